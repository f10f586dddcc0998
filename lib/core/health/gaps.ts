/** What the running numbers of a sensor's messages tell. */
export interface Gaps {
  /** Readings that arrived with a number. */
  heard: number;
  /** Numbers that never came. */
  missed: number;
  /** How often the numbers began anew: the sensor started again. */
  restarts: number;
}

/**
 * Counts what is missing between running numbers, in the order of measuring. A
 * number that goes down is a new start, after which nothing is known to be missing.
 */
export function countGaps(sequences: readonly number[]): Gaps {
  let missed = 0;
  let restarts = 0;
  for (let index = 1; index < sequences.length; index += 1) {
    const step = sequences[index]! - sequences[index - 1]!;
    if (step > 1) missed += step - 1;
    else if (step < 0) restarts += 1;
  }
  return { heard: sequences.length, missed, restarts };
}
