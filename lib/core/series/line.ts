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

let size = 512;
let residuals = new Float64Array(size);
let weights = new Float64Array(size);
let scratch = new Float64Array(size);
const blockT = new Float64Array(BLOCKS);
const blockG = new Float64Array(BLOCKS);
const slopes = new Float64Array((BLOCKS * (BLOCKS - 1)) / 2);

function grow(n: number): void {
  if (n <= size) return;
  size = 2 * n;
  residuals = new Float64Array(size);
  weights = new Float64Array(size);
  scratch = new Float64Array(size);
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
function inflation(n: number): number {
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
  grow(n);
  const middle = (t[from]! + t[to - 1]!) / 2;

  let a: number;
  let b: number;
  const blocks = Math.min(BLOCKS, n);
  for (let i = 0; i < blocks; i += 1) {
    const lo = from + Math.floor((i * n) / blocks);
    const hi = from + Math.floor(((i + 1) * n) / blocks);
    let sum = 0;
    for (let j = lo; j < hi; j += 1) {
      sum += t[j]!;
      scratch[j - lo] = g[j]!;
    }
    blockT[i] = sum / (hi - lo) - middle;
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
  b = medianInPlace(slopes, 0, pairs);
  for (let i = 0; i < blocks; i += 1) scratch[i] = blockG[i]! - b * blockT[i]!;
  a = medianInPlace(scratch, 0, blocks);

  let sigma = SIGMA_FLOOR;
  for (let round = 0; round < ROUNDS; round += 1) {
    for (let i = 0; i < n; i += 1) {
      const r = g[from + i]! - a - b * (t[from + i]! - middle);
      residuals[i] = r < 0 ? -r : r;
      scratch[i] = r < 0 ? -r : r;
    }
    // The scale settles before the line does.
    if (round < 2) sigma = Math.max(SIGMA_FLOOR, 1.4826 * medianInPlace(scratch, 0, n));
    const knee = HUBER_K * sigma;
    const cut = 6 * sigma + 0.5;
    let sw = 0;
    let st = 0;
    let sg = 0;
    let stt = 0;
    let stg = 0;
    for (let i = 0; i < n; i += 1) {
      const r = residuals[i]!;
      const w = r <= knee ? 1 : r > cut ? 0 : knee / r;
      weights[i] = w;
      const x = t[from + i]! - middle;
      const y = g[from + i]! - a;
      sw += w;
      st += w * x;
      sg += w * y;
      stt += w * x * x;
      stg += w * x * y;
    }
    const det = sw * stt - st * st;
    if (!(det > 1e-9 * sw)) return null;
    const slope = (sw * stg - st * sg) / det;
    const shift = (sg - slope * st) / sw;
    // Closer than a twentieth of the least standard error.
    const still = Math.abs(slope - b) < 1e-4 && Math.abs(shift) < 5e-3;
    b = slope;
    a += shift;
    if (still) break;
  }

  let sw = 0;
  let st = 0;
  let stt = 0;
  let counted = 0;
  const clip = 2.5 * sigma;
  for (let i = 0; i < n; i += 1) {
    const x = t[from + i]! - middle;
    const w = weights[i]!;
    sw += w;
    st += w * x;
    stt += w * x * x;
    if (w > 0) counted += 1;
    const r = g[from + i]! - a - b * x;
    residuals[i] = r > clip ? clip : r < -clip ? -clip : r;
  }
  if (counted < 5) return null;
  const spread = stt - (st * st) / sw;
  const variance = (sigma * sigma * inflation(n)) / spread;
  return {
    slope: b * 24,
    se: Math.max(SE_FLOOR, 24 * Math.sqrt(variance)),
    level: a,
    middle,
    sigma,
    n: counted,
  };
}
