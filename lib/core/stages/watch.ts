import type { BatchSetup, Reading } from '../types';
import { gasLPerH } from '../gas/gas';
import type { Line } from '../series/line';
import { Intake } from './intake';
import { hold } from './latch';

export { LOOK_H } from './intake';

/** Points that may still come, nine times in ten, when a batch may be racked, when it is called finished, and when it may be bottled. */
export const RACK_POINTS = 4.4;
export const TERMINAL_POINTS = 1.6;
export const BOTTLE_POINTS = 1;
/** Fall, points a day, under which it may be racked. */
export const RACK_PACE = 3;
/** Hours after the pitch at which a start is overdue. */
export const OVERDUE_H: Record<BatchSetup['kind'], number> = { beer: 48, cider: 72, mead: 72, wine: 72 };

/** Hours between two judgements of a batch that rests ready for bottles, and how far its level may move meanwhile, points (ours). */
const REST_LOOK_H = 12;
const REST_POINTS = 0.8;

/** Hours of rest after which a level a little above the yeast's range is taken for the end (ours). */
const RESTS_H = 72;

/** Thermal days past the steepest place of the curve at which the peak is over by the curve alone, and at which it is where the record agrees (own simulations). */
const CURVE_PAST_DAYS = 0.4;
const LINE_PAST_DAYS = 0.15;
/** By how much the gas may be more than the curve says, once the peak is over (own simulations: nine in ten below 1.3 times). */
const CURVE_GAS_ROOM = 1.5;

/** Share of what the curve says is left that counts against the yeast's range (ours): early it may see too much. */
const CURVE_SURE = 0.75;

/** Hours that a cold vessel may need to work as it could, once it is warm again (ours). */
const WARMING_H = 60;

/** The rules, one look every three hours: what turns each statement on, and what turns it off again. */
export class Watch extends Intake {
  private noise = 0.5;
  /** Hour of the last look at which it was cold. */
  private lastCold: number | null = null;
  /** Hour since which it has been cold, with no warm days between. */
  private coldSince = 0;
  /** Level at the last judgement, points, of a batch that was ready for bottles. */
  private restLevel: number | null = null;

  /** Takes in what was measured before `hour` and applies every rule once. */
  look(hour: number, readings: Reading[]): void {
    this.advance(hour, readings);
    this.watchSteps();
    this.watchFloat();
    if (this.og === null) this.guessOg();
    if (!this.restsStill(hour)) this.judge();
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
    const day = this.line(48);
    hold(this.rising, hour, day !== null && day.slope - 1.64 * day.se > 0.25, 2, day !== null && day.slope - 1.64 * day.se <= 0);
    const settled = this.quietSinceAddition(48, 240);
    hold(this.drifting, hour, settled && !this.segment.fruit && hour > 96 && (this.rising.on || (day !== null && day.slope > 0 && this.climbs(168))), 8, !this.rising.on);
    if (this.lastHand && Math.abs(this.lastHand.miss) > 4 && hour - this.lastHand.hour < 168 && this.lastHand.hour > 12) {
      hold(this.drifting, hour, true, 1, false);
    }
    this.restLevel = this.bottle.on ? this.track.level(hour - 6, hour) : null;
  }

  private noteCold(hour: number): void {
    if (!this.started.on || !this.coldNow()) return;
    if (this.lastCold === null || hour - this.lastCold > WARMING_H) this.coldSince = hour;
    this.lastCold = hour;
  }

  /** It is cold, or was lately, and had not come to its end before: what rests may only wait for warmth. */
  mayOnlyBeCold(): boolean {
    if (this.lastCold === null || this.lookedAt - this.lastCold > WARMING_H) return false;
    return !this.terminal.on || this.terminal.since === null || this.terminal.since > this.coldSince;
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
    let below = false;
    let plain = false;
    for (const window of [12, 18, 24, 36]) {
      const line = this.line(window);
      if (!line) continue;
      const rate = -line.slope;
      const most = this.maxRates.get(window);
      if (rate > 1 && (!most || rate > most.rate)) this.maxRates.set(window, { rate, se: line.se });
      else if (most) {
        const fallen = most.rate - rate;
        const doubt = Math.hypot(line.se, most.se);
        below ||= fallen > Math.max(0.06 * most.rate, 1.15 * doubt);
        plain ||= fallen > Math.max(0.2 * most.rate, 2.5 * doubt);
      }
      if (window === 24 && rate > this.maxRate) this.maxRate = rate;
    }
    const passed = this.pastCurvePeak();
    // Where the record is plain the curve is not asked: a late start can put its turn too late.
    const seen = plain || (passed === null ? below : passed > CURVE_PAST_DAYS || (below && passed > LINE_PAST_DAYS));
    // A drift or the first small fall has no peak.
    hold(this.peaked, hour, seen && this.progress() >= 0.12, 2, false);
  }

