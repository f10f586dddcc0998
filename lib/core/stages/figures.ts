import type { BatchSetup, Instant, Neck } from '../types';
import type { CurveFit } from '../fit/map';
import { finalGravityPrior, type Normal } from '../fit/priors';
import { gasLPerH, swapGasLPerH } from '../gas/gas';
import { selfHeatingC } from '../gas/heat';
import type { Line } from '../series/line';
import { Track, type Segment } from '../series/track';
import { pointsOf } from '../units/convert';
import { fitSegment } from './curve';
import { latch } from './latch';
import { held } from './remaining';

/** Standard deviation of a hydrometer reading by hand, points (our own). */
export const HAND_SD = 0.7;

/** Hours of which the present temperature is the median. */
const TEMPERATURE_H = 3;

/** Fall of temperature within two to four days, °C, from which on it has turned cold (ours). */
const COOLED_C = 4;

/** A float whose readings have all but stopped flickering. */
export interface FrozenState {
  since: number;
  /** Noise now and as usual, points. */
  index: number;
  usual: number;
}

/**
 * The state of one batch at its last look, and the figures that the rules and the
 * calls are made of. Each figure is worked out at most once a look, from what was
 * measured before it.
 */
export class Figures {
  readonly track: Track;
  segment: Segment;
  /** Original gravity as told, or as the float showed it before anything happened, points. */
  og: number | null;
  ogSd: number;
  readonly ogTold: boolean;
  /** Hour of the last look. */
  lookedAt = 0;

  neck: Neck | null;
  neckSince: number | null = null;
  stabilised = false;
  lastAddition: number | null = null;
  protected lastAdditionFruit = false;
  /** Sugar went in after the batch had come to rest. */
  sweetened = false;
  /** Level at which it rested before it was sweetened, points. */
  protected restedAt: number | null = null;
  readonly handReadings: { hour: number; points: number; sd: number }[] = [];
  lastHand: { hour: number; points: number; miss: number } | null = null;
  frozen: FrozenState | null = null;

  readonly started = latch();
  readonly overdue = latch();
  readonly peaked = latch();
  readonly airlock = latch();
  readonly sluggish = latch();
  readonly stuck = latch();
  readonly terminal = latch();
  /** The float gives nothing, and by its curve the end has come meanwhile. */
  readonly ended = latch();
  readonly rack = latch();
  readonly bottle = latch();
  readonly refermenting = latch();
  readonly tooCold = latch();
  readonly tooWarm = latch();
  readonly rising = latch();
  readonly drifting = latch();
  stuckCold = false;

  /** Highest rate over a day so far in this segment, points a day. */
  maxRate = 0;
  /** Level before anything happened, as the float showed it, points. */
  baseline: number | null = null;
  /** Lowest level of a quiet day in this segment, points: a ferment does not rise, a float that drifts does. */
  protected lowest: number | null = null;
  /** Level on which the batch came to rest, points. */
  plateau: number | null = null;

  private readonly lines = new Map<number, Line | null>();
  private levelMemo: number | null | undefined;
  private coldMemo: boolean | undefined;
  private fitCache: { key: number; fit: CurveFit | null } | null = null;
  /** The last fit that the rules asked for: where the next one begins. What a reader asks for between two looks must not move it. */
  private lastFit: { segment: Segment; fit: CurveFit | null } | null = null;
  /** The rules are being applied. */
  protected ruling = false;
  private priorCache: { segment: Segment; prior: Normal } | null = null;

  constructor(
    readonly setup: BatchSetup,
    origin: Instant,
  ) {
    this.track = new Track(setup, origin);
    this.og = setup.originalGravity === null ? null : pointsOf(setup.originalGravity);
    this.ogTold = this.og !== null;
    this.ogSd = this.ogTold ? 1 : 3;
    this.neck = setup.neck ?? null;
    this.segment = { from: 0, effectiveOg: this.og ?? 0, ogSd: this.ogSd, level: this.og, fruit: false, restarted: false };
  }

  /** Hour since which the temperature has been out of its range without a break. */
  outsideSince(side: 'low' | 'high'): number | null {
    const range = this.setup.temperature;
    if (!range) return null;
    const { bins } = this.track;
    let since: number | null = null;
    for (let i = this.track.upTo(this.lookedAt) - 1; i >= 0; i -= 1) {
      const t = bins.temperature[i]!;
      if (side === 'low' ? t >= range.minC : t <= range.maxC) break;
      since = bins.t[i]!;
    }
    return since;
  }

  line(window: number): Line | null {
    const known = this.lines.get(window);
    if (known !== undefined) return known;
    const from = Math.max(this.lookedAt - window, this.segment.restarted ? this.segment.from + 1 : -48);
    const line = this.lookedAt - from < 0.6 * window ? null : this.track.line(from, this.lookedAt);
    this.lines.set(window, line);
    return line;
  }

