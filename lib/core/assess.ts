import type { Assessment, BatchSetup, CallName, Call, Estimate, Instant, Judgement, Reading, Stage, WideEstimate } from './types';
import { bottleCall } from './calls/bottle';
import { callsByHand, handRecord } from './calls/byhand';
import { neckCall } from './calls/neck';
import { rackCall } from './calls/rack';
import type { Scene } from './calls/scene';
import { sensorCall } from './calls/sensor';
import { onceSettled, rackOnceSettled } from './calls/settling';
import { stalledCall } from './calls/stalled';
import { startedCall } from './calls/started';
import { temperatureCall } from './calls/temperature';
import { call } from './calls/words';
import { finalGravityHalfWidths, hoursInterval } from './fit/intervals';
import type { CurveFit } from './fit/map';
import { gasLPerH } from './gas/gas';
import { hoursToWithin } from './stages/byhand';
import { Run } from './stages/run';
import type { Watch } from './stages/watch';
import { drawing } from './stages/drawing';
import { footingOf } from './stages/footing';
import { abvBalling, apparentAttenuation } from './strength/strength';
import { sgOf } from './units/convert';

const Z80 = 1.2816;
/** Share of the fall from which a date is told: from here on as good, measured by the time that is left, as later (own simulations; the first tenth comes out a third too late). */
const DATED_FROM = 0.1;

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
  const run = new Run(setup, readings);
  for (const at of times) {
    const moment = run.at(at);
    yield moment ? judgementOf(moment.watch, at, moment.hour, options.picture ?? true) : unpitched(setup, at, run.readings);
  }
}

function stageOf(watch: Watch): Stage {
  if (watch.terminal.on || watch.ended.on) return 'terminal';
  if (!watch.started.on) return watch.track.bins.n === 0 ? 'unknown' : 'lag';
  if (watch.peaked.on) return 'slowing';
  const line = watch.line(12);
  if (line && watch.maxRate > 0 && -line.slope < 0.8 * watch.maxRate) return 'accelerating';
  const fit = watch.fit();
  if (fit) {
    const tau = watch.track.tauAt(watch.lookedAt) - watch.track.tauAt(watch.segment.from);
    return fit.curve.rate(tau) >= 0.8 * fit.curve.rate(fit.curve.peakTau(tau)) ? 'peak' : 'accelerating';
  }
  return 'accelerating';
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
  const temperature = silent ? null : watch.temperatureNow();
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
  calls.rack = rackOnceSettled(scene, calls.rack);
  calls.bottle = onceSettled(scene, calls.bottle);

  const fit = hand ? hand.fit : watch.fit();
  const og = watch.segment.effectiveOg;
  const finalGravity = finalGravityOf(watch, level, fit);
  const sdLevel = level === null ? null : hand ? hand.last.sd : Math.hypot(0.4, track.calibrationSd(level));
  const assessment: Assessment = {
    at,
    stage: hand ? stageByHand(calls) : stageOf(watch),
    gravity: level === null || sdLevel === null ? null : { value: sgOf(level), lo: sgOf(level - Z80 * sdLevel), hi: sgOf(level + Z80 * sdLevel) },
    lastGravity: lastGravityOf(watch, level, hand ? track.instantOf(hand.last.hour) : last ? last.at : at),
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
  if (!picture) return { assessment, curve: [], expected: [], gas: [], footing: null };
  return { assessment, ...drawing(watch, at, hand ? hand.fit : null), footing: footingOf({ watch, at, hour, level, rate, fit, byHand: hand !== null, finalGravity }) };
}

/** @param from when a level of now was measured */
function lastGravityOf(watch: Watch, level: number | null, from: Instant): Assessment['lastGravity'] {
  if (level !== null) return { at: from, value: sgOf(level) };
  const known = watch.lastKnown();
  return known && { at: watch.track.instantOf(known.hour), value: sgOf(known.points) };
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

/** When it was, or will be, within a point of its end. No date before a tenth is done, of a stalled batch, or of a silent float. */
function terminalOf(watch: Watch, at: Instant, hour: number, level: number | null, calls: Record<CallName, Call>, fit: CurveFit | null, silent: boolean, byHand: boolean): Estimate | null {
  if (watch.terminal.on && watch.terminal.since !== null) {
    const value = watch.track.instantOf(watch.terminal.since);
    return { value, lo: value, hi: value };
  }
  // That it has ended is the curve's word alone: nobody saw when.
  if (watch.ended.on) return null;
  const done = watch.progress(level);
  if (!fit || calls.started.verdict !== 'yes' || done < DATED_FROM || watch.stuck.on || (silent && !byHand)) return null;
  const hours = byHand ? hoursToWithin(watch, fit, hour, 1) : watch.hoursToEnd();
  if (hours === null || hours > 24 * 365) return null;
  const span = hoursInterval(hours, done);
  return { value: at + hours * MS_PER_H, lo: at + span.lo * MS_PER_H, hi: at + span.hi * MS_PER_H };
}

function stageByHand(calls: Record<CallName, Call>): Stage {
  if (calls.started.verdict !== 'yes') return calls.started.verdict === 'unknown' ? 'unknown' : 'lag';
  if (calls.bottle.verdict === 'yes') return 'terminal';
  return calls.neck.verdict === 'yes' || calls.rack.verdict === 'yes' || calls.rack.verdict === 'unknown' || calls.rack.since !== null ? 'slowing' : 'unknown';
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
      lastGravity: null,
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
    footing: null,
  };
}
