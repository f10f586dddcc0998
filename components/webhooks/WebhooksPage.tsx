'use client';

import { useState, type FormEvent } from 'react';
import { CopyLine } from '@/components/sensors/ConnectLines';
import { useAct } from '@/components/ui/use-act';
import { Box } from '@/components/ui/Box';
import { Button } from '@/components/ui/Button';
import { Field } from '@/components/ui/Field';
import { Haze } from '@/components/ui/Haze';
import { ErrorState, FormError } from '@/components/ui/Notice';
import { GroupBar } from '@/components/ui/Page';
import { WEBHOOK_EVENTS, type CreatedWebhookBody, type WebhookEvent } from '@/lib/contracts/webhooks';
import { createWebhook, useWebhooks } from '@/lib/client/webhooks';
import { WebhookRow } from './WebhookRow';

export const EVENT_WORDS: Record<WebhookEvent, string> = {
  alert: 'an alert opens, is taken or ends',
  assessment: 'a call of a batch changes',
  entry: 'something is logged',
  batch: 'a batch is begun, changed or ended',
  sensor: 'a sensor is moved or changed',
  lot: 'bottles are filled, moved or opened',
  job: 'a job is done or comes up',
};

function NewWebhook({ onMade }: { onMade: (made: CreatedWebhookBody) => void }) {
  const [url, setUrl] = useState('');
  const [events, setEvents] = useState<readonly WebhookEvent[]>(['alert']);
  const { busy, failed, fields, act } = useAct('The webhook was not made. Try again.');
  const submit = (event: FormEvent) => {
    event.preventDefault();
    void act(async () => {
      onMade(await createWebhook({ url: url.trim(), events: [...events] }));
      setUrl('');
    });
  };
  return (
    <form noValidate onSubmit={submit} className="flex flex-col gap-3 border-b bg-desk px-(--margin) py-4">
      {failed && <FormError>{failed}</FormError>}
      <Field label="address" type="url" inputMode="url" value={url} onChange={(event) => setUrl(event.target.value)} error={fields.url} hint="https, of the open Internet" autoComplete="off" className="max-w-[560px]" />
      <fieldset className="flex flex-col gap-2">
        <legend className="type-label mb-1 text-ink2">tell it when</legend>
        {WEBHOOK_EVENTS.map((event) => (
          <Box key={event} ticked={events.includes(event)} onTick={(ticked) => setEvents(ticked ? [...events, event] : events.filter((other) => other !== event))}>
            <span className="type-body">{EVENT_WORDS[event]}</span>
          </Box>
        ))}
        {fields.events && <p className="type-label text-madder">{fields.events}</p>}
      </fieldset>
      <div>
        <Button type="submit" look="first" disabled={busy}>
          Add it
        </Button>
      </div>
    </form>
  );
}

/** Where other programs are told of changes, and what became of each word. */
export function WebhooksPage() {
  const { webhooks, loading, error, retry } = useWebhooks();
  const [made, setMade] = useState<CreatedWebhookBody | null>(null);
  return (
    <>
      {made && (
        <div className="flex flex-col gap-3 border-b border-l-[3px] border-l-ink bg-lit px-(--margin) py-4">
          <h2 className="type-verdict-now">The key is shown this one time</h2>
          <CopyLine label="key that signs each delivery" text={made.secret} />
          <p className="type-body max-w-[72ch] text-ink2">
            Each delivery carries <code className="font-mono text-[0.8125rem]">Fallbright-Signature: t=…,v1=…</code>. Make the HMAC-SHA256 of t, a full stop and the body with this key, compare it with v1 in constant time, and refuse what is older than 5 minutes.
          </p>
          <div>
            <Button onClick={() => setMade(null)}>It is kept</Button>
          </div>
        </div>
      )}
      <GroupBar word="Webhooks" note="tried again for a day; switched off after five days without any" />
      {loading && <Haze height={60} label="Loading the webhooks" className="mx-(--margin) my-3" />}
      {error && !webhooks && (
        <ErrorState title="The webhooks did not load" onRetry={retry}>
          {error.message}
        </ErrorState>
      )}
      {webhooks?.length === 0 && <p className="type-body border-b px-(--margin) py-3 text-ink2">None yet. A program of yours that listens at an address can be told of alerts and changes there.</p>}
      <ul>
        {webhooks?.map((webhook) => (
          <WebhookRow key={webhook.id} webhook={webhook} />
        ))}
      </ul>
      <GroupBar word="Add one" />
      <NewWebhook onMade={setMade} />
    </>
  );
}
