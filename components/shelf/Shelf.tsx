'use client';

import { useCallback, useMemo, useRef, useState } from 'react';
import { clock } from '@/components/charts/zone';
import { ErrorState } from '@/components/ui/Notice';
import { Button, LinkButton } from '@/components/ui/Button';
import { usePageLayout } from '@/components/ui/layout';
import { useNow } from '@/components/ui/now';
import { GroupBar } from '@/components/ui/Page';
import { Sentence } from '@/components/ui/Sentence';
import { StateMark } from '@/components/ui/StateMark';
import { useAlerts } from '@/lib/client/alerts';
import { useMe } from '@/lib/client/me';
import { useShelf } from '@/lib/client/shelf';
import { useKeptSince } from '@/lib/client/kept';
import { useKeepingAhead } from '@/lib/client/use-keeping-ahead';
import { useLiveState } from '@/lib/client/use-live-changes';
import { Herald } from './Herald';
import { useTicks } from '@/components/rounds/use-ticks';
import { useJobs } from '@/lib/client/jobs';
import { nothingDue, todaysJobs } from './jobs';
import { Lane, PhoneLane } from './Lane';
import { GROUPS, laneFigures, laneView } from './lanes';
import { EmptyLane, LaneGuard, LoadingLane } from './LaneStates';
import { ShelfAxis } from './ShelfAxis';
import { ShelfKey } from './ShelfKey';
import { PhoneToday, Today } from './Today';
import { placeLanes, placesOf, useSlides, type Places } from './placement';
import { useShelfKeys } from './use-shelf-keys';

const HOUR = 3_600;
const DAY = 24 * HOUR;
/** Two thirds behind now, one third ahead. */
const DAYS = { wide: { back: 16, ahead: 8 }, middle: { back: 16, ahead: 8 }, strip: { back: 9.6, ahead: 5.4 } } as const;

/** What is asked for: whole hours, so that the same question is asked all hour long, and wide enough for every layout. */
function askedSpan(now: number) {
  const hour = Math.floor(now / HOUR) * HOUR;
  const iso = (at: number) => new Date(at * 1000).toISOString();
  return { from: iso(hour - DAYS.wide.back * DAY), to: iso(hour + HOUR + DAYS.wide.ahead * DAY) };
}

