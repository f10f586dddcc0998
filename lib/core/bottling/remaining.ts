/** Sugar that may still ferment in the bottle: the worst case, in points and volumes. */
import { figure, how, type RangeFigure } from '../how/how';
import { SOURCES } from '../how/sources';
import { VOLUMES_PER_POINT } from '../gas/gas';
import type { DrinkKind } from '../types';
import { times, type Range } from '../units/range';
import { pointsOf, sgOf } from '../units/convert';

/** Highest apparent attenuation a drink of each kind is known to reach, as a fraction: common practice, the upper end. */
const HIGHEST_ATTENUATION: Record<DrinkKind, number> = { beer: 0.84, cider: 1.07, mead: 1.15, wine: 1.12 };
/** Where no original gravity is known, SG. */
const DRIEST_KNOWN: Record<DrinkKind, number> = { beer: 1.0, cider: 0.99, mead: 0.985, wine: 0.985 };
/** A hydrometer is read to half a point: no batch is ever reckoned drier than that. Our own rule. */
export const READING_DOUBT_POINTS = 0.5;

export interface Leftover {
  kind: DrinkKind;
  gravity: number;
  /** Effective original gravity, SG, or null where nobody measured. */
  originalGravity: number | null;
  /** Final gravity to expect, SG, lower to upper; null where nothing is known of yeast and must. */
  expectedFinal: Range | null;
  /** False where the batch stopped above what was expected: then all its sugar counts. */
  trustExpected: boolean;
  /** Yeast or bacteria that eat what others leave. */
  diastatic: boolean;
  /** Points from a sweetener or lactose that yeast cannot use. */
  unfermentablePoints: number;
  /** Sulphite and sorbate in sufficient dose, or filtered sterile, after the gravity had stood still. */
  stabilised: boolean;
}

/** Final gravity up to which a yeast's range alone is believed, SG, where the sugar is that of fruit or honey: all of it ferments. Our own rule. */
const SUGAR_ENDS = { lo: 1.0, hi: 1.005 };
/** Share of a beer's points that dextrins may leave, at most: 60 % apparent attenuation. Common practice, the lower end. */
const MOST_DEXTRINS = 0.4;

/**
 * The final gravity to expect as far as a yeast's range can explain it. A range
 * that leaves much sugar behind explains nothing: what is left then is explained
 * by the alcohol, a sweetener or stabilising, or not at all.
 */
export function credible(drink: Pick<Leftover, 'kind' | 'originalGravity' | 'expectedFinal'>): Range | null {
  const { kind, originalGravity: og, expectedFinal: expected } = drink;
  if (!expected) return null;
  const beer = og === null ? Infinity : sgOf(pointsOf(og) * MOST_DEXTRINS);
  const top = kind === 'beer' ? { lo: beer, hi: beer } : SUGAR_ENDS;
  const hi = Math.min(expected.hi, top.hi);
  const lo = Math.min(expected.lo, top.lo);
  return { lo, value: Math.min(hi, Math.max(lo, expected.value)), hi };
}

/** Lowest gravity the drink could reach, SG: by its kind's highest attenuation; with diastatic yeast at most 1.000. */
export function lowestGravity(drink: Pick<Leftover, 'kind' | 'originalGravity' | 'diastatic'>): number {
  const og = drink.originalGravity;
  const byKind = og === null ? DRIEST_KNOWN[drink.kind] : sgOf(pointsOf(og) * (1 - HIGHEST_ATTENUATION[drink.kind]));
  return drink.diastatic ? Math.min(1, byKind) : byKind;
}

/** Points that may still ferment once the drink is closed in. The upper end is the one to be safe by. */
export function remainingPoints(drink: Leftover): RangeFigure {
  const inputs = [
    ['gravity', drink.gravity, 'SG'],
    ['original gravity', drink.originalGravity, 'SG'],
    ['expected final gravity, lower end', drink.expectedFinal?.lo ?? null, 'SG'],
    ['sweetener that does not ferment', drink.unfermentablePoints, 'points'],
  ] as const;
  if (drink.stabilised) {
    return figure({ lo: 0, value: 0, hi: 0 }, 'points', how('none: stabilised after the gravity stood still', SOURCES.told, inputs));
  }
  const above = (gravity: number): number => Math.max(0, pointsOf(drink.gravity) - pointsOf(gravity) - drink.unfermentablePoints);
  const floor = lowestGravity(drink);
  const believed = credible(drink);
  const expected = drink.trustExpected ? believed : null;
  const hi = Math.max(READING_DOUBT_POINTS, above(expected && !drink.diastatic ? expected.lo : Math.min(floor, believed?.lo ?? floor)));
  const value = expected ? Math.min(hi, above(expected.value)) : hi;
  return figure(
    { lo: expected ? Math.min(value, above(expected.hi)) : 0, value, hi },
    'points',
    expected && !drink.diastatic
      ? how('gravity − lower end of the expected final gravity, at least half a point', SOURCES.ownRule, inputs)
      : how('all the sugar: gravity − the lowest gravity a drink of this kind reaches', SOURCES.ownRule, [...inputs, ['lowest gravity', floor, 'SG']]),
  );
}

/** Gas those points give in a closed bottle, volumes: 0.51 a point. */
export function gasFromPoints(points: Range): RangeFigure {
  return figure(times(points, VOLUMES_PER_POINT), 'volumes', how('points × 0.51 volumes', SOURCES.pointsToVolumes, [['points, at most', points.hi, 'points']]));
}
