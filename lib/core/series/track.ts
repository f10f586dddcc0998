import type { BatchEvent, BatchSetup, Instant, Reading } from '../types';
import { appendBin, binFrom, GAP_H, newBins, type Bins } from './bins';
import { robustLine, type Line } from './line';
import { medianInPlace, middleOf, select } from './order';
import { Pinned } from './pinned';
import { fitTail, type Tail } from './tail';

export const HOUR_MS = 3_600_000;
const USUAL_C = 20;
/** Rate of fermentation at a temperature against that at 20 °C: Q10 of 2.2, our own choice (Q10 2 is common practice). */
export const warmth = (celsius: number): number => 2.2 ** ((Math.min(34, Math.max(4, celsius)) - 20) / 10);

/** A stretch of the batch that follows one curve: from the pitch, or from the last addition. */
export interface Segment {
  /** h since the pitch. */
  from: number;
  /** Gravity at its beginning if all alcohol were sugar still, points. */
  effectiveOg: number;
  ogSd: number;
  /** Gravity at its beginning as it is, points. Null until it has been measured. */
  level: number | null;
  fruit: boolean;
  restarted: boolean;
}

/** A correction that was made to the float's record, for the explanation. */
export interface Correction {
  atHour: number;
  points: number;
  why: 'racking' | 'moved' | 'sugar';
}

/** Readings whose spacing is looked at; anew once half of them are new. */
const SPACINGS = 60;

const scratch = new Float64Array(2048);
const lineT = new Float64Array(2048);
const lineG = new Float64Array(2048);

/**
 * The record of one batch as the rules see it: hourly bins with the steps taken
 * out, frozen stretches masked, thermal age, and the float's offset against the
 * hydrometer. It only ever grows; nothing in it looks past the hour it is asked for.
 */
export class Track extends Pinned {
  readonly bins: Bins = newBins();
  readonly corrections: Correction[] = [];
  /** Thermal age of each bin, days at 20 °C. */
  tau = new Float64Array(256);
  /** Steps taken out so far, points. */
  private pendingShift = 0;
  /** Median spacing of the readings, h. */
  spacing = 1;
  private readings: Reading[] = [];
  private taken = 0;
  private sinceMeasured = 0;
  /** Some of it is masked. */
  private masks = false;

  constructor(
    readonly setup: BatchSetup,
    readonly origin: Instant,
  ) {
    super();
  }

  hourOf(at: Instant): number {
    return (at - this.origin) / HOUR_MS;
  }

  instantOf(hour: number): Instant {
    return this.origin + Math.round(hour * HOUR_MS);
  }

  /** Takes in all readings measured before `until`; they must be in order of time and later than those before. */
  extend(readings: Reading[], until: Instant): void {
    this.readings = readings;
    while (this.taken < readings.length && readings[this.taken]!.at < until) {
      const from = this.taken;
      const hour = Math.floor(this.hourOf(readings[from]!.at));
      const end = Math.min(until, this.origin + (hour + 1) * HOUR_MS);
      let to = from + 1;
      while (to < readings.length && readings[to]!.at < end) to += 1;
      const { bins } = this;
      appendBin(bins, readings, from, to, hour, this.origin);
      const i = bins.n - 1;
      bins.g[i] = bins.raw[i]! - this.pendingShift;
      this.age(i);
      this.taken = to;
      this.sinceMeasured += to - from;
    }
    if (this.sinceMeasured >= Math.min(SPACINGS / 2, this.taken / 2)) this.measureSpacing();
  }

  private age(i: number): void {
    const { bins } = this;
    if (this.tau.length <= i) {
      const longer = new Float64Array(2 * this.tau.length);
      longer.set(this.tau);
      this.tau = longer;
    }
    if (!(bins.temperature[i]! > -99)) bins.temperature[i] = i > 0 ? bins.temperature[i - 1]! : this.usualC();
    const w = warmth(bins.temperature[i]!);
    if (i === 0) this.tau[0] = (bins.t[0]! / 24) * w;
    else this.tau[i] = this.tau[i - 1]! + ((bins.t[i]! - bins.t[i - 1]!) / 24) * 0.5 * (w + warmth(bins.temperature[i - 1]!));
  }

  private usualC(): number {
    const range = this.setup.temperature;
    return range ? (range.minC + range.maxC) / 2 : USUAL_C;
  }

  /** Spacing of the last readings; it decides how long a silence is long, and whether the record is one read by hand. */
  private measureSpacing(): void {
    const n = this.taken;
    if (n < 2) return;
    this.sinceMeasured = 0;
    const from = Math.max(1, n - SPACINGS);
    for (let i = from; i < n; i += 1) scratch[i - from] = (this.readings[i]!.at - this.readings[i - 1]!.at) / HOUR_MS;
    this.spacing = medianInPlace(scratch, 0, n - from);
  }

