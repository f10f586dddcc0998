'use client';

import { useState, type FormEvent } from 'react';
import { when } from '@/components/charts/zone';
import { Button } from '@/components/ui/Button';
import { Choice } from '@/components/ui/Choice';
import { TextField } from '@/components/ui/Field';
import { FormError } from '@/components/ui/Notice';
import { createEntry, removeEntry } from '@/lib/client/entries';
import { ClientError } from '@/lib/client/fetcher';
import type { CallRow } from './calls';

const LINK = 'type-label min-h-11 text-ink2 underline decoration-rule2 underline-offset-4 hover:text-ink strip:min-h-6';

/** Asks for the answer and the reason; the program's own words stay beside them. */
export function Overrule({ row, batchId }: { row: CallRow; batchId: string }) {
  const [open, setOpen] = useState(false);
  const [instead, setInstead] = useState<'yes' | 'no'>('no');
  const [reason, setReason] = useState('');
  const [failed, setFailed] = useState<string | null>(null);
  const [sending, setSending] = useState(false);
  const [clientId] = useState(() => crypto.randomUUID());

  async function send(event: FormEvent) {
    event.preventDefault();
    if (reason.trim() === '') {
      setFailed('Say why: the log keeps both.');
      return;
    }
    setSending(true);
    setFailed(null);
    try {
      await createEntry(batchId, { kind: 'overrule', at: new Date().toISOString(), text: reason, detail: { call: row.name, instead }, client_id: clientId });
      setOpen(false);
    } catch (error) {
      setFailed(error instanceof ClientError ? error.message : 'It was not saved. Try again.');
    }
    setSending(false);
  }

  if (!open) {
    return (
      <button type="button" className={LINK} onClick={() => setOpen(true)} aria-label={`I know better: ${row.question}`}>
        I know better
      </button>
    );
  }
  return (
    <form onSubmit={(event) => void send(event)} noValidate className="mt-2 flex w-full flex-col gap-3 border-l-[3px] border-rule2 pl-3">
      <Choice
        label={`Your answer: ${row.question}`}
        value={instead}
        onChoose={setInstead}
        options={[
          { value: 'yes', name: 'yes' },
          { value: 'no', name: 'no' },
        ]}
      />
      <TextField label="Why" value={reason} onChange={(event) => setReason(event.target.value)} rows={2} maxLength={2000} />
      <p className="type-label text-ink2">It tells nobody and makes no job until it says something else. The log keeps both{row.name === 'bottle' ? '; the bench still judges the bottles by itself' : ''}.</p>
      {failed && <FormError>{failed}</FormError>}
      <div className="flex justify-end gap-2">
        <Button size="lane" look="quiet" onClick={() => setOpen(false)}>
          Leave it
        </Button>
        <Button size="lane" type="submit" disabled={sending}>
          {sending ? 'Saving' : 'Overrule it'}
        </Button>
      </div>
    </form>
  );
}

/** What a person holds instead; it can be taken back. */
export function Overruled({ row, batchId, now, timeZone, mayTakeBack }: { row: CallRow; batchId: string; now: number; timeZone: string; mayTakeBack: boolean }) {
  const [failed, setFailed] = useState<string | null>(null);
  if (!row.overruled) return null;
  const { id, by, at, instead, reason } = row.overruled;
  return (
    <div className="mt-2 border-l-[3px] border-ink pl-3">
      <p className="type-reason">
        {instead && <strong className="font-semibold">{instead === 'yes' ? 'Yes' : 'No'}: </strong>}
        {reason}
      </p>
      <p className="type-label text-ink2">
        {by ?? 'somebody who has left'}, {when(Date.parse(at) / 1000, now, timeZone)}
        {mayTakeBack && (
          <>
            {' · '}
            <button type="button" className={LINK} onClick={() => void removeEntry(batchId, id).catch((error: unknown) => setFailed(error instanceof ClientError ? error.message : 'Not saved. Try again.'))}>
              heed the call again
            </button>
          </>
        )}
      </p>
      {failed && <FormError>{failed}</FormError>}
    </div>
  );
}
