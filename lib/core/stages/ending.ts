import { VOLUMES_PER_POINT } from '../gas/gas';
import type { Line } from '../series/line';
import { CHANCE_MEMORY_H, chanceOf, LATE_IN_BOTTLE, LATE_WHEN_FINISHED, logOddsOfLateFall } from './late-fall';
import { hold, never } from './latch';
import { CURVE_PAST_DAYS, Peak } from './peak';
import { TAIL_H } from './outlook';

/** Points that may still come, nine times in ten, when a batch may be racked. */
export const RACK_POINTS = 4.4;
/** The same where the end of the record says so by itself, while a curve that goes too deep still holds back (ours). */
export const RACK_TAIL_POINTS = 3;
/** Points left by the curve alone, at half its pace, when a batch may be racked whose float gives nothing, and when it is taken to have ended (ours). */
const RACK_BLIND_POINTS = 2.5;
const ENDED_BLIND_POINTS = 1;
/** Fall, points a day, under which it may be racked. */
export const RACK_PACE = 2.5;
/** Most fall of two days, points a day and nine times in ten, at which it may have ended, and at which it may be bottled where both tails say so (ours). */
const TERMINAL_PACE = 0.9;
const BOTTLE_PACE = 0.7;
/** Fall over three days, points a day, under which they count as quiet: less than a hydrometer shows, a point in all (the trade's readings three days apart). */
const QUIET_PACE = 1 / 3;

/** Points above the expected end, and above where its yeast usually ends, at which it may be bottled all the same where surely no more than so many are to come (ours): the range of a yeast is often a little wrong, and what stalls lies higher. */
export const ABOVE_END_POINTS = 1.2;
const ABOVE_YEAST_POINTS = 6;
export const AT_REST_POINTS = 0.6;
/** Hours between two weighings of the chance of a late fall in what was called ready, where it decides nothing (ours). */
const READY_WEIGHED_H = 48;
/** Points that make a volume of gas in a closed bottle. */
const VOLUME_POINTS = 1 / VOLUMES_PER_POINT;

/** The rules of the end: finished, to be racked, to be bottled. */
export class Ending extends Peak {
  /** Log odds that more than a point still comes, as a mean over the last looks, and when it was taken. */
  private lateFall: { hour: number; odds: number } | null = null;

  protected judgeEnd(hour: number): void {
    const level = this.levelNow();
    const line24 = this.line(24);
    // After a float that stuck there may be no two days of record yet.
    const line48 = this.line(48) ?? line24;
    const lower48 = line48 ? -line48.slope - 1.64 * line48.se : null;
    const upper48 = line48 ? -line48.slope + 1.28 * line48.se : null;
    const ground = this.groundLevel();
    const inside = ground !== null && (ground <= this.zoneTop() || this.sweetHeld()) && this.peaked.on;
    // A level that would not be called stuck may be the end: the yeast's range is often a little wrong.
    const near = ground !== null && (ground <= this.stuckFloor() || this.sweetHeld()) && this.peaked.on;
    // The tail is only asked where the fall is slow enough for it to matter.
    const ceiling = this.bottle.on ? Number.POSITIVE_INFINITY : this.terminal.on ? BOTTLE_PACE : TERMINAL_PACE;
    const slow = upper48 !== null && upper48 < ceiling && (inside || (near && !this.coldNow()));

    const sugary = level !== null && this.sweetStill(level);
    const wasDone = this.terminal.on;
    hold(this.terminal, hour, () => slow && upper48 < TERMINAL_PACE && !sugary && this.quietSinceAddition(60, 120) && this.hardlyFallsOn(), 2, () => (lower48 !== null && lower48 > 0.8) || this.refermenting.on);
    if (this.terminal.on && !wasDone) this.plateau = level;

    if (this.terminal.on) hold(this.rack, hour, () => true, 2, never);
    else if (!this.isBlind()) {
      const calm = (line: Line | null): boolean => line !== null && -line.slope < RACK_PACE;
      const asked = near && !sugary && this.quietSinceAddition(60, 120);
      hold(this.rack, hour, () => asked && (calm(line24) || calm(this.line(12))) && this.leavesLittle(), 2, () => line24 !== null && -line24.slope - 1.64 * line24.se > RACK_PACE);
    }

    const still = slow && (inside || this.restsJustAbove(ground)) && upper48 < BOTTLE_PACE && !this.rising.on && !this.refermenting.on && !sugary && this.quietSinceAddition(120, 168);
    const rests = still && !this.mayOnlyBeCold();
    this.weighLateFall(hour, rests);
    hold(
      this.bottle,
      hour,
      () => rests && this.leavesLess(VOLUME_POINTS) && this.threeQuietDays() && this.lateFall !== null && chanceOf(this.lateFall.odds) < LATE_IN_BOTTLE.chance,
      2,
      // A steady small fall shows in what it leaves to come, a whole volume of gas, before two days of it are beyond doubt.
      () => (lower48 !== null && lower48 > 0.5) || this.rising.on || this.refermenting.on || (slow && this.remainingNow() !== null && !this.leavesLess(VOLUME_POINTS)),
    );
  }