  /** Thermal days since the steepest place of the fitted curve; null without a curve, or where it says that hardly anything has fallen. */
  private pastCurvePeak(): number | null {
    const fit = this.fit();
    if (!fit) return null;
    const tau = this.track.tauAt(this.lookedAt) - this.track.tauAt(this.segment.from);
    const passed = tau - fit.curve.peakTau(tau);
    return passed > 0 && fit.curve.share(tau) > 0.85 ? 0 : passed;
  }

  /** Gas now by the fitted curve with room for its error, L/h: what is gone by while the float gives nothing. */
  private gasByCurve(): number {
    const fit = this.fit();
    const passed = this.pastCurvePeak();
    if (!fit || passed === null || passed < CURVE_PAST_DAYS) return Number.POSITIVE_INFINITY;
    const tau = this.track.tauAt(this.lookedAt) - this.track.tauAt(this.segment.from);
    return CURVE_GAS_ROOM * gasLPerH(fit.curve.rate(tau) * this.track.warmthAt(this.lookedAt), this.setup.volumeL);
  }

  private judgeAirlock(hour: number): void {
    if (!this.peaked.on || (this.airlock.on && this.terminal.on)) return;
    // Any window bounds the present rate from above while it falls; the sharpest one wins.
    let upper = Number.POSITIVE_INFINITY;
    let lower = Number.NEGATIVE_INFINITY;
    // Once it is on, only its release is asked for.
    for (const window of this.airlock.on ? [12] : [12, 18, 24]) {
      const line = this.line(window);
      if (!line) continue;
      if (line.slope > 1.5) continue;
      upper = Math.min(upper, gasLPerH(-line.slope + 1.15 * line.se, this.setup.volumeL));
      if (window === 12 || lower === Number.NEGATIVE_INFINITY) lower = gasLPerH(-line.slope - 1.64 * line.se, this.setup.volumeL);
    }
    // A float that is stuck or silent leaves what it told before.
    const blind = this.frozen !== null || upper === Number.POSITIVE_INFINITY;
    if (blind) upper = this.gasByCurve();
    const limit = this.swapGas();
    // A cold vessel with sugar left is quiet only until somebody warms it.
    const waiting = this.lastCold !== null && hour - this.lastCold < WARMING_H && this.gasIfWarmed() > limit;
    // Fresh sugar is not at its strongest at once, and yeast that had come to rest wakes slowly.
    const settled = this.quietSinceAddition(this.sweetened ? 72 : 24, 72);
    hold(this.airlock, hour, upper < limit && settled && !waiting, 3, lower > 1.3 * limit || waiting);
  }

  private noteLowest(): void {
    const line = this.line(24);
    const level = this.levelNow();
    if (!line || level === null || Math.abs(line.slope) > 2 || this.segment.fruit) return;
    if (this.lowest === null || level < this.lowest) this.lowest = level;
  }

