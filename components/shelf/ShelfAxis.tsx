'use client';

import { useRef } from 'react';
import { calendarOf } from '@/components/charts/calendar';
import type { Span } from '@/components/charts/picture';
import { useWidth } from '@/components/ui/width';

/** The shared calendar's days: weekends tinted, today an ink block. The lanes below continue its weekends. */
export function ShelfAxis({ span, now, timeZone }: { span: Span; now: number; timeZone: string }) {
  const cell = useRef<HTMLDivElement>(null);
  const calendar = calendarOf(span, timeZone, useWidth(cell, 728), now, true);
  const share = (at: number) => ((at - span.from) / (span.to - span.from)) * 100;
  return (
    <div ref={cell} aria-hidden className="relative h-full overflow-x-clip font-mono text-[min(0.75rem,13px)] leading-[13px]">
      {calendar.weekends.map((weekend) => (
        <span key={weekend.from} className="absolute top-0 -bottom-[1.5px] bg-well" style={{ left: `${share(weekend.from)}%`, width: `${share(weekend.to) - share(weekend.from)}%` }} />
      ))}
      {calendar.labels.map((label) => {
        const left = share(label.from);
        const width = share(label.to) - left;
        // A day that is not nearly whole in sight would have its figure cut.
        if (left < -width / 4 || left + width > 100 + width / 4) return null;
        const today = label.today && label.from <= now;
        return (
          <span
            key={label.from}
            className={`absolute flex flex-col items-center justify-end whitespace-nowrap pb-[3px] ${today ? 'inset-x-0 bottom-0 top-[2px] bg-ink text-on' : 'inset-y-0 text-ink2'}`}
            style={{ left: `${left}%`, width: `${width}%`, right: 'auto' }}
          >
            <span className={today ? '' : label.top.length > 1 && label.strong && !/^[A-Z]$/.test(label.top) ? 'font-bold text-ink' : 'text-ink3'} style={{ fontWeight: today || label.top.length > 1 ? 600 : 500 }}>
              {label.top || ' '}
            </span>
            <span className={today || label.strong ? 'text-[min(0.8125rem,14px)]' : ''} style={{ fontWeight: today || (label.strong && !today) ? 700 : 500, color: today ? undefined : label.strong ? 'var(--ink)' : undefined }}>
              {label.bottom}
            </span>
          </span>
        );
      })}
    </div>
  );
}
