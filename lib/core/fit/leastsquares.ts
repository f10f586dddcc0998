import { damp, factorise, inverseOf, solveLower, solveUpper } from './factor';

/**
 * Bounded, damped least squares: the Levenberg–Marquardt method in Moré's
 * trust-region form (J. J. Moré, The Levenberg–Marquardt algorithm: implementation
 * and theory, Lecture Notes in Mathematics 630 (1978) 105–116). Parameters at a
 * bound whose gradient points outwards are held for the step; a step that would
 * cross a bound is cut there.
 */

/** What is to be fitted. Residuals are already divided by their standard deviations. */
export interface Problem {
  observations: number;
  parameters: number;
  residuals(at: Float64Array, out: Float64Array): void;
  /** Derivative of residual i by parameter j, to out[j·observations + i]; central differences where absent. */
  jacobian?(at: Float64Array, out: Float64Array): void;
}

export interface FitOptions {
  lower?: readonly number[];
  upper?: readonly number[];
  maxIterations?: number;
  /** Relative fall of the sum of squares that ends the search. */
  sumTolerance?: number;
  /** Relative step that ends the search. */
  stepTolerance?: number;
  /** First trust radius as a multiple of the scaled start. */
  reach?: number;
}

export type StopReason = 'gradient' | 'sum of squares' | 'step' | 'iterations' | 'no fit';

export interface LeastSquaresFit {
  parameters: Float64Array;
  /** (JᵀJ)⁻¹ by row, not yet times the residual variance; null where the data do not determine all parameters. */
  covariance: Float64Array | null;
  sumOfSquares: number;
  iterations: number;
  evaluations: number;
  converged: boolean;
  reason: StopReason;
}

const EPS = 2.220446049250313e-16;

function sumSquares(values: Float64Array, n = values.length): number {
  let sum = 0;
  for (let i = 0; i < n; i += 1) sum += values[i]! * values[i]!;
  return sum;
}

function scaledNorm(values: Float64Array, scale: Float64Array, n: number): number {
  let sum = 0;
  for (let i = 0; i < n; i += 1) sum += (values[i]! * scale[i]!) ** 2;
  return Math.sqrt(sum);
}

function differences(problem: Problem, at: Float64Array, out: Float64Array, lower: Float64Array, upper: Float64Array): void {
  const m = problem.observations;
  const plus = new Float64Array(m);
  const minus = new Float64Array(m);
  const x = at.slice();
  for (let j = 0; j < problem.parameters; j += 1) {
    const h = Math.cbrt(EPS) * Math.max(Math.abs(at[j]!), 1e-8);
    const hi = Math.min(at[j]! + h, upper[j]!);
    const lo = Math.max(at[j]! - h, lower[j]!);
    x[j] = hi;
    problem.residuals(x, plus);
    x[j] = lo;
    problem.residuals(x, minus);
    x[j] = at[j]!;
    for (let i = 0; i < m; i += 1) out[j * m + i] = (plus[i]! - minus[i]!) / (hi - lo);
  }
}

/** Room for the step of n parameters, made once a fit. */
class StepRoom {
  readonly step: Float64Array;
  readonly work: Float64Array;
  readonly rhs: Float64Array;
  readonly diagonal: Float64Array;
  readonly damped: Float64Array;

  constructor(n: number) {
    this.step = new Float64Array(n);
    this.work = new Float64Array(n);
    this.rhs = new Float64Array(n);
    this.diagonal = new Float64Array(n);
    this.damped = new Float64Array(n * n);
  }
}

