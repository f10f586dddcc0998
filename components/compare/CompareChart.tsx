'use client';

import { useRef, useState } from 'react';
import { useWidth } from '@/components/ui/width';
import { gravityNumber, temperatureNumber } from '@/components/ui/units';
import { valueAt, written, type Curve, type Measure } from './curves';

const HEIGHT = 420;
const [TOP, FOOT, LEFT] = [16, 34, 54];
/** Room at the right for the names, on a wide page. */
const NAMES = 190;
/** One batch is told from the next by its dash as well as by its colour. */
const DASHES = ['', '9 4', '2.5 3.5', '12 4 2.5 4', '5 3', '1 4', '16 5', '7 3 1.5 3 1.5 3'];
const STEPS = [1, 2, 5, 7, 14, 28, 56];
const NAME_GAP = 17;

/** Round figures inside a span, about so many. */
function ticks(lo: number, hi: number, about: number): number[] {
  const rough = (hi - lo) / about;
  const size = 10 ** Math.floor(Math.log10(rough));
  const step = [1, 2, 5, 10].map((n) => n * size).find((n) => n >= rough) ?? size;
  return Array.from({ length: Math.floor(hi / step) - Math.ceil(lo / step) + 1 }, (_, index) => (Math.ceil(lo / step) + index) * step);
}

/** The names beside the ends of their curves, none over another. */
function spread(ends: ReadonlyArray<{ id: string; y: number }>): Map<string, number> {
  const placed = new Map<string, number>();
  let last = -Infinity;
  for (const end of ends.toSorted((a, b) => a.y - b.y)) {
    last = Math.max(end.y, last + NAME_GAP);
    placed.set(end.id, last);
  }
  const over = last - (HEIGHT - FOOT);
  if (over > 0) for (const [id, y] of placed) placed.set(id, y - over);
  return placed;
}

