'use client';

import { useId, useRef, useState, type PointerEvent } from 'react';
import type { Span } from '@/components/charts/picture';
import { useZoom } from '@/components/charts/use-zoom';
import { within } from '@/components/charts/zoom';
import { ZoomTools } from '@/components/charts/ZoomTools';
import { gravityNumber, temperatureNumber } from '@/components/ui/units';
import { useWidth } from '@/components/ui/width';
import { valueAt, written, type Curve, type Measure, type Point } from './curves';
import { between, DAY_S, dayTicks, heightOf, ticks } from './scales';
import { smoothPath } from './smooth';

const HEIGHT = 420;
const [TOP, FOOT, LEFT] = [30, 42, 54];
/** Room at the right for the names, on a wide page. */
const NAMES = 190;
const NAME_GAP = 17;
/** One batch is told from the next by its dash as well as by its colour. */
const DASHES = ['', '9 4', '2.5 3.5', '12 4 2.5 4', '5 3', '1 4', '16 5', '7 3 1.5 3 1.5 3'];
/** A drag shorter than this is a click, px. */
const DRAG_PX = 6;
const MEASURED: Record<Measure, { word: string; none: string }> = {
  gravity: { word: 'gravity', none: 'readings' },
  share: { word: 'share of the fall', none: 'an original gravity and readings' },
  temperature: { word: 'temperature', none: 'a temperature' },
};

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

const scaleWords = (value: number, measure: Measure): string => (measure === 'gravity' ? gravityNumber(value) : measure === 'temperature' ? temperatureNumber(value) : String(Number(value.toFixed(1))).replace('-', '−'));

/** Curves over each other, day 0 the pitch of each, to be zoomed and moved along. The table below says the same. */
export function CompareChart({ curves, measure, whole, span: asked, onSpan }: { curves: readonly Curve[]; measure: Measure; /** All there is to see, s since the pitch. */ whole: Span; /** s since the pitch; null: all of it. */ span: Span | null; onSpan: (span: Span) => void }) {
  const frame = useRef<HTMLDivElement>(null);
  const width = Math.max(300, useWidth(frame, 1100));
  const [cursor, setCursor] = useState<number | null>(null);
  const drawn = curves.filter((curve) => curve.points.length > 1);
  const span = within(asked ?? whole, whole);
  const wide = width > 700;
  const right = wide ? NAMES : 8;
  useZoom(frame, { span, whole, onSpan, left: LEFT, right });
  const { word, none } = MEASURED[measure];
  const at = cursor === null ? null : Math.min(span.to, Math.max(span.from, cursor)) / DAY_S;
  return (
    <>
      <div className="flex flex-wrap items-center gap-x-4 gap-y-1 px-(--margin) pb-1">
        <p className="type-label text-ink2">
          {at !== null ? (
            `day ${at.toFixed(1)}`
          ) : (
            <>
              Move over the curves to read them; <span className="max-strip:hidden">drag over a part</span>
              <span className="strip:hidden">two fingers</span> to see it closer.
            </>
          )}
        </p>
        {drawn.length > 0 && (
          <div className="ml-auto flex gap-1">
            <ZoomTools span={span} whole={whole} onSpan={onSpan} />
          </div>
        )}
      </div>
      <div
        ref={frame}
        tabIndex={0}
        role="group"
        aria-label={`${drawn.map((curve) => curve.name).join(', ')}: ${word} by days since the pitch. Zoom with plus and minus, move with the arrows, 0 shows all.`}
        className="min-w-0 touch-pan-y select-none font-mono outline-offset-[-3px]"
      >
        {drawn.length === 0 ? (
          <p className="type-body px-(--margin) py-6 text-ink2">None of these has {none} since its pitch.</p>
        ) : (
          <Drawing curves={drawn} measure={measure} span={span} width={width} right={width - right} wide={wide} at={at} onCursor={setCursor} onSpan={(chosen) => onSpan(within(chosen, whole))} />
        )}
      </div>
      <Key curves={drawn} measure={measure} at={at} />
    </>
  );
}

interface DrawingProps {
  curves: readonly Curve[];
  measure: Measure;
  span: Span;
  width: number;
  /** Right edge of the plot, px. */
  right: number;
  wide: boolean;
  /** Day under the cursor. */
  at: number | null;
  onCursor: (at: number | null) => void;
  onSpan: (span: Span) => void;
}

