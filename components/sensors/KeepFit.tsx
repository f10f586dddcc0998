'use client';

import { useState } from 'react';
import { Box } from '@/components/ui/Box';
import { Button } from '@/components/ui/Button';
import { Choice } from '@/components/ui/Choice';
import { Field } from '@/components/ui/Field';
import { FormError } from '@/components/ui/Notice';
import type { CalibrationBody } from '@/lib/contracts/calibration';
import { keepCalibration } from '@/lib/client/calibration';
import { DEGREES, type Degree, type FitOutcome } from '@/lib/core/calibration/calibrate';
import { fromLocalInput, toLocalInput } from './numbers';
import { useAct } from '@/components/ui/use-act';

interface KeepProps {
  sensor: string;
  points: string[];
  outcome: FitOutcome;
  degree: Degree;
  onDegree: (degree: Degree) => void;
  corrects: boolean;
  onCorrects: (corrects: boolean) => void;
  calibration: CalibrationBody;
  timeZone: string;
  now: number;
}

const NAMES: Record<Degree, string> = { 1: 'Straight', 2: 'Bent', 3: 'Bent twice' };

/** How the curve is drawn, and from when on readings stand by it. */
export function KeepFit({ sensor, points, outcome, degree, onDegree, corrects, onCorrects, calibration, timeZone, now }: KeepProps) {
  const [from, setFrom] = useState<string | null>(null);
  const [kept, setKept] = useState<number | null>(null);
  const { busy, failed, fields, act, setFields } = useAct('The calibration was not kept. Try again.');
  // What waits is what most people want turned.
  const usual = calibration.waiting_since ? Math.floor(Date.parse(calibration.waiting_since) / 60_000) * 60_000 : now * 1000;
  const shown = from ?? (now > 0 ? toLocalInput(usual, timeZone) : '');

  async function keep() {
    const appliesFrom = fromLocalInput(shown, timeZone);
    if (!appliesFrom) return setFields({ applies_from: 'is a day and a time' });
    setKept(null);
    await act(async () => setKept((await keepCalibration(sensor, { degree, corrects_temperature: corrects, points, applies_from: appliesFrom })).version));
  }

  return (
    <div className="flex flex-col gap-3 border-b bg-desk px-(--margin) py-4">
      {failed && <FormError>{failed}</FormError>}
      <div className="flex flex-wrap items-end gap-x-4 gap-y-3">
        <Choice label="curve" value={String(degree) as '1' | '2' | '3'} onChoose={(value) => onDegree(Number(value) as Degree)} options={DEGREES.map((value) => ({ value: String(value) as '1' | '2' | '3', name: NAMES[value] }))} className="w-full strip:w-[330px]" />
        <Field label="applies from" type="datetime-local" value={shown} onChange={(event) => setFrom(event.target.value)} error={fields.applies_from} className="w-full strip:w-60" />
      </div>
      <Box ticked={corrects} onTick={onCorrects}>
        <span className="type-body">Take out how the liquid swells with warmth, by the temperature of each reading.</span>
      </Box>
      <div className="flex flex-wrap items-center gap-3">
        <Button look="first" disabled={busy || !outcome.ok} onClick={() => void keep()}>
          Keep this curve
        </Button>
        <span role="status" className="type-label text-ink2">
          {kept !== null ? `version ${kept} kept; readings since then are being turned` : 'what was measured before then stays as it is'}
        </span>
      </div>
    </div>
  );
}