/** Leaves in `room.step` a step of length about `radius` in the scaled parameters; the damping it takes, by Moré's iteration. */
function trustStep(
  triangle: Float64Array,
  projected: Float64Array,
  scale: Float64Array,
  radius: number,
  damping: number,
  n: number,
  room: StepRoom,
): number {
  const { step, work, rhs, diagonal, damped } = room;
  const whole = solveUpper(triangle, projected, n, step);
  let length = scaledNorm(step, scale, n);
  let excess = length - radius;
  if (whole && excess <= 0.1 * radius) return 0;

  let least = 0;
  if (whole) {
    for (let j = 0; j < n; j += 1) work[j] = (scale[j]! * scale[j]! * step[j]!) / length;
    solveLower(triangle, work, n, rhs);
    least = excess / radius / sumSquares(rhs, n);
  }
  let gradient = 0;
  for (let j = 0; j < n; j += 1) {
    let sum = 0;
    for (let k = 0; k <= j; k += 1) sum += triangle[k * n + j]! * projected[k]!;
    gradient += (sum / scale[j]!) ** 2;
  }
  gradient = Math.sqrt(gradient);
  let most = gradient / radius || 1e-300 / Math.min(radius, 0.1);
  let par = Math.min(Math.max(damping, least), most) || gradient / (length || 1);
  for (let round = 0; round < 10; round += 1) {
    if (par === 0) par = Math.max(1e-300, 0.001 * most);
    for (let j = 0; j < n * n; j += 1) damped[j] = triangle[j]!;
    for (let j = 0; j < n; j += 1) {
      rhs[j] = projected[j]!;
      diagonal[j] = Math.sqrt(par) * scale[j]!;
    }
    damp(damped, rhs, diagonal, n, work);
    solveUpper(damped, rhs, n, step);
    length = scaledNorm(step, scale, n);
    const before = excess;
    excess = length - radius;
    if (Math.abs(excess) <= 0.1 * radius || (least === 0 && excess <= before && before < 0)) break;
    for (let j = 0; j < n; j += 1) work[j] = (scale[j]! * scale[j]! * step[j]!) / length;
    solveLower(damped, work, n, rhs);
    const correction = excess / radius / sumSquares(rhs, n);
    if (excess > 0) least = Math.max(least, par);
    else if (excess < 0) most = Math.min(most, par);
    par = Math.max(least, par + correction);
  }
  return par;
}

