import type { BatchSetup, Reading } from '../types';
import type { Line } from '../series/line';
import { Ending } from './ending';
import { clear, hold, never } from './latch';

export { LOOK_H } from './intake';

/** Hours after the pitch at which a start is overdue. */
export const OVERDUE_H: Record<BatchSetup['kind'], number> = { beer: 48, cider: 72, mead: 72, wine: 72 };

/** Degrees outside its range from which it is too cold or too warm. */
export const TEMPERATURE_MARGIN_C = 0.4;

/** Hours between two judgements of a batch that rests ready for bottles, and how far its level may move meanwhile, points (ours). */
const REST_LOOK_H = 12;
const REST_POINTS = 0.8;

/** Share of what the curve says is left that counts against the yeast's range (ours): early it may see too much. */
const CURVE_SURE = 0.75;

/** Rise over a week, points a day, under which a float that drifted is at rest again (ours). */
const STILL_CLIMB = 0.02;

/** Points above its lowest that a float stands at least which has climbed for a week (ours: at the limit it climbs one in it). */
const CLIMB_POINTS = 0.4;

/** Points below the lowest level of a stall at which one is over: a level at the limit must not flicker (dead band as in ANSI/ISA-18.2; its width is ours). */
const STUCK_BAND = 1;

/** The rules, one look every three hours: what turns each statement on, and what turns it off again. */
export class Watch extends Ending {
  private noise = 0.5;
  /** Looks in a row at which a stuck batch seemed to fall within hours. */
  private stirs = 0;
  /** Level at the last judgement, points, of a batch that was ready for bottles. */
  private restLevel: number | null = null;

  /** Takes in what was measured before `hour` and applies every rule once. */
  look(hour: number, readings: Reading[]): void {
    this.advance(hour, readings);
    this.watchSteps();
    this.watchFloat();
    if (this.og === null) this.guessOg();
    this.judgeTemperature(hour);
    this.ruling = true;
    if (!this.restsStill(hour)) this.judge();
    this.ruling = false;
  }

  /** Out of its range by more than the margin, until it is back inside: at the limit it must not flicker. */
  private judgeTemperature(hour: number): void {
    const range = this.setup.temperature;
    const now = range && this.temperatureNow();
    if (!range || now === null) return;
    hold(this.tooCold, hour, () => now < range.minC - TEMPERATURE_MARGIN_C, 1, () => now >= range.minC);
    hold(this.tooWarm, hour, () => now > range.maxC + TEMPERATURE_MARGIN_C, 1, () => now <= range.maxC);
  }

  /** Ready for bottles, nothing about to begin and its level as it was: there is nothing to weigh at every look. */
  private restsStill(hour: number): boolean {
    if (this.restLevel === null || !this.bottle.on || this.frozen || hour % REST_LOOK_H === 0) return false;
    if ([this.rising, this.drifting, this.refermenting, this.stuck, this.sluggish].some((one) => one.on || one.run > 0)) return false;
    const level = this.track.level(hour - 6, hour);
    return level !== null && Math.abs(level - this.restLevel) < REST_POINTS;
  }

  private judge(): void {
    const hour = this.lookedAt;
    this.judgeStart(hour);
    this.noteCold(hour);
    if (this.started.on && !this.frozen) {
      this.noteLowest();
      this.judgePeak(hour);
      this.judgeAirlock(hour);
      this.judgeEnd(hour);
      this.judgeStall(hour);
      this.judgeRefermentation(hour);
    } else if (this.started.on) {
      this.judgePeak(hour);
      this.judgeAirlock(hour);
    }
    if (this.started.on) this.judgeUnseen(hour);
    const day = this.line(48);
    hold(this.rising, hour, () => day !== null && day.slope - 1.64 * day.se > 0.25, 2, () => day !== null && day.slope - 1.64 * day.se <= 0);
    const mayDrift = this.quietSinceAddition(48, 240) && !this.segment.fruit && hour > 96;
    hold(this.drifting, hour, () => mayDrift && ((this.rising.on && !this.stuck.on) || (day !== null && day.slope > 0 && this.climbs(168))), 8, () => !this.rising.on && !this.climbsStill());
    if (this.lastHand && Math.abs(this.lastHand.miss) > 4 && hour - this.lastHand.hour < 168 && this.lastHand.hour > 12) {
      hold(this.drifting, hour, () => true, 1, never);
    }
    this.restLevel = this.bottle.on ? this.track.level(hour - 6, hour) : null;
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
    hold(this.started, hour, () => (fall > limit && falling) || late, fall > Math.max(5, 5 * this.noise) ? 1 : 2, never);
    hold(this.overdue, hour, () => hour >= OVERDUE_H[this.setup.kind] && fall < 2.5 && !this.started.on, 1, () => this.started.on);
  }

  private noteLowest(): void {
    const line = this.line(24);
    const level = this.levelNow();
    if (!line || level === null || Math.abs(line.slope) > 2 || this.segment.fruit) return;
    if (this.lowest === null || level < this.lowest) this.lowest = level;
  }

  /** The gravity climbs, which a ferment does not: what is seen is the float. */
  private climbs(window: 72 | 168): boolean {
    // What has climbed for a week stands well above the lowest it was seen at: where it does not, the week need not be asked.
    if (window === 168 && !this.standsAbove(CLIMB_POINTS)) return false;
    const line = this.line(window);
    return line !== null && line.slope - 1.64 * line.se > (window === 72 ? 0.12 : 0.06);
  }

  /** Its level is so many points above the lowest of its quiet days, or none of them is known. */
  private standsAbove(points: number): boolean {
    const level = this.levelNow();
    return level === null || this.lowest === null || level - this.lowest > points;
  }

