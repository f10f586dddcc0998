'use client';

import Link from 'next/link';
import { useSearchParams } from 'next/navigation';
import { useState } from 'react';
import { FilterTabs } from '@/components/ui/FilterTabs';
import { Haze } from '@/components/ui/Haze';
import { Button, LinkButton } from '@/components/ui/Button';
import { EmptyState, ErrorState, FormError } from '@/components/ui/Notice';
import { useNow } from '@/components/ui/now';
import { GroupBar, PageHead } from '@/components/ui/Page';
import { resolveAlert, useAlerts } from '@/lib/client/alerts';
import { ClientError } from '@/lib/client/fetcher';
import { useMe } from '@/lib/client/me';
import { useMessages } from '@/lib/client/messages';
import type { AlertBody } from '@/lib/contracts/alerts';
import type { MessagesBody } from '@/lib/contracts/messages';
import { clockOf } from '@/components/messages/words';
import { AlertDetail } from './AlertDetail';
import { AlertRow } from './AlertRow';
import { byNeed } from './rows';

type Tab = 'all' | AlertBody['state'];

const GROUPS: { state: AlertBody['state']; word: string; note: string }[] = [
  { state: 'open', word: 'Open', note: 'nobody has these yet' },
  { state: 'acknowledged', word: 'In hand', note: 'someone said they have it' },
  { state: 'resolved', word: 'Cleared', note: 'newest first' },
];

/** Cleared alerts shown before somebody asks for more. */
const CLEARED_FIRST = 8;
const STEP = 40;

/** Why an alert of the night may be told in the morning. */
function QuietHours({ messages }: { messages: MessagesBody | undefined }) {
  if (!messages?.quiet) return null;
  return (
    <p className="type-label ml-auto text-ink2 max-strip:w-full">
      <Link href="/settings/messages" className="no-underline hover:underline">
        your quiet hours {clockOf(messages.quiet.from)} to {clockOf(messages.quiet.to)}; what can hurt still rings
      </Link>
    </p>
  );
}

