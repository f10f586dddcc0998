import { factorise, inverseOf, solveUpper } from '../fit/factor';

/** A least-squares polynomial with what each observation did to it. */
export interface PolynomialFit {
  /** In ascending powers of x. */
  coefficients: number[];
  /** Observed less fitted, one for each observation. */
  residuals: number[];
  /** Diagonal of the hat matrix, 0 to 1: how far the curve follows this observation. Their sum is the number of coefficients. */
  leverage: number[];
  /** Residual standard deviation; null where as many coefficients as observations leave nothing to judge by. */
  sigma: number | null;
  /** Standard error of the curve at x; null with `sigma`. */
  standardError(x: number): number | null;
}

/**
 * Ordinary least squares of a polynomial, by orthogonal reflections on x moved and
 * scaled to [-1, 1], so that powers of degrees do not square into each other
 * (Golub, Van Loan, Matrix Computations, section 5.3). Null where there are fewer
 * distinct x than coefficients.
 */
export function fitPolynomial(x: readonly number[], y: readonly number[], degree: number): PolynomialFit | null {
  const m = x.length;
  const n = degree + 1;
  if (m !== y.length || new Set(x).size < n || ![...x, ...y].every(Number.isFinite)) return null;
  const low = Math.min(...x);
  const high = Math.max(...x);
  const middle = (low + high) / 2;
  const half = (high - low) / 2 || 1;
  const meanY = y.reduce((sum, value) => sum + value, 0) / m;

  const design = new Float64Array(m * n);
  const right = new Float64Array(m);
  for (let i = 0; i < m; i += 1) {
    const z = (x[i]! - middle) / half;
    for (let j = 0, power = 1; j < n; j += 1, power *= z) design[j * m + i] = power;
    right[i] = y[i]! - meanY;
  }
  const triangle = new Float64Array(n * n);
  const projected = new Float64Array(n);
  factorise(design, right, m, Array.from({ length: n }, (_, j) => j), triangle, projected);
  const scaled = new Float64Array(n);
  const inverse = inverseOf(triangle, n);
  if (!solveUpper(triangle, projected, n, scaled) || !inverse) return null;

  const residuals: number[] = [];
  const leverage: number[] = [];
  const row = new Float64Array(n);
  const spread = () => {
    let sum = 0;
    for (let a = 0; a < n; a += 1) for (let b = 0; b < n; b += 1) sum += row[a]! * inverse[a * n + b]! * row[b]!;
    return sum;
  };
  for (let i = 0; i < m; i += 1) {
    let fitted = 0;
    for (let j = 0; j < n; j += 1) {
      row[j] = design[j * m + i]!;
      fitted += scaled[j]! * row[j]!;
    }
    residuals.push(right[i]! - fitted);
    leverage.push(Math.min(1, spread()));
  }
  const square = residuals.reduce((sum, value) => sum + value * value, 0);
  const sigma = m > n ? Math.sqrt(square / (m - n)) : null;
  scaled[0] = scaled[0]! + meanY;
  return {
    coefficients: inPowersOfX([...scaled], middle, half),
    residuals,
    leverage,
    sigma,
    standardError(at) {
      if (sigma === null) return null;
      const z = (at - middle) / half;
      for (let j = 0, power = 1; j < n; j += 1, power *= z) row[j] = power;
      return sigma * Math.sqrt(Math.max(0, spread()));
    },
  };
}

/** Coefficients in powers of (x − middle)/half, written out in powers of x (Horner on polynomials). */
function inPowersOfX(scaled: readonly number[], middle: number, half: number): number[] {
  let result: number[] = [0];
  for (const coefficient of [...scaled].reverse()) {
    const next = new Array<number>(result.length + 1).fill(0);
    result.forEach((value, power) => {
      next[power] = next[power]! - (value * middle) / half;
      next[power + 1] = next[power + 1]! + value / half;
    });
    next[0] = next[0]! + coefficient;
    result = next;
  }
  return result.slice(0, scaled.length);
}

/** Value of a polynomial in ascending powers, by Horner's rule. */
export function valueOf(coefficients: readonly number[], x: number): number {
  return coefficients.reduceRight((sum, coefficient) => sum * x + coefficient, 0);
}

/** Slope of a polynomial of degree 3 at most: where it is smallest and largest over [from, to]. */
export function slopeExtremes(coefficients: readonly number[], from: number, to: number): { min: number; max: number } {
  const slope = coefficients.slice(1).map((coefficient, index) => coefficient * (index + 1));
  // The slope of a cubic is a parabola: its extremes are at the ends or at its vertex.
  const [, linear = 0, square = 0] = slope;
  const vertex = square === 0 ? NaN : -linear / (2 * square);
  const at = [from, to, ...(vertex > from && vertex < to ? [vertex] : [])].map((x) => valueOf(slope, x));
  return { min: Math.min(...at), max: Math.max(...at) };
}
