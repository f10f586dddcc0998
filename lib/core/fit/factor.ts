/** Triangular factors for least squares. Matrices of observations are stored by column, triangles by row. */

/** Below this ratio of pivots the normal equations are too coarse and the Householder road is taken. */
const COARSE = 1e-10;

/**
 * Upper triangle R and Qᵀr of the columns `free` of J (column j at j·m). For tall
 * well-posed matrices R comes from the normal equations (Cholesky), else from
 * Householder reflections, which do not square the condition number.
 */
export function factorise(
  jacobian: Float64Array,
  residuals: Float64Array,
  m: number,
  free: readonly number[],
  triangle: Float64Array,
  projected: Float64Array,
): void {
  const n = free.length;
  if (m > 8 * n && cholesky(jacobian, residuals, m, free, triangle, projected)) return;
  householder(jacobian, residuals, m, free, triangle, projected);
}

function cholesky(
  jacobian: Float64Array,
  residuals: Float64Array,
  m: number,
  free: readonly number[],
  triangle: Float64Array,
  projected: Float64Array,
): boolean {
  const n = free.length;
  for (let a = 0; a < n; a += 1) {
    const ca = free[a]! * m;
    // Two columns at a time: a sum has to wait for itself, two of them need not wait for each other.
    for (let b = a; b < n; b += 2) {
      const cb = free[b]! * m;
      const cc = free[Math.min(b + 1, n - 1)]! * m;
      let sum = 0;
      let other = 0;
      for (let i = 0; i < m; i += 1) {
        const value = jacobian[ca + i]!;
        sum += value * jacobian[cb + i]!;
        other += value * jacobian[cc + i]!;
      }
      triangle[a * n + b] = sum;
      if (b + 1 < n) triangle[a * n + b + 1] = other;
    }
    let sum = 0;
    for (let i = 0; i < m; i += 1) sum += jacobian[ca + i]! * residuals[i]!;
    projected[a] = sum;
  }
  for (let a = 0; a < n; a += 1) {
    const before = triangle[a * n + a]!;
    let pivot = before;
    for (let k = 0; k < a; k += 1) pivot -= triangle[k * n + a]! ** 2;
    if (!(pivot > COARSE * before)) return false;
    const root = Math.sqrt(pivot);
    triangle[a * n + a] = root;
    for (let b = a + 1; b < n; b += 1) {
      let sum = triangle[a * n + b]!;
      for (let k = 0; k < a; k += 1) sum -= triangle[k * n + a]! * triangle[k * n + b]!;
      triangle[a * n + b] = sum / root;
    }
    let rhs = projected[a]!;
    for (let k = 0; k < a; k += 1) rhs -= triangle[k * n + a]! * projected[k]!;
    projected[a] = rhs / root;
  }
  return true;
}

function householder(
  jacobian: Float64Array,
  residuals: Float64Array,
  m: number,
  free: readonly number[],
  triangle: Float64Array,
  projected: Float64Array,
): void {
  const n = free.length;
  const q = new Float64Array(m * n);
  for (let a = 0; a < n; a += 1) q.set(jacobian.subarray(free[a]! * m, (free[a]! + 1) * m), a * m);
  const rhs = residuals.slice(0, m);
  triangle.fill(0, 0, n * n);
  for (let a = 0; a < n; a += 1) {
    const ca = a * m;
    let norm = 0;
    for (let i = a; i < m; i += 1) norm += q[ca + i]! ** 2;
    norm = Math.sqrt(norm);
    if (a >= m || norm === 0) {
      triangle[a * n + a] = 0;
      projected[a] = 0;
      continue;
    }
    const alpha = q[ca + a]! > 0 ? -norm : norm;
    q[ca + a] = q[ca + a]! - alpha;
    let square = 0;
    for (let i = a; i < m; i += 1) square += q[ca + i]! ** 2;
    for (let b = a + 1; b < n; b += 1) {
      const cb = b * m;
      let dot = 0;
      for (let i = a; i < m; i += 1) dot += q[ca + i]! * q[cb + i]!;
      const f = (2 * dot) / square;
      for (let i = a; i < m; i += 1) q[cb + i] = q[cb + i]! - f * q[ca + i]!;
    }
    let dot = 0;
    for (let i = a; i < m; i += 1) dot += q[ca + i]! * rhs[i]!;
    const f = (2 * dot) / square;
    for (let i = a; i < m; i += 1) rhs[i] = rhs[i]! - f * q[ca + i]!;
    triangle[a * n + a] = alpha;
    projected[a] = rhs[a]!;
    for (let b = a + 1; b < n; b += 1) triangle[a * n + b] = q[b * m + a]!;
  }
}

