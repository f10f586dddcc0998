'use client';

import { useId, useRef } from 'react';
import { gravityName, gravityNumber } from '@/components/ui/units';
import { useWidth } from '@/components/ui/width';
import { feltAt } from '@/lib/core/calibration/apply';
import type { CalibrationFit, CalibrationPoint } from '@/lib/core/calibration/calibrate';
import { curvePaths, degreesScale, pictureWords, placed, scaleOf, withRoom } from './calibration-picture';
import { signedPoints } from './words';

const LEFT = 62;
const RIGHT = 14;
const HEIGHT = 320;
const REST = 116;

interface Shown extends CalibrationPoint {
  id: string;
  used: boolean;
}

/** The points, the curve with its doubt, and below it what is left over at each point. */
export function CalibrationChart({ points, fit, correctsTemperature }: { points: readonly Shown[]; fit: CalibrationFit | null; correctsTemperature: boolean }) {
  const frame = useRef<HTMLDivElement>(null);
  const width = Math.max(288, useWidth(frame, 720));
  const haze = `haze-${useId().replace(/\W/g, '')}`;
  const known = (point: CalibrationPoint) => (correctsTemperature ? feltAt(point.gravity, point.temperature) : point.gravity);
  const xs = degreesScale([...points.map((point) => point.inclination), ...(fit?.curve.map((at) => at.inclination) ?? [])], width > 560 ? 9 : 5);
  const ys = scaleOf([...points.map(known), ...(fit?.curve.map((at) => at.felt) ?? [])], 6);
  const x = placed(xs, LEFT, width - RIGHT);
  const y = placed(ys, HEIGHT - 4, 22);
  const worst = Math.max(0.001, ...(fit?.points.map((point) => Math.abs(point.leftOver)) ?? []));
  const limit = Math.ceil(worst * 1000) / 1000;
  const restTop = HEIGHT + 26;
  const r = placed({ from: -limit, to: limit, ticks: [] }, restTop + REST - 30, restTop);
  const paths = fit && curvePaths(fit, x, y);
  const labelled = withRoom(points.map((point) => x(point.inclination)), 46);
  return (
    <div ref={frame} className="min-w-0">
      <svg width={width} height={HEIGHT + 26 + REST} role="img" aria-label={fit ? pictureWords(fit) : `${points.length} points, no curve`} className="block font-mono" fontSize="12" fontWeight="500">
        <defs>
          <pattern id={haze} width="8" height="3" patternUnits="userSpaceOnUse">
            <path d="M0 .5h8" stroke="var(--ink)" strokeOpacity="0.28" />
          </pattern>
        </defs>
        {ys.ticks.map((tick) => (
          <g key={tick}>
            <path d={`M${LEFT} ${y(tick)}H${width - RIGHT}`} stroke="var(--rule)" />
            <text x={LEFT - 8} y={y(tick) + 4} textAnchor="end" fill="var(--ink2)">
              {gravityNumber(tick)}
            </text>
          </g>
        ))}
        {xs.ticks.map((tick) => (
          <path key={tick} d={`M${x(tick)} 22V${HEIGHT - 4}`} stroke="var(--rule)" />
        ))}
        <text x={LEFT + 6} y={14} fill="var(--ink)" fontWeight="600">
          known gravity{gravityName()}{correctsTemperature ? ', as felt' : ''}
        </text>
        {paths && (
          <>
            <path d={paths.band} fill={`url(#${haze})`} />
            <path d={paths.line} fill="none" stroke="var(--ink)" strokeWidth="1.9" />
          </>
        )}
        <path d={`M${LEFT} ${HEIGHT - 4}H${width - RIGHT}`} stroke="var(--ink)" strokeWidth="1.5" />
        {points.map((point, index) => (
          <g key={point.id}>
            <circle cx={x(point.inclination)} cy={y(known(point))} r="5.5" fill="var(--sheet)" stroke={point.used ? 'var(--ink)' : 'var(--ink3)'} strokeWidth="1.6" strokeDasharray={point.used ? undefined : '2.4 2.2'} />
            {labelled[index] && (
              <text x={x(point.inclination) - 8} y={y(known(point)) - 9} textAnchor={x(point.inclination) > LEFT + 60 ? 'end' : 'start'} fill={point.used ? 'var(--ink)' : 'var(--ink3)'}>
                {gravityNumber(point.gravity)}
              </text>
            )}
          </g>
        ))}
        {fit && (
          <>
            <text x={LEFT + 6} y={HEIGHT + 18} fill="var(--ink)" fontWeight="600">
              left over, points
            </text>
            <rect x={LEFT} y={restTop} width={width - RIGHT - LEFT} height={REST - 30} fill="var(--range)" />
            {[limit, 0, -limit].map((value) => (
              <g key={value}>
                <path d={`M${LEFT} ${r(value)}H${width - RIGHT}`} stroke={value === 0 ? 'var(--ink)' : 'var(--rule2)'} strokeDasharray={value === 0 ? undefined : '3 3'} />
                <text x={LEFT - 8} y={r(value) + 4} textAnchor="end" fill="var(--ink2)">
                  {value === 0 ? '0' : signedPoints(value).replace('.0', '')}
                </text>
              </g>
            ))}
            {fit.points.map((point, index) => (
              <g key={index}>
                <path d={`M${x(point.inclination)} ${r(0)}V${r(point.leftOver)}`} stroke="var(--ink)" strokeWidth="1.5" />
                <circle cx={x(point.inclination)} cy={r(point.leftOver)} r="4" fill="var(--ink)" />
              </g>
            ))}
          </>
        )}
        {xs.ticks.map((tick) => (
          <text key={tick} x={x(tick)} y={HEIGHT + 26 + REST - 12} textAnchor="middle" fill="var(--ink2)">
            {tick}°
          </text>
        ))}
      </svg>
    </div>
  );
}
