'use client';

import { useState } from 'react';
import { when } from '@/components/charts/zone';
import { useAct } from '@/components/ui/use-act';
import { Button } from '@/components/ui/Button';
import { FormError } from '@/components/ui/Notice';
import { useNow } from '@/components/ui/now';
import { State } from '@/components/ui/StateMark';
import type { DeliveryBody, WebhookBody } from '@/lib/contracts/webhooks';
import { useMe } from '@/lib/client/me';
import { deliverAgain, removeWebhook, tryWebhook, updateWebhook, useDeliveries } from '@/lib/client/webhooks';

const STATES: Record<DeliveryBody['state'], { state: 'Done' | 'In hand' | 'Check'; word: string }> = {
  delivered: { state: 'Done', word: 'Delivered' },
  waiting: { state: 'In hand', word: 'Waits' },
  failed: { state: 'Check', word: 'Given up' },
};

/** A time as the cellar's clock has it. */
function useAt(): (time: string) => string {
  const { me } = useMe();
  const now = (useNow() ?? 0) / 1000;
  return (time) => when(Date.parse(time) / 1000, now, me?.cellar.time_zone ?? 'UTC');
}

function Deliveries({ id }: { id: string }) {
  const { deliveries } = useDeliveries(id);
  const { busy, act } = useAct();
  const at = useAt();
  if (!deliveries) return null;
  if (deliveries.length === 0) return <p className="type-reason py-2 text-ink2">Nothing was owed yet.</p>;
  return (
    <ul className="max-h-96 overflow-y-auto border-t">
      {deliveries.map((delivery) => (
        <li key={delivery.id} className="flex flex-wrap items-center gap-x-4 gap-y-1 border-b border-rule py-1.5">
          <span className="w-28">
            <State {...STATES[delivery.state]} />
          </span>
          <span className="type-label w-24">{delivery.event}</span>
          <span className="type-label min-w-0 flex-1 break-words text-ink2">
            {at(delivery.created_at)}
            {delivery.status !== null && `, answered ${delivery.status}`}
            {delivery.error !== null && delivery.status === null && `, ${delivery.error}`}
            {delivery.attempts > 1 && `, ${delivery.attempts} tries`}
            {delivery.next_attempt_at && delivery.attempts > 0 && `, again ${at(delivery.next_attempt_at)}`}
          </span>
          {delivery.state !== 'delivered' && (
            <Button size="lane" look="quiet" disabled={busy} onClick={() => void act(() => deliverAgain(id, delivery.id))}>
              Send now
            </Button>
          )}
        </li>
      ))}
    </ul>
  );
}

/** One webhook with its log. */
export function WebhookRow({ webhook }: { webhook: WebhookBody }) {
  const [open, setOpen] = useState(false);
  const [sure, setSure] = useState(false);
  const { busy, failed, act } = useAct();
  const at = useAt();
  return (
    <li className="border-b px-(--margin) py-3">
      {failed && <FormError>{failed}</FormError>}
      <div className="flex flex-wrap items-center gap-x-4 gap-y-2">
        <span className="min-w-0 flex-1">
          <span className="block break-all font-mono text-[0.8125rem] font-semibold">{webhook.url}</span>
          <span className="type-label text-ink2">{webhook.events.join(', ')}</span>
        </span>
        {webhook.given_up_at ? <State state="Check" word="Given up" /> : webhook.disabled ? <State state="Leave be" word="Switched off" /> : webhook.last && <State {...STATES[webhook.last.state]} />}
      </div>
      {webhook.failing_since && (
        <p className="type-reason pt-1 text-ink2">
          {webhook.given_up_at ? `Switched off by the house ${at(webhook.given_up_at)}: nothing arrived since ${at(webhook.failing_since)}. The keepers were told.` : `Nothing arrives since ${at(webhook.failing_since)}. After five days it is switched off.`}
        </p>
      )}
      <div className="flex flex-wrap gap-2 pt-2">
        <Button size="lane" aria-expanded={open} onClick={() => setOpen(!open)}>
          {open ? 'Put the log away' : 'Log'}
        </Button>
        <Button size="lane" disabled={busy || webhook.disabled} onClick={() => void act(() => tryWebhook(webhook.id)).then((sent) => sent && setOpen(true))}>
          Try it
        </Button>
        <Button size="lane" disabled={busy} onClick={() => void act(() => updateWebhook(webhook.id, { disabled: !webhook.disabled }))}>
          {webhook.disabled ? 'Switch it on' : 'Switch it off'}
        </Button>
        {sure ? (
          <>
            <Button size="lane" look="final" disabled={busy} onClick={() => void act(() => removeWebhook(webhook.id))}>
              Remove it with its log
            </Button>
            <Button size="lane" onClick={() => setSure(false)}>
              Leave it
            </Button>
          </>
        ) : (
          <Button size="lane" look="quiet" onClick={() => setSure(true)}>
            Remove
          </Button>
        )}
      </div>
      {open && <Deliveries id={webhook.id} />}
    </li>
  );
}
