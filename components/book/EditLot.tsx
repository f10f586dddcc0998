'use client';

import { useState, type FormEvent } from 'react';
import { fromLocal, toLocal } from '@/components/batch/entry-form';
import { Button } from '@/components/ui/Button';
import { Field, TextField } from '@/components/ui/Field';
import { FormError } from '@/components/ui/Notice';
import { ClientError } from '@/lib/client/fetcher';
import { updateLot } from '@/lib/client/lots';
import type { LotBody, UpdateLot } from '@/lib/contracts/lots';

/** What is written of a lot. What the bench judged stays as it was. */
export function EditLot({ lot, timeZone, onDone }: { lot: LotBody; timeZone: string; onDone: () => void }) {
  const readyAt = toLocal(Date.parse(lot.ready_from) / 1000, timeZone);
  const [draft, setDraft] = useState({ name: lot.name, code: lot.code, ready: readyAt, note: lot.note ?? '', next: lot.own_next_time ?? '' });
  const [errors, setErrors] = useState<Record<string, string[]>>({});
  const [failed, setFailed] = useState<string | null>(null);
  const [sending, setSending] = useState(false);
  const set = (field: keyof typeof draft) => (event: { target: { value: string } }) => setDraft((before) => ({ ...before, [field]: event.target.value }));

  async function send(event: FormEvent) {
    event.preventDefault();
    setErrors({});
    setFailed(null);
    const readyFrom = fromLocal(draft.ready, timeZone);
    if (readyFrom === null) return setErrors({ ready_from: ['choose a day and a time'] });
    const words = (text: string) => text.trim() || null;
    // Only what was changed: two people may write at once.
    const changed: UpdateLot = {
      ...(draft.name.trim() !== lot.name && { name: draft.name.trim() }),
      ...(draft.code.trim() !== lot.code && { code: draft.code.trim() }),
      ...(draft.ready !== readyAt && { ready_from: readyFrom }),
      ...(words(draft.note) !== lot.note && { note: words(draft.note) }),
      ...(words(draft.next) !== lot.own_next_time && { next_time: words(draft.next) }),
    };
    if (Object.keys(changed).length === 0) return onDone();
    setSending(true);
    try {
      await updateLot(lot.id, changed);
      onDone();
    } catch (error) {
      const told = error instanceof ClientError ? error : null;
      setErrors(told?.fields ?? {});
      if (!told || Object.keys(told.fields).length === 0) setFailed(told?.message ?? 'It was not changed. Try again.');
      setSending(false);
    }
  }

  return (
    <form onSubmit={(event) => void send(event)} noValidate className="flex flex-col gap-4">
      <TextField label="Next time" rows={3} maxLength={500} value={draft.next} onChange={set('next')} error={errors.next_time?.[0]} hint="Stands on the must sheet, and goes along when it is copied." />
      <Field label="Name" autoComplete="off" maxLength={80} value={draft.name} onChange={set('name')} error={errors.name?.[0]} />
      <Field label="Code" autoComplete="off" maxLength={20} value={draft.code} onChange={set('code')} error={errors.code?.[0]} />
      <Field label="Ready from" type="datetime-local" value={draft.ready} onChange={set('ready')} error={errors.ready_from?.[0]} />
      <TextField label="Note" rows={3} maxLength={2000} value={draft.note} onChange={set('note')} error={errors.note?.[0]} />
      {failed && <FormError>{failed}</FormError>}
      <Button look="first" type="submit" disabled={sending} className="self-end">
        {sending ? 'Keeping' : 'Keep it'}
      </Button>
    </form>
  );
}
