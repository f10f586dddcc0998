'use client';

import { useState } from 'react';
import { dayName } from '@/components/charts/zone';
import { Button } from '@/components/ui/Button';
import { FormError } from '@/components/ui/Notice';
import { GroupBar } from '@/components/ui/Page';
import type { CalibrationVersionBody } from '@/lib/contracts/calibration';
import { takeBackCalibration } from '@/lib/client/calibration';
import { useAct } from '@/components/ui/use-act';
import type { Degree } from '@/lib/core/calibration/calibrate';
import { CURVE_WORDS, signedPoints } from './words';

function whatItIs(version: CalibrationVersionBody): string {
  const { curve, offset } = version;
  const moved = offset === 0 ? '' : `moved by ${signedPoints(offset)} points`;
  if (!curve) return moved || 'as it is sent';
  return [`${CURVE_WORDS[curve.degree as Degree]} through ${curve.points.length} liquids of known gravity, ${curve.low.toFixed(0)}–${curve.high.toFixed(0)}°`, moved].filter(Boolean).join(', ');
}

/** Every calibration there was, newest first; one that is taken back stays readable. */
export function Versions({ sensor, versions, mayChange, timeZone }: { sensor: string; versions: readonly CalibrationVersionBody[]; mayChange: boolean; timeZone: string }) {
  const { busy, failed, act } = useAct('It was not taken back. Try again.');
  const [sure, setSure] = useState<number | null>(null);
  if (versions.length === 0) return null;
  const day = (at: string) => dayName(Date.parse(at) / 1000, timeZone);
  return (
    <>
      <GroupBar word="Versions" note="the newest that applies counts" as="h3" />
      {failed && <FormError>{failed}</FormError>}
      <ul>
        {versions.map((version) => (
          <li key={version.version} className={`flex flex-wrap items-center gap-x-4 gap-y-1 border-b border-rule px-(--margin) py-2 ${version.removed_at ? 'text-ink3' : ''}`}>
            <span className="w-8 font-mono text-[0.875rem] font-semibold">{version.version}</span>
            <span className="min-w-0 flex-1">
              <span className="type-body block break-words">
                {whatItIs(version)}
                {version.note && <span className="text-ink2">: {version.note}</span>}
              </span>
              <span className="type-label text-ink2">
                from {day(version.applies_from)}, made {day(version.created_at)}
                {version.by && ` by ${version.by}`}
                {version.removed_at && `, taken back ${day(version.removed_at)}`}
              </span>
            </span>
            {mayChange &&
              !version.removed_at &&
              (sure === version.version ? (
                <span className="flex gap-2">
                  <Button size="lane" look="final" disabled={busy} onClick={() => void act(() => takeBackCalibration(sensor, version.version)).then(() => setSure(null))}>
                    Take it back
                  </Button>
                  <Button size="lane" onClick={() => setSure(null)}>
                    Leave it
                  </Button>
                </span>
              ) : (
                <Button size="lane" look="quiet" onClick={() => setSure(version.version)}>
                  Take back
                </Button>
              ))}
          </li>
        ))}
      </ul>
    </>
  );
}
