import type { Footing, Instant } from '../types';
import { fitModel, type ModelFit, type ModelName, type NoFit } from './models';
import { KineticCurve } from './kinetic';

/** Published curves that can be laid over a batch for teaching; the judgement itself does not use them. */
export const OTHER_CURVES = ['logistic', 'gompertz', 'richards'] as const satisfies readonly ModelName[];
export type OtherCurve = (typeof OTHER_CURVES)[number];

/** How a curve of the textbooks does beside the one that is judged by, on the same readings (medians of stretches). Points. */
export interface Beside {
  readings: number;
  /** Root mean square of what each leaves unexplained. */
  rms: { other: number; own: number };
  /** Where each would stop; the half width holds 8 in 10, null where the readings do not determine it. */
  end: { other: number; otherHalf: number | null; own: number; ownHalf: number };
  /**
   * Akaike's criterion for small samples of the other curve less that of the own
   * one, both by plain least squares without priors: above 0 the own one is
   * better supported (Burnham and Anderson, Model Selection and Multimodel
   * Inference, 2nd ed. 2002, eq. 2.4 and p. 70). Null where it cannot be had.
   */
  aicMore: number | null;
  /** Gravity of the other curve, points. */
  gravity(at: Instant): number;
}

const HOUR_MS = 3_600_000;
const Z80 = 1.2816;

/** AICc of a least-squares fit: n ln(RSS/n) + 2K + 2K(K+1)/(n−K−1), K counting the variance. Null with too few readings. */
export function aicc(sumOfSquares: number, n: number, parameters: number): number | null {
  const k = parameters + 1;
  if (n - k - 1 <= 0 || !(sumOfSquares > 0)) return null;
  return n * Math.log(sumOfSquares / n) + 2 * k + (2 * k * (k + 1)) / (n - k - 1);
}

/** Lays one of the published curves over the readings that the batch's own curve was fitted to; says why where it cannot. */
export function layBeside(footing: Footing, name: OtherCurve): Beside | NoFit {
  const { hours, tau, points } = footing.data;
  const days = hours.map((hour) => (hour - footing.from) / 24);
  const other = fitModel(name, days, points);
  if (other.reason === 'no fit') return other as NoFit;
  const fit = other as ModelFit;
  const own = new KineticCurve(footing.parameters);
  const n = points.length;
  const ownSquares = points.reduce((sum, value, i) => sum + (own.gravity(tau[i]!) - value) ** 2, 0);
  const plain = fitModel('kinetic', tau, points, { start: footing.parameters });
  const [mine, theirs] = [plain.reason === 'no fit' ? null : aicc((plain as ModelFit).sumOfSquares, n, 6), aicc(fit.sumOfSquares, n, fit.parameters.length)];
  const error = fit.standardErrors?.[1] ?? null;
  return {
    readings: n,
    rms: { other: fit.rms, own: Math.sqrt(ownSquares / n) },
    end: { other: fit.parameters[1]!, otherHalf: error === null ? null : Z80 * error, own: footing.finalGravity.value, ownHalf: footing.finalGravity.half80 },
    aicMore: mine === null || theirs === null ? null : theirs - mine,
    gravity: (at) => fit.gravity((footing.hour + (at - footing.at) / HOUR_MS - footing.from) / 24),
  };
}
