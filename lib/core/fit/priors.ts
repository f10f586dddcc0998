import type { BatchSetup, DrinkKind } from '../types';
import { pointsAtTolerance } from '../strength/strength';

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

/**
 * What the yeast's range and tolerance say of the final gravity, points: the
 * larger of where the attenuation ends and where the alcohol stops the yeast.
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
  let prior = byYeast;
  if (setup.alcoholToleranceAbv !== null) {
    const stop = pointsAtTolerance(effectiveOg, setup.alcoholToleranceAbv);
    const slope = pointsAtTolerance(effectiveOg, setup.alcoholToleranceAbv - 1) - stop;
    prior = largerOf(byYeast, { mean: stop, sd: Math.hypot(0.8 * slope, ogSd) });
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
