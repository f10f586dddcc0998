import { fitCurve, type CurveFit } from '../fit/map';
import { curvePrior } from '../fit/priors';
import { HAND_SD } from './figures';
import { OVERDUE_H, type Watch } from './watch';

/** A gravity read by hand, or a float that speaks too seldom to be a record. */
export interface HandReading {
  /** h since the pitch. */
  hour: number;
  points: number;
  sd: number;
}

/** A float that speaks less often than this is read like a hydrometer, h. */
const SELDOM_H = 2.5;
/** Most points that may still come where it may be bottled. */
export const HAND_MOST = 1.2;
/** Shortest span of readings that tells of an end, h. */
const APART_H = 72;
/** Pace times age of the end of a ferment that is still acceptable, at the slow side (own simulations: one in ten below). */
const SLOW_PACE = 4;

/** What can be said from single readings. */
export interface HandRecord {
  readings: readonly HandReading[];
  last: HandReading;
  /** Fall between the last two readings at least 12 h apart, points a day. */
  rate: { value: number; sd: number; hours: number } | null;
  fit: CurveFit | null;
  started: 'yes' | 'no' | 'overdue' | 'unknown';
  /** Most that may still come (9 in 10), points, and the span of the readings that say so; null with one reading. */
  most: { points: number; hours: number } | null;
  /** Hours that equal readings must lie apart to settle whether it is done, counted from the last one. */
  settlesAfterH: number;
  /** h since the pitch from which on a reading equal to the last would settle it, by any of the readings so far. */
  settlesAtHour: number;
  inside: boolean;
  stuck: boolean;
}

/**
 * The record to judge by when there is no float to follow: hydrometer readings,
 * and the float's own from before it fell silent (12-hour medians) or when it
 * speaks seldom. Null where a live float says more, or where there is nothing.
 */
export function handRecord(watch: Watch, hour: number, silent: boolean): HandRecord | null {
  const { track } = watch;
  const seldom = track.bins.n > 0 && track.spacing > SELDOM_H;
  const lastFloat = track.bins.n > 0 ? track.bins.t[track.bins.n - 1]! : Number.NEGATIVE_INFINITY;
  const hand = watch.handReadings;
  const newer = hand.length > 0 && hand[hand.length - 1]!.hour > lastFloat;
  if (!seldom && track.bins.n > 0 && !(silent && newer)) return null;
  const readings: HandReading[] = hand.map((one) => ({ ...one }));
  if (track.bins.n > 0) readings.push(...floatReadings(watch, seldom));
  const from = watch.segment.from;
  const known = readings.filter((one) => one.hour <= hour && one.hour >= from - 1).sort((a, b) => a.hour - b.hour);
  const last = known[known.length - 1];
  return last ? describe(watch, hour, known, last) : null;
}

function floatReadings(watch: Watch, seldom: boolean): HandReading[] {
  const { track } = watch;
  const { bins } = track;
  const found: HandReading[] = [];
  if (seldom) {
    for (let i = 0; i < bins.n; i += 1) found.push({ hour: bins.t[i]!, points: track.calibrate(bins.g[i]!), sd: HAND_SD });
    return found;
  }
  for (let h = 12 * Math.floor(bins.hour[0]! / 12); h < bins.hour[bins.n - 1]!; h += 12) {
    const level = track.level(h, h + 12);
    if (level !== null) found.push({ hour: h + 6, points: track.calibrate(level), sd: 0.5 });
  }
  return found;
}

