'use client';

import { useState, type FormEvent } from 'react';
import { typedNumber } from '@/components/batch/figures';
import { Button } from '@/components/ui/Button';
import { Field } from '@/components/ui/Field';
import { FormError } from '@/components/ui/Notice';
import { UnitField } from '@/components/units/UnitField';
import { ClientError } from '@/lib/client/fetcher';
import type { PlaceBody, PlaceForm as PlaceInput } from '@/lib/contracts/lots';

interface PlaceFormProps {
  /** The place that is changed; null for a new one. */
  place: PlaceBody | null;
  onSend: (input: PlaceInput) => Promise<unknown>;
  /** Called where nothing is to be changed after all. */
  onLeave?: () => void;
}

/** A place by its name, how many bottles fit, and how warm it gets at most. What was typed stays until it is kept. */
export function PlaceForm({ place, onSend, onLeave }: PlaceFormProps) {
  const blank = { name: place?.name ?? '', room: place?.capacity == null ? '' : String(place.capacity), warm: place?.temperature_c == null ? '' : String(place.temperature_c) };
  const [draft, setDraft] = useState(blank);
  const [errors, setErrors] = useState<Record<string, string[]>>({});
  const [failed, setFailed] = useState<string | null>(null);
  const [sending, setSending] = useState(false);
  const set = (field: keyof typeof draft) => (event: { target: { value: string } }) => setDraft((before) => ({ ...before, [field]: event.target.value }));

  async function send(event: FormEvent) {
    event.preventDefault();
    setErrors({});
    setFailed(null);
    const [capacity, warmest] = [typedNumber(draft.room), typedNumber(draft.warm)];
    if (Number.isNaN(capacity) || Number.isNaN(warmest)) return setErrors({ ...(Number.isNaN(capacity) && { capacity: ['must be a number'] }), ...(Number.isNaN(warmest) && { temperature_c: ['must be a number'] }) });
    setSending(true);
    try {
      await onSend({ name: draft.name.trim(), capacity, temperature_c: warmest });
      if (!place) setDraft(blank);
    } catch (error) {
      const told = error instanceof ClientError ? error : null;
      setErrors(told?.fields ?? {});
      if (!told || Object.keys(told.fields).length === 0) setFailed(told?.message ?? 'It was not changed. Try again.');
    }
    setSending(false);
  }

  return (
    <form onSubmit={(event) => void send(event)} noValidate aria-label={place ? `Change ${place.name}` : 'New place'} className="flex w-full flex-wrap items-start gap-3 px-(--margin) py-3">
      <Field label={place ? 'name' : 'new place'} value={draft.name} maxLength={60} autoComplete="off" error={errors.name?.[0]} onChange={set('name')} className="w-56 max-strip:w-full" />
      <Field label="holds" unit="bottles" placeholder="any" inputMode="numeric" value={draft.room} error={errors.capacity?.[0]} onChange={set('room')} className="w-36" />
      <UnitField measure="temperature" label="warmest" placeholder="?" value={draft.warm} error={errors.temperature_c?.[0]} onChange={set('warm')} className="w-32" />
      <div className="mt-[22px] flex gap-2">
        <Button type="submit" look={place ? 'first' : 'plain'} disabled={sending || draft.name.trim() === ''}>
          {place ? 'Keep it' : 'Add'}
        </Button>
        {onLeave && (
          <Button look="quiet" onClick={onLeave}>
            Leave it
          </Button>
        )}
      </div>
      {failed && (
        <div className="w-full">
          <FormError>{failed}</FormError>
        </div>
      )}
    </form>
  );
}