  /** Number of bins that begin before `hour`. */
  upTo(hour: number): number {
    return binFrom(this.bins, Math.ceil(hour - 1e-9));
  }

  lastReading(hour: number): Reading | null {
    for (let i = this.taken - 1; i >= 0; i -= 1) if (this.hourOf(this.readings[i]!.at) <= hour) return this.readings[i]!;
    return null;
  }

  /** Hour of the last bin before `hour` that is sound; the pitch where there is none. */
  lastSound(hour: number): number {
    const { bins } = this;
    for (let i = this.upTo(hour) - 1; i >= 0; i -= 1) if (!bins.masked[i]) return bins.t[i]!;
    return 0;
  }

  /** Robust line over [from, to) h, frozen stretches left out. Null when less than `cover` of it has data. */
  line(from: number, to: number, cover = 0.6): Line | null {
    const { bins } = this;
    const a = binFrom(bins, Math.ceil(from - 1e-9));
    const b = this.upTo(to);
    // A record without holes is read where it lies.
    const whole = !this.masks && b - a >= 5 && b - a <= lineT.length && 1 + bins.covered[b - 1]! - bins.covered[a]! > cover * (to - from) + 1e-9;
    if (whole) return robustLine(bins.t, bins.g, a, b);
    const kept = this.gather(from, to, cover);
    return kept < 5 ? null : robustLine(lineT, lineG, 0, kept);
  }

  /**
   * What is still to fall after `to`, from the last `hours` of sound record before it and
   * none of before `notBefore`, of a stretch that is `ageH` old. A gap is bridged: what lies
   * on both sides of it tells more of an end than either. Null when most of the wanted
   * hours are missing.
   */
  tail(hours: number, notBefore: number, to: number, ageH: number, wanes: boolean): Tail | null {
    const from = Math.max(notBefore, this.reachOf(hours, to));
    if (to - from < 66) return null;
    const kept = this.gather(from, to, Math.min(0.75, (0.75 * hours) / (to - from)));
    return kept < 10 ? null : fitTail(lineT, lineG, 0, kept > 60 ? thirds(kept) : kept, to, ageH / 24, wanes);
  }

  /** The hour since which there are so many hours of sound record before `to`; at most two and a half times as far back. */
  private reachOf(hours: number, to: number): number {
    const { bins } = this;
    const reach = Math.max(GAP_H, 1.6 * this.spacing);
    let covered = 0;
    let next = to;
    for (let i = this.upTo(to) - 1; i >= 0 && covered < hours; i -= 1) {
      if (bins.t[i]! < to - 2.5 * hours) return next;
      if (bins.masked[i]) continue;
      covered += Math.min(next - bins.t[i]!, reach);
      next = bins.t[i]!;
    }
    return Math.min(next, to - hours);
  }

  /** Copies the sound bins of [from, to) side by side; their number, or 0 when they cover too little. */
  private gather(from: number, to: number, cover: number): number {
    const { bins } = this;
    const a = binFrom(bins, Math.ceil(from - 1e-9));
    const b = this.upTo(to);
    if (b - a < 5) return 0;
    let kept = 0;
    let covered = 0;
    const reach = Math.max(GAP_H, 1.6 * this.spacing);
    for (let i = a; i < b && kept < lineT.length; i += 1) {
      if (bins.masked[i]) continue;
      lineT[kept] = bins.t[i]!;
      lineG[kept] = bins.g[i]!;
      covered += kept === 0 ? Math.min(1, reach) : Math.min(lineT[kept]! - lineT[kept - 1]!, reach);
      kept += 1;
    }
    return covered < cover * (to - from) ? 0 : kept;
  }

  /** Median gravity of [from, to), points, steps out and frozen stretches left out; null with no data. */
  level(from: number, to: number): number | null {
    const { bins } = this;
    const a = binFrom(bins, Math.ceil(from - 1e-9));
    const b = this.upTo(to);
    let n = 0;
    for (let i = a; i < b && n < scratch.length; i += 1) {
      if (bins.masked[i]) continue;
      scratch[n] = bins.g[i]!;
      n += 1;
    }
    return n === 0 ? null : medianInPlace(scratch, 0, n);
  }

  /** Median temperature of [from, to), °C; null with none. */
  temperature(from: number, to: number): number | null {
    const { bins } = this;
    const a = binFrom(bins, Math.ceil(from - 1e-9));
    const b = this.upTo(to);
    let n = 0;
    for (let i = a; i < b && n < scratch.length; i += 1) {
      scratch[n] = bins.temperature[i]!;
      n += 1;
    }
    return n === 0 ? null : medianInPlace(scratch, 0, n);
  }

