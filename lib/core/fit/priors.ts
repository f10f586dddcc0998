import { POINTS_PER_G_PER_L } from '../gravity/extract';
import { pointsAtTolerance } from '../strength/strength';
import type { BatchSetup, DrinkKind } from '../types';

/** A normal prior: mean and standard deviation. */
export interface Normal {
  mean: number;
  sd: number;
}

/** Apparent attenuation to expect where no yeast is told, as fractions (our own, wide). */
const USUAL_ATTENUATION: Record<DrinkKind, { min: number; max: number }> = {
  beer: { min: 0.66, max: 0.84 },
  cider: { min: 0.96, max: 1.07 },
  mead: { min: 0.95, max: 1.15 },
  wine: { min: 0.96, max: 1.12 },
};

/**
 * Share of its extract that ferments in a must of simple sugars, which any yeast takes
 * whole: what its card says was measured in wort. Malt needs the card. Juice and sugar
 * in unknown parts: from nearly all of the one to nearly all of the other.
 */
const FERMENTS: Partial<Record<DrinkKind, Normal>> = {
  // Apple juice 0.85 to 0.90, pear less (sorbitol; common practice), sugar 1.
  cider: n(0.91, 0.055),
  // 78.1 g of the 82.8 g of solids in 100 g: J. W. White et al., Composition of American Honeys, USDA Technical Bulletin 1261 (1962), from memory.
  mead: n(0.943, 0.03),
  // Grape must 0.884 (OIV-MA-AS2-02, Table II against ICUMSA), sugar 1.
  wine: n(0.93, 0.045),
};
/** g of extract that make 1 g of ethanol (Balling 1843), and g/L of it in 1 % vol. */
const EXTRACT_PER_ETHANOL = 2.0665;
const GRAMS_PER_ABV = 7.89;
/** Share of the sugar that stays as glycerol, acids and the like (Balling's split, from memory). */
const BY_PRODUCTS = 0.03;
/** Alcohol, % vol, that a yeast bears where nobody says (common practice: wine yeast 12 to 16). */
const USUAL_TOLERANCE = 14;
/** The alcohol of the dry drink over what the yeast bears: up to `ample` it will take all the sugar, from `none` on nobody knows (ours). */
const SPARE = { ample: 0.8, none: 0.95 };

/** Priors of ln κ, ln m, ln Kr, logit δ of the kinetic curve by kind (our own, pooled over simulated batches of two families of models). */
const KINETICS: Record<DrinkKind, readonly [Normal, Normal, Normal, Normal]> = {
  beer: [n(-0.6, 0.7), n(-0.45, 0.5), n(-1.9, 0.9), n(-0.5, 1.4)],
  cider: [n(-1.3, 0.7), n(0.35, 0.5), n(-1.1, 1.2), n(-1.2, 2.0)],
  mead: [n(-1.2, 0.7), n(0.35, 0.5), n(-0.4, 1.5), n(-0.3, 2.2)],
  wine: [n(-1.1, 0.7), n(0.35, 0.5), n(-0.7, 1.6), n(0.1, 2.4)],
};

/** Onset after an addition: the yeast is there already. */
const RESTART_ONSET = n(Math.log(0.12), 0.6);

function n(mean: number, sd: number): Normal {
  return { mean, sd };
}

const density = (z: number): number => Math.exp(-0.5 * z * z) / Math.sqrt(2 * Math.PI);

/** Normal distribution function; Abramowitz & Stegun 26.2.17, error below 7.5e-8. */
export function normalBelow(z: number): number {
  const t = 1 / (1 + 0.2316419 * Math.abs(z));
  const tail =
    density(z) * t * (0.31938153 + t * (-0.356563782 + t * (1.781477937 + t * (-1.821255978 + t * 1.330274429))));
  return z >= 0 ? 1 - tail : tail;
}

/** Mean and standard deviation of the larger of two independent normals (C. E. Clark, Operations Research 9 (1961) 145–162). */
export function largerOf(a: Normal, b: Normal): Normal {
  const theta = Math.hypot(a.sd, b.sd);
  if (theta === 0) return { mean: Math.max(a.mean, b.mean), sd: 0 };
  const alpha = (a.mean - b.mean) / theta;
  const up = normalBelow(alpha);
  const first = a.mean * up + b.mean * (1 - up) + theta * density(alpha);
  const second =
    (a.mean ** 2 + a.sd ** 2) * up + (b.mean ** 2 + b.sd ** 2) * (1 - up) + (a.mean + b.mean) * theta * density(alpha);
  return { mean: first, sd: Math.sqrt(Math.max(0, second - first * first)) };
}

