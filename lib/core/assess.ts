import type { Assessment, BatchEvent, BatchSetup, CallName, Call, CurvePoint, Estimate, Instant, Judgement, Reading, Stage, WideEstimate } from './types';
import { bottleCall } from './calls/bottle';
import { callsByHand, handRecord } from './calls/byhand';
import { neckCall } from './calls/neck';
import { rackCall } from './calls/rack';
import type { Scene } from './calls/scene';
import { sensorCall } from './calls/sensor';
import { stalledCall } from './calls/stalled';
import { startedCall } from './calls/started';
import { temperatureCall } from './calls/temperature';
import { call } from './calls/words';
import { finalGravityHalfWidths, hoursInterval } from './fit/intervals';
import type { CurveFit } from './fit/map';
import { gasLPerH } from './gas/gas';
import { accept } from './series/bins';
import { hoursToWithin } from './stages/byhand';
import { LOOK_H, Watch } from './stages/watch';
import { drawing } from './stages/drawing';
import { abvBalling, apparentAttenuation } from './strength/strength';
import { sgOf } from './units/convert';

const Z80 = 1.2816;

/** Options of a run over many times. */
export interface RunOptions {
  /** False leaves the curve, the expectation and the gas series empty, where only the figures are wanted. */
  picture?: boolean;
}

/**
 * The judgement of one batch at one time: a pure function of what is known at
 * `at`. Readings count from the time they were received, events from the time
 * they were told; the past is judged anew from all of them.
 */
export function assess(setup: BatchSetup, readings: readonly Reading[], at: Instant): Judgement {
  for (const judgement of assessEvery(setup, readings, [at])) return judgement;
  throw new Error('unreachable: one time gives one judgement');
}

/** Judgements of one batch at several ascending times, each as {@link assess} would give it, in one pass. */
export function* assessEvery(
  setup: BatchSetup,
  readings: readonly Reading[],
  times: readonly Instant[],
  options: RunOptions = {},
): Generator<Judgement> {
  const accepted = accept(readings).readings;
  const run = new Run(setup, accepted);
  for (const at of times) yield run.at(at, options.picture ?? true);
}

class Run {
  private watch: Watch | null = null;
  private known: Reading[] = [];
  private knownEvents: BatchEvent[] = [];
  private last = Number.NEGATIVE_INFINITY;
  private readonly late: boolean;
  /** Error of the sensor's clock that the known readings show, ms. */
  private clockError = 0;

  constructor(
    private readonly setup: BatchSetup,
    private readonly all: Reading[],
  ) {
    this.late = all.some((reading) => (reading.receivedAt ?? reading.at) > reading.at);
  }

  at(at: Instant, picture: boolean): Judgement {
    const { setup } = this;
    const pitched = setup.pitchedAt;
    if (pitched === null || at < pitched) return unpitched(setup, at, this.all);
    this.learn(at);
    const watch = this.watch!;
    const end = watch.track.hourOf(at);
    let hour = watch.lookedAt;
    while (hour + LOOK_H <= end + 1e-9) {
      hour += LOOK_H;
      watch.look(hour, this.known);
    }
    if (end > hour + 1e-9) {
      // Between two looks only the figures move; the rules wait for the next look. The record now
      // holds an unfinished hour, so the next time starts from the beginning again.
      watch.advance(end, this.known);
      this.watch = null;
    }
    return judgementOf(watch, at, end, picture);
  }

  /** Takes in what has become known by `at`; starts anew when that reaches behind the last look. */
  private learn(at: Instant): void {
    const behind = this.watch ? this.watch.track.instantOf(this.watch.lookedAt) : Number.NEGATIVE_INFINITY;
    let anew = this.watch === null || at < this.last;
    const events = this.setup.events.filter((event) => event.at <= at && (event.knownAt ?? event.at) <= at);
    if (events.length !== this.knownEvents.length) {
      if (events.some((event) => !this.knownEvents.includes(event) && event.at <= behind)) anew = true;
    }
    let known = this.all;
    if (this.late) {
      known = this.all.filter((reading) => (reading.receivedAt ?? reading.at) <= at);
      const error = clockErrorOf(known);
      if (error !== this.clockError) anew = true;
      this.clockError = error;
      if (error !== 0) known = known.map((reading) => ({ ...reading, at: reading.at + error }));
      if (!anew && known.some((reading) => (reading.receivedAt ?? reading.at) > this.last && reading.at < behind)) anew = true;
    }
    if (anew || events.length !== this.knownEvents.length || this.late) {
      this.knownEvents = events;
      this.known = known;
      if (anew || events.length > 0) this.watch = anew ? new Watch(this.setup, this.setup.pitchedAt!, events) : this.watch;
      if (!anew) this.watch!.hear(events);
    } else this.known = known;
    this.last = at;
  }
}

