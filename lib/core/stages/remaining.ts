/** Points still to fall, how well that is known, and the most it may be seven times and nine times in ten. */
export interface Remaining {
  value: number;
  sd: number;
  likely: number;
  most: number;
}

interface Known {
  value: number;
  sd: number;
}

/** Share of the fall, by the curve, from which the tail tells of what is left (own simulations). */
const TAIL_SHOWS_END_FROM = 0.85;

export const remaining = (value: number, sd: number): Remaining => ({ value, sd, likely: value + 0.5 * sd, most: value + 1.28 * sd });

/** Two independent estimates as one, weighted by their variances. */
export function held(a: Known, b: Known): Known {
  const wa = 1 / a.sd ** 2;
  const wb = 1 / b.sd ** 2;
  return { value: (wa * a.value + wb * b.value) / (wa + wb), sd: Math.sqrt(1 / (wa + wb)) };
}

/** Two views of the same record, which are not independent: `share` of the second, the rest of the first. */
export function mixed(a: Known, b: Known, share: number): Remaining {
  return remaining((1 - share) * a.value + share * b.value, (1 - share) * a.sd + share * b.sd);
}

/** How much the tail has to say beside the curve at a level, 0 to 1. */
export function shareOfTail(curve: { og: number; fg: number }, level: number): number {
  const done = curve.og > curve.fg ? (curve.og - level) / (curve.og - curve.fg) : 1;
  return Math.min(1, Math.max(0, (done - TAIL_SHOWS_END_FROM) / (1 - TAIL_SHOWS_END_FROM)));
}
