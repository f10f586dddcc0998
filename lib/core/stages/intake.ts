import type { BatchEvent, BatchSetup, Instant, Reading } from '../types';
import { POINTS_PER_G_PER_L } from '../gravity/extract';
import { median } from '../series/order';
import { findStep, findSugar, stepAt } from '../series/steps';
import { pointsOf } from '../units/convert';
import { HAND_SD } from './figures';
import { clear } from './latch';
import { Outlook } from './outlook';

/** Hours between two looks. The grid is anchored at the pitch, so that shifting all times shifts all answers. */
export const LOOK_H = 3;
/** Share of fruit that is sugar where nobody says. Common practice. */
const FRUIT_SUGAR = 0.1;

/** Looks whose noise tells of the usual one. */
const NOISES = 120;

/** Takes in readings and events, and keeps the record straight: additions, hydrometer readings, steps, a frozen float. */
export class Intake extends Outlook {
  /** Highest rate over each window that the peak is sought in. */
  protected readonly maxRates = new Map<number, { rate: number; se: number }>();
  /** The last noise indices, in no order, and how many there have been. */
  private readonly noises = new Float64Array(NOISES);
  private noisesTaken = 0;
  private usualNoise: number | null = null;
  private frozenLooks = 0;
  private events: BatchEvent[] = [];
  private eventsTaken = 0;
  private pendingRackings: number[] = [];
  private pendingLevels = false;

  constructor(setup: BatchSetup, origin: Instant, events: readonly BatchEvent[]) {
    super(setup, origin);
    this.hear(events);
  }

  /** Events that have become known; those behind the last look need a new watch. */
  hear(events: readonly BatchEvent[]): void {
    this.events = [...events].sort((a, b) => a.at - b.at || a.kind.localeCompare(b.kind));
  }

  /** Moves to an hour without applying the rules: for the figures between two looks. */
  advance(hour: number, readings: Reading[]): void {
    this.lookedAt = hour;
    this.forget();
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
        if (event.gravity) this.pinTo(hour, pointsOf(event.gravity), Math.max(HAND_SD, event.gravitySd ?? HAND_SD));
        break;
    }
  }

  private pinTo(hour: number, points: number, sd: number): void {
    this.handReadings.push({ hour, points, sd });
    if (this.og === null && hour < 24) {
      this.og = points;
      this.ogSd = Math.max(1, sd);
      this.segment = { ...this.segment, effectiveOg: points, level: points, ogSd: this.ogSd };
    }
    const raw = this.track.level(hour - 4, hour + 2) ?? this.track.level(hour - 12, hour + 1);
    if (raw === null) {
      this.lastHand = { hour, points, miss: 0 };
      return;
    }
    if (this.lastHand) this.track.loosen((hour - this.lastHand.hour) / 24);
    else if (hour > 24) this.track.loosen(hour / 24);
    const line = this.track.line(hour - 12, hour + 1);
    const slack = sd + (line ? Math.abs(line.slope) * 0.08 : 0.3);
    const miss = this.track.pin(raw, points, slack);
    this.lastHand = { hour, points, miss };
    this.recordChanged();
  }

  private add(event: BatchEvent, hour: number): void {
    const volume = this.setup.volumeL;
    let effective = this.segment.effectiveOg || (this.og ?? 0);
    let level = this.track.level(hour - 6, hour);
    level = level === null ? null : this.track.calibrate(level);
    if (this.terminal.on || this.bottle.on) this.restedAt = level;
    if (event.sugarG) {
      const points = (POINTS_PER_G_PER_L * event.sugarG) / volume;
      effective += points;
      if (level !== null) level += points;
    }
    if (event.fruitG) effective += (POINTS_PER_G_PER_L * event.fruitG * FRUIT_SUGAR) / volume;
    if (event.volumeL) {
      const share = event.volumeL / (volume + event.volumeL);
      const other = event.gravity ? pointsOf(event.gravity) : 0;
      const otherOg = event.originalGravity ? pointsOf(event.originalGravity) : other;
      effective += share * (otherOg - effective);
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
    this.pendingLevels = true;
    this.sweetened = sweetened;
    this.recordChanged();
    for (const one of [this.peaked, this.airlock, this.sluggish, this.stuck, this.terminal, this.ended, this.rack, this.bottle]) clear(one);
  }

  protected guessOg(): void {
    // Only a float that was there from the beginning can stand in for the hydrometer.
    const { bins } = this.track;
    if (bins.n < 3 || bins.t[0]! > 24) return;
    const level = this.track.level(bins.t[0]! - 1, bins.t[0]! + 6);
    if (level === null || this.lookedAt < bins.t[0]! + 3) return;
    this.og = Math.max(level, this.og ?? level);
    this.segment = { ...this.segment, effectiveOg: this.og, level: this.og, ogSd: 3 };
  }

  protected watchSteps(): void {
    const { track } = this;
    this.pendingRackings = this.pendingRackings.filter((hour) => {
      if (this.lookedAt < hour + 7.5) return true;
      const step = stepAt(track, hour);
      if (step !== null && Math.abs(step) > 0.4 && Math.abs(step) < 15) {
        track.shift(hour, step, 'racking');
        this.lowest = null;
        this.recordChanged();
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
    const sugar = findSugar(track, this.lookedAt, quietFrom);
    if (sugar && !this.nearEvent(sugar.hour)) {
      this.restart(sugar.hour, this.segment.effectiveOg + sugar.points, null, false);
      this.forget();
      return;
    }
    const step = findStep(track, this.lookedAt, quietFrom);
    if (step && !this.nearEvent(step.hour)) {
      if (step.points > 5.5) this.restart(step.hour, this.segment.effectiveOg + step.points, null, false);
      else {
        track.shift(step.hour, step.points, 'moved');
        this.lowest = null;
      }
      this.recordChanged();
    }
  }

  private nearEvent(hour: number): boolean {
    return this.events.some(
      (event) => (event.kind === 'rack' || event.kind === 'addition' || event.kind === 'top_up') && Math.abs(this.track.hourOf(event.at) - hour) < 4,
    );
  }

  protected watchFloat(): void {
    const index = this.track.noiseIndex(this.lookedAt);
    if (index === null) return;
    const usual = this.usualNoise;
    const limit = this.track.spacing < 0.75 ? 0.22 : 0.18;
    if (this.frozen) {
      if (index > 0.62 * this.frozen.usual) {
        this.track.mask(this.frozen.since, this.lookedAt - 3);
        this.frozen = null;
        this.frozenLooks = 0;
        this.recordChanged();
      } else {
        this.frozen = { ...this.frozen, index };
        this.track.mask(this.frozen.since, this.lookedAt);
        this.recordChanged();
      }
      return;
    }
    if (usual !== null && usual > 0.1 && index < limit * usual && this.track.resolution() < 0.6 * usual) {
      this.frozenLooks += 1;
      if (this.frozenLooks >= 2 || index < 0.12 * usual) {
        const span = this.track.spacing < 0.75 ? 8 : 14;
        this.frozen = { since: this.lookedAt - span - (this.frozenLooks - 1) * LOOK_H, index, usual };
        this.track.mask(this.frozen.since, this.lookedAt);
        this.recordChanged();
      }
    } else {
      this.frozenLooks = 0;
      this.noises[this.noisesTaken % NOISES] = index;
      this.noisesTaken += 1;
      const n = this.noisesTaken;
      if (n === 6 || (n > 6 && Math.round(this.lookedAt / LOOK_H) % 4 === 0)) this.usualNoise = median(this.noises.subarray(0, n));
    }
  }
}
