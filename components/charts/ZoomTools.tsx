import type { Span } from './picture';
import { isWhole, zoomed } from './zoom';

/** A small button above a chart. */
export const TOOL = 'type-label not-printed inline-flex h-11 min-w-11 items-center justify-center rounded border border-ink3 px-2 text-ink hover:bg-desk disabled:border-dashed disabled:text-ink3 strip:h-6 strip:min-w-6';

/** Closer, farther, all of it: what fingers, wheel and keys do, for who has none of them. */
export function ZoomTools({ span, whole, onSpan }: { span: Span; whole: Span; onSpan: (span: Span) => void }) {
  const all = isWhole(span, whole);
  const middle = (span.from + span.to) / 2;
  return (
    <>
      <button type="button" className={TOOL} aria-label="Zoom in" onClick={() => onSpan(zoomed(span, whole, 2, middle))}>
        +
      </button>
      <button type="button" className={TOOL} aria-label="Zoom out" onClick={() => onSpan(zoomed(span, whole, 0.5, middle))} disabled={all}>
        −
      </button>
      <button type="button" className={TOOL} aria-label="Show all of it" onClick={() => onSpan(whole)} disabled={all}>
        all
      </button>
    </>
  );
}
