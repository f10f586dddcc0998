import type { Reading } from '../types';
import { medianInPlace } from './order';

/** Least of what a gap between two bins may count as covered, h. */
export const GAP_H = 1.01;

/** Hourly bins of a float's readings; hours are counted from the pitch. Arrays are longer than `n`. */
export interface Bins {
  n: number;
  /** Hour in which the bin begins, a whole number. */
  hour: Int32Array;
  /** Median time, h since the pitch. */
  t: Float64Array;
  /** Median gravity as the float gave it, points. */
  raw: Float64Array;
  /** Median gravity after steps were taken out, points. */
  g: Float64Array;
  /** Median temperature, °C; NaN where none was sent. */
  temperature: Float64Array;
  /** Noise between readings, points: mean size of their second differences, so that a steady fall counts nothing; NaN where there was none. */
  flicker: Float64Array;
  count: Int32Array;
  /** Hours covered from the first bin to this one, at the least: no gap counts more than {@link GAP_H}. */
  covered: Float64Array;
  /** 1 where the data must not enter fits or slopes (frozen float). */
  masked: Uint8Array;
}

/** Why a reading was left out. */
export type Refusal = 'gravity out of range' | 'temperature out of range' | 'doubled' | 'not a number';

export interface Accepted {
  readings: Reading[];
  refused: { reading: Reading; why: Refusal }[];
}

function refusalOf(reading: Reading): Refusal | null {
  if (!Number.isFinite(reading.at) || !Number.isFinite(reading.gravity)) return 'not a number';
  if (reading.gravity < 0.97 || reading.gravity > 1.2) return 'gravity out of range';
  const { temperature } = reading;
  if (temperature !== null && !(temperature >= -10 && temperature <= 60)) return 'temperature out of range';
  return null;
}

/**
 * Readings that may be used, by measured time. A time counts once: of several
 * readings of one time the first received is kept, then the lowest, so that the
 * order of arrival and doubling change nothing.
 */
export function accept(readings: readonly Reading[]): Accepted {
  const refused: Accepted['refused'] = [];
  const kept: Reading[] = [];
  let ordered = true;
  for (const reading of readings) {
    const why = refusalOf(reading);
    if (why) {
      refused.push({ reading, why });
      continue;
    }
    const last = kept[kept.length - 1];
    if (last && last.at >= reading.at) ordered = false;
    kept.push(reading);
  }
  if (ordered) return { readings: kept, refused };
  kept.sort(
    (a, b) =>
      a.at - b.at ||
      (a.receivedAt ?? a.at) - (b.receivedAt ?? b.at) ||
      a.gravity - b.gravity ||
      (a.temperature ?? -99) - (b.temperature ?? -99),
  );
  const single: Reading[] = [];
  for (const reading of kept) {
    if (single.length > 0 && single[single.length - 1]!.at === reading.at) refused.push({ reading, why: 'doubled' });
    else single.push(reading);
  }
  return { readings: single, refused };
}

const HOUR_MS = 3_600_000;

function emptyBins(capacity: number): Bins {
  return {
    n: 0,
    hour: new Int32Array(capacity),
    t: new Float64Array(capacity),
    raw: new Float64Array(capacity),
    g: new Float64Array(capacity),
    temperature: new Float64Array(capacity),
    flicker: new Float64Array(capacity),
    count: new Int32Array(capacity),
    covered: new Float64Array(capacity),
    masked: new Uint8Array(capacity),
  };
}

/** Arrays of a {@link Bins}, lengthened to hold one bin more. */
function widen(bins: Bins): void {
  if (bins.n < bins.hour.length) return;
  const wider = emptyBins(2 * bins.hour.length);
  wider.hour.set(bins.hour);
  wider.t.set(bins.t);
  wider.raw.set(bins.raw);
  wider.g.set(bins.g);
  wider.temperature.set(bins.temperature);
  wider.flicker.set(bins.flicker);
  wider.count.set(bins.count);
  wider.covered.set(bins.covered);
  wider.masked.set(bins.masked);
  Object.assign(bins, { ...wider, n: bins.n });
}

export function newBins(): Bins {
  return emptyBins(1024);
}

const scratch = new Float64Array(4096);

/** Mean absolute second difference of white noise over its standard deviation: √6 · √(2/π). */
const BEND_TO_SD = Math.sqrt(6) * Math.sqrt(2 / Math.PI);

/** Puts readings[from..to), all of one hour, into the next bin; the two readings before them are looked up. */
export function appendBin(
  bins: Bins,
  readings: readonly Reading[],
  from: number,
  to: number,
  hour: number,
  origin: number,
): void {
  widen(bins);
  const previous = readings[from - 1] ?? null;
  const earlier = readings[from - 2] ?? null;
  const i = bins.n;
  const n = Math.min(to - from, scratch.length);
  for (let j = 0; j < n; j += 1) scratch[j] = (readings[from + j]!.gravity - 1) * 1000;
  let bends = 0;
  let total = 0;
  let before = earlier ? (earlier.gravity - 1) * 1000 : Number.NaN;
  let last = previous ? (previous.gravity - 1) * 1000 : Number.NaN;
  if (previous && readings[from]!.at - previous.at > 4 * HOUR_MS) last = Number.NaN;
  if (previous && earlier && previous.at - earlier.at > 4 * HOUR_MS) before = Number.NaN;
  for (let j = 0; j < n; j += 1) {
    const value = scratch[j]!;
    const bend = value - 2 * last + before;
    if (bend === bend) {
      total += Math.abs(bend);
      bends += 1;
    }
    before = last;
    last = value;
  }
  bins.flicker[i] = bends > 0 ? total / bends / BEND_TO_SD : Number.NaN;
  const gravity = medianInPlace(scratch, 0, n);
  bins.raw[i] = gravity;
  bins.g[i] = gravity;
  const half = n >> 1;
  const mid = n % 2 === 1 ? readings[from + half]!.at : (readings[from + half - 1]!.at + readings[from + half]!.at) / 2;
  bins.t[i] = (mid - origin) / HOUR_MS;
  bins.covered[i] = i === 0 ? 0 : bins.covered[i - 1]! + Math.min(GAP_H, bins.t[i]! - bins.t[i - 1]!);
  let warm = 0;
  for (let j = 0; j < n; j += 1) {
    const { temperature } = readings[from + j]!;
    if (temperature !== null) {
      scratch[warm] = temperature;
      warm += 1;
    }
  }
  bins.temperature[i] = warm > 0 ? medianInPlace(scratch, 0, warm) : Number.NaN;
  bins.hour[i] = hour;
  bins.count[i] = n;
  bins.masked[i] = 0;
  bins.n = i + 1;
}

/** First bin whose hour is not before `hour`. */
export function binFrom(bins: Bins, hour: number): number {
  let lo = 0;
  let hi = bins.n;
  while (lo < hi) {
    const mid = (lo + hi) >> 1;
    if (bins.hour[mid]! < hour) lo = mid + 1;
    else hi = mid;
  }
  return lo;
}
