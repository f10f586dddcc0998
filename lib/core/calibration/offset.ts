import { median } from '../series/order';
import type { Instant, Reading } from '../types';

/** A hydrometer reading beside what the float showed then. */
export interface Pair {
  at: Instant;
  hand: number;
  float: number;
}

export interface OffsetSuggestion {
  /** To be added to what the float shows, SG. */
  offset: number;
  /** From when on it fits: the first reading by hand that agrees with it. */
  since: Instant;
  /** Readings by hand that it rests on. */
  pairs: Pair[];
  /** How far those differ among themselves, SG. */
  spread: number;
}

/** Readings of the float within this of the hand's count as the same moment; within it a working must falls less than a hydrometer can be read to. */
const BESIDE_MS = 2 * 3_600_000;
/** Below this nobody can tell a float from a hydrometer, SG (common practice: a hydrometer is read to a point). */
const LEAST = 0.002;
/** One reading alone must show more than this, since it may be misread. */
const LEAST_OF_ONE = 0.003;
/** Pairs that differ by more than this do not tell of the same offset, SG. */
const AGREE = 0.002;

/** Each reading by hand with the median of what the float showed around it; those without a float reading beside them are left out. */
export function pairUp(readings: readonly Reading[], hands: readonly { at: Instant; gravity: number }[]): Pair[] {
  return [...hands]
    .sort((a, b) => a.at - b.at)
    .flatMap(({ at, gravity }) => {
      const near = readings.filter((reading) => Math.abs(reading.at - at) <= BESIDE_MS);
      return near.length === 0 ? [] : [{ at, hand: gravity, float: median(near.map((reading) => reading.gravity)) }];
    });
}

/**
 * The offset that the latest readings by hand agree on, or null where they show
 * none. It is only proposed: a person decides.
 */
export function suggestOffset(readings: readonly Reading[], hands: readonly { at: Instant; gravity: number }[]): OffsetSuggestion | null {
  const pairs = pairUp(readings, hands);
  const agreeing: Pair[] = [];
  for (const pair of [...pairs].reverse()) {
    const differences = [...agreeing, pair].map(({ hand, float }) => hand - float);
    if (Math.max(...differences) - Math.min(...differences) > AGREE) break;
    agreeing.unshift(pair);
  }
  if (agreeing.length === 0) return null;
  const differences = agreeing.map(({ hand, float }) => hand - float);
  const offset = Math.round(median(differences) * 1e4) / 1e4;
  if (Math.abs(offset) < (agreeing.length === 1 ? LEAST_OF_ONE : LEAST)) return null;
  return { offset, since: agreeing[0]!.at, pairs: agreeing, spread: Math.max(...differences) - Math.min(...differences) };
}
