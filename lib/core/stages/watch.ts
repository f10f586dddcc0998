import type { BatchEvent, BatchSetup, Instant, Neck, Reading } from '../types';
import type { CurveFit } from '../fit/map';
import { finalGravityPrior, type Normal } from '../fit/priors';
import { gasLPerH, swapGasLPerH } from '../gas/gas';
import { POINTS_PER_G_PER_L } from '../gravity/extract';
import type { Line } from '../series/line';
import { median } from '../series/order';
import type { Tail } from '../series/tail';
import { Track, type Segment } from '../series/track';
import { pointsOf } from '../units/convert';
import { fitSegment } from './curve';
import { hold, latch, type Latch } from './latch';

/** Hours between two looks. The grid is anchored at the pitch, so that shifting all times shifts all answers. */
export const LOOK_H = 3;
/** Hours between two views of the tail, which hardly changes from look to look. */
const TAIL_H = 6;
/** Points that may still come, nine times in ten, when a batch is called finished, and when it may be bottled. */
export const TERMINAL_POINTS = 1.7;
export const BOTTLE_POINTS = 1.0;
/** Points that are likely still to come when it may be racked. */
export const RACK_POINTS = 2.0;
/** Share of fruit that is sugar where nobody says. Common practice. */
const FRUIT_SUGAR = 0.1;

export const OVERDUE_H: Record<BatchSetup['kind'], number> = { beer: 48, cider: 72, mead: 72, wine: 72 };

export interface FrozenState {
  since: number;
  index: number;
  usual: number;
}

/** What the rules remember of one batch, and the rules themselves. One look every three hours. */
export class Watch {
  readonly track: Track;
  segment: Segment;
  /** Original gravity as told, or as the float showed it before anything happened, points. */
  og: number | null;
  ogSd: number;
  ogTold: boolean;

  /** Hour of the last look. */
  lookedAt = 0;
  neck: Neck | null;
  neckSince: number | null = null;
  stabilised = false;
  lastAddition: number | null = null;
  lastAdditionFruit = false;
  readonly handReadings: { hour: number; points: number }[] = [];
  lastHand: { hour: number; points: number; miss: number } | null = null;

  readonly started = latch();
  readonly overdue = latch();
  readonly peaked = latch();
  readonly airlock = latch();
  readonly sluggish = latch();
  readonly stuck = latch();
  readonly terminal = latch();
  readonly rack = latch();
  readonly bottle = latch();
  readonly refermenting = latch();
  readonly rising = latch();
  readonly drifting = latch();
  stuckCold = false;
  frozen: FrozenState | null = null;

  /** Highest rate over a day so far in this segment, points a day. */
  maxRate = 0;
  /** Highest rate over each window that the peak is sought in. */
  private maxRates = new Map<number, { rate: number; se: number }>();
  maxFittedRate = 0;
  baseline: number | null = null;
  /** Lowest level of a quiet day in this segment, points: a ferment does not rise, a float that drifts does. */
  private lowest: number | null = null;
  /** Level on which the batch came to rest, points. */
  plateau: number | null = null;
  private noise = 0.5;
  private noiseHistory: number[] = [];
  private usualNoise: number | null = null;
  private frozenLooks = 0;
  private events: BatchEvent[];
  private eventsTaken = 0;
  private pendingRackings: number[] = [];
  private pendingLevels = false;
  private lines = new Map<number, Line | null>();
  private fitCache: { key: number; fit: CurveFit | null } | null = null;
  private tailCache: { at: number; tail: Tail | null } | null = null;
  private priorCache: { segment: Segment; prior: Normal } | null = null;

  constructor(
    readonly setup: BatchSetup,
    origin: Instant,
    events: readonly BatchEvent[],
  ) {
    this.track = new Track(setup, origin);
    this.events = [...events].sort((a, b) => a.at - b.at || a.kind.localeCompare(b.kind));
    this.og = setup.originalGravity === null ? null : pointsOf(setup.originalGravity);
    this.ogTold = this.og !== null;
    this.ogSd = this.ogTold ? 1 : 3;
    this.neck = setup.neck ?? null;
    this.segment = { from: 0, effectiveOg: this.og ?? 0, ogSd: this.ogSd, level: this.og, fruit: false, restarted: false };
  }

