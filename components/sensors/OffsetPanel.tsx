'use client';

import { useState } from 'react';
import { dayName } from '@/components/charts/zone';
import { Button } from '@/components/ui/Button';
import { Field } from '@/components/ui/Field';
import { FormError } from '@/components/ui/Notice';
import { Sentence } from '@/components/ui/Sentence';
import { State } from '@/components/ui/StateMark';
import type { CalibrationBody } from '@/lib/contracts/calibration';
import { keepOffset } from '@/lib/client/calibration';
import { fromLocalInput, readNumber, toLocalInput } from './numbers';
import { useAct } from '@/components/ui/use-act';
import { signedPoints } from './words';

const pointsWords = (gravity: number) => `${(Math.abs(gravity) * 1000).toFixed(1).replace(/\.0$/, '')} points`;

/** What the readings by hand say of it; it changes nothing until a person agrees. */
export function Suggested({ sensor, suggestion, mayChange, timeZone }: { sensor: string; suggestion: NonNullable<CalibrationBody['suggestion']>; mayChange: boolean; timeZone: string }) {
  const { busy, failed, act } = useAct('The offset was not kept. Try again.');
  const since = dayName(Date.parse(suggestion.since) / 1000, timeZone);
  const { pairs } = suggestion;
  return (
    <div className="flex flex-col items-start gap-1.5 border-b bg-lit px-(--margin) py-4">
      {failed && <FormError>{failed}</FormError>}
      <State state="Check" word="Off" />
      <p className="type-verdict-now">
        <Sentence strong>{`Your float reads ${pointsWords(suggestion.offset)} ${suggestion.offset < 0 ? 'high' : 'low'} since ${since}.`}</Sentence>
      </p>
      <p className="type-body text-ink2">
        <Sentence>{`${pairs.length === 1 ? 'One reading' : `${pairs.length} readings`} by hand ${pairs.length === 1 ? 'says' : 'say'} so: ${pairs.map((pair) => `${pair.hand.toFixed(3)} where it showed ${pair.float.toFixed(3)}`).join(', ')}. Nothing is moved until you agree.`}</Sentence>
      </p>
      {mayChange && (
        <Button disabled={busy} onClick={() => void act(() => keepOffset(sensor, { offset: suggestion.offset, applies_from: suggestion.since, note: 'by the readings by hand' }))}>
          Move it by {signedPoints(suggestion.offset)} points from {since}
        </Button>
      )}
    </div>
  );
}

/** An offset by one's own judgement. */
export function OwnOffset({ sensor, timeZone, now }: { sensor: string; timeZone: string; now: number }) {
  const [points, setPoints] = useState('');
  const [from, setFrom] = useState<string | null>(null);
  const { busy, failed, fields, act, setFields } = useAct('The offset was not kept. Try again.');
  const shown = from ?? (now > 0 ? toLocalInput(now * 1000, timeZone) : '');
  async function keep() {
    const given = readNumber(points);
    const appliesFrom = fromLocalInput(shown, timeZone);
    if (given === null || given === 0 || Math.abs(given) > 50) return setFields({ offset: 'must be points such as −3 or 1.5' });
    if (!appliesFrom) return setFields({ applies_from: 'is a day and a time' });
    if (await act(() => keepOffset(sensor, { offset: given / 1000, applies_from: appliesFrom }))) setPoints('');
  }
  return (
    <details className="border-b px-(--margin) py-2">
      <summary className="type-label inline-flex min-h-8 cursor-pointer items-center text-ink2">move its gravity by points of your own</summary>
      <div className="flex flex-col gap-3 pb-2 pt-1">
        {failed && <FormError>{failed}</FormError>}
        <div className="flex flex-wrap items-start gap-3">
          <Field label="move by" inputMode="text" unit="points" value={points} onChange={(event) => setPoints(event.target.value)} error={fields.offset} className="w-40" />
          <Field label="from" type="datetime-local" value={shown} onChange={(event) => setFrom(event.target.value)} error={fields.applies_from} className="w-56" />
        </div>
        <div>
          <Button disabled={busy} onClick={() => void keep()}>
            Move it
          </Button>
        </div>
      </div>
    </details>
  );
}