  /** Calibrated level now, points: the day's line at its end where the day is quiet, else the last six hours. */
  levelNow(): number | null {
    if (this.levelMemo === undefined) this.levelMemo = this.measureLevel();
    return this.levelMemo;
  }

  /** Temperature now, °C: the median of three hours, or of the last word of a float that speaks more seldom; null with none. */
  temperatureNow(): number | null {
    return this.track.temperature(this.lookedAt - Math.max(TEMPERATURE_H, 1.2 * this.track.spacing), this.lookedAt);
  }

  /** Where it last was known to stand, points, while the float gives nothing: by its last sound word, or by the hydrometer since. */
  lastKnown(): { hour: number; points: number } | null {
    const { bins } = this.track;
    const bin = this.track.lastSound(this.lookedAt);
    const end = Math.floor(bin) + 1;
    // A bin stands at the middle of its readings; the last word is the latest of them.
    const last = this.track.lastReading(Math.min(end, this.lookedAt));
    const sound = last ? Math.max(bin, this.track.hourOf(last.at)) : bin;
    const from = Math.max(end - 24, this.segment.restarted ? this.segment.from + 1 : -48);
    const points = bins.n === 0 ? null : this.levelAt(sound, end, end - from < 0.6 * 24 ? null : this.track.line(from, end));
    const hand = this.handReadings.at(-1);
    if (points === null || (hand && hand.hour > sound)) return hand ?? null;
    return { hour: sound, points };
  }

  /** Drops the figures of the look before: the hour, the record or the set-up has changed. */
  protected forget(): void {
    this.lines.clear();
    this.levelMemo = undefined;
    this.coldMemo = undefined;
  }

  /** The record itself was changed: what was fitted to it no longer holds. */
  protected recordChanged(): void {
    this.fitCache = null;
    this.forget();
  }

  private measureLevel(): number | null {
    return this.levelAt(this.lookedAt, this.lookedAt, this.line(24));
  }

  /** Calibrated level at `hour`, points, from the day's line where it is quiet, else from the six hours to `end`. */
  private levelAt(hour: number, end: number, line: Line | null): number | null {
    if (line && Math.abs(line.slope) < 6) return this.track.calibrate(line.level + (line.slope / 24) * (hour - line.middle));
    const raw = this.track.level(end - 6, end);
    return raw === null ? null : this.track.calibrate(raw);
  }

  fgPrior(): Normal {
    const { segment } = this;
    // The segment is replaced whenever it changes, so it is its own key.
    if (this.priorCache?.segment !== segment) {
      this.priorCache = { segment, prior: finalGravityPrior(this.setup, segment.effectiveOg, segment.ogSd, segment.fruit) };
    }
    return this.priorCache.prior;
  }

  /** Level to hold against the yeast's range, points: now, unless the float has only climbed since. */
  protected groundLevel(): number | null {
    const level = this.levelNow();
    return level === null || this.lowest === null ? level : Math.min(level, this.lowest + 0.7);
  }

  /** Highest gravity at which the batch may be done, points. */
  zoneTop(): number {
    const prior = this.fgPrior();
    return prior.mean + Math.max(1.9 * Math.hypot(prior.sd, this.track.calibrationSd(prior.mean)), 3);
  }

  /** Lowest gravity at which a batch that rests may be called stuck, points; between the two it is not known. */
  stuckFloor(): number {
    return Math.max(this.zoneTop() + 1.5, this.fgPrior().mean + 5.5);
  }

  /** The fitted curve; anew every 6 h to day 10, every 12 h to day 30, then once a day. */
  fit(): CurveFit | null {
    const step = this.lookedAt < 240 ? 6 : this.lookedAt < 720 ? 12 : 24;
    const at = Math.floor(this.lookedAt / step + 1e-9) * step;
    if (this.fitCache?.key !== at) {
      const { segment } = this;
      if (segment.effectiveOg < 5) return null;
      const og: Normal = { mean: segment.level ?? segment.effectiveOg, sd: segment.restarted ? 2 : this.ogSd };
      const start = this.lastFit?.segment === segment ? this.lastFit.fit?.parameters : undefined;
      this.fitCache = { key: at, fit: fitSegment(this.setup, this.track, segment, at, this.fgPrior(), og, start) };
    }
    const { fit } = this.fitCache;
    if (this.ruling) this.lastFit = { segment: this.segment, fit };
    return fit;
  }

  /** The curve of a batch that ends where it is, for the picture of a stall: the one fitted to the yeast's range leaves the record. */
  restingFit(): CurveFit | null {
    const level = this.levelNow();
    const { segment } = this;
    if (level === null || segment.effectiveOg < 5) return null;
    const og: Normal = { mean: segment.level ?? segment.effectiveOg, sd: segment.restarted ? 2 : this.ogSd };
    return fitSegment(this.setup, this.track, segment, this.lookedAt, { mean: level, sd: 0.7 }, og);
  }