  private judgeEnd(hour: number): void {
    const level = this.levelNow();
    const line24 = this.line(24);
    // After a float that stuck there may be no two days of record yet.
    const line48 = this.line(48) ?? line24;
    const lower48 = line48 ? -line48.slope - 1.64 * line48.se : null;
    const upper48 = line48 ? -line48.slope + 1.28 * line48.se : null;
    const ground = this.groundLevel();
    const inside = ground !== null && ground <= this.zoneTop() && this.peaked.on;
    // The tail is only asked where the fall is slow enough for it to matter.
    const ceiling = !this.terminal.on ? 0.9 : !this.bottle.on ? 0.5 : 0;
    const slow = (inside || this.restsAbove()) && upper48 !== null && upper48 < ceiling;
    const left = slow && this.tail() ? this.remainingNow() : null;
    const most = left && left.most;

    const sugary = level !== null && this.sweetStill(level);
    const done = most !== null && most < TERMINAL_POINTS && upper48! < 0.9 && this.quietSinceAddition(60, 120) && !sugary;
    const wasDone = this.terminal.on;
    hold(this.terminal, hour, done, 2, (lower48 !== null && lower48 > 0.8) || this.refermenting.on);
    if (this.terminal.on && !wasDone) this.plateau = level;

    if (this.terminal.on) hold(this.rack, hour, true, 2, false);
    else {
      const line12 = this.line(12) ?? line24;
      const paces = [line12, line24].flatMap((line) => (line ? [-line.slope] : []));
      const asked = inside && !sugary && this.quietSinceAddition(60, 120) && Math.min(...paces) < RACK_PACE;
      const left = asked ? this.leftOnCurve() : null;
      hold(this.rack, hour, left !== null && left.most < RACK_POINTS, 2, line12 !== null && -line12.slope - 1.64 * line12.se > RACK_PACE);
    }

    // Both ends must say so: the shorter sees a late fall, the longer is seldom deceived.
    const rest = most !== null && most < BOTTLE_POINTS && inside && upper48! < 0.5 && this.threeQuietDays() ? this.longTail() : null;
    const still =
      rest !== null &&
      level !== null &&
      this.againstRange(level, rest).most < BOTTLE_POINTS &&
      !this.rising.on &&
      !this.refermenting.on &&
      !sugary &&
      !this.mayOnlyBeCold() &&
      this.quietSinceAddition(120, 168);
    hold(this.bottle, hour, still, 4, (lower48 !== null && lower48 > 0.5) || this.rising.on || this.refermenting.on);
  }

  private threeQuietDays(): boolean {
    const line = this.line(72);
    return line === null || -line.slope + 1.28 * line.se < 0.6;
  }

  /** It rests between where it should end and where it would be stuck, and has done so for days: the yeast's range was a little wrong. */
  private restsAbove(): boolean {
    const ground = this.groundLevel();
    if (!this.peaked.on || ground === null || ground <= this.zoneTop() || ground > this.stuckFloor()) return false;
    const flat = this.flatSince();
    const tail = this.tail();
    return flat !== null && this.lookedAt - flat >= RESTS_H && !this.coldNow() && tail !== null && tail.remaining + 1.28 * Math.hypot(tail.sd, 0.2) < BOTTLE_POINTS;
  }

  /** The gravity climbs, which a ferment does not: what is seen is the float. */
  private climbs(window: 72 | 168): boolean {
    const line = this.line(window);
    return line !== null && line.slope - 1.64 * line.se > (window === 72 ? 0.12 : 0.06);
  }

  private judgeStall(hour: number): void {
    const level = this.groundLevel();
    if (level === null) return;
    const prior = this.fgPrior();
    const limit = this.stuckFloor();
    const line48 = this.line(48);
    const settled = this.quietSinceAddition(60, 120);
    const flat =
      level > limit &&
      settled &&
      (slowerThan(line48, 0.5, 0.75) || slowerThan(this.line(72), 0.35, 0.5)) &&
      (hour - (this.started.since ?? hour) > 96 || this.progress(level) > 0.12);
    const climbing = (flat || this.stuck.on) && (this.drifting.on || this.climbs(72) || this.climbs(168));
    const moving =
      this.stuck.on &&
      [8, 24].some((window) => {
        const line = this.line(window);
        return line !== null && -line.slope - (window === 24 ? 1.64 : 2.5) * line.se > 1;
      });
    hold(this.stuck, hour, flat && !climbing, 3, moving || level < limit || climbing);
    if (this.stuck.on) this.stuckCold = this.coldNow();

    const rate = line48 ? -line48.slope : null;
    let crawling = false;
    const slow = hour > 48 && line48 !== null && rate !== null && rate + line48.se < 2.2 && !this.stuck.on && !this.drifting.on && this.quietSinceAddition(60, 96);
    // What is left by the yeast's range, or by the curve where that says more. What has come to its end has said so already.
    const asked = this.peaked.on && rate !== null && (slow || this.sluggish.on);
    const left = asked ? Math.max(level - prior.mean, this.terminal.on ? 0 : CURVE_SURE * (this.leftOnCurve()?.value ?? 0)) : 0;
    if (slow && left > 7.5) {
      const end = this.hoursToEnd();
      const fg = this.expectedFg();
      crawling = (end !== null && end > 130) || left > 6 * Math.max(rate, 0.3) || (fg !== null && fg > this.zoneTop());
    }
    hold(this.sluggish, hour, crawling, 3, (rate !== null && rate > 2.6) || left < 5 || this.stuck.on);
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
    hold(this.refermenting, hour, level < this.plateau - drop && !this.stabilised && this.fallsBy(pace), 3, still || this.stabilised);
    if (wasOn && !this.refermenting.on) this.plateau = level;
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
