'use client';

import { useMemo, useState, type ReactNode } from 'react';
import { FallChart } from '@/components/charts/FallChart';
import { TwinTable } from '@/components/charts/TextTwin';
import type { Picture, Span } from '@/components/charts/picture';
import { twinOf } from '@/components/charts/twin';
import { ZoomTools } from '@/components/charts/ZoomTools';
import { Button } from '@/components/ui/Button';
import { Haze } from '@/components/ui/Haze';
import { ChartKey } from './ChartKey';
import { cursorLine } from './cursor';
import type { Plays } from './use-plays';

interface EvidenceProps {
  name: string;
  picture: Picture;
  span: Span;
  whole: Span;
  onSpan: (span: Span) => void;
  timeZone: string;
  phone: boolean;
  /** The readings are on their way. */
  arriving: boolean;
  /** In place of new readings: why they did not come. */
  trouble: string | null;
  onRetry: () => void;
  /** What can be played with under the chart; null where there is no curve yet. */
  plays: Plays | null;
  /** What stands under the chart while somebody plays. */
  children?: ReactNode;
}

const LINK = 'type-label min-h-11 text-ink underline decoration-rule2 underline-offset-4 aria-expanded:font-bold strip:min-h-6';

/** The chart with its key, the line of figures under the cursor, zoom by buttons, and the same numbers as a table. */
export function Evidence({ name, picture, span, whole, onSpan, timeZone, phone, arriving, trouble, onRetry, plays, children }: EvidenceProps) {
  const [cursor, setCursor] = useState<number | null>(null);
  const [table, setTable] = useState(false);
  const twin = useMemo(() => twinOf(picture, name, timeZone, 60), [picture, name, timeZone]);
  const line = cursorLine(picture, cursor, timeZone);
  return (
    <section aria-label="Evidence">
      <div className="flex flex-wrap items-center gap-x-5 gap-y-1 px-(--margin) py-2 wide:pr-[14px]">
        <div className="max-strip:hidden">
          <ChartKey />
        </div>
        <p className="type-label ml-auto text-ink2 max-strip:ml-0">
          <span className="font-bold text-ink">{line.time}</span> {line.figures}
        </p>
        <div className="flex gap-1 max-strip:hidden">
          <ZoomTools span={span} whole={whole} onSpan={onSpan} />
        </div>
      </div>
      {trouble && (
        <div role="status" className="type-reason mx-(--margin) mb-1 flex flex-wrap items-center gap-x-4 gap-y-1 border-l-[3px] border-ochre pl-3 text-ink2">
          {trouble}
          <Button size="lane" onClick={onRetry}>
            Try again
          </Button>
        </div>
      )}
      <div className="relative">
        {arriving && !trouble && <Haze height={phone ? 228 : 336} className="absolute inset-x-0 top-0 z-[1]" label="Loading the readings" />}
        <FallChart picture={picture} span={span} whole={whole} onSpan={onSpan} onCursor={setCursor} timeZone={timeZone} phone={phone} label={twin.sentence} />
      </div>
      <div className="flex flex-wrap items-center gap-x-5 border-b border-t px-(--margin) py-1.5">
        {plays && (
          <>
            <button type="button" aria-expanded={plays.open === 'what-if'} className={LINK} onClick={() => plays.toggle('what-if')}>
              What if
            </button>
            <button type="button" aria-expanded={plays.open === 'curve'} className={LINK} onClick={() => plays.toggle('curve')}>
              Another curve
            </button>
          </>
        )}
        <button type="button" aria-expanded={table} className={LINK} onClick={() => setTable(!table)}>
          {table ? 'Put the table away' : phone ? 'As a table' : 'The same numbers as a table'}
        </button>
        <div className="ml-auto flex gap-1 strip:hidden">
          <ZoomTools span={span} whole={whole} onSpan={onSpan} />
        </div>
      </div>
      {children}
      {table && (
        <div className="max-h-[420px] overflow-auto border-b px-(--margin)" tabIndex={0} role="region" aria-label="Numbers of the chart">
          <TwinTable twin={twin} className="type-label w-full text-left [&_td]:border-b [&_td]:border-rule [&_td]:py-1 [&_td]:pr-3 [&_th]:border-b [&_th]:border-rule [&_th]:py-1 [&_th]:pr-3 [&_th]:font-semibold" />
        </div>
      )}
    </section>
  );
}