const SD_FLOOR = 1.5;

/** Ethanol, g/L, of a must in which such a share of the extract has fermented. */
const ethanolAtShare = (originalPoints: number, share: number): number => (share * originalPoints) / POINTS_PER_G_PER_L / EXTRACT_PER_ETHANOL;

/** Final gravity, points, of such a must: the sugar gone but for its by-products, and the alcohol that lightens it (fitted to OIML R 22). */
function pointsAtShare(originalPoints: number, share: number): number {
  const ethanol = ethanolAtShare(originalPoints, share);
  return originalPoints - (1 - BY_PRODUCTS) * share * originalPoints - (0.1885 * ethanol - 2.5e-4 * ethanol * ethanol);
}

/**
 * Where a must of simple sugars ends by its make-up, points; null for malt, and where the
 * alcohol may stop the yeast before the sugar is gone: nearing that it counts for less.
 */
function bySugars(kind: DrinkKind, originalPoints: number, toleranceAbv: number | null): Normal | null {
  const share = FERMENTS[kind];
  if (!share || originalPoints <= 0) return null;
  const burden = ethanolAtShare(originalPoints, share.mean) / GRAMS_PER_ABV / (toleranceAbv ?? USUAL_TOLERANCE);
  const weight = Math.min(1, (SPARE.none - burden) / (SPARE.none - SPARE.ample));
  if (weight <= 0) return null;
  const fall = pointsAtShare(originalPoints, share.mean - share.sd) - pointsAtShare(originalPoints, share.mean + share.sd);
  return n(pointsAtShare(originalPoints, share.mean), Math.max(SD_FLOOR, fall / 2) / Math.sqrt(weight));
}

/**
 * Two independent normals as one, weighted by their variances, and wider where they lie
 * further apart than these explain (R. T. Birge, Physical Review 40 (1932) 207, from memory).
 */
function both(a: Normal, b: Normal): Normal {
  const weight = b.sd ** 2 / (a.sd ** 2 + b.sd ** 2);
  const apart = Math.hypot(a.sd, b.sd);
  return n(weight * a.mean + (1 - weight) * b.mean, ((a.sd * b.sd) / apart) * Math.max(1, Math.abs(a.mean - b.mean) / apart));
}

/**
 * What the yeast's range, the must's sugars and the yeast's tolerance say of the
 * final gravity, points: the larger of where the attenuation ends and where the
 * alcohol stops the yeast.
 */
export function finalGravityPrior(
  setup: Pick<BatchSetup, 'kind' | 'attenuation' | 'alcoholToleranceAbv'>,
  effectiveOg: number,
  ogSd: number,
  fruit: boolean,
): Normal {
  const range = setup.attenuation ?? USUAL_ATTENUATION[setup.kind];
  const mid = (range.min + range.max) / 2;
  const half = Math.abs(range.max - range.min) / 2;
  const attenuationSd = Math.max(half / 1.28, 0.02);
  const byYeast: Normal = {
    mean: effectiveOg * (1 - mid),
    sd: Math.hypot(effectiveOg * attenuationSd, ogSd * (1 - mid)),
  };
  const sugars = bySugars(setup.kind, effectiveOg, setup.alcoholToleranceAbv);
  let prior = sugars ? both(byYeast, sugars) : byYeast;
  if (setup.alcoholToleranceAbv !== null) {
    const stop = pointsAtTolerance(effectiveOg, setup.alcoholToleranceAbv);
    const slope = pointsAtTolerance(effectiveOg, setup.alcoholToleranceAbv - 1) - stop;
    prior = largerOf(prior, { mean: stop, sd: Math.hypot(0.8 * slope, ogSd) });
  }
  return { mean: prior.mean, sd: Math.max(SD_FLOOR, prior.sd) + (fruit ? 3 : 0) };
}

/** Priors of the six parameters of the kinetic curve, in its order. */
export interface CurvePrior {
  normals: readonly Normal[];
}

export function curvePrior(kind: DrinkKind, og: Normal, fg: Normal, restarted: boolean): CurvePrior {
  const [k, m, kr, delta] = KINETICS[kind];
  return { normals: [og, fg, k, restarted ? RESTART_ONSET : m, kr, delta] };
}
