import type { Range } from '../units/range';

/** A state at the middle of all inputs, and at both ends of each input that has a spread, moved alone. */
export interface Swings<T> {
  middle: T;
  pairs: readonly (readonly [T, T])[];
}

/** Works a state out once for every end of every input: two evaluations an input that has a spread, and one. */
export function swing<T>(inputs: readonly Range[], f: (values: readonly number[]) => T): Swings<T> {
  const middles = inputs.map((r) => r.value);
  const pairs = inputs.flatMap((range, i): (readonly [T, T])[] => (range.lo === range.hi ? [] : [[f(middles.with(i, range.lo)), f(middles.with(i, range.hi))]]));
  return { middle: f(middles), pairs };
}

/**
 * Spread of a figure read from the states. The inputs are taken as independent:
 * each one's changes are added as squares, up and down apart (the propagation of
 * uncertainty of JCGM 100:2008, with ends in place of derivatives).
 */
export function readSpread<T>(swings: Swings<T>, pick: (state: T) => number): Range {
  const value = pick(swings.middle);
  let [up, down] = [0, 0];
  for (const [a, b] of swings.pairs) {
    const changes = [pick(a) - value, pick(b) - value];
    up += Math.max(0, ...changes) ** 2;
    down += Math.min(0, ...changes) ** 2;
  }
  return { lo: value - Math.sqrt(down), value, hi: value + Math.sqrt(up) };
}