/** Curves over each other, day 0 the pitch of each. The table below says the same. */
export function CompareChart({ curves, measure }: { curves: readonly Curve[]; measure: Measure }) {
  const frame = useRef<HTMLDivElement>(null);
  const width = Math.max(300, useWidth(frame, 1100));
  const [cursor, setCursor] = useState<number | null>(null);
  const drawn = curves.filter((curve) => curve.points.length > 1);
  const all = drawn.flatMap((curve) => [...curve.points, ...curve.rings]);
  if (all.length === 0) return <p className="type-body px-(--margin) py-6 text-ink2">None of these has {measure === 'temperature' ? 'a temperature' : measure === 'share' ? 'an original gravity and readings' : 'readings'} since its pitch.</p>;
  const wide = width > 700;
  const right = wide ? width - NAMES : width - 8;
  const values = all.map((point) => point.value);
  const [low, high] = [Math.min(...values), Math.max(...values)];
  const air = (high - low || 0.01) * 0.06;
  const [bottom, top] = [low - air, high + air];
  const days = Math.max(1, ...all.map((point) => point.day));
  const x = (day: number) => LEFT + ((right - LEFT) * day) / days;
  const y = (value: number) => TOP + ((HEIGHT - TOP - FOOT) * (top - value)) / (top - bottom);
  const step = STEPS.find((size) => days / size <= (wide ? 12 : 5)) ?? 56;
  const names = spread(drawn.map((curve) => ({ id: curve.id, y: y(curve.points.at(-1)!.value) })));
  const path = (curve: Curve) => curve.points.map((point, index) => `${index === 0 ? 'M' : 'L'}${x(point.day).toFixed(1)} ${y(point.value).toFixed(1)}`).join('');
  const at = cursor === null ? null : Math.min(days, Math.max(0, cursor));

  return (
    <div ref={frame} className="min-w-0 font-mono">
      <svg
        width={width}
        height={HEIGHT}
        role="img"
        aria-label={`${drawn.map((curve) => curve.name).join(', ')}: ${measure === 'gravity' ? 'gravity' : measure === 'share' ? 'share of the fall' : 'temperature'} by days since the pitch.`}
        onPointerMove={(event) => setCursor(((event.clientX - event.currentTarget.getBoundingClientRect().left - LEFT) / (right - LEFT)) * days)}
        onPointerLeave={() => setCursor(null)}
        className="touch-pan-y"
      >
        {ticks(bottom, top, 6).map((value) => (
          <g key={value}>
            <path d={`M${LEFT} ${y(value)}H${right}`} stroke="var(--rule)" />
            <text x={LEFT - 8} y={y(value) + 4} textAnchor="end" fontSize="12" fill="var(--ink2)">
              {measure === 'gravity' ? gravityNumber(value) : measure === 'temperature' ? temperatureNumber(value) : String(Number(value.toFixed(1))).replace('-', '−')}
            </text>
          </g>
        ))}
        {Array.from({ length: Math.floor(days / step) + 1 }, (_, index) => index * step).map((day) => (
          <g key={day}>
            <path d={`M${x(day)} ${TOP}V${HEIGHT - FOOT}`} stroke="var(--rule)" />
            <text x={x(day)} y={HEIGHT - FOOT + 20} textAnchor={day === 0 ? 'start' : 'middle'} fontSize="12" fill="var(--ink2)">
              {day === 0 ? 'pitch' : day}
            </text>
          </g>
        ))}
        <text x={right} y={HEIGHT - 3} textAnchor="end" fontSize="11" fill="var(--ink2)">
          days since the pitch
        </text>
        <path d={`M${LEFT} ${HEIGHT - FOOT}H${right}`} stroke="var(--ink)" strokeWidth="1.5" />
        {drawn.map((curve, index) => (
          <g key={curve.id}>
            <path d={path(curve)} fill="none" stroke={curve.colour} strokeWidth="7" strokeOpacity="0.55" strokeLinejoin="round" />
            <path d={path(curve)} fill="none" stroke="var(--ink)" strokeWidth="1.8" strokeDasharray={DASHES[index % DASHES.length]} strokeLinejoin="round" />
            {curve.rings.map((ring) => (
              <circle key={ring.day} cx={x(ring.day)} cy={y(ring.value)} r="4" fill="var(--lit)" stroke="var(--ink)" strokeWidth="1.4" />
            ))}
            {curve.posts.map((post) => (
              <g key={`${post.kind} ${post.day}`}>
                <rect x={x(post.day) - 7} y={y(post.value) - 24} width="14" height="15" fill="var(--ink)" />
                <path d={`M${x(post.day)} ${y(post.value) - 9}V${y(post.value)}`} stroke="var(--ink)" />
                <text x={x(post.day)} y={y(post.value) - 12.5} textAnchor="middle" fontSize="11" fontWeight="600" fill="var(--on)">
                  {post.letter}
                </text>
              </g>
            ))}
            {wide && (
              <>
                <path d={`M${x(curve.points.at(-1)!.day) + 3} ${y(curve.points.at(-1)!.value)}L${right + 8} ${names.get(curve.id)}`} stroke="var(--rule2)" fill="none" />
                <text x={right + 12} y={(names.get(curve.id) ?? 0) + 4} fontSize="12" fontWeight="600" fill="var(--ink)">
                  {curve.name.length > 22 ? `${curve.name.slice(0, 21)}…` : curve.name}
                </text>
              </>
            )}
          </g>
        ))}
        {at !== null && <path d={`M${x(at)} ${TOP}V${HEIGHT - FOOT}`} stroke="var(--ink)" />}
      </svg>
      <ul className="flex flex-wrap gap-x-6 gap-y-1 px-(--margin) pb-2" aria-hidden>
        {drawn.map((curve, index) => {
          const value = at === null ? null : valueAt(curve.points, at);
          return (
            <li key={curve.id} className="type-label flex items-center gap-2">
              <svg width="36" height="10">
                <path d="M0 5h36" stroke={curve.colour} strokeWidth="7" strokeOpacity="0.55" />
                <path d="M0 5h36" stroke="var(--ink)" strokeWidth="1.8" strokeDasharray={DASHES[index % DASHES.length]} />
              </svg>
              {curve.name}
              {at !== null && <span className="font-semibold">{value === null ? 'nothing here' : written(value, measure)}</span>}
            </li>
          );
        })}
        <li className="type-label text-ink2">{at === null ? 'Move over the curves to read them.' : `day ${at.toFixed(1)}`}</li>
      </ul>
    </div>
  );
}
