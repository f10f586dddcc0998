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

/** A fall of so many points, as a chance of it is weighed. */
export interface LateFall {
  points: number;
  /** Chance up to which the batch counts as ended (own simulations). */
  chance: number;
  /** Weights of the log odds: a logistic regression over looks at 3,800 batches of two families of own simulations, at which the record was quiet. */
  weights: { none: number; most: number; likely: number; spread: number; belowTop: number; since2: number; since8: number };
}

/** From which a batch was bottled too early: half a volume of gas. */
export const LATE_IN_BOTTLE: LateFall = {
  points: 1,
  chance: 0.1,
  weights: { none: -3.596, most: 1.443, likely: 1.077, spread: 2.741, belowTop: -0.205, since2: -2.221, since8: 4.289 },
};

/** From which a batch was called finished too early. */
export const LATE_WHEN_FINISHED: LateFall = {
  points: 2,
  chance: 0.1,
  weights: { none: -5.671, most: 2.008, likely: 0.568, spread: 2.623, belowTop: -0.239, since2: -1.637, since8: 2.752 },
};

/** Time constant, hours, of the mean that is held against it: no single look decides. */
export const CHANCE_MEMORY_H = 24;

/** Least figures that were weighed, and the ends of `belowTop`: beyond them nothing was learnt. */
const LEAST = { most: 0.1, likely: 0.02, share: 0.02 };
const BELOW_TOP = { lo: -4, hi: 20 };

const logFrom = (value: number, least: number): number => Math.log(Math.max(value, least));

/**
 * Logarithm of the odds that a batch at rest still falls by more than so many points. It rises with what
 * may still come, with the doubt about where its yeast ends, and where the last eight points took
 * long; it sinks the further it lies below the top of the expected end and the longer it has lain there.
 * Source: own simulations; nothing is published on it.
 */
export function logOddsOfLateFall({ weights }: LateFall, { most, likely, spread, belowTop, since2, since8 }: RestFigures): number {
  return (
    weights.none +
    weights.most * logFrom(most, LEAST.most) +
    weights.likely * logFrom(likely, LEAST.likely) +
    weights.spread * Math.log(spread) +
    weights.belowTop * Math.min(BELOW_TOP.hi, Math.max(BELOW_TOP.lo, belowTop)) +
    weights.since2 * logFrom(since2, LEAST.share) +
    weights.since8 * logFrom(since8, LEAST.share)
  );
}

/** Chance, 0 to 1, of log odds. */
export const chanceOf = (logOdds: number): number => 1 / (1 + Math.exp(-logOdds));
