import { medianInPlace } from './order';

/** How much fall is still to come, judged from the end of the record alone. */
export interface Tail {
  /** Points still to fall. */
  remaining: number;
  sd: number;
  /** The likely figure, points: the middle where `remaining` is the mean of a lopsided spread. */
  likely: number;
  /** Pace of the slowing, per day. */
  pace: number;
}

/** Spread of the logarithm of a tail's pace about what its age lets expect (two families of own simulations), our own prior. */
const PACE_SPREAD = 0.6;
/** Paces tried, as multiples of 1/age, about evenly spaced in the logarithm. Each pair is twice the pair before, so that its exponentials are the squares of theirs. */
const PACES = [0.75, 1, 1.5, 2, 3, 4, 6, 8, 12, 16, 24];
/** Exponents are cut here, so that their squares stay numbers. */
const STEEPEST = 30;
/** Noise that hangs together over hours leaves fewer independent bins than there are. */
const CORRELATION_MOST = 0.9;
/** Middle of pace times age: to day 25, and at the least; between the two it falls as the age grows (the middles of two families of own simulations lie within a half of it). */
const USUAL_PACE = { quick: 6, untilDay: 25, slow: 3.3 };

/** Pace times age to expect of an end: what took long to get here is held back by its alcohol and its tired yeast, and slows down slower still. */
export function usualPace(ageDays: number): number {
  const { quick, untilDay, slow } = USUAL_PACE;
  return Math.max(slow, Math.min(quick, (quick * untilDay) / ageDays));
}

/** Share of its age over which a waning tail is followed back; before that it falls at the pace it had there. */
const WANES_FROM = 0.35;

let size = 256;
let weights = new Float64Array(size);
let residuals = new Float64Array(size);
let scratch = new Float64Array(size);
let basis = new Float64Array(size);
/** The bases of the two paces before, by turns. */
let even = new Float64Array(size);
let odd = new Float64Array(size);

interface Line2 {
  a: number;
  b: number;
  bb: number;
  /** Weighted sum of the squares of what is left. */
  rest: number;
}

/** Weighted least squares of g on 1 and the basis. */
function solve(g: Float64Array, from: number, n: number): Line2 | null {
  let sw = 0;
  let sf = 0;
  let sg = 0;
  let sff = 0;
  let sfg = 0;
  let sgg = 0;
  const g0 = g[from]!;
  for (let i = 0; i < n; i += 1) {
    const w = weights[i]!;
    const f = basis[i]!;
    const y = g[from + i]! - g0;
    sw += w;
    sf += w * f;
    sg += w * y;
    sff += w * f * f;
    sfg += w * f * y;
    sgg += w * y * y;
  }
  const det = sw * sff - sf * sf;
  if (!(det > 1e-12 * sw * sff)) return null;
  const b = (sw * sfg - sf * sg) / det;
  const a = (sg - b * sf) / sw;
  return { a: g0 + a, b, bb: sw / det, rest: Math.max(0, sgg - a * sg - b * sfg) };
}

/**
 * Falling end of a ferment as a + b·e^(−λt) over t[from..to) (h, ascending), `now` in
 * h, the age in days. The pace λ is averaged over a prior that goes with the age:
 * what took long to get here slows down slowly. b at `now` is what is still to
 * come. Where the tail `wanes`, the pace is that of now and wanes as the age grows: a
 * power of the age in place of the exponential, which leaves more to come. Null with
 * fewer than ten points.
 */
export function fitTail(t: Float64Array, g: Float64Array, from: number, to: number, now: number, ageDays: number, wanes = false): Tail | null {
  const n = to - from;
  if (n < 10 || !(ageDays > 0)) return null;
  if (n > size) {
    size = 2 * n;
    weights = new Float64Array(size);
    residuals = new Float64Array(size);
    scratch = new Float64Array(size);
    basis = new Float64Array(size);
    even = new Float64Array(size);
    odd = new Float64Array(size);
  }
  const median = usualPace(ageDays);
  weights.fill(1, 0, n);
  let sigma = 0.3;
  let rho = 0;
  // Weights against bubbles from the middle pace; the shape matters little for them.
  for (let round = 0; round < 3; round += 1) {
    setBasis(t, from, n, now, median / ageDays, wanes ? ageDays : null, basis);
    const fit = solve(g, from, n);
    if (!fit) return null;
    for (let i = 0; i < n; i += 1) {
      residuals[i] = g[from + i]! - fit.a - fit.b * basis[i]!;
      scratch[i] = Math.abs(residuals[i]!);
    }
    sigma = Math.max(0.08, 1.4826 * medianInPlace(scratch, 0, n));
    for (let i = 0; i < n; i += 1) {
      const r = Math.abs(residuals[i]!);
      weights[i] = r <= 1.5 * sigma ? 1 : r > 6 * sigma + 0.5 ? 0 : (1.5 * sigma) / r;
    }
  }
  let cross = 0;
  let square = 0;
  let before = 0;
  for (let i = 0; i < n; i += 1) {
    const r = Math.max(-2.5 * sigma, Math.min(2.5 * sigma, residuals[i]!));
    square += r * r;
    cross += i > 0 ? r * before : 0;
    before = r;
  }
  rho = Math.min(CORRELATION_MOST, Math.max(0, (square > 0 ? cross / square : 0) + 2 / n));
  const variance = (sigma * sigma * (1 + rho)) / (1 - rho);

  let total = 0;
  let mean = 0;
  let second = 0;
  let pace = 0;
  let logs = 0;
  let best = Number.POSITIVE_INFINITY;
  const found: { b: number; v: number; cost: number; lambda: number }[] = [];
  for (let k = 0; k < PACES.length; k += 1) {
    const multiple = PACES[k]!;
    const lambda = multiple / ageDays;
    const kept = k % 2 === 0 ? even : odd;
    if (k < 2) setBasis(t, from, n, now, lambda, wanes ? ageDays : null, kept);
    else for (let i = 0; i < n; i += 1) kept[i] = Math.min(1e120, kept[i]! * kept[i]!);
    basis.set(kept.subarray(0, n));
    const fit = solve(g, from, n);
    if (!fit) continue;
    const z = Math.log(multiple / median) / PACE_SPREAD;
    const cost = fit.rest / (2 * variance) + (z * z) / 2;
    best = Math.min(best, cost);
    found.push({ b: fit.b, v: variance * fit.bb, cost, lambda });
  }
  for (const { b, v, cost, lambda } of found) {
    const w = Math.exp(best - cost);
    total += w;
    mean += w * b;
    second += w * (b * b + v);
    pace += w * lambda;
    logs += w * Math.log(Math.max(0.05, b));
  }
  if (!(total > 0)) return null;
  mean /= total;
  return { remaining: mean, sd: Math.sqrt(Math.max(0, second / total - mean * mean)), likely: Math.exp(logs / total), pace: pace / total };
}

/** The basis of a pace: of a steady one, or of one that wanes with `waningAge`, days. */
function setBasis(t: Float64Array, from: number, n: number, now: number, lambda: number, waningAge: number | null, out: Float64Array): void {
  for (let i = 0; i < n; i += 1) {
    const back = (now - t[from + i]!) / 24;
    out[i] = Math.exp(Math.min(STEEPEST, lambda * (waningAge === null ? back : waned(back, waningAge))));
  }
}

/** Days at the present pace in which so much falls as in so many days back, when the pace goes with one over the age. */
function waned(back: number, age: number): number {
  const near = Math.min(back, WANES_FROM * age);
  return -age * Math.log(1 - near / age) + (back - near) / (1 - WANES_FROM);
}
