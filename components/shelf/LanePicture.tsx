'use client';

import { useEffect, useMemo, useRef, useState } from 'react';
import { pictureOf } from '@/components/charts/from-wire';
import { LaneChart } from '@/components/charts/LaneChart';
import type { Span } from '@/components/charts/picture';
import type { LaneBody } from '@/lib/contracts/batches';

interface LanePictureProps {
  lane: LaneBody;
  span: Span;
  now: number;
  timeZone: string;
  /** Least height, px; a lane that grows with its words takes its picture along. */
  height: number;
  phone?: boolean;
}

/** A lane's section of the calendar. */
export function LanePicture({ lane, span, now, timeZone, height, phone = false }: LanePictureProps) {
  const cell = useRef<HTMLDivElement>(null);
  const [grown, setGrown] = useState(height);
  const picture = useMemo(() => pictureOf({ batch: lane, series: lane.series, drawn: lane, entries: lane.entries }, now, timeZone), [lane, now, timeZone]);

  useEffect(() => {
    const element = cell.current;
    if (!element) return;
    const watch = new ResizeObserver(() => setGrown(Math.max(height, Math.floor(element.clientHeight))));
    watch.observe(element);
    return () => watch.disconnect();
  }, [height]);

  return (
    <div ref={cell} className="arrives pointer-events-none relative h-full min-w-0 overflow-hidden" style={{ minHeight: height }}>
      <div className="absolute inset-x-0 top-0">
        <LaneChart picture={picture} span={span} timeZone={timeZone} height={grown} name={lane.name} narrow short={phone} />
      </div>
    </div>
  );
}
