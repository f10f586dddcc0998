import { CLOSED } from './closed';
import { KINETIC_PARAMETERS, KineticCurve, KineticRow } from './kinetic';
import { leastSquares, type FitOptions, type LeastSquaresFit, type Problem, type StopReason } from './leastsquares';

/**
 * The attenuation curves that can be laid over a record: the published ones for
 * comparison and teaching, and the reduced kinetic curve that the calls use.
 *
 * - `logistic`: 4 parameters, g = FG + D/(1 + e^(k(t−m))) (Speers, Rogers, Smith, J.
 *   Inst. Brew. 109 (2003) 229–235; ASBC Yeast-14).
 * - `logistic5`: the same with a power s on the bracket, for uneven shoulders (Reid
 *   et al., Fermentation 7 (2021) 13).
 * - `gompertz`, `richards`: Zwietering's forms (Appl. Environ. Microbiol. 56 (1990)
 *   1875–1881) of the fall OG − g, with its steepest pace and its lag.
 * - `kinetic`: see ./kinetic; here without priors and in plain days.
 *
 * Time in days, gravity in points.
 */
export const MODEL_NAMES = ['logistic', 'logistic5', 'gompertz', 'richards', 'kinetic'] as const;
export type ModelName = (typeof MODEL_NAMES)[number];

const KINETIC_LOWER = [-50, -150, -7, -5, -6, -6];
const KINETIC_UPPER = [250, 200, 4, 4, 3, 6];

export interface ModelFit {
  model: ModelName;
  /** Names and values of the parameters, in one order. */
  names: readonly string[];
  parameters: readonly number[];
  /** Null where the data do not determine them all. */
  standardErrors: readonly number[] | null;
  sumOfSquares: number;
  /** Root mean square of the residuals, points. */
  rms: number;
  iterations: number;
  converged: boolean;
  reason: StopReason;
  gravity(day: number): number;
}

export interface NoFit {
  model: ModelName;
  reason: 'no fit';
  why: string;
}

export interface ModelOptions extends FitOptions {
  /** Where to begin; from the data where absent. */
  start?: readonly number[];
}

/** More points than this are refused: thin them first, as the calls do. */
export const MOST_POINTS = 50_000;

export function namesOf(model: ModelName): readonly string[] {
  return model === 'kinetic' ? ['OG', 'FG', 'ln κ', 'ln m', 'ln Kr', 'logit δ'] : CLOSED[model].parameters;
}

/** Gravity of a model at a time, points. */
export function modelGravity(model: ModelName, parameters: ArrayLike<number>, day: number): number {
  return model === 'kinetic' ? new KineticCurve(parameters).gravity(day) : CLOSED[model].value(parameters, day, null, 0, 0);
}

/** Derivatives of the gravity by the parameters at a time: what a band about the curve is made of. */
export function modelGradient(model: ModelName, parameters: ArrayLike<number>, day: number): Float64Array {
  const out = new Float64Array(namesOf(model).length);
  if (model === 'kinetic') new KineticCurve(parameters).gradient(day, out, 0, 1);
  else CLOSED[model].value(parameters, day, out, 0, 1);
  return out;
}

function problemOf(model: ModelName, t: Float64Array, g: Float64Array): Problem {
  const m = t.length;
  if (model === 'kinetic') {
    const row = new KineticRow(t, m);
    return {
      observations: m,
      parameters: KINETIC_PARAMETERS,
      residuals(at, out) {
        row.gravities(at, out);
        for (let i = 0; i < m; i += 1) out[i] = out[i]! - g[i]!;
      },
      jacobian: (at, out) => row.gradients(at, out, m),
    };
  }
  const closed = CLOSED[model];
  return {
    observations: m,
    parameters: closed.parameters.length,
    residuals(at, out) {
      for (let i = 0; i < m; i += 1) out[i] = closed.value(at, t[i]!, null, 0, 0) - g[i]!;
    },
    jacobian(at, out) {
      for (let i = 0; i < m; i += 1) closed.value(at, t[i]!, out, i, m);
    },
  };
}

/** Rough values from the record itself: its ends, its middle, its steepness. */
export function startOf(model: ModelName, t: Float64Array, g: Float64Array, depth = 0): number[] {
  const n = g.length;
  const tenth = Math.max(1, Math.floor(n / 10));
  let og = 0;
  let end = 0;
  for (let i = 0; i < tenth; i += 1) {
    og += g[i]! / tenth;
    end += g[n - 1 - i]! / tenth;
  }
  const fall = Math.max(og - end, 1);
  const fg = end - depth * fall;
  const crossing = (share: number): number => {
    const level = og - share * (og - fg);
    for (let i = 0; i < n; i += 1) if (g[i]! <= level) return t[i]!;
    return t[n - 1]! + (t[n - 1]! - t[0]!) * share * depth;
  };
  const middle = crossing(0.5);
  const spread = Math.max(crossing(0.8) - crossing(0.2), 0.05 * (t[n - 1]! - t[0]!), 1e-3);
  const k = 2.77 / spread;
  const pace = ((og - fg) * k) / 4;
  switch (model) {
    case 'logistic':
      return [og, fg, k, middle];
    case 'logistic5':
      return [og, fg, k, middle, 1];
    case 'gompertz':
      return [og, fg, pace, middle - 2 / k];
    case 'richards':
      return [og, fg, pace, middle - 2 / k, 0.5];
    case 'kinetic':
      return [og, fg, Math.log(Math.max(0.02, k / 3)), Math.log(Math.max(0.05, middle / 2)), -1, -1];
  }
}

