/**
 * An amount known only within limits: "about half a jar". The ends are the least
 * and the most that is thought possible, not a confidence interval.
 */
export interface Range {
  lo: number;
  value: number;
  hi: number;
}

/** A range without spread. */
export const exactly = (value: number): Range => ({ lo: value, value, hi: value });

/** A range from its two ends; the middle stands for it. */
export const between = (a: number, b: number): Range => ({ lo: Math.min(a, b), value: (a + b) / 2, hi: Math.max(a, b) });

/** A range from a value and what it may be off by, both ways. */
export const within = (value: number, plusMinus: number): Range => ({
  lo: value - Math.abs(plusMinus),
  value,
  hi: value + Math.abs(plusMinus),
});

/** A value judged by eye, good to a fifth: our own rule for "about". Never below 0. */
export const about = (value: number): Range => ({ lo: Math.max(0, 0.8 * value), value, hi: 1.2 * value });

/** Sum of ranges: the ends add, as if all were wrong the same way. */
export function sum(ranges: readonly Range[]): Range {
  let [lo, value, hi] = [0, 0, 0];
  for (const range of ranges) {
    lo += range.lo;
    value += range.value;
    hi += range.hi;
  }
  return { lo, value, hi };
}

/** A range times a number. */
export function times(range: Range, factor: number): Range {
  const ends = [range.lo * factor, range.hi * factor] as const;
  return { lo: Math.min(...ends), value: range.value * factor, hi: Math.max(...ends) };
}

/** Product of two ranges of numbers that are not negative. */
export const product = (a: Range, b: Range): Range => ({ lo: a.lo * b.lo, value: a.value * b.value, hi: a.hi * b.hi });

/** The same monotone function at the three points; the ends are put in order. */
export function mapRange(range: Range, f: (x: number) => number): Range {
  const [a, value, b] = [f(range.lo), f(range.value), f(range.hi)];
  return { lo: Math.min(a, value, b), value, hi: Math.max(a, value, b) };
}

/** True for three finite numbers in order. */
export const isRange = (range: Range): boolean =>
  Number.isFinite(range.lo) && Number.isFinite(range.hi) && range.lo <= range.value && range.value <= range.hi;
