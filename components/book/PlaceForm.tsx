'use client';

import type { FormEvent } from 'react';
import { typedNumber } from '@/components/batch/figures';
import { Button } from '@/components/ui/Button';
import { Field } from '@/components/ui/Field';
import { FormError } from '@/components/ui/Notice';
import { useDraftForm, type Wrong } from '@/components/ui/use-draft-form';
import { UnitField } from '@/components/units/UnitField';
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
  const { draft, setDraft, set, errors, failed, sending, submit } = useDraftForm(blank);

  function send(event: FormEvent) {
    const [capacity, warmest] = [typedNumber(draft.room), typedNumber(draft.warm)];
    const wrong: Wrong = { ...(Number.isNaN(capacity) && { capacity: 'must be a number' }), ...(Number.isNaN(warmest) && { temperature_c: 'must be a number' }) };
    submit(
      event,
      Object.keys(wrong).length > 0
        ? { wrong }
        : async () => {
            await onSend({ name: draft.name.trim(), capacity, temperature_c: warmest });
            if (!place) setDraft(blank);
          },
    );
  }

  return (
    <form onSubmit={send} noValidate aria-label={place ? `Change ${place.name}` : 'New place'} className="flex w-full flex-wrap items-start gap-3 px-(--margin) py-3">
      <Field label={place ? 'name' : 'new place'} value={draft.name} maxLength={60} autoComplete="off" error={errors.name} onChange={set('name')} className="w-56 max-strip:w-full" />
      <Field label="holds" unit="bottles" placeholder="any" inputMode="numeric" value={draft.room} error={errors.capacity} onChange={set('room')} className="w-36" />
      <UnitField measure="temperature" label="warmest" placeholder="?" value={draft.warm} error={errors.temperature_c} onChange={set('warm')} className="w-32" />
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