function refuse(model: ModelName, t: Float64Array, g: Float64Array): string | null {
  const n = t.length;
  if (g.length !== n) return 'times and gravities differ in number';
  if (n > MOST_POINTS) return `more than ${MOST_POINTS} points`;
  if (n <= namesOf(model).length) return 'too few points';
  let least = Number.POSITIVE_INFINITY;
  let most = Number.NEGATIVE_INFINITY;
  for (let i = 0; i < n; i += 1) {
    if (!Number.isFinite(t[i]!) || !Number.isFinite(g[i]!)) return 'a value is not a number';
    least = Math.min(least, g[i]!);
    most = Math.max(most, g[i]!);
  }
  if (!(most - least > 1e-9)) return 'the gravity does not change';
  if (!(t[n - 1]! > t[0]!)) return 'the times do not ascend';
  return null;
}

/** More points than this are first searched in groups: the way to the bottom is the same, and costs a fraction. */
const COARSE_FROM = 600;
const GROUPS = 300;

/** The means of neighbouring points, about so many groups of them. */
function inGroups(t: Float64Array, g: Float64Array): [Float64Array, Float64Array] {
  const days = new Float64Array(GROUPS);
  const points = new Float64Array(GROUPS);
  for (let k = 0; k < GROUPS; k += 1) {
    const from = Math.floor((k * t.length) / GROUPS);
    const to = Math.floor(((k + 1) * t.length) / GROUPS);
    for (let i = from; i < to; i += 1) {
      days[k] = days[k]! + t[i]! / (to - from);
      points[k] = points[k]! + g[i]! / (to - from);
    }
  }
  return [days, points];
}

/** Least squares from a start, and from others where that one ended against a bound, in a flat place, or not at all. */
function search(model: ModelName, t: Float64Array, g: Float64Array, start: readonly number[], settings: FitOptions): LeastSquaresFit {
  const { lower = [], upper = [] } = settings;
  const problem = problemOf(model, t, g);
  let best = leastSquares(problem, start, settings);
  const cornered = (fit: LeastSquaresFit): boolean =>
    !fit.converged || !fit.covariance || Array.from(fit.parameters).some((value, j) => value <= lower[j]! || value >= upper[j]!);
  for (const depth of [0, 0.5, 2]) {
    if (!cornered(best)) break;
    const other = leastSquares(problem, startOf(model, t, g, depth), settings);
    if (other.sumOfSquares < best.sumOfSquares * (1 - 1e-9)) best = other;
  }
  return best;
}

/**
 * Fits one of the curves to a record by plain least squares, without priors: for
 * comparison only, since early on such a fit says nothing of the final gravity.
 * Says `no fit`, and why, where it cannot.
 */
export function fitModel(model: ModelName, days: ArrayLike<number>, points: ArrayLike<number>, options: ModelOptions = {}): ModelFit | NoFit {
  const none = (why: string): NoFit => ({ model, reason: 'no fit', why });
  if (days.length > MOST_POINTS) return none(`more than ${MOST_POINTS} points`);
  const t = Float64Array.from(days);
  const g = Float64Array.from(points);
  const why = refuse(model, t, g);
  if (why) return none(why);
  const lower = options.lower ?? (model === 'kinetic' ? KINETIC_LOWER : CLOSED[model].lower);
  const upper = options.upper ?? (model === 'kinetic' ? KINETIC_UPPER : CLOSED[model].upper);
  if (lower.some((value, j) => !(value < upper[j]!))) return none('a lower bound is not below its upper one');

  const settings: FitOptions = { maxIterations: 100, ...options, lower, upper };
  const start = options.start ?? startOf(model, t, g);
  const coarse = t.length > COARSE_FROM ? search(model, ...inGroups(t, g), start, settings) : null;
  const best = coarse ? leastSquares(problemOf(model, t, g), coarse.parameters, settings) : search(model, t, g, start, settings);
  if (!Number.isFinite(best.sumOfSquares)) return none('the curve cannot be worked out there');
  const n = namesOf(model).length;
  const variance = best.sumOfSquares / Math.max(1, t.length - n);
  const { covariance } = best;
  const parameters = Array.from(best.parameters);
  return {
    model,
    names: namesOf(model),
    parameters,
    standardErrors: covariance && parameters.map((_, j) => Math.sqrt(covariance[j * n + j]! * variance)),
    sumOfSquares: best.sumOfSquares,
    rms: Math.sqrt(best.sumOfSquares / t.length),
    iterations: best.iterations,
    converged: best.converged,
    reason: best.reason,
    gravity: (day) => modelGravity(model, parameters, day),
  };
}
