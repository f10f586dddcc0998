/** Order statistics on scratch arrays; they reorder what they are given. */

/** Up to so many values a plain sort is quicker than a selection (measured). */
const FEW = 12;

/** Sorts values[from..to) by insertion. */
function sortFew(values: Float64Array, from: number, to: number): void {
  for (let i = from + 1; i < to; i += 1) {
    const value = values[i]!;
    let j = i - 1;
    while (j >= from && values[j]! > value) {
      values[j + 1] = values[j]!;
      j -= 1;
    }
    values[j + 1] = value;
  }
}

/**
 * k-th smallest of values[from..to), with nothing larger before it and nothing
 * smaller behind; NaN where values are. Each pass brings what lies below the middle
 * of three to the front; it counts instead of branching, for a branch that nobody
 * can foretell costs more than an exchange (twice as fast from fifty values up, measured).
 */
export function select(values: Float64Array, from: number, to: number, k: number): number {
  let lo = from;
  let hi = to;
  const at = from + k;
  while (hi - lo > FEW) {
    const pivot = middleOf(values[lo]!, values[(lo + hi) >> 1]!, values[hi - 1]!);
    let below = lo;
    for (let j = lo; j < hi; j += 1) {
      const value = values[j]!;
      values[j] = values[below]!;
      values[below] = value;
      below += Number(value < pivot);
    }
    if (at < below) {
      hi = below;
      continue;
    }
    let equal = below;
    for (let j = below; j < hi; j += 1) {
      const value = values[j]!;
      values[j] = values[equal]!;
      values[equal] = value;
      equal += Number(value <= pivot);
    }
    if (at < equal || equal === lo) return pivot;
    lo = equal;
  }
  sortFew(values, lo, hi);
  return values[at]!;
}

/** Median of values[from..to): the mean of the middle two where their number is even; NaN of nothing. */
export function medianInPlace(values: Float64Array, from: number, to: number): number {
  const n = to - from;
  if (n <= 0) return Number.NaN;
  return middle(values, from, to, n >> 1, n % 2 === 1);
}

/** The k-th smallest of values[from..to) where their whole number is odd, else the mean of it and the one before. */
function middle(values: Float64Array, from: number, to: number, k: number, odd: boolean): number {
  const upper = select(values, from, to, k);
  if (odd) return upper;
  let lower = Number.NEGATIVE_INFINITY;
  for (let i = from; i < from + k; i += 1) if (values[i]! > lower) lower = values[i]!;
  return (lower + upper) / 2;
}

let between = new Float64Array(512);

/**
 * Median of values[0..n), which is looked for between two bounds, mostly near it: only what lies
 * there is put in order. The same as {@link medianInPlace} gives, also where it lies elsewhere.
 */
export function medianBetween(values: Float64Array, n: number, low: number, high: number): number {
  if (n >= between.length) between = new Float64Array(2 * n);
  let below = 0;
  let upTo = 0;
  for (let i = 0; i < n; i += 1) {
    const value = values[i]!;
    between[upTo - below] = value;
    below += Number(value < low);
    upTo += Number(value <= high);
  }
  const half = (n >> 1) - below;
  if (half < 1 || half >= upTo - below) return medianInPlace(values, 0, n);
  return middle(between, 0, upTo - below, half, n % 2 === 1);
}

/** Median of a list, which stays as it was; NaN of an empty one. */
export function median(values: ArrayLike<number>): number {
  const copy = new Float64Array(values);
  return medianInPlace(copy, 0, copy.length);
}

/** Median of three. */
export function middleOf(a: number, b: number, c: number): number {
  return Math.max(Math.min(a, b), Math.min(Math.max(a, b), c));
}

/** Median of four: the mean of the middle two. */
export function middleTwo(a: number, b: number, c: number, d: number): number {
  return (Math.max(Math.min(a, b), Math.min(c, d)) + Math.min(Math.max(a, b), Math.max(c, d))) / 2;
}
