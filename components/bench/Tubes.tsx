'use client';

import { degrees } from '@/components/batch/figures';
import { useId, useRef } from 'react';
import { useWidth } from '@/components/ui/width';
import type { BottlePicture } from '@/lib/core/bottling/bench';
import { BOTTLES } from '@/lib/core/bottling/bottles';
import { ratedBar, STILL_LIMIT_BAR } from '@/lib/core/bottling/judge';

/** Highest bar that the picture's scale shows: an even number with air above all that is drawn. */
export const scaleTop = (bottle: BottlePicture): number => Math.max(4, 2 * Math.ceil((Math.max(bottle.worst.bar, limitOf(bottle)) * 1.08) / 2));

/** The marks of the scale: a line each, and its figure at each that has room. */
export function barTicks(top: number): { lines: number[]; named: number } {
  const step = top <= 12 ? 1 : top <= 24 ? 2 : top <= 60 ? 5 : 10;
  return { lines: Array.from({ length: Math.floor(top / step) + 1 }, (_, index) => index * step), named: step === 1 ? 2 : step === 2 ? 4 : step };
}

/** What a bottle is held against, bar. */
export const limitOf = (bottle: BottlePicture): number => (bottle.holds.rating === 'never' ? STILL_LIMIT_BAR : ratedBar(bottle.holds.rating));

const HEIGHT = 470;
const TOP = 34;
const FOOT = 56;
const LEFT = 64;

interface Tube {
  name: string;
  where: string;
  bar: number;
  /** Lower end of the doubt, bar. */
  from: number;
}

