'use client';

import type { Calendar } from './calendar';
import type { Span } from './picture';

interface CalendarAxisProps {
  calendar: Calendar;
  span: Span;
  /** Gutters of the charts that stand on this axis, px. */
  left?: number;
  right?: number;
  className?: string;
}

/** The days of a span as text, today as an ink block. Decoration for sighted people: each chart has its own text twin. */
export function CalendarAxis({ calendar, span, left = 0, right = 0, className = '' }: CalendarAxisProps) {
  const share = (at: number) => ((at - span.from) / (span.to - span.from)) * 100;
  return (
    <div aria-hidden="true" className={`relative h-[34px] overflow-hidden font-mono text-[11px] leading-[15px] ${className}`} style={{ marginLeft: left, marginRight: right }}>
      {calendar.labels.map((label) => {
        const from = share(label.from);
        const width = share(label.to) - from;
        // The middle of a stretch that starts before the span would lie outside it.
        const seenFrom = Math.max(0, from);
        const seenWidth = Math.min(100, from + width) - seenFrom;
        if (label.names === 'rule' ? from < 2 || from > 98 : seenWidth <= width * 0.45) return null;
        const block = label.today && label.names === 'room';
        const place = label.names === 'rule' ? { left: `${from - width / 2}%`, width: `${width}%` } : { left: `${seenFrom}%`, width: `${seenWidth}%` };
        return (
          <div key={label.from} className={`absolute inset-y-0 flex flex-col items-center justify-center overflow-hidden whitespace-nowrap ${block ? 'bg-ink text-on' : 'text-ink2'}`} style={place}>
            <span className={label.strong && !block ? 'text-ink' : ''}>{label.top || '\u00a0'}</span>
            <span className={label.strong || block ? 'font-bold' : 'font-medium'}>{label.bottom}</span>
          </div>
        );
      })}
    </div>
  );
}