  /** Events that have become known; those behind the last look need a new watch. */
  hear(events: readonly BatchEvent[]): void {
    this.events = [...events].sort((a, b) => a.at - b.at || a.kind.localeCompare(b.kind));
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

  // Figures of the present look. Each is worked out at most once a look.

  line(window: number): Line | null {
    if (this.lines.has(window)) return this.lines.get(window)!;
    const from = Math.max(this.lookedAt - window, this.segment.restarted ? this.segment.from + 1 : -48);
    const line = this.lookedAt - from < 0.6 * window ? null : this.track.line(from, this.lookedAt);
    this.lines.set(window, line);
    return line;
  }

  /** Calibrated level now, points: the day's line at its end where the day is quiet, else the last six hours. */
  levelNow(): number | null {
    const line = this.line(24);
    if (line && Math.abs(line.slope) < 6) return this.track.calibrate(line.level + (line.slope / 24) * (this.lookedAt - line.middle));
    const raw = this.track.level(this.lookedAt - 6, this.lookedAt);
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
  private groundLevel(): number | null {
    const level = this.levelNow();
    return level === null || this.lowest === null ? level : Math.min(level, this.lowest + 0.7);
  }

  private noteLowest(): void {
    const line = this.line(24);
    const level = this.levelNow();
    if (!line || level === null || Math.abs(line.slope) > 2 || this.segment.fruit) return;
    if (this.lowest === null || level < this.lowest) this.lowest = level;
  }

  /** Highest gravity at which the batch may be done, points. */
  zoneTop(): number {
    const prior = this.fgPrior();
    return prior.mean + Math.max(1.6 * Math.hypot(prior.sd, this.track.calibrationSd(prior.mean)), 3);
  }

  /** Lowest gravity at which a batch that rests may be called stuck, points; between the two it is not known. */
  stuckFloor(): number {
    return Math.max(this.zoneTop() + 1.5, this.fgPrior().mean + 5.5);
  }

  /** The fitted curve; anew every 6 h to day 10, every 12 h to day 30, then once a day. */
  fit(): CurveFit | null {
    const step = this.lookedAt < 240 ? 6 : this.lookedAt < 720 ? 12 : 24;
    const at = Math.floor(this.lookedAt / step + 1e-9) * step;
    if (this.fitCache && this.fitCache.key === at) return this.fitCache.fit;
    const { segment } = this;
    if (segment.effectiveOg < 5) return null;
    const og: Normal = { mean: segment.level ?? segment.effectiveOg, sd: segment.restarted ? 2 : this.ogSd };
    const fit = fitSegment(this.setup, this.track, segment, at, this.fgPrior(), og);
    this.fitCache = { key: at, fit };
    return fit;
  }

  /** What is still to come by the end of the record alone: a quarter of the age, at least 3 and at most 10 days of it. */
  tail(): Tail | null {
    const now = Math.floor(this.lookedAt / TAIL_H + 1e-9) * TAIL_H;
    if (this.tailCache?.at !== now) {
      const { from, restarted } = this.segment;
      const age = restarted ? Math.max(72, now - from) : now;
      const window = Math.max(72, Math.min(240, 0.25 * age));
      const since = Math.max(now - window, restarted ? from + 24 : 0);
      this.tailCache = { at: now, tail: now - since < 66 ? null : this.track.tail(since, now, age) };
    }
    return this.tailCache.tail;
  }

  /** The tail where the fall is near its end; null before. */
  private tailNow(): Tail | null {
    const level = this.levelNow();
    const line = this.line(48);
    const ending = level !== null && this.peaked.on && line !== null && -line.slope < 3 && level < this.zoneTop() + 10;
    return ending ? this.tail() : null;
  }

  /**
   * Points still to fall, and how well that is known: near the end what the tail
   * shows, held against what the yeast's range leaves to be had; before that the
   * curve. The range counts little where the tail is clear.
   */
  remainingNow(): { value: number; sd: number } | null {
    const level = this.levelNow();
    if (level === null) return null;
    const tail = this.tailNow();
    if (!tail) {
      const fit = this.fit();
      return fit && { value: level - fit.parameters[1]!, sd: Math.hypot(fit.fgSd, 0.6) };
    }
    const prior = this.fgPrior();
    return held(
      { value: tail.remaining, sd: Math.hypot(tail.sd, 0.2) },
      { value: level - prior.mean, sd: Math.hypot(prior.sd, this.track.calibrationSd(level)) },
    );
  }

  remaining(): number | null {
    return this.remainingNow()?.value ?? null;
  }

  /** Expected final gravity, points. */
  expectedFg(): number | null {
    const left = this.remainingNow();
    const level = this.levelNow();
    return left === null || level === null ? null : level - left.value;
  }

  get age(): number {
    return this.lookedAt;
  }

  quietSinceAddition(hours: number, fruitHours: number): boolean {
    if (this.lastAddition === null) return true;
    return this.lookedAt - this.lastAddition > (this.lastAdditionFruit ? fruitHours : hours);
  }

  // One look.

  /** Takes in what was measured before `hour` and applies every rule once. */
  look(hour: number, readings: Reading[]): void {
    this.advance(hour, readings);
    this.watchSteps();
    this.watchFloat();
    if (this.og === null) this.guessOg();
    this.judge();
  }

  /** Moves to an hour without applying the rules: for the figures between two looks. */
  advance(hour: number, readings: Reading[]): void {
    this.lookedAt = hour;
    this.lines.clear();
    this.track.extend(readings, this.track.instantOf(hour));
    while (this.eventsTaken < this.events.length && this.track.hourOf(this.events[this.eventsTaken]!.at) <= hour) {
      this.take(this.events[this.eventsTaken]!);
      this.eventsTaken += 1;
    }
  }

  private take(event: BatchEvent): void {
    const hour = this.track.hourOf(event.at);
    switch (event.kind) {
      case 'rack':
        this.pendingRackings.push(hour);
        break;
      case 'neck':
        this.neck = event.neck ?? this.neck;
        this.neckSince = hour;
        break;
      case 'stabilise':
        this.stabilised = true;
        break;
      case 'addition':
      case 'top_up':
        this.add(event, hour);
        break;
      case 'reading':
      case 'note':
        if (event.gravity) this.pinTo(hour, pointsOf(event.gravity));
        break;
    }
  }

  private pinTo(hour: number, points: number): void {
    this.handReadings.push({ hour, points });
    if (this.og === null && hour < 24) {
      this.og = points;
      this.ogSd = 1;
      this.segment = { ...this.segment, effectiveOg: points, level: points, ogSd: 1 };
    }
    const raw = this.track.level(hour - 4, hour + 2) ?? this.track.level(hour - 12, hour + 1);
    if (raw === null) {
      this.lastHand = { hour, points, miss: 0 };
      return;
    }
    if (this.lastHand) this.track.loosen((hour - this.lastHand.hour) / 24);
    else if (hour > 24) this.track.loosen(hour / 24);
    const line = this.track.line(hour - 12, hour + 1);
    const slack = 0.7 + (line ? Math.abs(line.slope) * 0.08 : 0.3);
    const miss = this.track.pin(raw, points, slack);
    this.lastHand = { hour, points, miss };
    this.fitCache = null;
  }

  private add(event: BatchEvent, hour: number): void {
    const volume = this.setup.volumeL;
    let effective = this.segment.effectiveOg || (this.og ?? 0);
    let level = this.track.level(hour - 6, hour);
    level = level === null ? null : this.track.calibrate(level);
    if (event.sugarG) {
      const points = (POINTS_PER_G_PER_L * event.sugarG) / volume;
      effective += points;
      if (level !== null) level += points;
    }
    if (event.fruitG) effective += (POINTS_PER_G_PER_L * event.fruitG * FRUIT_SUGAR) / volume;
    if (event.volumeL) {
      const share = event.volumeL / (volume + event.volumeL);
      const other = event.gravity ? pointsOf(event.gravity) : 0;
      effective += share * (other - effective);
      if (level !== null) level += share * (other - level);
    }
    this.restart(hour, effective, level, Boolean(event.fruitG));
  }

  private restart(hour: number, effectiveOg: number, level: number | null, fruit: boolean): void {
    const sweetened = this.terminal.on || this.bottle.on;
    this.lastAddition = hour;
    this.lastAdditionFruit = fruit;
    this.segment = { from: hour, effectiveOg, ogSd: Math.hypot(this.segment.ogSd, 1), level, fruit: fruit || this.segment.fruit, restarted: true };
    this.plateau = sweetened ? level : null;
    this.lowest = null;
    this.maxRate = 0;
    this.maxRates.clear();
    this.maxFittedRate = 0;
    this.fitCache = null;
    this.tailCache = null;
    this.pendingLevels = true;
    this.sweetened = sweetened;
    for (const one of [this.peaked, this.airlock, this.sluggish, this.stuck, this.terminal, this.rack, this.bottle]) clear(one);
  }

  /** Sugar went in after the batch had come to rest. */
  sweetened = false;

  private guessOg(): void {
    // Only a float that was there from the beginning can stand in for the hydrometer.
    const { bins } = this.track;
    if (bins.n < 3 || bins.t[0]! > 24) return;
    const level = this.track.level(bins.t[0]! - 1, bins.t[0]! + 6);
    if (level === null || this.lookedAt < bins.t[0]! + 3) return;
    this.og = Math.max(level, this.og ?? level);
    this.segment = { ...this.segment, effectiveOg: this.og, level: this.og, ogSd: 3 };
  }

  private watchSteps(): void {
    const { track } = this;
    this.pendingRackings = this.pendingRackings.filter((hour) => {
      if (this.lookedAt < hour + 7.5) return true;
      const step = track.stepAt(hour);
      if (step !== null && Math.abs(step) > 0.4 && Math.abs(step) < 15) {
        track.shift(hour, step, 'racking');
        this.lowest = null;
        this.lines.clear();
        this.fitCache = null;
        this.tailCache = null;
      }
      return false;
    });
    if (this.pendingLevels && this.lookedAt >= this.segment.from + 7) {
      const level = track.level(this.segment.from + 1, this.segment.from + 7);
      if (level !== null) this.segment = { ...this.segment, level: track.calibrate(level) };
      this.pendingLevels = false;
      if (this.sweetened) this.plateau = this.segment.level;
    }
    const quietFrom = Math.max(this.segment.from, this.frozen ? this.lookedAt : 0);
    const sugar = track.findSugar(this.lookedAt, quietFrom);
    if (sugar && !this.nearEvent(sugar.hour)) {
      this.restart(sugar.hour, this.segment.effectiveOg + sugar.points, null, false);
      this.lines.clear();
      return;
    }
    const step = track.findStep(this.lookedAt, quietFrom);
    if (step && !this.nearEvent(step.hour)) {
      if (step.points > 5.5) this.restart(step.hour, this.segment.effectiveOg + step.points, null, false);
      else {
        track.shift(step.hour, step.points, 'moved');
        this.lowest = null;
      }
      this.lines.clear();
      this.fitCache = null;
      this.tailCache = null;
    }
  }

  private nearEvent(hour: number): boolean {
    return this.events.some(
      (event) => (event.kind === 'rack' || event.kind === 'addition' || event.kind === 'top_up') && Math.abs(this.track.hourOf(event.at) - hour) < 4,
    );
  }

  private watchFloat(): void {
    const index = this.track.noiseIndex(this.lookedAt);
    if (index === null) return;
    const usual = this.usualNoise;
    const limit = this.track.spacing < 0.75 ? 0.22 : 0.18;
    if (this.frozen) {
      if (index > 0.62 * this.frozen.usual) {
        this.track.mask(this.frozen.since, this.lookedAt - 3);
        this.frozen = null;
        this.frozenLooks = 0;
        this.lines.clear();
        this.tailCache = null;
      } else {
        this.frozen = { ...this.frozen, index };
        this.track.mask(this.frozen.since, this.lookedAt);
        this.lines.clear();
      }
      return;
    }
    if (usual !== null && usual > 0.1 && this.track.resolution() < 0.6 * usual && index < limit * usual) {
      this.frozenLooks += 1;
      if (this.frozenLooks >= 2 || index < 0.12 * usual) {
        const span = this.track.spacing < 0.75 ? 8 : 14;
        this.frozen = { since: this.lookedAt - span - (this.frozenLooks - 1) * LOOK_H, index, usual };
        this.track.mask(this.frozen.since, this.lookedAt);
        this.lines.clear();
      }
    } else {
      this.frozenLooks = 0;
      this.noiseHistory.push(index);
      if (this.noiseHistory.length > 120) this.noiseHistory.shift();
      const n = this.noiseHistory.length;
      if (n === 6 || (n > 6 && Math.round(this.lookedAt / LOOK_H) % 4 === 0)) this.usualNoise = median(this.noiseHistory);
    }
  }

  /** Drop since the pitch, points; null before there is a baseline. */
  dropSoFar(): number | null {
    const now = this.track.level(this.lookedAt - 6, this.lookedAt);
    return now === null || this.baseline === null ? null : this.baseline - now;
  }

  private judge(): void {
    const hour = this.lookedAt;
    this.judgeStart(hour);
    if (this.started.on && !this.frozen) {
      this.noteLowest();
      this.judgePeak(hour);
      this.judgeAirlock(hour);
      this.judgeEnd(hour);
      this.judgeStall(hour);
      this.judgeRefermentation(hour);
    }
    const day = this.line(48);
    hold(this.rising, hour, day !== null && day.slope - 1.64 * day.se > 0.25, 2, day !== null && day.slope - 1.64 * day.se <= 0);
    const settled = this.quietSinceAddition(48, 240);
    hold(this.drifting, hour, this.rising.on && settled && !this.segment.fruit && hour > 96, 8, !this.rising.on);
    if (this.lastHand && Math.abs(this.lastHand.miss) > 4 && hour - this.lastHand.hour < 168 && this.lastHand.hour > 12) {
      hold(this.drifting, hour, true, 1, false);
    }
  }

  private judgeStart(hour: number): void {
    const { track } = this;
    if (this.started.on) return;
    const now = track.level(hour - 6, hour);
    if (now === null) return;
    const first = track.bins.n > 0 ? track.bins.t[0]! : hour;
    if (this.baseline === null) {
      if (hour < first + 5.5) return;
      this.baseline = track.level(first - 1, first + 6) ?? now;
      if (this.ogTold && this.og !== null && first < 12 && this.baseline > this.og - 5) {
        track.pin(this.baseline, this.og, 0.7);
      }
    } else if (now > this.baseline) this.baseline = Math.min(now, this.baseline + 0.15);
    const line = this.line(12);
    if (line) this.noise = Math.max(0.25, Math.min(1.2, line.sigma));
    const fall = this.baseline - now;
    const limit = Math.max(1.4, 2.25 * this.noise);
    // A float put in late, or silent at first, may find the fall well on its way.
    const late = this.og !== null && this.ogTold && this.og - now > (first > 12 ? 5 : 8);
    const falling = line !== null && line.slope + 0.8 * line.se < 0;
    hold(this.started, hour, (fall > limit && falling) || late, fall > Math.max(5, 5 * this.noise) ? 1 : 2, false);
    hold(this.overdue, hour, hour >= OVERDUE_H[this.setup.kind] && fall < 2.5 && !this.started.on, 1, this.started.on);
  }

  private judgePeak(hour: number): void {
    if (this.peaked.on) return;
    // A drift or the first small fall has no peak.
    const early = this.progress() < 0.12;
    let below = false;
    for (const window of [12, 18, 24, 36]) {
      const line = this.line(window);
      if (!line) continue;
      const rate = -line.slope;
      const most = this.maxRates.get(window);
      if (rate > 1 && (!most || rate > most.rate)) this.maxRates.set(window, { rate, se: line.se });
      else if (most && most.rate - rate > Math.max(0.06 * most.rate, 1.6 * Math.hypot(line.se, most.se))) below = true;
      if (window === 24 && rate > this.maxRate) this.maxRate = rate;
    }
    let fitted = false;
    const fit = Math.floor(hour) % 12 === 0 ? this.fit() : null;
    if (fit) {
      const tau = this.track.tauAt(hour) - this.track.tauAt(this.segment.from);
      const now = fit.curve.rate(tau) * this.track.warmthAt(hour);
      this.maxFittedRate = Math.max(this.maxFittedRate * 0.98, now);
      fitted = now < 0.8 * this.maxFittedRate && fit.curve.share(tau) < 0.78;
    }
    hold(this.peaked, hour, (below || fitted) && !early, 2, false);
  }

  swapGas(): number {
    return swapGasLPerH(this.setup.kind, this.setup.volumeL, this.setup.vesselL);
  }

  /** Gas, L/h, if a cold vessel were warm again: its best pace in the measure of what is left. */
  private gasIfWarmed(): number {
    const level = this.levelNow();
    const { mean } = this.fgPrior();
    const whole = this.segment.effectiveOg - mean;
    return level === null || whole <= 0 ? 0 : gasLPerH((this.maxRate * (level - mean)) / whole, this.setup.volumeL);
  }

  private judgeAirlock(hour: number): void {
    if (!this.peaked.on || (this.airlock.on && this.terminal.on)) return;
    // Any window bounds the present rate from above while it falls; the sharpest one wins.
    let upper = Number.POSITIVE_INFINITY;
    let lower = Number.NEGATIVE_INFINITY;
    for (const window of [12, 18, 24]) {
      const line = this.line(window);
      if (!line) continue;
      if (line.slope > 1.5) continue;
      upper = Math.min(upper, gasLPerH(-line.slope + 1.28 * line.se, this.setup.volumeL));
      if (window === 12 || lower === Number.NEGATIVE_INFINITY) lower = gasLPerH(-line.slope - 1.64 * line.se, this.setup.volumeL);
    }
    const limit = this.swapGas();
    // A cold vessel with sugar left is quiet only until somebody warms it.
    const waiting = this.coldNow() && this.gasIfWarmed() > limit;
    hold(this.airlock, hour, this.peaked.on && upper < limit && !waiting, 3, lower > 1.3 * limit || waiting);
  }

  private judgeEnd(hour: number): void {
    const level = this.levelNow();
    const line24 = this.line(24);
    const line48 = this.line(48);
    const lower48 = line48 ? -line48.slope - 1.64 * line48.se : null;
    const upper48 = line48 ? -line48.slope + 1.64 * line48.se : null;
    const ground = this.groundLevel();
    const inside = ground !== null && ground <= this.zoneTop() && this.peaked.on;
    // The tail is only asked where the fall is slow enough for it to matter.
    const open = !this.terminal.on || !this.bottle.on;
    const slow = open && inside && upper48 !== null && upper48 < 1.2;
    const left = slow && this.tail() ? this.remainingNow() : null;
    const most = left && left.value + 1.28 * left.sd;

    const done = most !== null && most < TERMINAL_POINTS && upper48! < 0.9 && this.quietSinceAddition(60, 120);
    const wasDone = this.terminal.on;
    hold(this.terminal, hour, done, 2, (lower48 !== null && lower48 > 0.8) || this.refermenting.on);
    if (this.terminal.on && !wasDone) this.plateau = level;

    let rackable = this.terminal.on;
    if (!rackable && inside && this.quietSinceAddition(60, 120) && line24 && -line24.slope < 2.5) {
      const end = this.tail();
      const likely = end ? end.likely : this.remaining();
      rackable = likely !== null && likely < RACK_POINTS;
    }
    hold(this.rack, hour, rackable, 2, line24 !== null && -line24.slope - 1.64 * line24.se > 3);

    const still =
      most !== null &&
      most < BOTTLE_POINTS &&
      upper48! < 0.5 &&
      !this.rising.on &&
      !this.refermenting.on &&
      this.quietSinceAddition(120, 240);
    hold(this.bottle, hour, still, 4, (lower48 !== null && lower48 > 0.5) || this.rising.on || this.refermenting.on);
  }

  private judgeStall(hour: number): void {
    const level = this.groundLevel();
    if (level === null) return;
    const prior = this.fgPrior();
    const limit = this.stuckFloor();
    const line48 = this.line(48);
    const slow = (line: Line | null, rate: number, upper: number): boolean =>
      line !== null && -line.slope < rate && -line.slope + 1.64 * line.se < upper;
    const settled = this.quietSinceAddition(60, 120);
    const begun = this.progress(level) > 0.12 || hour - (this.started.since ?? hour) > 96;
    const flat = level > limit && settled && begun && (slow(line48, 0.5, 0.75) || slow(this.line(72), 0.35, 0.5));
    const moving =
      this.stuck.on &&
      [8, 12, 24].some((window) => {
        const line = this.line(window);
        return line !== null && -line.slope - (window === 24 ? 1.64 : 2.5) * line.se > 1;
      });
    hold(this.stuck, hour, flat, 4, moving || level < limit);
    if (this.stuck.on) this.stuckCold = this.coldNow();

    const rate = line48 ? -line48.slope : null;
    let crawling = false;
    if (this.peaked.on && hour > 48 && line48 && rate !== null && rate + line48.se < 2 && level > prior.mean + 9 && !this.stuck.on && settled) {
      const end = this.hoursToEnd();
      const fg = this.expectedFg();
      crawling = (end !== null && end > 144) || (fg !== null && fg > this.zoneTop());
    }
    hold(this.sluggish, hour, crawling, 4, (rate !== null && rate > 2.6) || level < prior.mean + 6 || this.stuck.on);
  }

  coldNow(): boolean {
    const now = this.track.temperature(this.lookedAt - 12, this.lookedAt);
    if (now === null) return false;
    if (this.setup.temperature && now < this.setup.temperature.minC - 0.4) return true;
    const before = this.track.temperature(this.lookedAt - 96, this.lookedAt - 48);
    return before !== null && before - now > 4;
  }

  private judgeRefermentation(hour: number): void {
    if (this.plateau === null) return;
    const level = this.levelNow();
    if (level === null) return;
    if (level > this.plateau && !this.sweetened) this.plateau = level;
    // A batch that was sweetened may well work again; any other falls for good reason only when it is plain.
    const drop = this.sweetened ? 1.5 : 2.5;
    const pace = this.sweetened ? 0.25 : 0.5;
    const falls = [24, 48].some((window) => {
      const line = this.line(window);
      return line !== null && line.slope + 2 * line.se < -pace;
    });
    const line48 = this.line(48);
    const still = line48 !== null && -line48.slope + line48.se < 0.3 && Math.abs(line48.slope) < 0.15;
    const wasOn = this.refermenting.on;
    hold(this.refermenting, hour, level < this.plateau - drop && falls && !this.stabilised, 3, still || this.stabilised);
    if (wasOn && !this.refermenting.on) this.plateau = level;
  }

  /** Hours until the gravity is within a point of its end: from the curve, near the end from the tail as well; null without either. */
  hoursToEnd(): number | null {
    const fit = this.fit();
    const tail = this.tailNow();
    const byTail = tail && (tail.likely <= 1 ? 0 : (24 * Math.log(tail.likely)) / tail.pace);
    if (!fit) return byTail;
    const { curve } = fit;
    const drop = curve.og - curve.fg;
    if (drop <= 1) return 0;
    const tauNow = this.track.tauAt(this.lookedAt) - this.track.tauAt(this.segment.from);
    const byCurve = Math.max(0, ((curve.tauOfShare(1 / drop) - tauNow) / this.track.warmthAt(this.lookedAt)) * 24);
    // Spans of time spread evenly in their logarithm; half a day keeps it tame near nought.
    return byTail === null ? byCurve : Math.sqrt((byCurve + 12) * (byTail + 12)) - 12;
  }

  /** Share of the whole expected fall that is done, 0 to 1. */
  progress(level = this.levelNow()): number {
    const fg = this.expectedFg() ?? this.fgPrior().mean;
    const { effectiveOg } = this.segment;
    if (level === null || effectiveOg - fg < 1) return 0;
    return Math.min(1, Math.max(0, (effectiveOg - level) / (effectiveOg - fg)));
  }

  /** Present fall, points a day: the shortest window that is sharp enough, blended with the curve. */
  rateNow(): { value: number; sd: number } | null {
    let chosen: Line | null = null;
    for (const window of [8, 12, 24, 48, 72]) {
      const line = this.line(window);
      if (!line) continue;
      chosen = line;
      if (line.se <= Math.max(0.5, 0.15 * Math.abs(line.slope))) break;
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
}

/** Two independent estimates as one, weighted by their variances. */
function held(a: { value: number; sd: number }, b: { value: number; sd: number }): { value: number; sd: number } {
  const wa = 1 / a.sd ** 2;
  const wb = 1 / b.sd ** 2;
  return { value: (wa * a.value + wb * b.value) / (wa + wb), sd: Math.sqrt(1 / (wa + wb)) };
}

function clear(one: Latch): void {
  one.on = false;
  one.since = null;
  one.run = 0;
}