/** The fit from one start. A start with residuals that are not numbers, or bounds the wrong way round, is answered `no fit`. */
export function leastSquares(problem: Problem, start: ArrayLike<number>, options: FitOptions = {}): LeastSquaresFit {
  const n = problem.parameters;
  const m = problem.observations;
  const maxIterations = options.maxIterations ?? 200;
  const sumTolerance = options.sumTolerance ?? 1e-12;
  const stepTolerance = options.stepTolerance ?? 1e-11;
  const lower = new Float64Array(n).fill(Number.NEGATIVE_INFINITY);
  const upper = new Float64Array(n).fill(Number.POSITIVE_INFINITY);
  for (let j = 0; j < n; j += 1) {
    lower[j] = options.lower?.[j] ?? lower[j]!;
    upper[j] = options.upper?.[j] ?? upper[j]!;
  }
  const x = new Float64Array(start).slice(0, n);
  const failed = (evaluations: number): LeastSquaresFit => ({
    parameters: x,
    covariance: null,
    sumOfSquares: Number.POSITIVE_INFINITY,
    iterations: 0,
    evaluations,
    converged: false,
    reason: 'no fit',
  });
  if (m < 1 || n < 1 || x.length < n) return failed(0);
  for (let j = 0; j < n; j += 1) {
    if (!(lower[j]! < upper[j]!)) return failed(0);
    x[j] = Math.min(upper[j]!, Math.max(lower[j]!, x[j]!));
  }

  let residuals = new Float64Array(m);
  let trialResiduals = new Float64Array(m);
  const jacobian = new Float64Array(m * n);
  const triangle = new Float64Array(n * n);
  const projected = new Float64Array(n);
  const scale = new Float64Array(n);
  const freeScale = new Float64Array(n);
  const trial = new Float64Array(n);
  const full = new Float64Array(n);
  const room = new StepRoom(n);
  problem.residuals(x, residuals);
  let evaluations = 1;
  let sum = sumSquares(residuals);
  if (!Number.isFinite(sum)) return failed(evaluations);

  let radius = 0;
  let damping = 0;
  let iterations = 0;
  let reason: StopReason | null = null;
  while (reason === null) {
    if (problem.jacobian) problem.jacobian(x, jacobian);
    else {
      differences(problem, x, jacobian, lower, upper);
      evaluations += 2 * n;
    }
    const free: number[] = [];
    let steepest = 0;
    const size = Math.sqrt(sum);
    for (let j = 0; j < n; j += 1) {
      let slope = 0;
      let square = 0;
      for (let i = 0; i < m; i += 1) {
        const d = jacobian[j * m + i]!;
        slope += d * residuals[i]!;
        square += d * d;
      }
      const norm = Math.sqrt(square);
      if (!Number.isFinite(norm)) return failed(evaluations);
      scale[j] = Math.max(scale[j]!, norm) || 1;
      if ((x[j]! <= lower[j]! && slope > 0) || (x[j]! >= upper[j]! && slope < 0)) continue;
      free.push(j);
      if (norm > 0 && size > 0) steepest = Math.max(steepest, Math.abs(slope) / norm / size);
    }
    if (iterations === 0) {
      const reach = options.reach ?? 100;
      radius = reach * scaledNorm(x, scale, n) || reach;
    }
    if (steepest <= 1e-14 || free.length === 0 || sum === 0) {
      reason = 'gradient';
      break;
    }
    const nf = free.length;
    for (let a = 0; a < nf; a += 1) freeScale[a] = scale[free[a]!]!;
    factorise(jacobian, residuals, m, free, triangle, projected);

    for (;;) {
      damping = trustStep(triangle, projected, freeScale, radius, damping, nf, room);
      full.fill(0);
      for (let a = 0; a < nf; a += 1) full[free[a]!] = -room.step[a]!;
      for (let j = 0; j < n; j += 1) {
        trial[j] = Math.min(upper[j]!, Math.max(lower[j]!, x[j]! + full[j]!));
        full[j] = trial[j]! - x[j]!;
      }
      const length = scaledNorm(full, scale, n);
      if (iterations === 0) radius = Math.min(radius, length || radius);
      problem.residuals(trial, trialResiduals);
      evaluations += 1;
      const trialSum = sumSquares(trialResiduals);
      // What the straight-line model promised for the step that was really taken.
      let modelled = 0;
      for (let i = 0; i < m; i += 1) {
        let r = residuals[i]!;
        for (let j = 0; j < n; j += 1) r += jacobian[j * m + i]! * full[j]!;
        modelled += r * r;
      }
      const promised = 1 - modelled / sum;
      const got = Number.isFinite(trialSum) ? 1 - trialSum / sum : -1e10;
      const ratio = promised > 0 ? got / promised : got > 0 ? 1 : 0;
      if (ratio <= 0.25) {
        radius = (got >= 0 ? 0.5 : 0.1) * Math.min(radius, length * 10 || radius);
        damping *= 2;
      } else if (damping === 0 || ratio >= 0.75) {
        radius = Math.max(radius, 2 * length);
        damping *= 0.5;
      }
      const size0 = scaledNorm(x, scale, n);
      if (ratio >= 1e-4) {
        x.set(trial);
        [residuals, trialResiduals] = [trialResiduals, residuals];
        sum = trialSum;
      }
      iterations += 1;
      if (Math.abs(got) <= sumTolerance && promised <= sumTolerance && ratio <= 2) reason = 'sum of squares';
      else if (radius <= stepTolerance * size0 || length <= EPS * size0) reason = 'step';
      else if (iterations >= maxIterations) reason = 'iterations';
      if (reason !== null || ratio >= 1e-4) break;
    }
  }

  if (problem.jacobian) problem.jacobian(x, jacobian);
  else differences(problem, x, jacobian, lower, upper);
  const every = Array.from({ length: n }, (_, j) => j);
  factorise(jacobian, residuals, m, every, triangle, projected);
  let covariance: Float64Array | null = null;
  let widest = 0;
  for (let j = 0; j < n; j += 1) widest = Math.max(widest, Math.abs(triangle[j * n + j]!) / (scale[j]! || 1));
  let sound = widest > 0;
  for (let j = 0; j < n; j += 1) if (!(Math.abs(triangle[j * n + j]!) > 1e-14 * scale[j]!)) sound = false;
  if (sound) covariance = inverseOf(triangle, n);
  return {
    parameters: x,
    covariance,
    sumOfSquares: sum,
    iterations,
    evaluations,
    converged: reason !== 'iterations',
    reason: reason ?? 'no fit',
  };
}

/** The best of several fits of the same problem, tried with smaller first steps too where one ends in a flat place. */
export function bestOf(problem: Problem, starts: readonly ArrayLike<number>[], options: FitOptions = {}): LeastSquaresFit {
  let best: LeastSquaresFit | null = null;
  for (const start of starts) {
    for (const reach of [100, 1, 0.1]) {
      const fit = leastSquares(problem, start, { ...options, reach });
      if (best === null || fit.sumOfSquares < best.sumOfSquares) best = fit;
      // A flat place: some parameter no longer matters. Another road may lead out of it.
      if (fit.converged && fit.covariance) break;
    }
  }
  return best ?? leastSquares({ ...problem, observations: 0 }, []);
}