/** One lane a vessel on one calendar, what wants a person first. */
export function Shelf() {
  const nowMs = useNow();
  const now = nowMs === null ? null : Math.floor(nowMs / 1000);
  const layout = usePageLayout();
  const { me, may } = useMe();
  const live = useLiveState();
  const kept = useKeptSince();
  const timeZone = me?.cellar.time_zone ?? 'UTC';
  const [skip, setSkip] = useState(0);
  const { shelf, error, loading, retry } = useShelf(now === null ? null : { ...askedSpan(now), ...(skip > 0 && { skip }) });
  useKeepingAhead(shelf?.items);
  const mayTake = may('alerts.acknowledge');
  const [maySee, mayWalk, mayDo] = [may('alerts.read'), may('jobs.read'), may('jobs.do')];
  const open = useAlerts(maySee ? { state: 'open', limit: 100 } : null);
  const taken = useAlerts(maySee ? { state: 'acknowledged', limit: 100 } : null);
  const rounds = useJobs(mayWalk ? { state: 'open', order: 'due', limit: 100 } : null);
  const alerts = useMemo(() => (open.alerts && taken.alerts ? [...open.alerts, ...taken.alerts] : undefined), [open.alerts, taken.alerts]);
  const ticks = useTicks();
  const list = useRef<HTMLDivElement>(null);
  const [held, setHeld] = useState<Places | null>(null);

  const views = useMemo(() => (shelf && now !== null ? shelf.items.map((lane) => laneView(lane, alerts, now, timeZone)) : []), [shelf, alerts, now, timeZone]);
  const groups = useMemo(() => placeLanes(views, held), [views, held]);
  const jobs = useMemo(() => (now === null ? [] : todaysJobs(rounds.jobs ?? [], ticks.ticked, now, timeZone)), [rounds.jobs, ticks.ticked, now, timeZone]);

  const { tick, ticked } = ticks;
  const tickFirst = useCallback(() => {
    const first = jobs.find(({ job }) => !ticked.has(job.id));
    if (first && mayDo) tick(first.job);
  }, [jobs, mayDo, tick, ticked]);
  useShelfKeys(list, tickFirst);
  useSlides(list, groups.map((group) => group.views.map((view) => view.lane.id).join()).join('|'));

  if (now === null || (!shelf && !error)) return <ShelfLoading />;
  if (!shelf) {
    return (
      <ErrorState title="The shelf did not load" onRetry={retry}>
        {error?.message ?? 'The server did not answer.'} Nothing that was logged is lost.
      </ErrorState>
    );
  }

  const phone = layout === 'strip';
  const span = { from: now - DAYS[layout].back * DAY, to: now + DAYS[layout].ahead * DAY };
  const staleAt = live.state === 'offline' || error || kept !== null ? Date.parse(shelf.now) / 1000 : null;
  const nothing = !mayWalk ? 'The rounds are for those who work here.' : rounds.error && !rounds.jobs ? 'The rounds could not be read; trying again.' : nothingDue(rounds.jobs ?? [], now, timeZone);
  const today = { jobs, ticks, nothing, now, timeZone, mayDo, loading: loading || (mayWalk && rounds.loading) };
  return (
    <div className="[--call:clamp(330px,28.06vw,404px)] [--vessel:308px]">
      <h1 className="heard-only">Shelf</h1>
      <Herald views={views} />
      {phone ? <PhoneToday {...today} /> : <Today {...today} />}
      {error && live.state !== 'offline' && (
        <div role="alert" className="flex flex-wrap items-center gap-3 border-b px-(--margin) py-2">
          <StateMark state="Check" />
          <span className="type-label">
            The shelf did not load anew. Shown as it was at {clock(Date.parse(shelf.now) / 1000, timeZone)}. {error.message}
          </span>
          <Button size="lane" onClick={retry} className="ml-auto">
            Try again
          </Button>
        </div>
      )}
      <div
        className={`sticky top-0 z-10 grid h-[34px] border-b-[1.5px] border-ink bg-sheet ${phone ? 'grid-cols-1' : layout === 'middle' ? 'grid-cols-[var(--vessel)_minmax(0,1fr)]' : 'grid-cols-[var(--vessel)_minmax(0,1fr)_var(--call)]'}`}
      >
        {!phone && <div className="type-label flex items-center pl-(--margin) text-ink2">Vessel</div>}
        <ShelfAxis span={span} now={now} timeZone={timeZone} />
        {layout === 'wide' && <div className="type-label flex items-center pl-[18px] text-ink2">Call</div>}
      </div>
      <div ref={list} onPointerEnter={(event) => event.pointerType === 'mouse' && setHeld(placesOf(groups))} onPointerLeave={() => setHeld(null)}>
        {GROUPS.map(({ group, word, note }, index) => {
          const lanes = groups[index]?.views ?? [];
          if (lanes.length === 0) return null;
          return (
            <section key={group} aria-label={`${word}: ${note}`}>
              <GroupBar word={word} note={`${lanes.length}, ${note}`} />
              <ul>
                {lanes.map((view) => {
                  const props = { view, span, now, timeZone, staleAt, mayTake };
                  return (
                    <LaneGuard key={view.lane.id} name={view.lane.name} gravity={laneFigures(view.lane, staleAt, now, timeZone).gravity}>
                      {phone ? <PhoneLane {...props} /> : <Lane {...props} layout={layout} />}
                    </LaneGuard>
                  );
                })}
              </ul>
            </section>
          );
        })}
        {shelf.total > shelf.items.length && (
          <Rest
            skip={skip}
            shown={shelf.items.length}
            total={shelf.total}
            onSkip={(to) => {
              setSkip(to);
              window.scrollTo({ top: 0 });
            }}
          />
        )}
        {views.length === 0 && shelf.total === 0 && (
          <ul>
            <EmptyLane may={may} />
          </ul>
        )}
      </div>
      <div className="flex flex-wrap items-center gap-x-6 max-strip:px-(--margin) max-strip:py-3 strip:pr-(--margin)">
        <div className="min-w-0 flex-1">
          <ShelfKey />
        </div>
        {views.length > 0 && may('batches.create') && (
          <LinkButton href="/batches/new" size="lane" className="my-1">
            Start a batch
          </LinkButton>
        )}
      </div>
    </div>
  );
}

/** A shelf longer than one answer: what is shown of it, and the way to the rest. */
function Rest({ skip, shown, total, onSkip }: { skip: number; shown: number; total: number; onSkip: (skip: number) => void }) {
  const left = total - skip - shown;
  return (
    <div className="flex flex-wrap items-center gap-3 border-b bg-desk px-(--margin) py-2">
      <p className="type-body mr-auto">
        <Sentence>{`Shown are ${skip + 1} to ${skip + shown} of ${total} vessels, those with an alert first.`}</Sentence>
      </p>
      {skip > 0 && <Button onClick={() => onSkip(0)}>Back to the first</Button>}
      {left > 0 && <Button onClick={() => onSkip(skip + shown)}>{left === 1 ? 'Show the last one' : `Show the next ${Math.min(left, shown)}`}</Button>}
    </div>
  );
}

function ShelfLoading() {
  return (
    <div className="[--call:clamp(330px,28.06vw,404px)] [--vessel:308px]" aria-busy>
      <h1 className="heard-only">Shelf</h1>
      <p role="status" className="heard-only">
        Loading the shelf
      </p>
      <div className="min-h-20 border-b bg-desk px-(--margin) py-3">
        <div className="type-head">Today</div>
      </div>
      <div className="h-[34px] border-b-[1.5px] border-ink" />
      <ul>
        {[0, 1, 2, 3].map((index) => (
          <LoadingLane key={index} first={index === 0} />
        ))}
      </ul>
    </div>
  );
}
