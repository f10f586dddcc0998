import type { Case } from './catalogue';
import type { Look } from './run';
import { DECISIONS, Truths, type Decision } from './truths';

/** Tally of one statement over many batches. */
export interface Tally {
  moments: number;
  detected: number;
  /** The same of batches whose float neither stuck, drifted nor fell silent: the others are rightly refused for a while. */
  soundMoments: number;
  soundDetected: number;
  delays: number[];
  falseAlarms: number;
  missed: string[];
  wrong: string[];
}

/** Forecasts at a share of the time to the end. */
export interface Forecasts {
  finalError: number[];
  in80: number;
  in95: number;
  width80: number[];
  dateError: number[];
  dateIn80: number;
  dates: number;
  /** Errors in units of the promised standard deviation: plainly, and of the logarithm of the time to go. */
  finalZ: number[];
  dateZ: number[];
}

export interface Score {
  batches: number;
  months: number;
  tallies: Record<Decision, Tally>;
  /** Batches with a wrong statement at any look. */
  unsafeBottle: string[];
  unsafeBottleStuck: string[];
  stuckBatches: number;
  wrongStuck: string[];
  wrongAirlock: string[];
  forecasts: Record<25 | 50 | 75, Forecasts>;
  rackError: number[];
  rateErrors: number[];
}

const newForecasts = (): Forecasts => ({ finalError: [], in80: 0, in95: 0, width80: [], dateError: [], dateIn80: 0, dates: 0, finalZ: [], dateZ: [] });

export function newScore(): Score {
  return {
    batches: 0,
    months: 0,
    tallies: Object.fromEntries(DECISIONS.map((one) => [one, { moments: 0, detected: 0, soundMoments: 0, soundDetected: 0, delays: [], falseAlarms: 0, missed: [], wrong: [] }])) as unknown as Record<Decision, Tally>,
    unsafeBottle: [],
    unsafeBottleStuck: [],
    stuckBatches: 0,
    wrongStuck: [],
    wrongAirlock: [],
    forecasts: { 25: newForecasts(), 50: newForecasts(), 75: newForecasts() },
    rackError: [],
    rateErrors: [],
  };
}

/** Groups in which the float gives nothing to go by for days. */
const BLIND_GROUPS: ReadonlySet<string> = new Set(['frozen float', 'sensor drift', 'dropouts and late delivery']);
/** Hours in which a second false alarm is the same one. */
const REFRACTORY_H = 24;

export function addCase(score: Score, batch: Case, truths: Truths, looks: readonly Look[]): void {
  score.batches += 1;
  score.months += batch.endH / 24 / 30.4;
  for (const decision of DECISIONS) addDecision(score.tallies[decision], decision, batch, truths, looks);

  const everStuck = truths.moments('stuck').length > 0;
  if (everStuck) score.stuckBatches += 1;
  const wronglySaid = (decision: Decision): Look | undefined => looks.find((look) => look.said[decision] && !truths.acceptable(decision, look.hour));
  const unsafe = wronglySaid('ready to bottle');
  if (unsafe) {
    const text = `${batch.id} at ${(unsafe.hour / 24).toFixed(1)} d with ${truths.remaining(unsafe.hour).toFixed(1)} left`;
    score.unsafeBottle.push(text);
    if (everStuck && truths.remaining(unsafe.hour) > 6) score.unsafeBottleStuck.push(text);
  }
  const stuck = wronglySaid('stuck');
  if (stuck) score.wrongStuck.push(`${batch.id} at ${(stuck.hour / 24).toFixed(1)} d, ${truths.remaining(stuck.hour).toFixed(1)} left, ${truths.rate(stuck.hour).toFixed(1)}/d`);
  const airlock = wronglySaid('airlock ok');
  if (airlock) score.wrongAirlock.push(`${batch.id} at ${(airlock.hour / 24).toFixed(1)} d`);

  addForecasts(score, batch, truths, looks);
  const errors: number[] = [];
  for (const look of looks) if (look.rate !== null && look.hour > 12) errors.push((look.rate - truths.rate(look.hour)) ** 2);
  if (errors.length > 0) score.rateErrors.push(Math.sqrt(errors.reduce((a, b) => a + b, 0) / errors.length));
}

