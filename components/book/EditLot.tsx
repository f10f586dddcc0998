'use client';

import type { FormEvent } from 'react';
import { fromLocal, toLocal } from '@/components/batch/entry-form';
import { Button } from '@/components/ui/Button';
import { Field, TextField } from '@/components/ui/Field';
import { FormError } from '@/components/ui/Notice';
import { useDraftForm } from '@/components/ui/use-draft-form';
import { updateLot } from '@/lib/client/lots';
import type { LotBody, UpdateLot } from '@/lib/contracts/lots';

/** What is written of a lot. What the bench judged stays as it was. */
export function EditLot({ lot, timeZone, onDone }: { lot: LotBody; timeZone: string; onDone: () => void }) {
  const readyAt = toLocal(Date.parse(lot.ready_from) / 1000, timeZone);
  const { draft, set, errors, failed, sending, submit } = useDraftForm({ name: lot.name, code: lot.code, ready: readyAt, note: lot.note ?? '', next: lot.own_next_time ?? '' });

  function changed(): UpdateLot | null {
    const readyFrom = fromLocal(draft.ready, timeZone);
    if (readyFrom === null) return null;
    const words = (text: string) => text.trim() || null;
    // Only what was changed: two people may write at once.
    return {
      ...(draft.name.trim() !== lot.name && { name: draft.name.trim() }),
      ...(draft.code.trim() !== lot.code && { code: draft.code.trim() }),
      ...(draft.ready !== readyAt && { ready_from: readyFrom }),
      ...(words(draft.note) !== lot.note && { note: words(draft.note) }),
      ...(words(draft.next) !== lot.own_next_time && { next_time: words(draft.next) }),
    };
  }

  function send(event: FormEvent) {
    const change = changed();
    submit(
      event,
      change === null
        ? { wrong: { ready_from: 'choose a day and a time' } }
        : async () => {
            if (Object.keys(change).length > 0) await updateLot(lot.id, change);
            onDone();
          },
    );
  }

  return (
    <form onSubmit={send} noValidate className="flex flex-col gap-4">
      <TextField label="Next time" rows={3} maxLength={500} value={draft.next} onChange={set('next')} error={errors.next_time} hint="Stands on the must sheet, and goes along when it is copied." />
      <Field label="Name" autoComplete="off" maxLength={80} value={draft.name} onChange={set('name')} error={errors.name} />
      <Field label="Code" autoComplete="off" maxLength={20} value={draft.code} onChange={set('code')} error={errors.code} />
      <Field label="Ready from" type="datetime-local" value={draft.ready} onChange={set('ready')} error={errors.ready_from} />
      <TextField label="Note" rows={3} maxLength={2000} value={draft.note} onChange={set('note')} error={errors.note} />
      {failed && <FormError>{failed}</FormError>}
      <Button look="first" type="submit" disabled={sending} className="self-end">
        {sending ? 'Keeping' : 'Keep it'}
      </Button>
    </form>
  );
}