  /** Hour since which the level has been within a point of the present one; null without a level. */
  flatSince(): number | null {
    const now = this.track.level(this.lookedAt - 12, this.lookedAt);
    if (now === null) return null;
    let since = this.lookedAt - 12;
    for (let hour = since; hour > this.segment.from && since - hour < 72; hour -= 6) {
      const level = this.track.level(hour - 6, hour);
      if (level === null) continue;
      if (Math.abs(level - now) > 1) break;
      since = hour - 6;
    }
    return Math.max(since, this.segment.from);
  }

  /** Present fall, points a day: the shortest window that is sharp enough, blended with the curve. */
  rateNow(): { value: number; sd: number } | null {
    let chosen: Line | null = null;
    // At rest there is time to look longer.
    const rests = this.stuck.on || this.terminal.on;
    for (const window of rests ? [48, 72] : [8, 12, 24, 48, 72]) {
      const line = this.line(window);
      if (!line) continue;
      chosen = line;
      if (line.se <= Math.max(rests ? 0.15 : 0.5, 0.15 * Math.abs(line.slope))) break;
    }
    if (!chosen) return null;
    const fit = this.started.on && !this.stuck.on ? this.fit() : null;
    if (!fit) return { value: -chosen.slope, sd: chosen.se };
    const start = this.track.tauAt(this.segment.from);
    const pace = (hour: number): number => fit.curve.rate(this.track.tauAt(hour) - start) * this.track.warmthAt(hour);
    const curved = pace(this.lookedAt);
    // A line tells the pace of its middle; the curve tells how that has changed since.
    const change = curved - pace(chosen.middle);
    const rate = -chosen.slope + change;
    return held({ value: rate, sd: Math.hypot(chosen.se, 0.12 * rate, 0.5 * change) }, { value: curved, sd: 0.25 * curved + 0.3 });
  }

  /** Whether sugar that went in after the batch had come to rest is still there, and nothing keeps the yeast from it. */
  sweetStill(level: number): boolean {
    return this.sweetened && !this.stabilised && this.restedAt !== null && level > this.restedAt + 2;
  }

  /** Sweetened at rest and kept from working by what went in to stabilise it: what lies there stays. */
  sweetHeld(): boolean {
    return this.sweetened && this.stabilised && this.restedAt !== null;
  }

  quietSinceAddition(hours: number, fruitHours: number): boolean {
    if (this.lastAddition === null) return true;
    return this.lookedAt - this.lastAddition > (this.lastAdditionFruit ? fruitHours : hours);
  }

  /** Drop since the pitch, points; null before there is a baseline. */
  dropSoFar(): number | null {
    const now = this.track.level(this.lookedAt - 6, this.lookedAt);
    return now === null || this.baseline === null ? null : this.baseline - now;
  }

  swapGas(): number {
    return swapGasLPerH(this.setup.kind, this.setup.volumeL, this.setup.vesselL);
  }

  /** Gas, L/h, if a cold vessel were warm again: its best pace in the measure of what is left. */
  gasIfWarmed(): number {
    const level = this.levelNow();
    const { mean } = this.fgPrior();
    const whole = this.segment.effectiveOg - mean;
    return level === null || whole <= 0 ? 0 : gasLPerH((this.maxRate * (level - mean)) / whole, this.setup.volumeL);
  }

  /** Colder than its range, or than it was two days before. */
  coldNow(): boolean {
    return (this.coldMemo ??= this.measureCold());
  }

  private measureCold(): boolean {
    // Where not even the coldest hour tells of it, no median does.
    const coldest = this.track.coldest(this.lookedAt - 12, this.lookedAt);
    const within = !this.setup.temperature || coldest >= this.setup.temperature.minC - 0.4;
    if (within && this.track.warmest(this.lookedAt - 96, this.lookedAt - 48) - coldest <= COOLED_C) return false;
    const now = this.track.temperature(this.lookedAt - 12, this.lookedAt);
    if (now === null) return false;
    if (this.setup.temperature && now < this.setup.temperature.minC - 0.4) return true;
    const before = this.track.temperature(this.lookedAt - 96, this.lookedAt - 48);
    if (before === null || before - now <= COOLED_C) return false;
    // The heat of its own work goes when the work is done: that is no cold.
    const worked = this.track.line(this.lookedAt - 96, this.lookedAt - 48);
    const works = this.line(24);
    const own = selfHeatingC(this.setup.volumeL, worked ? -worked.slope : 0) - selfHeatingC(this.setup.volumeL, works ? -works.slope : 0);
    return before - now - Math.max(0, own) > COOLED_C;
  }
}