function addDecision(tally: Tally, decision: Decision, batch: Case, truths: Truths, looks: readonly Look[]): void {
  for (const moment of truths.moments(decision)) {
    const [from, to] = truths.window(decision, moment);
    const first = looks.find((look) => look.hour >= from && look.hour <= to && look.said[decision] && truths.acceptable(decision, look.hour));
    if (!first && to > batch.endH) continue;
    tally.moments += 1;
    const sound = !BLIND_GROUPS.has(batch.group);
    if (sound) tally.soundMoments += 1;
    if (sound && first) tally.soundDetected += 1;
    if (first) {
      tally.detected += 1;
      tally.delays.push(Math.max(0, first.hour - moment));
    } else tally.missed.push(`${batch.id} at ${(moment / 24).toFixed(1)} d`);
  }
  let before = false;
  let quietUntil = Number.NEGATIVE_INFINITY;
  for (const look of looks) {
    const now = look.said[decision];
    if (now && !before && look.hour >= quietUntil && !truths.acceptable(decision, look.hour)) {
      tally.falseAlarms += 1;
      tally.wrong.push(`${batch.id} at ${(look.hour / 24).toFixed(1)} d`);
      quietUntil = look.hour + REFRACTORY_H;
    }
    before = now;
  }
}

function addForecasts(score: Score, batch: Case, truths: Truths, looks: readonly Look[]): void {
  // Only batches that follow one curve to their end can be asked for it on the way.
  const end = truths.moments('terminal')[0];
  if (batch.finals.length > 1 || end === undefined || truths.moments('stuck').length > 0) return;
  const final = batch.finals[0]!.points;
  for (const share of [25, 50, 75] as const) {
    const hour = (end * share) / 100;
    const look = looks.find((one) => one.hour >= hour);
    const tally = score.forecasts[share];
    if (look?.finalGravity) {
      tally.finalError.push(Math.abs(look.finalGravity.value - final));
      tally.finalZ.push((1.2816 * (final - look.finalGravity.value)) / Math.max(0.05, (look.finalGravity.hi - look.finalGravity.lo) / 2));
      tally.width80.push(look.finalGravity.hi - look.finalGravity.lo);
      if (final >= look.finalGravity.lo && final <= look.finalGravity.hi) tally.in80 += 1;
      if (final >= look.finalGravity.lo95 && final <= look.finalGravity.hi95) tally.in95 += 1;
    }
    if (look?.terminalHour) {
      tally.dateError.push(Math.abs(look.terminalHour.value - end) / 24);
      tally.dates += 1;
      const togo = (at: number): number => Math.log(Math.max(1, at - look.hour + 12));
      const spread = (togo(look.terminalHour.hi) - togo(look.terminalHour.lo)) / 2 / 1.2816;
      if (spread > 0) tally.dateZ.push((togo(end) - togo(look.terminalHour.value)) / spread);
      if (end >= look.terminalHour.lo && end <= look.terminalHour.hi) tally.dateIn80 += 1;
    }
  }
  const rack = truths.moments('ready to rack')[0];
  const look = rack === undefined ? undefined : looks.find((one) => one.hour >= rack * 0.75);
  if (rack !== undefined && look?.rackHour != null) score.rackError.push(Math.abs(look.rackHour - rack) / 24);
}

export const quantile = (values: readonly number[], p: number): number => {
  if (values.length === 0) return Number.NaN;
  const sorted = [...values].sort((a, b) => a - b);
  const at = p * (sorted.length - 1);
  const lo = Math.floor(at);
  return sorted[lo]! + (sorted[Math.min(sorted.length - 1, lo + 1)]! - sorted[lo]!) * (at - lo);
};

export const mean = (values: readonly number[]): number => values.reduce((a, b) => a + b, 0) / values.length;
