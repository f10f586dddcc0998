'use client';

import { degrees } from '@/components/batch/figures';
import { useRef } from 'react';
import { dayName } from '@/components/charts/zone';
import { useWidth } from '@/components/ui/width';
import { barTicks } from './Tubes';
import { overRatingFrom, type WeekPoint } from '@/lib/core/bottling/conditioning';

const HEIGHT = 470;
const TOP = 34;
const FOOT = 56;
const LEFT = 30;
const RIGHT = 8;

/** Pressure in the warm from the day of bottling on: as asked, and if the last sugar goes. */
export function Weeks({ points, limit, top, celsius, timeZone }: { points: readonly WeekPoint[]; limit: number; top: number; celsius: number; timeZone: string }) {
  const frame = useRef<HTMLDivElement>(null);
  const width = Math.max(220, useWidth(frame, 430));
  const first = points[0];
  const last = points.at(-1);
  if (!first || !last) return null;
  const x = (at: number) => LEFT + ((width - LEFT - RIGHT) * (at - first.at)) / (last.at - first.at);
  const y = (bar: number) => TOP + (HEIGHT - TOP - FOOT) * (1 - Math.min(top, bar) / top);
  const line = (of: (point: WeekPoint) => number) => points.map((point, index) => `${index === 0 ? 'M' : 'L'}${x(point.at).toFixed(1)} ${y(of(point)).toFixed(1)}`).join('');
  const ticks = barTicks(top);
  const over = overRatingFrom(points, limit);
  const day = (at: number) => dayName(at / 1000, timeZone).split(' ').slice(1).join(' ');
  const marks = points.filter((_, index) => index % 14 === 0);
  const worstIsHigher = last.worstBar - last.bar > 0.15;
  const overPoint = points.find((point) => point.at === over);
  return (
    <div ref={frame} className="min-w-0 font-mono">
      <svg
        width={width}
        height={HEIGHT}
        role="img"
        aria-label={`From ${day(first.at)} to ${day(last.at)} at ${degrees(celsius)}: as asked up to ${last.bar.toFixed(1)} bar; if the last sugar goes up to ${last.worstBar.toFixed(1)} bar. ${over === null ? `It stays under ${limit.toFixed(1)} bar.` : `Over ${limit.toFixed(1)} bar from ${day(over)}.`}`}
      >
        {ticks.lines.map((bar) => (
          <g key={bar}>
            <path d={`M${LEFT} ${y(bar)}H${width - RIGHT}`} stroke="var(--rule)" />
            {bar % ticks.named === 0 && (
              <text x={LEFT - 8} y={y(bar) + 4} textAnchor="end" fontSize="12" fill="var(--ink2)">
                {bar}
              </text>
            )}
          </g>
        ))}
        {marks.map((point, index) => (
          <g key={point.at}>
            <path d={`M${x(point.at)} ${TOP}V${y(0)}`} stroke="var(--rule)" />
            {(width > 330 || index % 2 === 0) && (
              <text x={x(point.at)} y={y(0) + 20} textAnchor={index === 0 ? 'start' : index === marks.length - 1 ? 'end' : 'middle'} fontSize="12" fill="var(--ink2)">
                {day(point.at)}
              </text>
            )}
          </g>
        ))}
        <path d={`${line((point) => point.bar)}L${x(last.at)} ${y(0)}L${x(first.at)} ${y(0)}Z`} fill="var(--drink-fill)" fillOpacity="0.42" />
        <path d={line((point) => point.bar)} fill="none" stroke="var(--ink)" strokeWidth="2.2" />
        {worstIsHigher && <path d={line((point) => point.worstBar)} fill="none" stroke={over === null ? 'var(--ink)' : 'var(--madder)'} strokeWidth="1.8" strokeDasharray="6 4" />}
        <path d={`M${LEFT} ${y(limit)}H${width - RIGHT}`} stroke="var(--ink)" strokeWidth="2.2" />
        <text x={width - RIGHT} y={y(limit) - 7} textAnchor="end" fontSize="11" fontWeight="600" fill="var(--ink)" stroke="var(--sheet)" strokeWidth="3" paintOrder="stroke">
          {limit.toFixed(1)} bar
        </text>
        {worstIsHigher && (
          <text x={width - RIGHT - 4} y={y(last.worstBar) - 9 - (Math.abs(y(last.worstBar) - y(limit)) < 20 ? 16 : 0)} textAnchor="end" fontSize="12" fontWeight="600" fill={over === null ? 'var(--ink)' : 'var(--madder)'} stroke="var(--sheet)" strokeWidth="3" paintOrder="stroke">
            if the last sugar goes
          </text>
        )}
        <text x={width - RIGHT - 4} y={Math.min(y(last.bar) + 22, y(0) - 6)} textAnchor="end" fontSize="12" fontWeight="600" fill="var(--ink)">
          as asked
        </text>
        {over !== null && overPoint && (
          <g>
            <circle cx={x(over)} cy={y(limit)} r="7" fill="var(--lit)" stroke="var(--madder)" strokeWidth="2.2" />
            <path d={`M${x(over) - 3.5} ${y(limit)}h7`} stroke="var(--madder)" strokeWidth="2" />
            <text x={Math.max(LEFT + 4, x(over) - 10)} y={y(limit) - 12} textAnchor={x(over) - LEFT < 130 ? 'start' : 'end'} fontSize="12" fontWeight="600" fill="var(--madder)" stroke="var(--sheet)" strokeWidth="3" paintOrder="stroke">
              over from {day(over)}
            </text>
          </g>
        )}
      </svg>
    </div>
  );
}
