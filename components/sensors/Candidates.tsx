'use client';

import { dayName } from '@/components/charts/zone';
import { Button } from '@/components/ui/Button';
import { FormError } from '@/components/ui/Notice';
import { GroupBar } from '@/components/ui/Page';
import { gravityText } from '@/components/ui/units';
import type { CalibrationBody } from '@/lib/contracts/calibration';
import { pairPoint } from '@/lib/client/calibration';
import { useAct } from '@/components/ui/use-act';

/** Hydrometer readings of the log with what the float leaned like then. */
export function Candidates({ sensor, candidates, timeZone }: { sensor: string; candidates: CalibrationBody['candidates']; timeZone: string }) {
  const { busy, failed, act } = useAct('The reading was not taken. Try again.');
  if (candidates.length === 0) return null;
  return (
    <>
      <GroupBar word="Read by hand" note="in the log, beside this float" />
      {failed && <FormError>{failed}</FormError>}
      <ul>
        {candidates.map((candidate) => (
          <li key={candidate.entry_id} className="flex flex-wrap items-center gap-x-4 gap-y-1 border-b border-rule px-(--margin) py-2 font-mono text-[0.8125rem]">
            <span className="min-w-0 flex-1 break-words">
              <b className="font-semibold">{gravityText(candidate.gravity)}</b> at {candidate.inclination.toFixed(1)}°<span className="type-label block text-ink2">
                {dayName(Date.parse(candidate.at) / 1000, timeZone)}, {candidate.batch}
              </span>
            </span>
            <Button size="lane" disabled={busy} onClick={() => void act(() => pairPoint(sensor, candidate.entry_id))}>
              Take it
            </Button>
          </li>
        ))}
      </ul>
    </>
  );
}
