import { hoursToGo, lateness, SHAPE_SD, tailTellsDate } from '../fit/intervals';
import type { Tail } from '../series/tail';
import { abvBalling } from '../strength/strength';
import { sgOf } from '../units/convert';
import { Figures } from './figures';
import type { RestFigures } from './late-fall';
import { held, mixed, remaining, shareOfTail, type Remaining } from './remaining';

/** Hours between two views of the tail, which hardly changes from look to look. */
export const TAIL_H = 6;
/** Youngest age of a stretch that was begun by an addition, hours, by which its tail is judged. */
const SHORTEST_AGE_H = 72;

/** Share of the fall that is done when the tail is asked for what is left. */
const NEAR_END = 0.8;
interface TailCache {
  at: number;
  tail: Tail | null;
}

/** What is still to come of a batch, and when it will have come: by its curve, and near its end by its tail. */
export class Outlook extends Figures {
  private remainingMemo: Remaining | null | undefined;
  private tailCache: TailCache | null = null;
  private longTailCache: TailCache | null = null;
  private readonly halfDays = new Map<number, number | null>();

  protected override forget(): void {
    super.forget();
    this.remainingMemo = undefined;
  }

  protected override recordChanged(): void {
    this.tailCache = null;
    this.longTailCache = null;
    this.halfDays.clear();
    super.recordChanged();
  }

  /** What is still to come by the end of the record alone: three tenths of the age, at least 4 and at most 12 days of it. */
  tail(): Tail | null {
    this.tailCache = this.tailOver(0.3, 288, false, this.tailCache);
    return this.tailCache.tail;
  }

  /** The same from a longer end, 0.35 of the age and at most 14 days, with a pace that wanes: slower to see an end, and seldom deceived by one. */
  longTail(): Tail | null {
    this.longTailCache = this.tailOver(0.35, 336, true, this.longTailCache);
    return this.longTailCache.tail;
  }

  private tailOver(share: number, mostH: number, wanes: boolean, cache: TailCache | null): TailCache {
    const now = Math.floor(this.lookedAt / TAIL_H + 1e-9) * TAIL_H;
    if (cache?.at === now) return cache;
    const { from, restarted } = this.segment;
    const own = restarted ? Math.max(SHORTEST_AGE_H, now - from) : now;
    // A yeast that was fed at work is as tired as the whole batch is old, and its sugar as young as the feed; one that had come to rest begins anew.
    const age = restarted && !this.sweetened ? Math.sqrt(own * now) : own;
    return { at: now, tail: this.track.tail(Math.max(96, Math.min(mostH, share * own)), restarted ? from + 24 : 0, now, age, wanes) };
  }

  /** The alcohol at a level as a share of what the yeast bears; null where that is not told. */
  private burden(level: number | null): number | null {
    const tolerance = this.setup.alcoholToleranceAbv;
    if (tolerance === null || level === null || this.segment.effectiveOg <= 0) return null;
    return abvBalling(sgOf(this.segment.effectiveOg), sgOf(level)) / tolerance;
  }

  /** The tail where the fall is near its end; null before, when it takes a steady fall for the whole of it. */
  private tailNow(): Tail | null {
    const level = this.levelNow();
    const line = this.line(48);
    if (level === null || line === null || !this.peaked.on || -line.slope > 3 || level > this.zoneTop() + 10) return null;
    if (!this.sweetHeld() && (-line.slope > 1 || level > this.zoneTop())) {
      const fit = this.fit();
      if (fit && fit.curve.og - level < NEAR_END * (fit.curve.og - fit.curve.fg)) return null;
    }
    return this.tail();
  }

  /**
   * Points still to fall, and how well that is known: near the end what the tail
   * shows, held against what the yeast's range leaves to be had; before that the
   * curve. The range counts little where the tail is clear.
   */
  remainingNow(): Remaining | null {
    if (this.remainingMemo === undefined) this.remainingMemo = this.weighRemaining();
    return this.remainingMemo;
  }

  private weighRemaining(): Remaining | null {
    const level = this.levelNow();
    if (level === null) return null;
    const tail = this.tailNow();
    if (tail) return this.againstRange(level, tail);
    const fit = this.fit();
    return fit && remaining(level - fit.parameters[1]!, Math.hypot(fit.fgSd, SHAPE_SD));
  }

  /** A tail held against what the yeast's range leaves to be had. A level below the range has shown the range wrong: it cannot say that less than nothing is left. */
  protected againstRange(level: number, tail: Tail): Remaining {
    const prior = this.fgPrior();
    const both = held(
      { value: tail.remaining, sd: Math.hypot(tail.sd, 0.2) },
      { value: Math.max(0, level - prior.mean), sd: Math.hypot(prior.sd, this.track.calibrationSd(level)) },
    );
    return remaining(both.value, both.sd);
  }

