'use client';

import { useCallback, useEffect, useMemo, useRef, useState } from 'react';
import type uPlot from 'uplot';
import { calendarOf } from './calendar';
import { CalendarAxis } from './CalendarAxis';
import { columnsOf } from './columns';
import { chartOptions, type Scene } from './options';
import { readPalette } from './palette';
import { hasStopped, type Picture, type Span } from './picture';
import { Plot } from './Plot';
import { layOut } from './strips';
import { useZoom } from './use-zoom';

interface FallChartProps {
  picture: Picture;
  span: Span;
  whole: Span;
  onSpan: (span: Span) => void;
  onCursor: (at: number | null) => void;
  timeZone: string;
  phone: boolean;
  /** What it shows, for those who do not see it. */
  label: string;
}

/** Gravity, temperature and gas of one batch on one axis, to be zoomed and moved along. */
export function FallChart({ picture, span, whole, onSpan, onCursor, timeZone, phone, label }: FallChartProps) {
  const frame = useRef<HTMLDivElement>(null);
  const plot = useRef<uPlot | null>(null);
  const scene = useRef<Scene | null>(null);
  const [width, setWidth] = useState(900);
  const data = useMemo(() => columnsOf(picture), [picture]);
  const layout = useMemo(() => layOut(picture, phone ? 'phone' : 'page'), [picture, phone]);
  const plotWidth = Math.max(100, width - layout.left - layout.right);
  const calendar = useMemo(() => calendarOf(span, timeZone, plotWidth, picture.now, phone), [span, timeZone, plotWidth, picture.now, phone]);
  useZoom(frame, { span, whole, onSpan, left: layout.left, right: layout.right });

  const handlers = useRef({ onSpan, onCursor });
  useEffect(() => {
    handlers.current = { onSpan, onCursor };
  });

  const onMeasure = useCallback(
    (element: HTMLElement, measured: number) => {
      setWidth(measured);
      scene.current = { picture, layout, span, timeZone, palette: readPalette(element, picture.drink), calendar };
    },
    [picture, layout, span, timeZone, calendar],
  );
  const options = useCallback(
    (size: { width: number; height: number }) => chartOptions(() => scene.current!, size, { onSelect: (chosen) => handlers.current.onSpan(chosen), onCursor: (at) => handlers.current.onCursor(at) }),
    [],
  );

  // A new span needs no new data: the scene is replaced and the scales are read again.
  useEffect(() => {
    if (!scene.current || !plot.current) return;
    scene.current = { ...scene.current, span, calendar };
    plot.current.setScale('x', { min: span.from, max: span.to });
  }, [span, calendar]);

  return (
    <div
      ref={frame}
      tabIndex={0}
      role="group"
      aria-label={`${label} Zoom with plus and minus, move with the arrows, 0 shows all.`}
      className="fall-chart touch-pan-y select-none font-mono text-[11.5px] outline-offset-[-3px]"
    >
      <Plot options={options} data={data} height={layout.height} kind={`${layout.style} ${timeZone} ${hasStopped(picture)}`} onMeasure={onMeasure} onReady={(made) => (plot.current = made)} />
      <CalendarAxis calendar={calendar} span={span} left={layout.left} right={layout.right} />
    </div>
  );
}
