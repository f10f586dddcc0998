import { medianBetween, medianInPlace, middleTwo } from './order';

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

let buffers = { x: new Float64Array(512), scratch: new Float64Array(512) };
const blockT = new Float64Array(BLOCKS);
const blockG = new Float64Array(BLOCKS);
const slopes = new Float64Array((BLOCKS * (BLOCKS - 1)) / 2 + 1);

/** Room for n points; one set serves every line, for a history takes thousands of them. */
function room(n: number): typeof buffers {
  if (n > buffers.x.length) buffers = { x: new Float64Array(2 * n), scratch: new Float64Array(2 * n) };
  return buffers;
}

/** Median distance of the points from the last line, points: where that of the next is looked for first. It changes no result. */
let usualDistance = 0.2;
/** How far about it, as a share; and the slope's about the straight one through the blocks, in its standard errors (both the quickest, measured). */
const DISTANCE_WITHIN = 0.3;
const SLOPE_WITHIN = 1.5;

/** Lags, in bins, over which noise may hang together. */
const LAGS = 6;
/** Sums of products of the residuals with themselves, and with those of one to six bins before. */
const products = new Float64Array(LAGS + 1);

/** Fills `products` from the residuals about a + b·x, cut at `clip`: in one pass, in which the sums need not wait for each other. */
function correlate(g: Float64Array, from: number, x: Float64Array, n: number, a: number, b: number, clip: number): void {
  let p0 = 0;
  let p1 = 0;
  let p2 = 0;
  let p3 = 0;
  let p4 = 0;
  let p5 = 0;
  let p6 = 0;
  let r1 = 0;
  let r2 = 0;
  let r3 = 0;
  let r4 = 0;
  let r5 = 0;
  let r6 = 0;
  for (let i = 0; i < n; i += 1) {
    const whole = g[from + i]! - a - b * x[i]!;
    const r = whole > clip ? clip : whole < -clip ? -clip : whole;
    p0 += r * r;
    p1 += r * r1;
    p2 += r * r2;
    p3 += r * r3;
    p4 += r * r4;
    p5 += r * r5;
    p6 += r * r6;
    r6 = r5;
    r5 = r4;
    r4 = r3;
    r3 = r2;
    r2 = r1;
    r1 = r;
  }
  products[0] = p0;
  products[1] = p1;
  products[2] = p2;
  products[3] = p3;
  products[4] = p4;
  products[5] = p5;
  products[6] = p6;
}

/**
 * By how much noise that hangs together widens the variance of a slope: the larger
 * of (1+ρ)/(1−ρ) of the first lag, as if it were first-order, and of one and twice
 * the sum of the first lags (Newey, West, Econometrica 55 (1987) 703–708), since white
 * noise on top hides the slow part from the first lag. Each autocorrelation is
 * raised by 2/n for the line that was taken out; at most 19.
 */
function inflation(n: number): number {
  const square = products[0]!;
  if (square <= 0) return 1;
  let sum = 0;
  let first = 0;
  for (let lag = 1; lag <= LAGS && lag < n - 2; lag += 1) {
    const r = Math.max(0, products[lag]! / square + 2 / n);
    if (lag === 1) first = Math.min(0.9, r);
    sum += r;
  }
  return Math.min(19, Math.max((1 + first) / (1 - first), 1 + 2 * sum));
}

/** Medians of g in up to twelve stretches of as many points each, to `blockG`, with the mean of x of each; how many stretches. */
function blockMedians(g: Float64Array, from: number, x: Float64Array, n: number, scratch: Float64Array): number {
  const blocks = Math.min(BLOCKS, n);
  let lo = 0;
  for (let i = 0; i < blocks; i += 1) {
    const hi = Math.floor(((i + 1) * n) / blocks);
    const size = hi - lo;
    let sum = 0;
    for (let j = lo; j < hi; j += 1) sum += x[j]!;
    blockT[i] = sum / size;
    const first = from + lo;
    // Lines of one day and of two are asked at every look: theirs need no sort.
    if (size === 1) blockG[i] = g[first]!;
    else if (size === 2) blockG[i] = (g[first]! + g[first + 1]!) / 2;
    else if (size === 4) blockG[i] = middleTwo(g[first]!, g[first + 1]!, g[first + 2]!, g[first + 3]!);
    else {
      for (let j = 0; j < size; j += 1) scratch[j] = g[first + j]!;
      blockG[i] = medianInPlace(scratch, 0, size);
    }
    lo = hi;
  }
  return blocks;
}

/** Median slope of all pairs of blocks; NaN where none are apart in time. `weight` is the number of points of a block. */
function medianSlope(blocks: number, weight: number): number {
  let pairs = 0;
  let st = 0;
  let sg = 0;
  let stt = 0;
  let stg = 0;
  for (let i = 0; i < blocks; i += 1) {
    const ti = blockT[i]!;
    const gi = blockG[i]!;
    for (let j = i + 1; j < blocks; j += 1) {
      const dt = blockT[j]! - ti;
      slopes[pairs] = (blockG[j]! - gi) / dt;
      pairs += Number(dt > 0);
    }
    const y = gi - blockG[0]!;
    st += ti;
    sg += y;
    stt += ti * ti;
    stg += ti * y;
  }
  // It lies near the least-squares slope: there it is looked for first.
  const spread = stt - (st * st) / blocks;
  const about = (stg - (st * sg) / blocks) / spread;
  const reach = (SLOPE_WITHIN * usualDistance) / Math.sqrt(weight * spread);
  return medianBetween(slopes, pairs, about - reach, about + reach);
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
  const { x, scratch } = room(n);
  const middle = (t[from]! + t[to - 1]!) / 2;
  for (let i = 0; i < n; i += 1) x[i] = t[from + i]! - middle;

  const blocks = blockMedians(g, from, x, n, scratch);
  let b = medianSlope(blocks, n / blocks);
  if (Number.isNaN(b)) return null;
  for (let i = 0; i < blocks; i += 1) scratch[i] = blockG[i]! - b * blockT[i]!;
  let a = medianInPlace(scratch, 0, blocks);

  let sigma = SIGMA_FLOOR;
  let counted = 0;
  let spread = 0;
  let reach = DISTANCE_WITHIN * usualDistance;
  for (let round = 0; round < ROUNDS; round += 1) {
    // The scale settles before the line does.
    if (round < 2) {
      for (let i = 0; i < n; i += 1) scratch[i] = Math.abs(g[from + i]! - a - b * x[i]!);
      usualDistance = medianBetween(scratch, n, usualDistance - reach, usualDistance + reach);
      sigma = Math.max(SIGMA_FLOOR, 1.4826 * usualDistance);
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
      const size = Math.abs(y - b * xi);
      if (size > cut) continue;
      const w = size <= knee ? 1 : knee / size;
      const wx = w * xi;
      counted += 1;
      sw += w;
      st += wx;
      sg += w * y;
      stt += wx * xi;
      stg += wx * y;
    }
    const det = sw * stt - st * st;
    if (!(det > 1e-9 * sw)) return null;
    spread = det / sw;
    const slope = (sw * stg - st * sg) / det;
    const shift = (sg - slope * st) / sw;
    // Closer than a twentieth of the least standard error.
    const still = Math.abs(slope - b) < 1e-4 && Math.abs(shift) < 5e-3;
    // No point's distance has changed by more.
    reach = Math.abs(shift) + Math.abs(slope - b) * Math.max(-x[0]!, x[n - 1]!) + 1e-9;
    b = slope;
    a += shift;
    if (still) break;
  }
  if (counted < 5) return null;

  correlate(g, from, x, n, a, b, 2.5 * sigma);
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