export function AlertsPage() {
  const { me, may, error: meError, retry: retryMe } = useMe();
  const timeZone = me?.cellar.time_zone ?? 'UTC';
  const { messages } = useMessages();
  const nowMs = useNow();
  const asked = useSearchParams().get('alert');
  const [tab, setTab] = useState<Tab>('all');
  const [cleared, setCleared] = useState(CLEARED_FIRST);
  const [taking, setTaking] = useState<string | null>(null);
  const [failed, setFailed] = useState<string | null>(null);
  const mayRead = may('alerts.read');

  const open = useAlerts(mayRead ? { state: 'open', limit: 100 } : null);
  const acknowledged = useAlerts(mayRead ? { state: 'acknowledged', limit: 100 } : null);
  const resolved = useAlerts(mayRead ? { state: 'resolved', limit: tab === 'resolved' ? Math.max(STEP, cleared) : cleared } : null);
  const error = open.error ?? acknowledged.error ?? resolved.error;

  if (me && !mayRead) {
    return (
      <>
        <PageHead title="Alerts" />
        <EmptyState title="Alerts are for those who tend the vessels" action={<LinkButton href="/shelf">To the shelf</LinkButton>}>
          As a guest of {me.cellar.name} you see its batches and bottles.
        </EmptyState>
      </>
    );
  }
  if ((error && !open.alerts) || (meError && !me)) {
    return (
      <>
        <PageHead title="Alerts" />
        <ErrorState title="The alerts did not load" onRetry={() => [open.retry, acknowledged.retry, resolved.retry, retryMe].forEach((retry) => retry())}>
          {(error ?? meError)?.message} Until they do, look at the vessels themselves.
        </ErrorState>
      </>
    );
  }
  if (!open.alerts || !acknowledged.alerts || !resolved.alerts || nowMs === null || !me) return <Haze height={420} label="Loading the alerts" className="m-(--margin)" />;

  const now = nowMs / 1000;
  const rest = messages?.quiet ? { quiet: { fromMin: messages.quiet.from, toMin: messages.quiet.to }, timeZone: messages.time_zone } : null;
  const counts = open.counts;
  const shown = { open: byNeed(open.alerts), acknowledged: acknowledged.alerts, resolved: resolved.alerts };
  const everything = [...shown.open, ...shown.acknowledged, ...shown.resolved];
  // On a wide page the worst open alert stands beside the list; on a phone only what was chosen.
  const chosen = everything.find((alert) => alert.id === asked) ?? null;
  const beside = chosen ?? everything[0] ?? null;
  // The address keeps the choice for the way back and for sharing; nothing has to be fetched for it.
  const choose = (id: string | null) => window.history.pushState(null, '', id === null ? '/alerts' : `/alerts?alert=${id}`);

  async function clear(alert: AlertBody) {
    setFailed(null);
    try {
      await resolveAlert(alert.id);
    } catch (error) {
      setFailed(error instanceof ClientError ? error.message : 'It was not cleared. Try again.');
    }
  }

  return (
    <div className="wide:grid wide:min-h-[calc(100dvh-var(--header))] wide:grid-cols-[minmax(0,1fr)_452px]">
      <div className={chosen ? 'max-wide:hidden' : ''}>
        <div className="flex flex-wrap items-center gap-x-5 gap-y-2 border-b-[1.5px] border-ink px-(--margin) py-3">
          <h1 className="type-head">Alerts</h1>
          <FilterTabs
            label="Show"
            value={tab}
            onChoose={setTab}
            tabs={[
              { value: 'all', name: 'All' },
              { value: 'open', name: 'Open', count: counts?.open },
              { value: 'acknowledged', name: 'In hand', count: counts?.acknowledged },
              { value: 'resolved', name: 'Cleared', count: counts?.resolved },
            ]}
          />
          <QuietHours messages={messages} />
        </div>
        {failed && <FormError>{failed}</FormError>}
        {everything.length === 0 && (
          <EmptyState title="Nothing to tell">No call has turned into an alert. When one does, it stands here and goes out by mail.</EmptyState>
        )}
        {GROUPS.filter((group) => tab === 'all' || tab === group.state).map((group) => {
          const alerts = shown[group.state];
          if (alerts.length === 0 && (tab === 'all' || everything.length === 0)) return null;
          return (
            <section key={group.state} aria-label={group.word}>
              <GroupBar word={group.word} note={group.note} />
              {alerts.length === 0 && <p className="type-body border-b px-(--margin) py-4 text-ink2">None.</p>}
              <ul>
                {alerts.map((alert) => (
                  <AlertRow
                    key={alert.id}
                    alert={alert}
                    now={now}
                    timeZone={timeZone}
                    chosen={beside?.id === alert.id}
                    mayTake={may('alerts.acknowledge')}
                    mayClear={may('alerts.resolve')}
                    onChoose={() => {
                      setTaking(null);
                      choose(alert.id);
                    }}
                    onTake={() => {
                      setTaking(alert.id);
                      choose(alert.id);
                    }}
                    onClear={() => void clear(alert)}
                  />
                ))}
              </ul>
              {group.state === 'resolved' && resolved.nextCursor !== null && (
                <div className="border-b px-(--margin) py-2">
                  <Button look="quiet" onClick={() => setCleared(Math.min(200, Math.max(cleared, alerts.length) + STEP))}>
                    Show older ones
                  </Button>
                </div>
              )}
            </section>
          );
        })}
      </div>
      {beside && (
        <div className={`wide:border-l-[1.5px] wide:border-ink wide:bg-lit ${chosen ? '' : 'max-wide:hidden'}`}>
          <div className="wide:sticky wide:top-0">
            <AlertDetail key={beside.id} alert={beside} now={now} timeZone={timeZone} rest={rest} mayTake={may('alerts.acknowledge')} mayClear={may('alerts.resolve')} taking={taking === beside.id} onBack={() => choose(null)} />
          </div>
        </div>
      )}
    </div>
  );
}