  /** What tells whether a batch at rest has ended; null where the record is too short for its two ends. */
  restFigures(): RestFigures | null {
    const level = this.levelNow();
    const short = this.tail();
    const long = short && this.longTail();
    if (level === null || short === null || long === null) return null;
    const { from, restarted } = this.segment;
    const ageH = restarted ? Math.max(SHORTEST_AGE_H, this.lookedAt - from) : this.lookedAt;
    const [since2, since8] = this.hoursSinceHigher(level).map((hours) => Math.min(1, (hours ?? ageH) / ageH));
    return {
      most: Math.max(this.againstRange(level, short).most, this.againstRange(level, long).most),
      likely: long.likely,
      spread: this.spreadOfYeastsEnd(),
      // What was stabilised at rest does not go on to where its yeast ends.
      belowTop: this.sweetHeld() ? 0 : this.zoneTop() - level,
      since2: since2!,
      since8: since8!,
    };
  }

  /** Hours since the level of half a day was last 2 and 8 points higher than now; null where this stretch never was. */
  private hoursSinceHigher(level: number): [number | null, number | null] {
    const stop = this.segment.restarted ? this.segment.from + 12 : 0;
    let since2: number | null = null;
    for (let hour = Math.floor(this.lookedAt / TAIL_H) * TAIL_H - TAIL_H; hour > stop; hour -= TAIL_H) {
      const past = this.halfDayAt(hour);
      if (past === null) continue;
      const higher = this.track.calibrate(past) - level;
      if (higher >= 2) since2 ??= this.lookedAt - hour;
      if (higher >= 8) return [since2, this.lookedAt - hour];
    }
    return [since2, null];
  }

  /** Uncalibrated level of the half day about an hour that has passed, points; a batch that rests is asked for it at every look. */
  private halfDayAt(hour: number): number | null {
    const known = this.halfDays.get(hour);
    if (known !== undefined) return known;
    const level = this.track.level(hour - 6, hour + 6);
    this.halfDays.set(hour, level);
    return level;
  }

  private spreadOfYeastsEnd(): number {
    const { mean, sd } = this.fgPrior();
    return Math.hypot(sd, this.track.calibrationSd(mean));
  }

  /** The end of the record tells what is left. */
  protected tailTells(): boolean {
    return this.tailNow() !== null;
  }

  /** Points still to fall, by the curve until the fall is nearly over and the further it is by it, the more by the tail. */
  leftOnCurve(): Remaining | null {
    const left = this.remainingNow();
    const level = this.levelNow();
    const fit = this.fit();
    if (left === null || level === null || !fit) return left;
    const byCurve = { value: level - fit.curve.fg, sd: Math.hypot(fit.fgSd, SHAPE_SD) };
    return mixed(byCurve, left, shareOfTail(fit.curve, level));
  }

  /** Expected final gravity, points. */
  expectedFg(): number | null {
    const left = this.leftOnCurve();
    const level = this.levelNow();
    return left === null || level === null ? null : level - left.value;
  }

  /** Hours until the gravity is within a point of its end; null without a curve or a tail. */
  hoursToEnd(): number | null {
    return this.hoursUntilLeft(1);
  }

  /**
   * Hours until so many points are left. The curve tells it while most of the fall is to come,
   * the tail where it is nearly over; between the two both, the more the tail the further it is.
   */
  hoursUntilLeft(points: number): number | null {
    const fit = this.fit();
    const level = this.levelNow();
    const done = this.progress(level);
    const tail = this.peaked.on && level !== null && tailTellsDate(done) ? this.tail() : null;
    const left = tail && level !== null ? this.againstRange(level, tail).value : 0;
    const byTail = tail && (left <= points ? 0 : (24 * Math.log(left / points)) / tail.pace);
    if (!fit) return byTail;
    const { curve } = fit;
    const drop = curve.og - curve.fg;
    if (drop <= points) return 0;
    const tauNow = this.track.tauAt(this.lookedAt) - this.track.tauAt(this.segment.from);
    const byCurve = ((curve.tauOfShare(points / drop) - tauNow) / this.track.warmthAt(this.lookedAt)) * 24;
    return hoursToGo(Math.max(0, byCurve), byTail, done, lateness(this.setup.kind, this.burden(this.expectedFg()), done));
  }

  /** Share of the whole expected fall that is done, 0 to 1. */
  progress(level = this.levelNow()): number {
    const fg = this.expectedFg() ?? this.fgPrior().mean;
    const { effectiveOg } = this.segment;
    if (level === null || effectiveOg - fg < 1) return 0;
    return Math.min(1, Math.max(0, (effectiveOg - level) / (effectiveOg - fg)));
  }
}
