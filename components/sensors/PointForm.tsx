'use client';

import { useState, type FormEvent } from 'react';
import { Button } from '@/components/ui/Button';
import { Choice } from '@/components/ui/Choice';
import { Field } from '@/components/ui/Field';
import { FormError } from '@/components/ui/Notice';
import { Sentence } from '@/components/ui/Sentence';
import { UnitField } from '@/components/units/UnitField';
import { calibrationPointForm, type CalibrationBody } from '@/lib/contracts/calibration';
import { addPoint } from '@/lib/client/calibration';
import { readNumber } from './numbers';
import { useAct } from '@/components/ui/use-act';
import { sentencesOf, firstOf } from '@/lib/contracts/issues';

type Way = 'water' | 'sugar' | 'hydrometer';
const WAYS: readonly { value: Way; name: string }[] = [
  { value: 'water', name: 'Water' },
  { value: 'sugar', name: 'Sugar' },
  { value: 'hydrometer', name: 'Hydrometer' },
];
const HINTS: Record<Way, string> = {
  water: 'Plain water: 1.000 at 20 °C.',
  sugar: 'Table sugar weighed in, then water up to the mark of one litre.',
  hydrometer: 'Any liquid, read with a hydrometer you trust.',
};

/** Notes a point. The inclination it says right now is offered. */
export function PointForm({ sensor, last }: { sensor: string; last: CalibrationBody['last'] }) {
  const [way, setWay] = useState<Way>('sugar');
  const [values, setValues] = useState({ inclination: '', gravity: '', sugar: '', temperature: '20' });
  const { busy, failed, fields, act, setFields } = useAct('The point was not noted. Try again.');
  const set = (name: keyof typeof values) => (event: { target: { value: string } }) => setValues((before) => ({ ...before, [name]: event.target.value }));

  async function submit(event: FormEvent) {
    event.preventDefault();
    const parsed = calibrationPointForm.safeParse({
      source: way,
      inclination: readNumber(values.inclination),
      temperature: readNumber(values.temperature),
      gravity: way === 'hydrometer' ? readNumber(values.gravity) : null,
      sugar_g_per_l: way === 'sugar' ? readNumber(values.sugar) : null,
    });
    if (!parsed.success) return setFields(firstOf(sentencesOf(parsed.error.issues)));
    if (await act(() => addPoint(sensor, parsed.data))) setValues((before) => ({ ...before, inclination: '', gravity: '', sugar: '' }));
  }

  return (
    <form noValidate onSubmit={(event) => void submit(event)} className="flex flex-col gap-3 bg-desk px-(--margin) py-4">
      {failed && <FormError>{failed}</FormError>}
      <Choice label="the float is in" value={way} onChoose={setWay} options={WAYS} className="max-w-[420px]" />
      <p className="type-reason -mt-1.5 text-ink2">
        <Sentence>{HINTS[way]}</Sentence>
      </p>
      <div className="flex flex-wrap items-start gap-3">
        {way === 'sugar' && <Field label="sugar in a litre" inputMode="decimal" unit="g/L" value={values.sugar} onChange={set('sugar')} error={fields.sugar_g_per_l ?? fields.gravity} className="w-40" />}
        {way === 'hydrometer' && <UnitField measure="gravity" label={<Sentence>gravity at 20 °C</Sentence>} value={values.gravity} onChange={set('gravity')} error={fields.gravity} className="w-40" />}
        <Field label="it leans" inputMode="decimal" unit="°" value={values.inclination} onChange={set('inclination')} error={fields.inclination} className="w-36" />
        <UnitField measure="temperature" label="the liquid is" value={values.temperature} onChange={set('temperature')} error={fields.temperature} className="w-32" />
      </div>
      <div className="flex flex-wrap items-center gap-2">
        <Button type="submit" disabled={busy}>
          Note the point
        </Button>
        {last && (
          <Button look="quiet" onClick={() => setValues((before) => ({ ...before, inclination: last.inclination.toFixed(2), temperature: (last.temperature ?? 20).toFixed(1) }))}>
            Take what it said last: {last.inclination.toFixed(1)}°
          </Button>
        )}
      </div>
    </form>
  );
}
