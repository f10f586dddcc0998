'use client';

import { useCallback, useMemo, useRef } from 'react';
import { calendarOf } from './calendar';
import { columnsOf } from './columns';
import { chartOptions, type Scene } from './options';
import { readPalette } from './palette';
import type { Picture, Span } from './picture';
import { Plot } from './Plot';
import { layOut } from './strips';
import { TextTwin } from './TextTwin';
import { twinOf } from './twin';

interface LaneChartProps {
  picture: Picture;
  span: Span;
  timeZone: string;
  height: number;
  /** Name of the batch, for those who hear the chart. */
  name: string;
  /** Days are narrower on a phone. */
  narrow?: boolean;
  /** A phone's strip: fewer figures. */
  short?: boolean;
  className?: string;
}

/** One batch on the shelf's shared calendar: fall, forecast, bed, posts and temperature. */
export function LaneChart({ picture, span, timeZone, height, name, narrow = false, short = false, className = '' }: LaneChartProps) {
  const data = useMemo(() => columnsOf(picture, true), [picture]);
  const layout = useMemo(() => layOut(picture, 'lane', height, short), [picture, height, short]);
  const scene = useRef<Scene | null>(null);
  const onMeasure = useCallback(
    (element: HTMLElement, width: number) => {
      scene.current = { picture, layout, span, timeZone, palette: readPalette(element, picture.drink), calendar: calendarOf(span, timeZone, width, picture.now, narrow) };
    },
    [picture, layout, span, timeZone, narrow],
  );
  const options = useCallback((size: { width: number; height: number }) => chartOptions(() => scene.current!, size), []);
  return (
    <div className={`relative font-mono text-[12px] ${className}`}>
      <Plot options={options} data={data} height={height} kind={`lane ${timeZone}`} onMeasure={onMeasure} />
      <TextTwin twin={twinOf(picture, name, timeZone)} />
    </div>
  );
}
