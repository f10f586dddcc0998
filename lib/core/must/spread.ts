import type { Range } from '../units/range';

/**
 * Spread of a result from the spreads of its inputs, taken as independent: each is
 * moved to its ends alone, and the changes are added as squares, up and down apart
 * (the usual propagation of uncertainty, JCGM 100:2008, with ends in place of
 * derivatives). Costs two evaluations an input that has a spread.
 */
export function spreadOf(inputs: readonly Range[], f: (values: readonly number[]) => number): Range {
  const middles = inputs.map((r) => r.value);
  const value = f(middles);
  let [up, down] = [0, 0];
  inputs.forEach((range, i) => {
    if (range.lo === range.hi) return;
    const at = (x: number): number => f(middles.with(i, x)) - value;
    const ends = [at(range.lo), at(range.hi)];
    up += Math.max(0, ...ends) ** 2;
    down += Math.min(0, ...ends) ** 2;
  });
  return { lo: value - Math.sqrt(down), value, hi: value + Math.sqrt(up) };
}