function describe(watch: Watch, hour: number, readings: HandReading[], last: HandReading): HandRecord {
  const og = watch.segment.level ?? watch.segment.effectiveOg;
  const top = watch.zoneTop();
  const before = [...readings].reverse().find((one) => last.hour - one.hour >= 12) ?? null;
  const rate = before && {
    value: ((before.points - last.points) * 24) / (last.hour - before.hour),
    sd: (Math.hypot(before.sd, last.sd) * 24) / (last.hour - before.hour),
    hours: last.hour - before.hour,
  };
  const drop = og > 5 ? og - last.points : 0;
  const limit = OVERDUE_H[watch.setup.kind];
  let started: HandRecord['started'] = 'unknown';
  if (drop >= 3) started = 'yes';
  else if (last.hour >= limit && drop < 2) started = 'overdue';
  else if (last.hour > 6) started = 'no';

  // The fall that may be hidden between two readings, carried on at the slowest pace an end has.
  const ageDays = Math.max(1, last.hour / 24);
  let most: HandRecord['most'] = null;
  for (const earlier of readings) {
    const hours = last.hour - earlier.hour;
    if (hours < APART_H) continue;
    const pace = fallBetween(earlier, last.points, last.sd) / (hours / 24);
    const points = (pace * ageDays) / SLOW_PACE / 1.5;
    if (most === null || points < most.points) most = { points, hours };
  }
  const apart = (from: HandReading) => settlesAfter(from, last.points);
  const flat = rate !== null && rate.hours >= 60 && rate.value < 0.5 && rate.value + 1.28 * rate.sd < 0.75;
  return {
    readings,
    last,
    rate,
    fit: fitHand(watch, readings),
    started,
    most,
    settlesAfterH: apart(last),
    settlesAtHour: Math.min(...readings.map((one) => one.hour + apart(one))),
    inside: last.points <= top,
    stuck: started === 'yes' && flat && last.points > watch.stuckFloor() && hour - last.hour < 240,
  };
}

/** Most that it may have fallen from one reading to another, points. */
const fallBetween = (from: HandReading, points: number, sd: number): number => Math.max(0, from.points - points) + 1.28 * Math.hypot(from.sd, sd);

/** Hours after `from` at which a reading of so many points would leave less than {@link HAND_MOST} to come; the batch ages meanwhile. */
function settlesAfter(from: HandReading, points: number): number {
  const fall = fallBetween(from, points, HAND_SD);
  const room = Math.max(0.5, HAND_MOST * SLOW_PACE * 1.5 - fall);
  return Math.max(APART_H, (fall * Math.max(0, from.hour)) / room + 1);
}

function fitHand(watch: Watch, readings: readonly HandReading[]): CurveFit | null {
  const { segment, setup } = watch;
  if (segment.effectiveOg < 5 || readings.length === 0) return null;
  const n = readings.length;
  const tau = new Float64Array(n);
  const g = new Float64Array(n);
  const sd = new Float64Array(n);
  const hours = Float64Array.from(readings, (one) => one.hour);
  const tau0 = watch.track.tauAt(segment.from);
  readings.forEach((one, i) => {
    const next = readings[Math.min(n - 1, i + 1)]!;
    const previous = readings[Math.max(0, i - 1)]!;
    const span = next.hour - previous.hour;
    const rate = span > 0 ? (Math.abs(previous.points - next.points) * 24) / span : 0;
    tau[i] = watch.track.tauAt(one.hour) - tau0;
    g[i] = one.points;
    sd[i] = Math.hypot(one.sd, 0.3 * rate, 0.4);
  });
  const og = { mean: segment.level ?? segment.effectiveOg, sd: segment.restarted ? 2 : watch.ogSd };
  return fitCurve({ n, tau, g, sd, hours }, curvePrior(setup.kind, og, watch.fgPrior(), segment.restarted));
}

/** Hours from `hour` until the fitted curve is within `points` of its end. */
export function hoursToWithin(watch: Watch, fit: CurveFit, hour: number, points: number): number {
  const drop = fit.curve.og - fit.curve.fg;
  if (drop <= points) return 0;
  const tau = watch.track.tauAt(hour) - watch.track.tauAt(watch.segment.from);
  return Math.max(0, ((fit.curve.tauOfShare(points / drop) - tau) / watch.track.warmthAt(hour)) * 24);
}