/**
 * Upper triangle of RᵀR + D² and the right side that goes with it, by Givens
 * rotations (Moré 1978): no squaring. `triangle`, `rhs` and `row` are overwritten.
 */
export function damp(triangle: Float64Array, rhs: Float64Array, damping: Float64Array, n: number, row: Float64Array): void {
  for (let j = 0; j < n; j += 1) {
    if (damping[j] === 0) continue;
    row.fill(0);
    row[j] = damping[j]!;
    let extra = 0;
    for (let k = j; k < n; k += 1) {
      const below = row[k]!;
      if (below === 0) continue;
      const pivot = triangle[k * n + k]!;
      const length = Math.sqrt(pivot * pivot + below * below);
      const cos = pivot / length;
      const sin = below / length;
      triangle[k * n + k] = length;
      const kept = cos * rhs[k]! + sin * extra;
      extra = -sin * rhs[k]! + cos * extra;
      rhs[k] = kept;
      for (let i = k + 1; i < n; i += 1) {
        const up = triangle[k * n + i]!;
        triangle[k * n + i] = cos * up + sin * row[i]!;
        row[i] = -sin * up + cos * row[i]!;
      }
    }
  }
}

/** x of R x = b; unknowns behind a zero pivot are 0. */
export function solveUpper(triangle: Float64Array, b: Float64Array, n: number, x: Float64Array): boolean {
  let whole = true;
  for (let j = n - 1; j >= 0; j -= 1) {
    const pivot = triangle[j * n + j]!;
    let sum = b[j]!;
    for (let k = j + 1; k < n; k += 1) sum -= triangle[j * n + k]! * x[k]!;
    if (pivot === 0) {
      whole = false;
      x[j] = 0;
    } else x[j] = sum / pivot;
  }
  return whole;
}

/** x of Rᵀ x = b. */
export function solveLower(triangle: Float64Array, b: Float64Array, n: number, x: Float64Array): void {
  for (let j = 0; j < n; j += 1) {
    let sum = b[j]!;
    for (let k = 0; k < j; k += 1) sum -= triangle[k * n + j]! * x[k]!;
    const pivot = triangle[j * n + j]!;
    x[j] = pivot === 0 ? 0 : sum / pivot;
  }
}

/** (RᵀR)⁻¹ by row, or null where R is singular to working precision. */
export function inverseOf(triangle: Float64Array, n: number): Float64Array | null {
  const inverse = new Float64Array(n * n);
  for (let j = 0; j < n; j += 1) if (!(Math.abs(triangle[j * n + j]!) > 0)) return null;
  // Columns of R⁻¹ first, then their products.
  const upper = new Float64Array(n * n);
  for (let c = 0; c < n; c += 1) {
    for (let r = c; r >= 0; r -= 1) {
      let sum = r === c ? 1 : 0;
      for (let k = r + 1; k <= c; k += 1) sum -= triangle[r * n + k]! * upper[k * n + c]!;
      upper[r * n + c] = sum / triangle[r * n + r]!;
    }
  }
  for (let a = 0; a < n; a += 1) {
    for (let b = a; b < n; b += 1) {
      let sum = 0;
      for (let k = b; k < n; k += 1) sum += upper[a * n + k]! * upper[b * n + k]!;
      if (!Number.isFinite(sum)) return null;
      inverse[a * n + b] = sum;
      inverse[b * n + a] = sum;
    }
  }
  return inverse;
}
