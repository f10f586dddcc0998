/** What tells whether a batch that rests has really ended. */
export interface RestFigures {
  /** The most that may still come nine times in ten, points, by the shorter and by the longer end of the record: the larger. */
  most: number;
  /** What is likely still to come by the longer end, points. */
  likely: number;
  /** How well it is known where the yeast ends: standard deviation, points. */
  spread: number;
  /** Points below the highest gravity at which it may be done; negative above it. */
  belowTop: number;
  /** How long ago it stood 2 and 8 points higher, as shares of the age of this stretch, 0 to 1; 1 where it never did. */
  since2: number;
  since8: number;
}

/** Points that still come after the bottling from which a call was wrong. */
export const LATE_POINTS = 1;

/** Chance of such a late fall up to which it may be bottled (own simulations: at most one batch in twenty-five is called wrongly). */
export const BOTTLE_CHANCE = .1;

/** Time constant, hours, of the mean that is held against it: no single look decides. */
export const CHANCE_MEMORY_H = 24;

/** Weights of the log odds: a logistic regression over looks at 3,800 batches of two families of own simulations, at which the record was quiet and less than 4 points were to come. */
const WEIGHTS = { none: -3.596, most: 1.443, likely: 1.077, spread: 2.741, belowTop: -0.205, since2: -2.221, since8: 4.289 };
/** Least figures that were weighed, and the ends of `belowTop`: beyond them nothing was learnt. */
const LEAST = { most: 0.1, likely: 0.02, share: 0.02 };
const BELOW_TOP = { lo: -4, hi: 20 };

const logFrom = (value: number, least: number): number => Math.log(Math.max(value, least));

/**
 * Logarithm of the odds that a batch at rest still falls by more than a point. It rises with what
 * may still come, with the doubt about where its yeast ends, and where the last eight points took
 * long; it sinks the further it lies below the top of the expected end and the longer it has lain there.
 * Source: own simulations; nothing is published on it.
 */
export function logOddsOfLateFall({ most, likely, spread, belowTop, since2, since8 }: RestFigures): number {
  return (
    WEIGHTS.none +
    WEIGHTS.most * logFrom(most, LEAST.most) +
    WEIGHTS.likely * logFrom(likely, LEAST.likely) +
    WEIGHTS.spread * Math.log(spread) +
    WEIGHTS.belowTop * Math.min(BELOW_TOP.hi, Math.max(BELOW_TOP.lo, belowTop)) +
    WEIGHTS.since2 * logFrom(since2, LEAST.share) +
    WEIGHTS.since8 * logFrom(since8, LEAST.share)
  );
}

/** Chance, 0 to 1, of log odds. */
export const chanceOf = (logOdds: number): number => 1 / (1 + Math.exp(-logOdds));