/** One bottle, three ways, on one scale, with what it holds across all of them. The upper end is what counts. */
export function Tubes({ bottle, lows }: { bottle: BottlePicture; /** Lower ends, bar: in the cellar, at the warmest. */ lows: { cellar: number; warm: number } }) {
  const frame = useRef<HTMLDivElement>(null);
  const width = Math.max(220, useWidth(frame, 430));
  const id = useId();
  const top = scaleTop(bottle);
  const limit = limitOf(bottle);
  const y = (bar: number) => TOP + (HEIGHT - TOP - FOOT) * (1 - bar / top);
  const base = y(0);
  const tubes: Tube[] = [
    { name: 'as asked', where: `cellar, ${degrees(bottle.cellar.celsius)}`, bar: bottle.cellar.bar, from: lows.cellar },
    { name: 'as asked', where: `warmest, ${degrees(bottle.warm.celsius)}`, bar: bottle.warm.bar, from: lows.warm },
    { name: 'last sugar goes', where: `warmest, ${degrees(bottle.worst.celsius)}`, bar: bottle.worst.bar, from: Math.min(bottle.warm.bar, bottle.worst.bar) },
  ];
  const step = (width - LEFT - 6) / 3;
  const tubeWidth = Math.min(50, step * 0.42);
  const ticks = barTicks(top);
  const never = bottle.holds.rating === 'never';
  return (
    <div ref={frame} className="min-w-0 font-mono">
      <svg
        width={width}
        height={HEIGHT}
        role="img"
        aria-label={`${BOTTLES[bottle.choice.kind].name}: ${tubes.map((tube) => `${tube.name}, ${tube.where}: ${tube.bar.toFixed(1)} bar`).join('; ')}. ${never ? 'For still drink' : 'Rated'} ${limit.toFixed(1)} bar.`}
      >
        <defs>
          <pattern id={`${id}h`} width="6" height="3" patternUnits="userSpaceOnUse">
            <path d="M0 0.5h6" stroke="var(--ink)" strokeOpacity="0.45" />
          </pattern>
          <pattern id={`${id}s`} width="8" height="8" patternUnits="userSpaceOnUse" patternTransform="rotate(45)">
            <rect width="8" height="8" fill="var(--lit)" />
            <rect width="4" height="8" fill="var(--madder)" />
          </pattern>
        </defs>
        <text x={LEFT - 12} y={TOP - 16} textAnchor="end" fontSize="12" fill="var(--ink2)">
          bar
        </text>
        {ticks.lines.map((bar) => (
          <g key={bar}>
            <path d={`M${LEFT} ${y(bar)}H${width}`} stroke="var(--rule)" />
            {bar % ticks.named === 0 && (y(bar) < y(limit) - 28 || y(bar) > y(limit) + 20) && (
              <text x={LEFT - 12} y={y(bar) + 4} textAnchor="end" fontSize="12" fill="var(--ink2)">
                {bar}
              </text>
            )}
          </g>
        ))}
        {tubes.map((tube, index) => {
          const middle = LEFT + step * (index + 0.42);
          const left = middle - tubeWidth / 2;
          const over = tube.bar > limit;
          const fillTop = y(Math.min(tube.bar, over ? limit : tube.bar));
          return (
            <g key={tube.where + index}>
              <path d={`M${left} ${TOP}V${base - 6}q0 6 6 6h${tubeWidth - 12}q6 0 6-6V${TOP}`} fill="var(--glass)" stroke="none" />
              <path d={`M${left} ${fillTop}V${base - 6}q0 6 6 6h${tubeWidth - 12}q6 0 6-6V${fillTop}Z`} fill="var(--drink-fill)" />
              {tube.from < tube.bar && <rect x={left} y={y(tube.bar)} width={tubeWidth} height={y(Math.max(0, tube.from)) - y(tube.bar)} fill={`url(#${id}h)`} />}
              {over && <rect x={left} y={y(tube.bar)} width={tubeWidth} height={y(limit) - y(tube.bar)} fill={`url(#${id}s)`} />}
              <path d={`M${left} ${y(tube.bar)}h${tubeWidth}`} stroke={over ? 'var(--madder)' : 'var(--ink)'} strokeWidth="2" />
              <path d={`M${left} ${TOP}V${base - 6}q0 6 6 6h${tubeWidth - 12}q6 0 6-6V${TOP}`} fill="none" stroke="var(--ink)" strokeWidth="1.7" />
              <text x={middle} y={base + 20} textAnchor="middle" fontSize={step < 100 ? 11 : 12} fontWeight="600" fill="var(--ink)">
                {step < 100 ? tube.name.replace('last sugar goes', 'sugar goes') : tube.name}
              </text>
              <text x={middle} y={base + 38} textAnchor="middle" fontSize={step < 100 ? 11 : 12} fill="var(--ink2)">
                {step < 118 ? `${tube.where.split(', ').at(-1)}` : tube.where}
              </text>
            </g>
          );
        })}
        <path d={`M${LEFT - 46} ${y(limit)}H${width}`} stroke="var(--ink)" strokeWidth="2.2" />
        {tubes.map((tube, index) => {
          // Beside the line of what it holds, not on it.
          const at = y(tube.bar);
          const near = Math.abs(at - y(limit)) < 12;
          return (
            <text key={tube.where + index} x={LEFT + step * (index + 0.42) + tubeWidth / 2 + 6} y={near ? y(limit) + (tube.bar > limit ? -7 : 17) : at + 5} fontSize="15" fontWeight="600" fill={tube.bar > limit ? 'var(--madder)' : 'var(--ink)'} stroke="var(--sheet)" strokeWidth="4" paintOrder="stroke">
              {tube.bar.toFixed(1)}
            </text>
          );
        })}
        <rect x={LEFT - 62} y={y(limit) - 21} width="46" height="20" fill="var(--ink)" />
        <text x={LEFT - 39} y={y(limit) - 6} textAnchor="middle" fontSize="13" fontWeight="600" fill="var(--on)">
          {limit.toFixed(1)}
        </text>
        <text x={LEFT - 62} y={y(limit) + 15} fontSize="11" fontWeight="600" fill="var(--ink)">
          {never ? 'still' : bottle.holds.confirmed ? 'bottle' : 'usual'}
        </text>
      </svg>
    </div>
  );
}
