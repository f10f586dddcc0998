import type { CurvePoint, Instant } from '../types';
import { finalGravityHalfWidths } from '../fit/intervals';
import { curveSd, type CurveFit } from '../fit/map';
import { gasLPerH } from '../gas/gas';
import { sgOf } from '../units/convert';
import { hoursToWithin } from './byhand';
import type { Watch } from './watch';

const POINTS = 240;
const Z80 = 1.2816;
/** Relative doubt of the pace that a stalled batch should have had (ours). */
const PACE_DOUBT = 0.4;

/** The fitted curve with its forecast, what should have happened after a stall, and the gas: at most 240 points each. */
export function drawing(watch: Watch, at: Instant, byHand: CurveFit | null): { curve: CurvePoint[]; expected: CurvePoint[]; gas: { at: Instant; value: number }[] } {
  return { ...curves(watch, at, byHand), gas: gasSeries(watch) };
}

function curves(watch: Watch, at: Instant, byHand: CurveFit | null): { curve: CurvePoint[]; expected: CurvePoint[] } {
  const fit = byHand ?? (watch.stuck.on ? watch.restingFit() : null) ?? watch.fit();
  if (!fit || !(watch.started.on || byHand)) return { curve: [], expected: [] };
  const { track, segment } = watch;
  const now = track.hourOf(at);
  const toEnd = watch.stuck.on ? 0 : byHand ? hoursToWithin(watch, byHand, now, 1) : (watch.hoursToEnd() ?? 0);
  const ahead = Math.max(24, Math.min(60 * 24, 1.15 * toEnd));
  const tau0 = track.tauAt(segment.from);
  const tauNow = track.tauAt(now) - tau0;
  const warmth = track.warmthAt(now);
  const gradient = new Float64Array(6);
  const { half80 } = finalGravityHalfWidths(fit.fgSd, watch.progress());
  const curve: CurvePoint[] = [];
  const past = Math.floor(POINTS * 0.6);
  const level = watch.levelNow();
  const flat = watch.stuck.on || watch.terminal.on;
  for (let i = 0; i < POINTS; i += 1) {
    const isPast = i < past;
    const hour = isPast ? segment.from + (i / past) * (now - segment.from) : now + ((i - past) / (POINTS - 1 - past)) * ahead;
    const tau = isPast ? track.tauAt(hour) - tau0 : tauNow + ((hour - now) / 24) * warmth;
    let value = fit.curve.gravity(tau);
    let sd = curveSd(fit, tau, gradient);
    if (!isPast) {
      if (flat && level !== null) value = level;
      // The band opens from the present level towards the interval of the end.
      const share = Math.min(1, (hour - now) / Math.max(24, toEnd));
      sd = Math.max(0.4, Math.min(sd, half80 / Z80) * share + sd * (1 - share));
    }
    curve.push({ at: track.instantOf(hour), gravity: sgOf(value), lo: sgOf(value - Z80 * sd), hi: sgOf(value + Z80 * sd) });
  }
  return { curve, expected: watch.stuck.on || watch.sluggish.on ? expectation(watch, now) : [] };
}

/** Where the batch would have gone from where it stalled, had it ended in the middle of its yeast's range. */
function expectation(watch: Watch, now: number): CurvePoint[] {
  const latch = watch.stuck.on ? watch.stuck : watch.sluggish;
  const from = Math.max(watch.segment.from, (latch.since ?? now) - 60);
  const start = watch.track.level(from - 6, from + 6);
  if (start === null) return [];
  const level = watch.track.calibrate(start);
  const { mean, sd } = watch.fgPrior();
  if (level <= mean) return [];
  // An exponential ending at the prior, as steep as the peak allows for what is left.
  const pace = Math.max(0.15, Math.min(0.6, watch.maxRate / Math.max(20, watch.segment.effectiveOg)));
  const points: CurvePoint[] = [];
  const until = now + Math.max(72, Math.min(21 * 24, (24 * Math.log(Math.max(1.5, level - mean))) / pace - (now - from)));
  for (let i = 0; i <= 60; i += 1) {
    const hour = from + (i / 60) * (until - from);
    const rest = Math.exp((-pace * (hour - from)) / 24);
    const value = mean + (level - mean) * rest;
    // In doubt are the end and, on the way to it, the pace.
    const doubt = Math.hypot(sd * (1 - rest), PACE_DOUBT * (level - mean) * rest * pace * ((hour - from) / 24), 0.4);
    points.push({ at: watch.track.instantOf(hour), gravity: sgOf(value), lo: sgOf(value - Z80 * doubt), hi: sgOf(value + Z80 * doubt) });
  }
  return points;
}

function gasSeries(watch: Watch): { at: Instant; value: number }[] {
  const { track, setup } = watch;
  const { bins } = track;
  if (bins.n < 6) return [];
  const from = bins.t[0]!;
  const to = bins.t[bins.n - 1]!;
  const step = Math.max(3, Math.ceil((to - from) / POINTS));
  const series: { at: Instant; value: number }[] = [];
  for (let hour = from + step; hour <= to; hour += step) {
    const line = track.line(hour - Math.max(step, 9), hour + 1, 0.5);
    if (line) series.push({ at: track.instantOf(hour - step / 2), value: gasLPerH(-line.slope, setup.volumeL) });
  }
  return series;
}
