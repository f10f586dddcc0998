import { VOLUMES_PER_POINT } from '../gas/gas';

/** Points that may still come, seven times in ten, when a batch may be bottled that rests no higher than where its yeast ends, and of one two spreads above that (ours). */
export const BOTTLE_MOST = 0.9;
export const BOTTLE_LEAST = 0.62;
const HIGH_SPREADS = 2;
/** Points above where its yeast ends from which what rests may have stalled, and by how much more than that may come nine times in ten there (ours). */
export const STALL_POINTS = 3;
export const STALL_ROOM = 1.37;

/** The same for a level so many points above where its yeast ends, which is known to `spread`: what rests high is more often only slow. */
export function bottlePoints(above: number, spread: number): number {
  const height = Math.min(1, Math.max(0, above / (HIGH_SPREADS * spread)));
  return BOTTLE_MOST - height * (BOTTLE_MOST - BOTTLE_LEAST);
}

/** What comes late comes slowly: share of those points that is let pass where fruit gives up its sugar, after sugar was added, and near the alcohol that the yeast bears; and how near that is, by share (own simulations). */
export const LATE_FRUIT = 0.6;
export const LATE_SUGAR = 0.7;
export const NEAR_TOLERANCE = 0.7;
export const NEAR_TOLERANCE_FROM = 0.9;

/** Share of the points that is let pass, 0 to 1, by what makes the last of a fall slow. `ofTolerance`: alcohol by share of what the yeast bears; null where nobody said. */
export function shareLetPass({ fruit, added, ofTolerance }: { fruit: boolean; added: boolean; ofTolerance: number | null }): number {
  const late = fruit ? LATE_FRUIT : added ? LATE_SUGAR : 1;
  return ofTolerance !== null && ofTolerance > NEAR_TOLERANCE_FROM ? late * NEAR_TOLERANCE : late;
}

/** Points that may still come, nine times in ten, when it may be bottled: less than make a volume of gas, and of what may have stalled hardly more than seven times in ten. */
export function bottleMost(above: number, spread: number): number {
  return above > STALL_POINTS ? STALL_ROOM * bottlePoints(above, spread) : 1 / VOLUMES_PER_POINT;
}

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
