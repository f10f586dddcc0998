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
  const half = n >> 1;
  const upper = select(values, from, to, half);
  if (n % 2 === 1) return upper;
  let lower = Number.NEGATIVE_INFINITY;
  for (let i = from; i < from + half; i += 1) if (values[i]! > lower) lower = values[i]!;
  return (lower + upper) / 2;
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