/** Least lag between measuring and receiving that still counts as a wrong clock. */
const CLOCK_MS = 30 * 60_000;

/**
 * How far the sensor's clock is behind, ms: when even the quickest readings (5 %)
 * arrive more than half an hour after their time, or before it, the clock is
 * wrong. Rounded to 10 min, so that it stays put. A wrong clock is late by the
 * same for most readings; lags that differ are a backlog, sent when it could be,
 * and the times in it are right.
 */
function clockErrorOf(known: readonly Reading[]): number {
  const lags: number[] = [];
  for (const reading of known) if (reading.receivedAt != null) lags.push(reading.receivedAt - reading.at);
  if (lags.length < 12) return 0;
  lags.sort((a, b) => a - b);
  const quick = lags[Math.floor(0.05 * lags.length)]!;
  if (lags[Math.floor(0.5 * lags.length)]! - quick > CLOCK_MS) return 0;
  return Math.abs(quick) > CLOCK_MS ? Math.round(quick / 600_000) * 600_000 : 0;
}

function stageOf(watch: Watch): Stage {
  if (watch.terminal.on) return 'terminal';
  if (!watch.started.on) return watch.track.bins.n === 0 ? 'unknown' : 'lag';
  if (watch.peaked.on) return 'slowing';
  const line = watch.line(12);
  if (line && watch.maxRate > 0 && -line.slope < 0.8 * watch.maxRate) return 'accelerating';
  const fit = watch.fit();
  if (fit) {
    const tau = watch.track.tauAt(watch.lookedAt) - watch.track.tauAt(watch.segment.from);
    return fit.curve.rate(tau) >= 0.8 * peakRate(fit.curve, tau) ? 'peak' : 'accelerating';
  }
  return 'accelerating';
}

/** Highest rate that the curve reaches at any time, points a thermal day. */
function peakRate(curve: { rate(tau: number): number; m: number }, tau: number): number {
  let most = 0;
  const until = Math.max(tau, 3 * curve.m + 1);
  for (let i = 0; i <= 24; i += 1) most = Math.max(most, curve.rate((i / 24) * until));
  return most;
}

const MS_PER_H = 3_600_000;

function judgementOf(watch: Watch, at: Instant, hour: number, picture: boolean): Judgement {
  const { track, setup } = watch;
  const last = track.lastReading(hour);
  const silentH = last ? (at - last.at) / MS_PER_H : null;
  const silent = silentH !== null && silentH > Math.max(6, 6 * track.spacing);
  const hand = handRecord(watch, hour, silent);
  const level = hand ? hand.last.points : silent ? null : watch.levelNow();
  const rate = hand ? hand.rate : silent || watch.frozen ? null : watch.rateNow();
  const ratePointsPerDay: Estimate | null = rate && { value: rate.value, lo: rate.value - Z80 * rate.sd, hi: rate.value + Z80 * rate.sd };
  const gas: Estimate | null = ratePointsPerDay && {
    value: gasLPerH(ratePointsPerDay.value, setup.volumeL),
    lo: gasLPerH(ratePointsPerDay.lo, setup.volumeL),
    hi: gasLPerH(ratePointsPerDay.hi, setup.volumeL),
  };
  const temperature = silent ? null : track.temperature(hour - 3, hour);
  const scene: Scene = { watch, at, hour, timeZone: setup.timeZone ?? 'UTC', level, rate, gas, temperature, silentH, silent };
  const calls: Record<CallName, Call> = {
    started: startedCall(scene),
    neck: neckCall(scene),
    stalled: stalledCall(scene),
    temperature: temperatureCall(scene),
    rack: rackCall(scene),
    bottle: bottleCall(scene),
    sensor: sensorCall(scene),
    ...(hand ? callsByHand(scene, hand) : {}),
  };

  const fit = hand ? hand.fit : watch.fit();
  const og = watch.segment.effectiveOg;
  const finalGravity = finalGravityOf(watch, level, fit);
  const sdLevel = level === null ? null : hand ? hand.last.sd : Math.hypot(0.4, track.calibrationSd(level));
  const assessment: Assessment = {
    at,
    stage: hand ? stageByHand(calls) : stageOf(watch),
    gravity: level === null || sdLevel === null ? null : { value: sgOf(level), lo: sgOf(level - Z80 * sdLevel), hi: sgOf(level + Z80 * sdLevel) },
    temperatureC: temperature,
    lastReadingAt: last ? last.at : hand ? track.instantOf(hand.last.hour) : null,
    ratePointsPerDay,
    gasLPerH: gas,
    finalGravity,
    terminalAt: terminalOf(watch, at, hour, level, calls, fit, silent, hand !== null),
    abvPercent: level === null || og <= 0 ? null : abvBalling(sgOf(og), sgOf(level)),
    expectedAbvPercent: finalGravity && og > 0 ? abvBalling(sgOf(og), finalGravity.value) : null,
    attenuationPercent: level === null || og <= 0 ? null : apparentAttenuation(sgOf(og), sgOf(level)),
    calls,
  };
  const drawn: { curve: CurvePoint[]; expected: CurvePoint[]; gas: { at: Instant; value: number }[] } = picture
    ? drawing(watch, at, hand ? hand.fit : null)
    : { curve: [], expected: [], gas: [] };
  return { assessment, ...drawn };
}

