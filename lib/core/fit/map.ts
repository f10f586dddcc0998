import { KINETIC_PARAMETERS, KineticCurve, KineticRow } from './kinetic';
import { leastSquares } from './leastsquares';
import type { CurvePrior } from './priors';

/** Gravity levels that the curve is fitted to: thermal age, points, and how far each may be off. */
export interface Observations {
  n: number;
  tau: Float64Array;
  g: Float64Array;
  sd: Float64Array;
  /** h since the pitch: the same ages by the clock. */
  hours: Float64Array;
}

/** The attenuation curve after the fit, with how well it is known. */
export interface CurveFit {
  parameters: Float64Array;
  /** Covariance of the six parameters, by row. */
  covariance: Float64Array;
  curve: KineticCurve;
  /** Standard deviation of the final gravity, points, before calibration of its interval. */
  fgSd: number;
  converged: boolean;
  /** What it was fitted to, so that it can be fitted otherwise. */
  data: Observations;
  prior: CurvePrior;
}

const LOWER = [-20, -40, -5, -5, -6, -6];
const UPPER = [220, 160, 3, 3.5, 3, 6];
/** Degrees of freedom of the t-shaped prior of the final gravity: a yeast's range can simply be wrong. */
const T = 5;

/**
 * Most probable kinetic curve given the data and the priors (penalised least
 * squares). The prior of the final gravity has Student's t shape, so that clear
 * data can leave a range that is wrong; the others are normal.
 */
export function fitCurve(data: Observations, prior: CurvePrior, start?: ArrayLike<number>): CurveFit | null {
  const p = KINETIC_PARAMETERS;
  const m = data.n + p;
  const { normals } = prior;
  const pull = (at: Float64Array, out: Float64Array): void => {
    for (let j = 0; j < p; j += 1) {
      const { mean, sd } = normals[j]!;
      const z = (at[j]! - mean) / sd;
      out[data.n + j] = j === 1 ? Math.sign(z) * Math.sqrt((T + 1) * Math.log1p((z * z) / T)) : z;
    }
  };
  const row = new KineticRow(data.tau, data.n);
  const problem = {
    observations: m,
    parameters: p,
    residuals(at: Float64Array, out: Float64Array) {
      row.gravities(at, out);
      for (let i = 0; i < data.n; i += 1) out[i] = (out[i]! - data.g[i]!) / data.sd[i]!;
      pull(at, out);
    },
    jacobian(at: Float64Array, out: Float64Array) {
      row.gradients(at, out, m);
      for (let i = 0; i < data.n; i += 1) {
        for (let j = 0; j < p; j += 1) out[j * m + i] = out[j * m + i]! / data.sd[i]!;
      }
      for (let j = 0; j < p; j += 1) {
        const { mean, sd } = normals[j]!;
        for (let i = 0; i < p; i += 1) out[j * m + data.n + i] = 0;
        let slope = 1 / sd;
        if (j === 1) {
          const z = (at[j]! - mean) / sd;
          const r = Math.sqrt((T + 1) * Math.log1p((z * z) / T));
          slope = Math.abs(z) < 1e-4 ? Math.sqrt((T + 1) / T) / sd : ((T + 1) * Math.abs(z)) / (T + z * z) / r / sd;
        }
        out[j * m + data.n + j] = slope;
      }
    },
  };
  const fit = leastSquares(problem, start ?? normals.map((normal) => normal.mean), {
    lower: LOWER,
    upper: UPPER,
    maxIterations: 30,
    sumTolerance: 1e-5,
    stepTolerance: 1e-5,
  });
  if (!fit.covariance || !Number.isFinite(fit.sumOfSquares)) return null;
  const variance = fit.covariance[p + 1]!;
  return {
    parameters: fit.parameters,
    covariance: fit.covariance,
    curve: new KineticCurve(fit.parameters),
    fgSd: Math.sqrt(Math.max(0, variance)),
    converged: fit.converged,
    data: { n: data.n, tau: data.tau.slice(0, data.n), g: data.g.slice(0, data.n), sd: data.sd.slice(0, data.n), hours: data.hours.slice(0, data.n) },
    prior,
  };
}

/** Standard deviation of the curve at τ, points, from the covariance of its parameters. */
export function curveSd(fit: CurveFit, tau: number, gradient: Float64Array): number {
  fit.curve.gradient(tau, gradient, 0, 1);
  let variance = 0;
  for (let a = 0; a < KINETIC_PARAMETERS; a += 1) {
    for (let b = 0; b < KINETIC_PARAMETERS; b += 1) {
      variance += gradient[a]! * gradient[b]! * fit.covariance[a * KINETIC_PARAMETERS + b]!;
    }
  }
  return Math.sqrt(Math.max(0, variance));
}
