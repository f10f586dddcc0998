'use client';

import { Box } from '@/components/ui/Box';
import { Button } from '@/components/ui/Button';
import { gravityText, temperatureText } from '@/components/ui/units';
import type { CalibrationPointBody } from '@/lib/contracts/calibration';
import type { CalibrationFit } from '@/lib/core/calibration/calibrate';
import { signedPoints } from './words';

const SOURCE = { water: 'water', sugar: 'sugar', hydrometer: 'hydrometer' } as const;

/** A point with more weight in the curve than twice its share, times the coefficients (Hoaglin, Welsch, The American Statistician 32 (1978) 17–22). */
const pulls = (leverage: number, fit: CalibrationFit) => leverage > (2 * (fit.degree + 1)) / fit.points.length;

export interface ChosenPoint extends CalibrationPointBody {
  used: boolean;
}

/** The notebook of points: which count, what is left over, and which one the curve hangs on. */
export function CalibrationPoints({ points, fit, mayChange, onUse, onRemove }: { points: readonly ChosenPoint[]; fit: CalibrationFit | null; mayChange: boolean; onUse: (id: string, used: boolean) => void; onRemove: (id: string) => void }) {
  const used = points.filter((point) => point.used);
  const judged = (id: string) => (fit ? fit.points[used.findIndex((point) => point.id === id)] : undefined);
  return (
    <table className="w-full border-collapse font-mono text-[0.8125rem]">
      <thead>
        <tr className="type-label border-b-[1.5px] border-ink text-left text-ink2">
          <th className="py-1.5 pl-(--margin) font-medium">in</th>
          <th className="py-1.5 pl-3 text-right font-medium">known</th>
          <th className="py-1.5 pl-3 text-right font-medium max-strip:hidden">leans</th>
          <th className="py-1.5 pl-3 text-right font-medium max-strip:hidden">at</th>
          <th className="py-1.5 pl-3 text-right font-medium">left over</th>
          <th className="py-1.5 pl-3 text-right font-medium max-strip:hidden">without it</th>
          <th className="py-1.5 pr-(--margin) text-right font-medium">
            <span className="heard-only">strike out</span>
          </th>
        </tr>
      </thead>
      <tbody>
        {points.map((point) => {
          const result = judged(point.id);
          const pulling = result && fit && pulls(result.leverage, fit);
          return (
            <tr key={point.id} className={`border-b border-rule ${point.used ? '' : 'text-ink3'}`}>
              <td className="py-1.5 pl-(--margin)">
                <span className="flex items-center gap-3">
                  {mayChange && <Box ticked={point.used} onTick={(ticked) => onUse(point.id, ticked)} label={`${SOURCE[point.source]} ${gravityText(point.gravity)} counts`} />}
                  <span className="min-w-0">
                    {SOURCE[point.source]}
                    {point.sugar_g_per_l !== null && ` ${Math.round(point.sugar_g_per_l)} g/L`}
                    <span className="type-label block text-ink2 strip:hidden">
                      leans {point.inclination.toFixed(1)}°{result?.missedBy != null && `, without it ${signedPoints(result.missedBy)}`}
                    </span>
                    {pulling && <span className="type-label block text-ochre">the curve hangs on it</span>}
                  </span>
                </span>
              </td>
              <td className="whitespace-nowrap py-1.5 pl-3 text-right font-semibold">{gravityText(point.gravity)}</td>
              <td className="whitespace-nowrap py-1.5 pl-3 text-right max-strip:hidden">{point.inclination.toFixed(1)}°</td>
              <td className="whitespace-nowrap py-1.5 pl-3 text-right max-strip:hidden">{temperatureText(point.temperature, 0)}</td>
              <td className="whitespace-nowrap py-1.5 pl-3 text-right">{result ? signedPoints(result.leftOver) : '–'}</td>
              <td className="whitespace-nowrap py-1.5 pl-3 text-right text-ink2 max-strip:hidden">{result?.missedBy == null ? '–' : signedPoints(result.missedBy)}</td>
              <td className="py-1 pl-3 pr-(--margin) text-right">
                {mayChange && (
                  <Button size="lane" look="quiet" aria-label={`Strike out ${gravityText(point.gravity)} at ${point.inclination.toFixed(1)} degrees`} onClick={() => onRemove(point.id)}>
                    <span className="strip:hidden">×</span>
                    <span className="max-strip:hidden">Strike out</span>
                  </Button>
                )}
              </td>
            </tr>
          );
        })}
      </tbody>
    </table>
  );
}
