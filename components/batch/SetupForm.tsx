'use client';

import { useState, type FormEvent } from 'react';
import { Button } from '@/components/ui/Button';
import { FormError } from '@/components/ui/Notice';
import { updateBatch } from '@/lib/client/batches';
import { ClientError } from '@/lib/client/fetcher';
import { focusFirstError } from '@/lib/client/focus';
import type { BatchBody, UpdateBatch } from '@/lib/contracts/batches';
import { BatchFields } from './BatchFields';
import { batchErrors, batchToUpdate, draftOf, type BatchErrors } from './batch-form';
import { toLocal } from './entry-form';

interface SetupFormProps {
  batch: BatchBody;
  /** Seconds since 1970. */
  now: number;
  timeZone: string;
  onDone: () => void;
}

/** Changes what was told of a batch, ends it, or opens it again. */
export function SetupForm({ batch, now, timeZone, onDone }: SetupFormProps) {
  const [draft, setDraft] = useState(() => draftOf(batch, timeZone));
  const [errors, setErrors] = useState<BatchErrors>({});
  const [failed, setFailed] = useState<string | null>(null);
  const [sending, setSending] = useState(false);
  const [ending, setEnding] = useState(false);

  async function send(change: UpdateBatch) {
    setSending(true);
    setFailed(null);
    try {
      if (Object.keys(change).length > 0) await updateBatch(batch.id, change);
      onDone();
    } catch (error) {
      const told = error instanceof ClientError ? error : null;
      const fields = batchErrors(told?.fields ?? {});
      setErrors(fields);
      if (Object.keys(fields).length === 0) setFailed(told?.message ?? 'It was not saved. Try again.');
      setSending(false);
    }
  }

  function submit(event: FormEvent) {
    event.preventDefault();
    const made = batchToUpdate(draft, batch, timeZone);
    setErrors(made.errors ?? {});
    if (made.change) void send(made.change);
    else focusFirstError();
  }

  return (
    <form onSubmit={submit} noValidate className="flex flex-col gap-5">
      <BatchFields draft={draft} errors={errors} onChange={setDraft} latest={toLocal(now, timeZone)} fresh={false} batchId={batch.id} />
      {failed && <FormError>{failed}</FormError>}
      <div className="flex justify-end">
        <Button type="submit" look="first" disabled={sending}>
          {sending ? 'Saving' : 'Save the set-up'}
        </Button>
      </div>
      <section className="border-t pt-3">
        <h3 className="type-name">{batch.state === 'working' ? 'End the batch' : 'Open it again'}</h3>
        <p className="type-reason pb-2 text-ink2">
          {batch.state === 'working' ? 'It leaves the shelf and its sensor is free for another. The log and the curve are kept; it can be opened again.' : 'It goes back on the shelf. Put a sensor in again if it has one.'}
        </p>
        {batch.state === 'ended' ? (
          <Button disabled={sending} onClick={() => void send({ state: 'working' })}>
            Open it again
          </Button>
        ) : ending ? (
          <div className="flex gap-2">
            <Button look="final" disabled={sending} onClick={() => void send({ state: 'ended' })}>
              End {batch.name}
            </Button>
            <Button look="quiet" onClick={() => setEnding(false)}>
              Keep it on the shelf
            </Button>
          </div>
        ) : (
          <Button onClick={() => setEnding(true)}>End the batch</Button>
        )}
      </section>
    </form>
  );
}