  /** A float that was seen to climb drifts on until its week has come to rest: at the limit it must not flicker. */
  private climbsStill(): boolean {
    const week = this.drifting.on ? this.line(168) : null;
    return week !== null && week.slope > STILL_CLIMB;
  }

  private judgeStall(hour: number): void {
    if (this.sweetHeld()) {
      clear(this.stuck);
      clear(this.sluggish);
      return;
    }
    const level = this.groundLevel();
    if (level === null) return;
    const limit = this.stuckFloor();
    // A few hours are soon deceived by noise: they must say so twice.
    this.stirs = this.stuck.on && this.falls(8, 2.5) ? this.stirs + 1 : 0;
    const settled = this.quietSinceAddition(60, 120);
    const wasStuck = this.stuck.on;
    // A few days' climb keeps from calling it stuck, but only a float that has drifted takes it back: about a level that stands a float swings.
    hold(
      this.stuck,
      hour,
      () => level > limit && settled && this.liesFlat(level) && !this.mayClimb(),
      3,
      () => level < limit - STUCK_BAND || this.drifting.on || ((this.falls(24, 1.64) || this.stirs > 1) && this.belowStall(level)),
    );
    if (this.stuck.on) this.stuckCold = this.coldNow();
    // What begins to creep again is slow at once, and not as it should be for some looks.
    const resumed = wasStuck && !this.stuck.on;

    const line48 = this.line(48);
    const rate = line48 ? -line48.slope : null;
    const slow = hour > 48 && line48 !== null && -line48.slope + line48.se < 2.2 && !this.stuck.on && !this.drifting.on && this.peaked.on;
    hold(
      this.sluggish,
      hour,
      () => slow && this.quietSinceAddition(60, 96) && !this.quickens() && this.leavesAtLeast(7.5, level) && this.crawls(-line48.slope, level) && !this.mayClimb(),
      resumed ? 1 : 3,
      () => rate === null || rate > 2.6 || !this.peaked.on || this.stuck.on || this.drifting.on || !this.leavesAtLeast(5, level),
    );
  }

  /** Two or three days that hardly fall, of a batch that has fallen before. */
  private liesFlat(level: number): boolean {
    const two = this.line(48);
    // Two days that surely fall are not outweighed by a third that did not.
    if (two && -two.slope - 1.64 * two.se > 0.5) return false;
    if (!slowerThan(two, 0.5, 0.75) && !slowerThan(this.line(72), 0.35, 0.5)) return false;
    return this.lookedAt - (this.started.since ?? this.lookedAt) > 96 || this.progress(level) > 0.12;
  }

  /** So many points are left by the yeast's range, or by the curve where that says more. What has come to its end has said so already. */
  private leavesAtLeast(points: number, level: number): boolean {
    if (level - this.fgPrior().mean >= points) return true;
    return !this.terminal.on && CURVE_SURE * (this.leftOnCurve()?.value ?? 0) >= points;
  }

  /** At this pace, or by its curve, it has long to go, or will end above its range. */
  private crawls(rate: number, level: number): boolean {
    if (this.leavesAtLeast(6 * Math.max(rate, 0.3), level)) return true;
    const end = this.hoursToEnd();
    if (end !== null && end > 130) return true;
    const fg = this.expectedFg();
    return fg !== null && fg > this.zoneTop();
  }

  /** The float may be climbing: what stands still by it does not. */
  private mayClimb(): boolean {
    return this.drifting.on || this.climbs(72) || this.climbs(168);
  }

  /** It falls by more than a point a day, so many standard errors beyond doubt. */
  private falls(window: 8 | 24, sure: number): boolean {
    const line = this.line(window);
    return line !== null && -line.slope - sure * line.se > 1;
  }

  /** Below where it stood: what only swings about its level has not begun to fall. */
  private belowStall(level: number): boolean {
    const stood = this.stuck.since === null ? null : this.track.level(this.stuck.since - 48, this.lookedAt - 24);
    return stood === null || level < this.track.calibrate(stood) - STUCK_BAND;
  }

  private judgeRefermentation(hour: number): void {
    if (this.plateau === null) return;
    const level = this.levelNow();
    if (level === null) return;
    if (level > this.plateau && !this.sweetened) this.plateau = level;
    // A batch that was sweetened may well work again; any other falls for good reason only when it is plain.
    const drop = this.sweetened ? 1.5 : 2.5;
    const pace = this.sweetened ? 0.25 : 0.5;
    const line48 = this.line(48);
    const still = line48 !== null && -line48.slope + line48.se < 0.3 && Math.abs(line48.slope) < 0.15;
    const wasOn = this.refermenting.on;
    hold(this.refermenting, hour, () => !this.stabilised && level < this.plateau! - drop && this.fallsBy(pace), 3, () => this.stabilised || still);
    if (wasOn && !this.refermenting.on) this.plateau = level;
  }

  /** The last hours fall faster than what is called slow: a batch that was cold works again before two days show it. */
  private quickens(): boolean {
    return [12, 24].some((window) => {
      const line = this.line(window);
      return line !== null && -line.slope - 1.28 * line.se > 2.2;
    });
  }

  /** A day or two fall faster than so many points a day, beyond doubt. */
  private fallsBy(pace: number): boolean {
    return [24, 48].some((window) => {
      const line = this.line(window);
      return line !== null && line.slope + 2 * line.se < -pace;
    });
  }
}

function slowerThan(line: Line | null, rate: number, upper: number): boolean {
  return line !== null && -line.slope < rate && -line.slope + 1.64 * line.se < upper;
}