  /** Temperature of the coldest bin of [from, to), °C; Infinity with none. */
  coldest(from: number, to: number): number {
    const { temperature } = this.bins;
    let coldest = Number.POSITIVE_INFINITY;
    for (let i = binFrom(this.bins, Math.ceil(from - 1e-9)), end = this.upTo(to); i < end; i += 1) coldest = Math.min(coldest, temperature[i]!);
    return coldest;
  }

  /** Temperature of the warmest bin of [from, to), °C; -Infinity with none. */
  warmest(from: number, to: number): number {
    const { temperature } = this.bins;
    let warmest = Number.NEGATIVE_INFINITY;
    for (let i = binFrom(this.bins, Math.ceil(from - 1e-9)), end = this.upTo(to); i < end; i += 1) warmest = Math.max(warmest, temperature[i]!);
    return warmest;
  }

  /** Thermal age at an hour between or after the bins, days. */
  tauAt(hour: number): number {
    const { bins } = this;
    const i = this.upTo(hour) - 1;
    if (i < 0) return (hour / 24) * warmth(bins.n > 0 ? bins.temperature[0]! : this.usualC());
    return this.tau[i]! + ((hour - bins.t[i]!) / 24) * warmth(bins.temperature[i]!);
  }

  /** Thermal days in a day as warm as the last day before `hour`. */
  warmthAt(hour: number): number {
    const temperature = this.temperature(hour - 24, hour);
    return warmth(temperature ?? this.usualC());
  }

  // Steps.

  /** Takes a step out of everything from `hour` on. */
  shift(hour: number, points: number, why: Correction['why']): void {
    const { bins } = this;
    for (let i = binFrom(bins, Math.ceil(hour - 1e-9)); i < bins.n; i += 1) bins.g[i] = bins.g[i]! - points;
    this.pendingShift += points;
    this.corrections.push({ atHour: hour, points, why });
  }

  // Frozen float.

  /** Noise index at an hour: trimmed mean of the noise of its last hours, points; null with too little data. */
  noiseIndex(hour: number): number | null {
    const { bins } = this;
    const span = this.spacing < 0.75 ? 8 : this.spacing < 1.5 ? 14 : 18;
    const to = this.upTo(hour);
    let n = 0;
    for (let i = to - 1; i >= 0 && bins.hour[i]! >= hour - span; i -= 1) {
      const value = bins.flicker[i]!;
      if (value === value) {
        scratch[n] = value;
        n += 1;
      }
    }
    if (n < 6) return null;
    const kept = Math.max(1, Math.floor(0.85 * n));
    select(scratch, 0, n, kept - 1);
    let sum = 0;
    for (let i = 0; i < kept; i += 1) sum += scratch[i]!;
    return sum / kept;
  }

  /** Smallest change that the float can show, points: a coarse float looks frozen when it is only coarse. */
  resolution(): number {
    let least = Number.POSITIVE_INFINITY;
    const n = Math.min(this.taken, 400);
    for (let i = 1; i < n; i += 1) {
      const change = Math.abs(this.readings[i]!.gravity - this.readings[i - 1]!.gravity) * 1000;
      if (change > 1e-6 && change < least) least = change;
    }
    return Number.isFinite(least) ? least : 0;
  }

  mask(fromHour: number, toHour: number): void {
    const { bins } = this;
    this.masks = true;
    for (let i = binFrom(bins, Math.ceil(fromHour)); i < bins.n && bins.hour[i]! < toHour; i += 1) bins.masked[i] = 1;
  }
}

/** Medians of three neighbours each in place of the gathered bins; how many there are. */
function thirds(n: number): number {
  const m = Math.floor(n / 3);
  // The newest bins are kept whole: what is left over falls off at the old end.
  const skip = n - 3 * m;
  for (let i = 0; i < m; i += 1) {
    const j = skip + 3 * i;
    lineT[i] = (lineT[j]! + lineT[j + 1]! + lineT[j + 2]!) / 3;
    lineG[i] = middleOf(lineG[j]!, lineG[j + 1]!, lineG[j + 2]!);
  }
  return m;
}

/** Hydrometer readings among the events: readings, and notes that carry a gravity. */
export function handReadings(events: readonly BatchEvent[]): { at: Instant; gravity: number }[] {
  return events.flatMap((event) =>
    (event.kind === 'reading' || event.kind === 'note') && event.gravity ? [{ at: event.at, gravity: event.gravity }] : [],
  );
}
