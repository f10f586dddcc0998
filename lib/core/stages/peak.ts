import { gasLPerH } from '../gas/gas';
import { Intake } from './intake';
import { hold, never } from './latch';

/** Thermal days past the steepest place of the curve at which the peak is over by the curve alone, and at which it is where the record agrees (own simulations). */
export const CURVE_PAST_DAYS = 0.4;
const LINE_PAST_DAYS = 0.15;
/** By how much the gas may be more than the curve says, once the peak is over (own simulations: nine in ten below 1.3 times). */
const CURVE_GAS_ROOM = 1.5;
/** By how much the curve's gas may lie over the limit where the record is under it (ours). */
const CURVE_GAS_SLACK = 1.5;

/** By how much the gas must be over the limit to take a swap back: at the limit it must not flicker (ours). */
export const GAS_BAND = 1.3;

/** Hours that a cold vessel may need to work as it could, once it is warm again (ours). */
const WARMING_H = 60;

/** The rules of the peak, the gas and the cold. */
export class Peak extends Intake {
  /** Hour of the last look at which it was cold. */
  private lastCold: number | null = null;
  /** A cold vessel with sugar left: it is quiet only until somebody warms it. */
  waitsForWarmth = false;
  /** Hour since which it has been cold, with no warm days between. */
  private coldSince = 0;

  protected noteCold(hour: number): void {
    if (!this.started.on || !this.coldNow()) return;
    if (this.lastCold === null || hour - this.lastCold > WARMING_H) this.coldSince = hour;
    this.lastCold = hour;
  }

  /** It is cold, or was lately, and had not come to its end before: what rests may only wait for warmth. */
  mayOnlyBeCold(): boolean {
    if (this.lastCold === null || this.lookedAt - this.lastCold > WARMING_H) return false;
    return !this.terminal.on || this.terminal.since === null || this.terminal.since > this.coldSince;
  }

  protected judgePeak(hour: number): void {
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
    // A drift or the first small fall has no peak; what was stabilised at rest has had its own.
    hold(this.peaked, hour, () => (seen && this.progress() >= 0.12) || this.sweetHeld(), 2, never);
  }

  /** Thermal days since the steepest place of the fitted curve; null without a curve, or where it says that hardly anything has fallen. */
  protected pastCurvePeak(): number | null {
    const fit = this.fit();
    if (!fit) return null;
    const tau = this.track.tauAt(this.lookedAt) - this.track.tauAt(this.segment.from);
    const passed = tau - fit.curve.peakTau(tau);
    return passed > 0 && fit.curve.share(tau) > 0.85 ? 0 : passed;
  }

  /** Gas now by the fitted curve, L/h; 0 without one. */
  private curveGas(): number {
    const fit = this.fit();
    if (!fit) return 0;
    const tau = this.track.tauAt(this.lookedAt) - this.track.tauAt(this.segment.from);
    return gasLPerH(fit.curve.rate(tau) * this.track.warmthAt(this.lookedAt), this.setup.volumeL);
  }

  /** The same where the peak is over by the curve, else Infinity: what is gone by while the float gives nothing. */
  private gasByCurve(): number {
    const passed = this.pastCurvePeak();
    return passed === null || passed < CURVE_PAST_DAYS ? Number.POSITIVE_INFINITY : this.curveGas();
  }

  protected judgeAirlock(hour: number): void {
    this.waitsForWarmth = false;
    if (!this.peaked.on || (this.airlock.on && this.terminal.on)) return;
    const limit = this.swapGas();
    const cold = this.lastCold !== null && hour - this.lastCold < WARMING_H;
    this.waitsForWarmth = cold && this.gasIfWarmed() > (this.airlock.on ? GAS_BAND : 1) * limit;
    // Fresh sugar is not at its strongest at once, and yeast that had come to rest wakes slowly.
    const settled = this.quietSinceAddition(this.sweetened ? 72 : 24, 72);
    hold(this.airlock, hour, () => settled && !this.waitsForWarmth && this.gasIsWeak(limit), 3, () => this.waitsForWarmth || this.gasReturns(GAS_BAND * limit));
  }

  /** Under the limit by a line of the last day, and not much over it by the curve; by the curve alone where the float gives nothing. */
  private gasIsWeak(limit: number): boolean {
    // Any window bounds the present rate from above while it falls; the sharpest one wins.
    let most = Number.POSITIVE_INFINITY;
    for (const window of this.airlock.on ? [12] : [12, 18, 24]) most = Math.min(most, this.gasOver(window, 1.15));
    // A float that is stuck or silent leaves what it told before.
    if (this.frozen !== null || most === Number.POSITIVE_INFINITY) return CURVE_GAS_ROOM * this.gasByCurve() < limit;
    return most < limit && this.curveAgrees(limit);
  }

  /** Half a day gives more than the limit, beyond doubt. */
  private gasReturns(limit: number): boolean {
    // What comes back in the last half of a day makes its whole half as steep: where that is far from it, the half is not asked.
    if (this.gasOver(24, 1.64) < limit / 4) return false;
    const least = this.gasOver(12, -1.64);
    return least !== Number.POSITIVE_INFINITY && least > limit;
  }

  /** Gas by the last hours, L/h, so many standard errors above what they show; Infinity where they show none, or climb. */
  private gasOver(window: number, errors: number): number {
    const line = this.line(window);
    return line === null || line.slope > 1.5 ? Number.POSITIVE_INFINITY : gasLPerH(-line.slope + errors * line.se, this.setup.volumeL);
  }

  /** A day's line can fall behind a fermentation that warms itself: the curve must not say much more. */
  private curveAgrees(limit: number): boolean {
    return this.airlock.on || this.curveGas() <= CURVE_GAS_SLACK * limit;
  }
}
