'use client';

import { useState, type FormEvent } from 'react';
import { degrees, typedNumber } from '@/components/batch/figures';
import { Button } from '@/components/ui/Button';
import { Field } from '@/components/ui/Field';
import { UnitField } from '@/components/units/UnitField';
import { Haze } from '@/components/ui/Haze';
import { FormError } from '@/components/ui/Notice';
import { State } from '@/components/ui/StateMark';
import { ClientError } from '@/lib/client/fetcher';
import { createPlace, removePlace, usePlaces } from '@/lib/client/lots';

/** Places with their room; full is said, not only drawn. */
export function Places({ mayManage }: { mayManage: boolean }) {
  const { places, error } = usePlaces();
  const [name, setName] = useState('');
  const [room, setRoom] = useState('');
  const [warm, setWarm] = useState('');
  const [errors, setErrors] = useState<Record<string, string[]>>({});
  const [failed, setFailed] = useState<string | null>(null);

  async function attempt(act: () => Promise<unknown>) {
    setErrors({});
    setFailed(null);
    try {
      await act();
      return true;
    } catch (problem) {
      const told = problem instanceof ClientError ? problem : null;
      setErrors(told?.fields ?? {});
      if (!told || Object.keys(told.fields).length === 0) setFailed(told?.message ?? 'It was not changed. Try again.');
      return false;
    }
  }
  async function add(event: FormEvent) {
    event.preventDefault();
    if (await attempt(() => createPlace({ name, capacity: typedNumber(room), temperature_c: typedNumber(warm) }))) {
      setName('');
      setRoom('');
      setWarm('');
    }
  }

  if (error && !places) return <p className="type-body px-(--margin) py-3 text-ink2">The places did not load. {error.message}</p>;
  if (!places) return <Haze height={60} label="Loading the places" className="m-(--margin)" />;
  return (
    <>
      {places.length === 0 && <p className="type-body border-b px-(--margin) py-3 text-ink2">No place is named yet.</p>}
      <ul>
        {places.map((place) => {
          const full = place.capacity !== null && place.bottles >= place.capacity;
          return (
            <li key={place.id} className="flex flex-wrap items-center gap-x-5 gap-y-1 border-b border-rule px-(--margin) py-2">
              <span className="type-name-low min-w-40">{place.name}</span>
              <span className="type-label text-ink2">
                {place.capacity === null ? `${place.bottles} bottles` : `${place.bottles} of ${place.capacity} bottles`}
                {place.temperature_c !== null && `, up to ${degrees(place.temperature_c)}`}
              </span>
              {full && <State state="Check" word="Full" size={13} />}
              {mayManage && place.bottles === 0 && (
                <button type="button" aria-label={`Take ${place.name} away`} onClick={() => void attempt(() => removePlace(place.id))} className="type-label ml-auto min-h-8 text-ink2 underline underline-offset-4 max-strip:min-h-11">
                  Take away
                </button>
              )}
            </li>
          );
        })}
      </ul>
      {failed && <FormError>{failed}</FormError>}
      {mayManage && (
        <form onSubmit={(event) => void add(event)} className="flex flex-wrap items-start gap-3 border-b px-(--margin) py-3">
          <Field label="new place" value={name} error={errors.name?.[0]} onChange={(event) => setName(event.target.value)} className="w-56" />
          <Field label="holds" unit="bottles" placeholder="any" inputMode="numeric" value={room} error={errors.capacity?.[0]} onChange={(event) => setRoom(event.target.value)} className="w-36" />
          <UnitField measure="temperature" label="warmest" placeholder="?" value={warm} error={errors.temperature_c?.[0]} onChange={(event) => setWarm(event.target.value)} className="w-32" />
          <Button type="submit" className="mt-[22px]" disabled={name.trim() === ''}>
            Add
          </Button>
        </form>
      )}
    </>
  );
}
