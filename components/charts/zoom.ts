import type { Span } from './picture';

/** Less than this shows single readings and no more truth. */
export const NARROWEST_S = 2 * 3600;

/** A span moved and cut so that it stays inside the whole. */
export function within(span: Span, whole: Span): Span {
  const length = Math.min(Math.max(span.to - span.from, NARROWEST_S), whole.to - whole.from);
  const from = Math.min(Math.max(span.from, whole.from), whole.to - length);
  return { from, to: from + length };
}

/** Zooms by a factor (2 shows half as much) about an instant that stays where it is. */
export function zoomed(span: Span, whole: Span, factor: number, about: number): Span {
  const length = Math.max(NARROWEST_S, (span.to - span.from) / factor);
  const share = (about - span.from) / (span.to - span.from);
  return within({ from: about - share * length, to: about + (1 - share) * length }, whole);
}

/** Moves along by a share of what is shown; positive is later. */
export function moved(span: Span, whole: Span, share: number): Span {
  const by = (span.to - span.from) * share;
  return within({ from: span.from + by, to: span.to + by }, whole);
}

export const isWhole = (span: Span, whole: Span): boolean => span.to - span.from >= (whole.to - whole.from) * 0.999;

/** What a key does to the span; null for a key that means nothing here. */
export function afterKey(key: string, span: Span, whole: Span): Span | null {
  const middle = (span.from + span.to) / 2;
  switch (key) {
    case '+':
    case '=':
      return zoomed(span, whole, 1.5, middle);
    case '-':
      return zoomed(span, whole, 1 / 1.5, middle);
    case 'ArrowLeft':
      return moved(span, whole, -0.2);
    case 'ArrowRight':
      return moved(span, whole, 0.2);
    case '0':
      return whole;
    default:
      return null;
  }
}
