'use client';

import Link from 'next/link';
import { useId, useState } from 'react';
import { dayName } from '@/components/charts/zone';
import { Button } from '@/components/ui/Button';
import { Field, Select } from '@/components/ui/Field';
import { FormError } from '@/components/ui/Notice';
import { useAct } from '@/components/ui/use-act';
import type { SensorBody, UpdateSensor } from '@/lib/contracts/sensors';
import { useBatches } from '@/lib/client/batches';
import { updateSensor } from '@/lib/client/sensors';
import { fromLocalInput, toLocalInput } from './numbers';

/** One change of a sensor, with what is said while it runs and when it fails. */
export function useSensorChange(id: string) {
  const { busy, failed, fields, act } = useAct('Nothing was changed. Try again.');
  return { busy, failed, fields, change: (input: UpdateSensor) => act(() => updateSensor(id, input)) };
}

/** `one`, `one and two`, `one, two and three`. */
const listed = (names: readonly string[]) => (names.length < 2 ? names.join('') : `${names.slice(0, -1).join(', ')} and ${names.at(-1)}`);

/** The room that a room probe hangs in, by the name that batches give their place. */
export function Hanging({ sensor, mayAssign }: { sensor: SensorBody; mayAssign: boolean }) {
  const { batches } = useBatches({ state: 'working' });
  const { busy, failed, change } = useSensorChange(sensor.id);
  const [place, setPlace] = useState(sensor.place ?? '');
  const list = useId();
  const places = [...new Set((batches ?? []).flatMap((batch) => batch.place ?? []))].sort((a, b) => a.localeCompare(b, 'en', { numeric: true }));
  const sharing = sensor.place === null ? [] : (batches ?? []).filter((batch) => batch.place?.trim().toLowerCase() === sensor.place?.trim().toLowerCase());
  return (
    <section aria-label="In which place" className="flex flex-col gap-3 border-b px-(--margin) py-4">
      <p className="type-body">
        {sensor.place === null ? (
          'It hangs in no place. Name one, and the batches standing there show its temperature.'
        ) : (
          <>
            Its place: <b className="font-semibold">{sensor.place}</b>. {sharing.length === 0 ? 'No batch stands there now.' : `${listed(sharing.map((batch) => batch.name))} ${sharing.length === 1 ? 'stands there and shows' : 'stand there and show'} its temperature.`}
          </>
        )}
      </p>
      {failed && <FormError>{failed}</FormError>}
      {mayAssign && (
        <form className="flex flex-wrap items-start gap-2" onSubmit={(event) => (event.preventDefault(), void change({ place: place.trim() || null }))}>
          <Field label="it hangs" list={list} maxLength={80} autoComplete="off" value={place} onChange={(event) => setPlace(event.target.value)} className="min-w-48 flex-1" hint="As the batches name it. Empty: none." />
          <datalist id={list}>
            {places.map((name) => (
              <option key={name} value={name} />
            ))}
          </datalist>
          <Button type="submit" disabled={busy || place.trim() === (sensor.place ?? '')} className="mt-[22px]">
            Keep it so
          </Button>
        </form>
      )}
    </section>
  );
}

/** Which vessel it floats in: put in, moved, taken out. */
export function Placement({ sensor, mayAssign, timeZone, now }: { sensor: SensorBody; mayAssign: boolean; timeZone: string; now: number }) {
  const { batches } = useBatches({ state: 'working' });
  const { busy, failed, fields, change } = useSensorChange(sensor.id);
  const [chosen, setChosen] = useState('');
  const [since, setSince] = useState('');
  const at = () => (since === '' ? {} : { since: fromLocalInput(since, timeZone) ?? undefined });
  const done = (changed: boolean) => {
    if (!changed) return;
    setChosen('');
    setSince('');
  };
  const others = (batches ?? []).filter((batch) => batch.id !== sensor.batch?.id);
  const taken = sensor.kind === 'float' ? others.find((batch) => batch.id === chosen)?.sensor : undefined;
  return (
    <section aria-label="In which vessel" className="flex flex-col gap-3 border-b px-(--margin) py-4">
      <p className="type-body">
        {sensor.batch ? (
          <>
            In{' '}
            <Link href={`/batches/${sensor.batch.id}`} className="font-semibold underline underline-offset-2">
              {sensor.batch.name}
            </Link>{' '}
            <span className="fig">since {dayName(Date.parse(sensor.batch.since) / 1000, timeZone)}</span>. What it sends counts for this batch.
          </>
        ) : (
          sensor.kind === 'room' && sensor.place !== null ? 'At no vessel of its own: it tells of the room.' : 'In no vessel. What it sends is kept and counts for no batch.'
        )}
      </p>
      {failed && !fields.since && <FormError>{failed}</FormError>}
      {mayAssign && (
        <div className="flex flex-wrap items-end gap-2">
          <Select
            label={sensor.batch ? 'move it to' : 'put it in'}
            value={chosen}
            onChange={(event) => setChosen(event.target.value)}
            className="min-w-48 flex-1"
            hint={taken ? `${taken.name} is in it and comes out` : sensor.kind === 'float' ? 'one float a batch' : sensor.kind === 'room' ? 'for one vessel’s own air: a cupboard, a water bath' : 'looks into its neck'}
          >
            <option value="">choose a batch</option>
            {others.map((batch) => (
              <option key={batch.id} value={batch.id}>
                {batch.name}
                {batch.tag === null ? '' : `, tag ${batch.tag}`}
              </option>
            ))}
          </Select>
          <Field label="since" type="datetime-local" value={since} max={now > 0 ? toLocalInput(now * 1000, timeZone) : undefined} onChange={(event) => setSince(event.target.value)} error={fields.since} hint="left empty: now" className="w-full strip:w-60" />
          <Button disabled={busy || chosen === ''} onClick={() => void change({ batch_id: chosen, ...at() }).then(done)} className="mb-[22px]">
            {sensor.batch ? 'Move it' : 'Put it in'}
          </Button>
          {sensor.batch && (
            <Button look="quiet" disabled={busy} onClick={() => void change({ batch_id: null, ...at() }).then(done)} className="mb-[22px]">
              Take it out
            </Button>
          )}
        </div>
      )}
    </section>
  );
}
