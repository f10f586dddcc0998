/** Order statistics on scratch arrays; they reorder what they are given. */

/** k-th smallest of values[from..to), by Hoare's selection. Mean cost O(n). */
export function select(values: Float64Array, from: number, to: number, k: number): number {
  let lo = from;
  let hi = to - 1;
  const at = from + k;
  while (lo < hi) {
    const pivot = values[(lo + hi) >> 1]!;
    let i = lo;
    let j = hi;
    while (i <= j) {
      while (values[i]! < pivot) i += 1;
      while (values[j]! > pivot) j -= 1;
      if (i <= j) {
        const swap = values[i]!;
        values[i] = values[j]!;
        values[j] = swap;
        i += 1;
        j -= 1;
      }
    }
    if (at <= j) hi = j;
    else if (at >= i) lo = i;
    else break;
  }
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
  const copy = Float64Array.from(values);
  return medianInPlace(copy, 0, copy.length);
}

/** Median of three. */
export function middleOf(a: number, b: number, c: number): number {
  return Math.max(Math.min(a, b), Math.min(Math.max(a, b), c));
}