/** Expected final gravity with its intervals; their upper ends never lie more than 1.5 points above the present level. */
function finalGravityOf(watch: Watch, level: number | null, fit: CurveFit | null): WideEstimate | null {
  if (watch.segment.effectiveOg <= 5) return null;
  const prior = watch.fgPrior();
  const expected = fit === watch.fit() ? watch.expectedFg() : null;
  const centre = expected ?? (fit ? fit.parameters[1]! : prior.mean);
  const { half80, half95 } = finalGravityHalfWidths(fit ? fit.fgSd : prior.sd, watch.progress(level));
  const top = level === null ? Number.POSITIVE_INFINITY : level + 1.5;
  const value = Math.min(centre, top);
  const hi = Math.min(centre + half80, Math.max(top, value));
  const hi95 = Math.min(centre + half95, Math.max(top, value));
  const lo = Math.min(centre - half80, value - 0.5);
  const lo95 = Math.min(centre - half95, lo);
  return { value: sgOf(value), lo: sgOf(lo), hi: sgOf(hi), lo95: sgOf(lo95), hi95: sgOf(Math.max(hi, hi95)) };
}

/** When it was, or will be, within a point of its end. No date before 15 % is done, of a stalled batch, or of a silent float. */
function terminalOf(watch: Watch, at: Instant, hour: number, level: number | null, calls: Record<CallName, Call>, fit: CurveFit | null, silent: boolean, byHand: boolean): Estimate | null {
  if (watch.terminal.on && watch.terminal.since !== null) {
    const value = watch.track.instantOf(watch.terminal.since);
    return { value, lo: value, hi: value };
  }
  const done = watch.progress(level);
  if (!fit || calls.started.verdict !== 'yes' || done < 0.15 || watch.stuck.on || (silent && !byHand)) return null;
  const hours = byHand ? hoursToWithin(watch, fit, hour, 1) : watch.hoursToEnd();
  if (hours === null || hours > 24 * 365) return null;
  const span = hoursInterval(hours, done);
  return { value: at + hours * MS_PER_H, lo: at + span.lo * MS_PER_H, hi: at + span.hi * MS_PER_H };
}

function stageByHand(calls: Record<CallName, Call>): Stage {
  if (calls.started.verdict !== 'yes') return calls.started.verdict === 'unknown' ? 'unknown' : 'lag';
  if (calls.bottle.verdict === 'yes') return 'terminal';
  return calls.neck.verdict === 'yes' || calls.rack.verdict === 'yes' || calls.rack.verdict === 'unknown' ? 'slowing' : 'unknown';
}

/** Before the pitch, or where nobody told when it was, there is nothing to judge but the temperature. */
function unpitched(setup: BatchSetup, at: Instant, readings: readonly Reading[]): Judgement {
  const told = setup.pitchedAt !== null;
  const reason = told ? 'The yeast is not in yet.' : 'Nobody has said when the yeast went in.';
  const quiet = (): Call => call(told ? 'no' : 'unknown', told ? 'Not pitched yet.' : 'Pitch time not told.', reason, { act: told ? null : 'Log the pitch.' });
  const last = [...readings].reverse().find((reading) => reading.at <= at && (reading.receivedAt ?? reading.at) <= at) ?? null;
  return {
    assessment: {
      at,
      stage: told ? 'not_started' : 'unknown',
      gravity: null,
      temperatureC: last?.temperature ?? null,
      lastReadingAt: last?.at ?? null,
      ratePointsPerDay: null,
      gasLPerH: null,
      finalGravity: null,
      terminalAt: null,
      abvPercent: null,
      expectedAbvPercent: null,
      attenuationPercent: null,
      calls: { started: quiet(), neck: quiet(), stalled: quiet(), temperature: quiet(), rack: quiet(), bottle: quiet(), sensor: quiet() },
    },
    curve: [],
    expected: [],
    gas: [],
  };
}