  /** Chance that more than a point still comes of a batch at rest, 0 to 1; null where it does not rest. */
  chanceOfLateFall(): number | null {
    return this.lateFall && chanceOf(this.lateFall.odds);
  }

  /** The odds of a late fall as they have been for about a day, since it came to rest; what was called ready keeps them while it is not asked. */
  private weighLateFall(hour: number, rests: boolean): void {
    if (!rests) {
      if (!this.bottle.on) this.lateFall = null;
      return;
    }
    if (this.lateFall && hour - this.lateFall.hour < (this.bottle.on ? READY_WEIGHED_H : TAIL_H)) return;
    const figures = this.restFigures();
    const now = figures && logOddsOfLateFall(LATE_IN_BOTTLE, figures);
    const before = this.lateFall;
    const kept = before ? Math.exp((before.hour - hour) / CHANCE_MEMORY_H) : 0;
    this.lateFall = now === null ? null : { hour, odds: kept * (before?.odds ?? 0) + (1 - kept) * now };
  }

  /** Less than so many points may still come, nine times in ten. */
  private leavesLess(points: number): boolean {
    const left = this.remainingNow();
    return left !== null && left.most < points;
  }

  /** A little above the expected end, and surely at rest there. */
  private restsJustAbove(ground: number | null): boolean {
    if (ground === null || !this.peaked.on || this.stuck.on || this.coldNow()) return false;
    return ground <= this.zoneTop() + ABOVE_END_POINTS && ground <= this.fgPrior().mean + ABOVE_YEAST_POINTS && this.leavesLess(AT_REST_POINTS);
  }

  /** Little enough to be racked: by curve and tail as they are weighed, or by the tail alone. */
  private leavesLittle(): boolean {
    const left = this.leftOnCurve();
    return left !== null && (left.most < RACK_POINTS || (this.tailTells() && this.leavesLess(RACK_TAIL_POINTS)));
  }

  /** It has as good as ended: little chance of more than two points. */
  private hardlyFallsOn(): boolean {
    const figures = this.restFigures();
    return figures !== null && chanceOf(logOddsOfLateFall(LATE_WHEN_FINISHED, figures)) < LATE_WHEN_FINISHED.chance;
  }

  /** The float is stuck or silent. */
  private isBlind(): boolean {
    return this.frozen !== null || this.lookedAt - this.track.lastSound(this.lookedAt) > Math.max(6, 6 * this.track.spacing);
  }

  /** What can be said of the end while the float gives nothing, and of what was said then. */
  protected judgeUnseen(hour: number): void {
    if (!this.terminal.on && this.isBlind()) this.judgeBlind(hour);
    else if (this.ended.on) this.holdEnded(hour);
  }

  /** By what the float gave before: so little is left by the curve even were the fall half as quick since. */
  private judgeBlind(hour: number): void {
    const left = this.leftBlind(hour);
    const settled = left !== null && this.quietSinceAddition(60, 120);
    if (!this.rack.on) hold(this.rack, hour, () => settled && left < RACK_BLIND_POINTS, 2, never);
    hold(this.ended, hour, () => settled && left < ENDED_BLIND_POINTS, 2, never);
  }

  /** Points left by the curve, had the fall been half as quick since the last sound reading; null where the curve cannot tell. */
  private leftBlind(hour: number): number | null {
    if (!this.peaked.on || this.stuck.on || this.sluggish.on) return null;
    const fit = this.fit();
    const passed = this.pastCurvePeak();
    if (!fit || passed === null || passed < CURVE_PAST_DAYS) return null;
    const from = this.track.tauAt(this.segment.from);
    const last = this.track.tauAt(this.track.lastSound(hour)) - from;
    const now = this.track.tauAt(hour) - from;
    return (fit.curve.og - fit.curve.fg) * fit.curve.share(last + (now - last) / 2);
  }

  /** What the curve said of the end stands until the float, sound again, says otherwise. */
  private holdEnded(hour: number): void {
    const line = this.line(24);
    const level = this.levelNow();
    hold(this.ended, hour, never, 2, () => {
      const high = level !== null && level > this.stuckFloor();
      return high || (line !== null && (-line.slope - 1.64 * line.se > 0.8 || (this.leftOnCurve()?.value ?? 0) > RACK_POINTS));
    });
  }

  /** Three days (two, where there are no more) that hardly fall, and surely do not fall fast. */
  private threeQuietDays(): boolean {
    const line = this.line(72) ?? this.line(48);
    return line === null || (-line.slope < QUIET_PACE && -line.slope + 1.28 * line.se < 0.6);
  }
}
