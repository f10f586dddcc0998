import { readdirSync, readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { bestOf, type Problem } from '../../lib/core/fit/leastsquares';
import { NIST_MODELS } from './nist-models';

/**
 * Statistical Reference Datasets, Nonlinear Least Squares Regression, National
 * Institute of Standards and Technology: certified parameters and standard
 * deviations. Both published starts must lead to the certified solution.
 */
interface Set {
  dataset: string;
  x: number[];
  y: number[];
  start1: number[];
  start2: number[];
  certified_parameters: number[];
  certified_standard_deviations: number[];
  certified_residual_sum_of_squares: number;
  degrees_of_freedom: number;
}

const folder = new URL('./data/nist/', import.meta.url);
const sets = readdirSync(folder)
  .filter((name) => name.endsWith('.json'))
  .map((name) => JSON.parse(readFileSync(new URL(name, folder), 'utf8')) as Set);

function problemOf(set: Set): Problem {
  const model = NIST_MODELS[set.dataset]!;
  return {
    observations: set.x.length,
    parameters: set.start1.length,
    residuals(at, out) {
      for (let i = 0; i < set.x.length; i += 1) out[i] = model(at, set.x[i]!) - set.y[i]!;
    },
  };
}

/** Digits in which the worst parameter agrees with the certified one. */
const digits = (found: ArrayLike<number>, certified: readonly number[]): number =>
  -Math.log10(Math.max(1e-11, ...certified.map((value, j) => Math.abs(found[j]! - value) / Math.abs(value))));

describe('the solver against the NIST reference sets', () => {
  it('has all 26 of them', () => {
    expect(sets).toHaveLength(26);
  });

  for (const set of sets) {
    for (const start of ['start1', 'start2'] as const) {
      it(`reaches six digits of ${set.dataset} from ${start}`, () => {
        const fit = bestOf(problemOf(set), [set[start]], { maxIterations: 2000, sumTolerance: 1e-16, stepTolerance: 1e-13 });
        expect(fit.converged).toBe(true);
        expect(digits(fit.parameters, set.certified_parameters)).toBeGreaterThanOrEqual(6);
        expect(fit.covariance).not.toBeNull();
        // The sum of squares of Lanczos1 is 1e-25, below what double precision can tell.
        if (set.dataset === 'Lanczos1') return;
        const variance = fit.sumOfSquares / set.degrees_of_freedom;
        const n = set.start1.length;
        const deviations = set.start1.map((_, j) => Math.sqrt(fit.covariance![j * n + j]! * variance));
        expect(digits(deviations, set.certified_standard_deviations)).toBeGreaterThanOrEqual(4);
        expect(Math.abs(fit.sumOfSquares / set.certified_residual_sum_of_squares - 1)).toBeLessThan(1e-6);
      });
    }
  }
});