function Drawing({ curves, measure, span, width, right, wide, at, onCursor, onSpan }: DrawingProps) {
  const id = useId();
  const [drag, setDrag] = useState<{ from: number; to: number } | null>(null);
  const [from, to] = [span.from / DAY_S, span.to / DAY_S];
  const shown = curves.map((curve) => ({ curve, points: between(curve.points, from, to) }));
  const inside = (point: Point) => point.day >= from && point.day <= to;
  const height = heightOf([...shown.flatMap(({ points }) => points), ...curves.flatMap((curve) => curve.rings.filter(inside))]) ?? { bottom: 0, top: 1 };
  const x = (day: number) => LEFT + ((right - LEFT) * (day - from)) / (to - from);
  const y = (value: number) => TOP + ((HEIGHT - TOP - FOOT) * (height.top - value)) / (height.top - height.bottom);
  const line = (points: readonly Point[]) => smoothPath(points.map((point) => ({ x: x(point.day), y: y(point.value) })));
  const ends = shown.flatMap(({ curve, points }) => (points.length > 0 ? [{ id: curve.id, y: y(points.at(-1)!.value) }] : []));
  const names = spread(ends);

  const px = (event: PointerEvent<SVGSVGElement>) => Math.min(right, Math.max(LEFT, event.clientX - event.currentTarget.getBoundingClientRect().left));
  const timeAt = (pixel: number) => span.from + ((pixel - LEFT) / (right - LEFT)) * (span.to - span.from);
  const chooses = drag !== null && Math.abs(drag.to - drag.from) > DRAG_PX;

  return (
    <svg
      width={width}
      height={HEIGHT}
      aria-hidden
      className="block"
      onPointerDown={(event) => {
        if (event.pointerType !== 'mouse' || event.button !== 0) return;
        event.currentTarget.setPointerCapture(event.pointerId);
        setDrag({ from: px(event), to: px(event) });
      }}
      onPointerMove={(event) => {
        onCursor(timeAt(px(event)));
        if (drag) setDrag({ ...drag, to: px(event) });
      }}
      onPointerUp={() => {
        if (drag && chooses) onSpan({ from: timeAt(Math.min(drag.from, drag.to)), to: timeAt(Math.max(drag.from, drag.to)) });
        setDrag(null);
      }}
      onPointerCancel={() => setDrag(null)}
      onPointerLeave={() => onCursor(null)}
    >
      <clipPath id={id}>
        <rect x={LEFT} y={0} width={right - LEFT} height={HEIGHT - FOOT} />
      </clipPath>
      {ticks(height.bottom, height.top, 6).map((value) => (
        <g key={value}>
          <path d={`M${LEFT} ${y(value)}H${right}`} stroke="var(--rule)" />
          <text x={LEFT - 8} y={y(value) + 4} textAnchor="end" fontSize="12" fill="var(--ink2)">
            {scaleWords(value, measure)}
          </text>
        </g>
      ))}
      {dayTicks(from, to, wide ? 12 : 5).map((day) => (
        <g key={day}>
          <path d={`M${x(day)} ${TOP}V${HEIGHT - FOOT}`} stroke="var(--rule)" />
          <text x={x(day)} y={HEIGHT - FOOT + 20} textAnchor={day === 0 ? 'start' : 'middle'} fontSize="12" fill="var(--ink2)">
            {day === 0 ? 'pitch' : day}
          </text>
        </g>
      ))}
      <text x={right} y={HEIGHT - 6} textAnchor="end" fontSize="11" fill="var(--ink2)">
        days since the pitch
      </text>
      <path d={`M${LEFT} ${HEIGHT - FOOT}H${right}`} stroke="var(--ink)" strokeWidth="1.5" />
      {chooses && <rect x={Math.min(drag.from, drag.to)} y={TOP} width={Math.abs(drag.to - drag.from)} height={HEIGHT - TOP - FOOT} fill="var(--ink)" fillOpacity="0.12" />}
      {shown.map(({ curve, points }, index) => (
        <g key={curve.id}>
          <g clipPath={`url(#${id})`}>
            <path d={line(points)} fill="none" stroke={curve.colour} strokeWidth="7" strokeOpacity="0.55" strokeLinejoin="round" />
            <path d={line(points)} fill="none" stroke="var(--ink)" strokeWidth="1.8" strokeDasharray={DASHES[index % DASHES.length]} strokeLinejoin="round" />
          </g>
          {curve.rings.filter(inside).map((ring) => (
            <circle key={ring.day} cx={x(ring.day)} cy={y(ring.value)} r="4" fill="var(--lit)" stroke="var(--ink)" strokeWidth="1.4" />
          ))}
          {curve.posts.filter(inside).map((post) => (
            <g key={`${post.kind} ${post.day}`}>
              <rect x={x(post.day) - 7} y={y(post.value) - 24} width="14" height="15" fill="var(--ink)" />
              <path d={`M${x(post.day)} ${y(post.value) - 9}V${y(post.value)}`} stroke="var(--ink)" />
              <text x={x(post.day)} y={y(post.value) - 12.5} textAnchor="middle" fontSize="11" fontWeight="600" fill="var(--on)">
                {post.letter}
              </text>
            </g>
          ))}
          {wide && points.length > 0 && (
            <>
              <path d={`M${x(points.at(-1)!.day) + 3} ${y(points.at(-1)!.value)}L${right + 8} ${names.get(curve.id)}`} stroke="var(--rule2)" fill="none" />
              <text x={right + 12} y={(names.get(curve.id) ?? 0) + 4} fontSize="12" fontWeight="600" fill="var(--ink)">
                {curve.name.length > 22 ? `${curve.name.slice(0, 21)}…` : curve.name}
              </text>
            </>
          )}
        </g>
      ))}
      {at !== null && <path d={`M${x(at)} ${TOP}V${HEIGHT - FOOT}`} stroke="var(--ink)" />}
    </svg>
  );
}

/** Which line is whose, with its value under the cursor. */
function Key({ curves, measure, at }: { curves: readonly Curve[]; measure: Measure; at: number | null }) {
  return (
    <ul className="flex flex-wrap gap-x-6 gap-y-1 px-(--margin) pb-2" aria-hidden>
      {curves.map((curve, index) => {
        const value = at === null ? null : valueAt(curve.points, at);
        return (
          <li key={curve.id} className="type-label flex min-w-0 items-center gap-2">
            <svg width="36" height="10" className="shrink-0">
              <path d="M0 5h36" stroke={curve.colour} strokeWidth="7" strokeOpacity="0.55" />
              <path d="M0 5h36" stroke="var(--ink)" strokeWidth="1.8" strokeDasharray={DASHES[index % DASHES.length]} />
            </svg>
            <span className="min-w-0 break-words">{curve.name}</span>
            {at !== null && <span className="font-semibold">{value === null ? 'nothing here' : written(value, measure)}</span>}
          </li>
        );
      })}
    </ul>
  );
}
