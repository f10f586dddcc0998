'use client';

import { useRef } from 'react';
import { dayName } from '@/components/charts/zone';
import { useWidth } from '@/components/ui/width';
import type { SharedBatch } from '@/lib/contracts/shares';
import { fallOf } from './fall';

const HEIGHT = 220;
const [TOP, FOOT] = [22, 26];
/** Width of a gravity in the picture's letters. */
const FIGURE = 48;

/** The fall of the batch in its drink's colour, from the original gravity to where it is, or ended. */
export function FallPicture({ shared, now }: { shared: SharedBatch; now: number }) {
  const frame = useRef<HTMLDivElement>(null);
  const width = Math.max(220, useWidth(frame, 720));
  const { line, read, floor } = fallOf(shared, now);
  const [first, last] = [line[0], line.at(-1)];
  if (!first || !last || floor === null || last.at <= first.at) return null;
  const gravities = line.map((point) => point.gravity);
  const high = Math.max(...gravities, shared.original_gravity ?? 0);
  const x = (at: number) => ((at - first.at) / (last.at - first.at)) * (width - 2) + 1;
  const y = (gravity: number) => TOP + (HEIGHT - TOP - FOOT) * ((high - gravity) / (high - floor || 0.001));
  const path = line.map((point, index) => `${index === 0 ? 'M' : 'L'}${x(point.at).toFixed(1)} ${y(point.gravity).toFixed(1)}`).join('');
  const bed = HEIGHT - FOOT;
  // A fall that is steep to its end would cross its own figure.
  const overEnd = Math.min(...line.filter((point) => x(point.at) >= width - FIGURE).map((point) => y(point.gravity)));
  const day = (at: number) => dayName(at, 'UTC').split(' ').slice(1).join(' ');
  return (
    <div ref={frame} className="min-w-0 font-mono">
      <svg width={width} height={HEIGHT} role="img" aria-label={`Gravity fell from ${high.toFixed(3)} on ${day(first.at)} to ${last.gravity.toFixed(3)} on ${day(last.at)}`}>
        <path d={`${path}L${x(last.at)} ${bed}L${x(first.at)} ${bed}Z`} fill="var(--drink-fill)" />
        <path d={path} fill="none" stroke="var(--ink)" strokeWidth="2.2" />
        <path d={`M0 ${bed}H${width}`} stroke="var(--ink)" strokeWidth="1.5" />
        {read.filter((point) => point.at >= first.at && point.at <= last.at).map((point) => (
          <circle key={point.at} cx={x(point.at)} cy={y(point.gravity)} r="4" fill="var(--lit)" stroke="var(--ink)" strokeWidth="1.4" />
        ))}
        <text x="2" y="14" fontSize="13" fontWeight="600" fill="var(--ink)">
          {high.toFixed(3)}
        </text>
        <text x={width - 2} y={Math.max(14, overEnd - 8)} textAnchor="end" fontSize="13" fontWeight="600" fill="var(--ink)">
          {last.gravity.toFixed(3)}
        </text>
        <text x="2" y={HEIGHT - 8} fontSize="12" fill="var(--ink2)">
          {day(first.at)}
        </text>
        <text x={width - 2} y={HEIGHT - 8} textAnchor="end" fontSize="12" fill="var(--ink2)">
          {day(last.at)}
        </text>
      </svg>
    </div>
  );
}
