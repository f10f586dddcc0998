import { medianInPlace } from './order';

/** A straight line through a stretch of gravity, with an honest standard error. */
export interface Line {
  /** Points a day; negative while the gravity falls. */
  slope: number;
  /** Standard error of the slope, points a day, widened for noise that hangs together. */
  se: number;
  /** Points at the middle of the stretch. */
  level: number;
  /** Middle of the stretch, h. */
  middle: number;
  /** Robust standard deviation about the line, points. */
  sigma: number;
  /** Number of bins with weight. */
  n: number;
}

const BLOCKS = 12;
const ROUNDS = 4;
const HUBER_K = 1.5;
const SIGMA_FLOOR = 0.08;
const SE_FLOOR = 0.05;

let buffers = { x: new Float64Array(512), residuals: new Float64Array(512), scratch: new Float64Array(512) };
const blockT = new Float64Array(BLOCKS);
const blockG = new Float64Array(BLOCKS);
const slopes = new Float64Array((BLOCKS * (BLOCKS - 1)) / 2);

/** Room for n points; one set serves every line, for a history takes thousands of them. */
function room(n: number): typeof buffers {
  if (n > buffers.x.length) buffers = { x: new Float64Array(2 * n), residuals: new Float64Array(2 * n), scratch: new Float64Array(2 * n) };
  return buffers;
}

/** Lags, in bins, over which noise may hang together. */
const LAGS = 6;

/**
 * By how much noise that hangs together widens the variance of a slope: the larger
 * of (1+ρ)/(1−ρ) of the first lag, as if it were first-order, and of one and twice
 * the sum of the first lags (Newey, West, Econometrica 55 (1987) 703–708), since white
 * noise on top hides the slow part from the first lag. Each autocorrelation is
 * raised by 2/n for the line that was taken out; at most 19.
 */
function inflation(residuals: Float64Array, n: number): number {
  let square = 0;
  for (let i = 0; i < n; i += 1) square += residuals[i]! * residuals[i]!;
  if (square <= 0) return 1;
  let sum = 0;
  let first = 0;
  for (let lag = 1; lag <= LAGS && lag < n - 2; lag += 1) {
    let cross = 0;
    for (let i = lag; i < n; i += 1) cross += residuals[i]! * residuals[i - lag]!;
    const r = Math.max(0, cross / square + 2 / n);
    if (lag === 1) first = Math.min(0.9, r);
    sum += r;
  }
  return Math.min(19, Math.max((1 + first) / (1 - first), 1 + 2 * sum));
}

/**
 * Robust line through g[from..to) against t (h, ascending). Starts from
 * Theil–Sen on 12 block medians (Sen 1968), then four Huber re-weightings;
 * points beyond six sigmas and half a point count nothing. The standard error is
 * inflated for autocorrelation and is never under 0.05 points a day. Null with fewer than five points or none
 * of them apart in time.
 */
export function robustLine(t: Float64Array, g: Float64Array, from: number, to: number): Line | null {
  const n = to - from;
  if (n < 5) return null;
  const { x, residuals, scratch } = room(n);
  const middle = (t[from]! + t[to - 1]!) / 2;
  for (let i = 0; i < n; i += 1) x[i] = t[from + i]! - middle;

  const blocks = Math.min(BLOCKS, n);
  for (let i = 0; i < blocks; i += 1) {
    const lo = Math.floor((i * n) / blocks);
    const hi = Math.floor(((i + 1) * n) / blocks);
    let sum = 0;
    for (let j = lo; j < hi; j += 1) {
      sum += x[j]!;
      scratch[j - lo] = g[from + j]!;
    }
    blockT[i] = sum / (hi - lo);
    blockG[i] = medianInPlace(scratch, 0, hi - lo);
  }
  let pairs = 0;
  for (let i = 0; i < blocks; i += 1) {
    for (let j = i + 1; j < blocks; j += 1) {
      const dt = blockT[j]! - blockT[i]!;
      if (dt > 0) {
        slopes[pairs] = (blockG[j]! - blockG[i]!) / dt;
        pairs += 1;
      }
    }
  }
  if (pairs === 0) return null;
  let b = medianInPlace(slopes, 0, pairs);
  for (let i = 0; i < blocks; i += 1) scratch[i] = blockG[i]! - b * blockT[i]!;
  let a = medianInPlace(scratch, 0, blocks);

  let sigma = SIGMA_FLOOR;
  let counted = 0;
  let spread = 0;
  for (let round = 0; round < ROUNDS; round += 1) {
    // The scale settles before the line does.
    if (round < 2) {
      for (let i = 0; i < n; i += 1) {
        const r = g[from + i]! - a - b * x[i]!;
        scratch[i] = r < 0 ? -r : r;
      }
      sigma = Math.max(SIGMA_FLOOR, 1.4826 * medianInPlace(scratch, 0, n));
    }
    const knee = HUBER_K * sigma;
    const cut = 6 * sigma + 0.5;
    let sw = 0;
    let st = 0;
    let sg = 0;
    let stt = 0;
    let stg = 0;
    counted = 0;
    for (let i = 0; i < n; i += 1) {
      const xi = x[i]!;
      const y = g[from + i]! - a;
      const r = y - b * xi;
      const size = r < 0 ? -r : r;
      if (size > cut) continue;
      const w = size <= knee ? 1 : knee / size;
      counted += 1;
      sw += w;
      st += w * xi;
      sg += w * y;
      stt += w * xi * xi;
      stg += w * xi * y;
    }
    const det = sw * stt - st * st;
    if (!(det > 1e-9 * sw)) return null;
    spread = det / sw;
    const slope = (sw * stg - st * sg) / det;
    const shift = (sg - slope * st) / sw;
    // Closer than a twentieth of the least standard error.
    const still = Math.abs(slope - b) < 1e-4 && Math.abs(shift) < 5e-3;
    b = slope;
    a += shift;
    if (still) break;
  }
  if (counted < 5) return null;

  const clip = 2.5 * sigma;
  for (let i = 0; i < n; i += 1) {
    const r = g[from + i]! - a - b * x[i]!;
    residuals[i] = r > clip ? clip : r < -clip ? -clip : r;
  }
  const variance = (sigma * sigma * inflation(residuals, n)) / spread;
  return {
    slope: b * 24,
    se: Math.max(SE_FLOOR, 24 * Math.sqrt(variance)),
    level: a,
    middle,
    sigma,
    n: counted,
  };
}
