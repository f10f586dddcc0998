/** Is it done? Two or three hydrometer readings in agreement, the float, and whether the sugar left is explained. */
import { how, type How, type RangeFigure } from '../how/how';
import { SOURCES } from '../how/sources';
import { abvBalling } from '../strength/strength';
import type { DrinkKind, Instant } from '../types';
import type { Range } from '../units/range';
import { pointsOf } from '../units/convert';
import { credible, lowestGravity, remainingPoints } from './remaining';

const HOUR = 3_600_000;
/** Readings agree within a point: what a hydrometer of 0.001 divisions can tell. */
const AGREE_POINTS = 1;
/** Older than this, the last reading says nothing of today. */
const STALE_H = 7 * 24;
/** A float above this still falls, points a day: the upper bound of the rate. */
const FLOAT_MOVES = 0.5;
/** After sugar or another drink went in, wait. */
const AFTER_ADDITION_H = 5 * 24;
/** Above the expected range by more than this it stopped high. */
const HIGH_POINTS = 2;
/** Within this of its tolerance a yeast may have stopped for the alcohol, % vol. */
const NEAR_TOLERANCE = 0.5;

export const DONE_VERDICTS = ['done', 'not_yet', 'stopped_high', 'unknown'] as const;
export type DoneVerdict = (typeof DONE_VERDICTS)[number];

export const EXPLANATIONS = ['dry', 'as_expected', 'sweetener', 'tolerance', 'stabilised'] as const;
export type Explanation = (typeof EXPLANATIONS)[number];

export interface HydrometerReading {
  at: Instant;
  /** SG at 20 °C, corrected. Refractometer readings of a fermented drink do not belong here. */
  gravity: number;
}

export interface DoneInput {
  kind: DrinkKind;
  at: Instant;
  pitchedAt: Instant | null;
  /** Effective original gravity, SG. */
  originalGravity: number | null;
  hydrometer: readonly HydrometerReading[];
  /** Fall of the float, points a day, with its interval; null without a float or when it is silent. */
  floatRate: Range | null;
  /** Final gravity to expect from yeast and must, SG. */
  expectedFinal: Range | null;
  toleranceAbv: number | null;
  diastatic: boolean;
  stabilised: boolean;
  unfermentablePoints: number;
  /** Last time sugar, juice or another drink went in. */
  lastAdditionAt: Instant | null;
}

export interface DoneCheck {
  verdict: DoneVerdict;
  /** Why there may be sugar left; null where nothing explains it. */
  explanation: Explanation | null;
  /** The last reading by hand, SG. */
  gravity: number | null;
  /** Points that may still ferment. Null without a reading. */
  remaining: RangeFigure | null;
  stabilised: boolean;
  reasons: readonly string[];
  /** What would settle it. */
  changesIt: string;
  /** From when a further reading by hand would settle it. */
  readAgainAt: Instant | null;
  how: How;
}

/** Hours over which readings must agree: 72, growing to 168 with a fifth of the batch's age, since slow ferments lose 0.1 point a day for weeks. */
export function agreementHours(pitchedAt: Instant | null, at: Instant): number {
  const ageH = pitchedAt === null ? Infinity : Math.max(0, at - pitchedAt) / HOUR;
  return Math.min(168, Math.max(72, 0.2 * ageH));
}

/** The same asked the other way: how long after its first reading an agreement has lasted enough, hours; the batch ages meanwhile. */
function agreedAfter(pitchedAt: Instant | null, first: Instant): number {
  const ageH = pitchedAt === null ? Infinity : Math.max(0, first - pitchedAt) / HOUR;
  return Math.min(168, Math.max(72, (0.2 / 0.8) * ageH));
}

/** The last readings, as far back as all of them lie within a point. */
function agreeing(readings: readonly HydrometerReading[]): readonly HydrometerReading[] {
  let from = readings.length - 1;
  while (from > 0 && spreadOf(readings.slice(from - 1)) <= AGREE_POINTS + 1e-6) from -= 1;
  return readings.slice(from);
}

function spreadOf(readings: readonly HydrometerReading[]): number {
  const points = readings.map((reading) => pointsOf(reading.gravity));
  return Math.max(...points) - Math.min(...points);
}

/** Judges whether a batch has finished, from what was read and told. Pure; `at` is now. */
export function checkDone(input: DoneInput): DoneCheck {
  const readings = input.hydrometer
    .filter((r) => Number.isFinite(r.gravity) && r.at <= input.at && r.at >= (input.lastAdditionAt ?? -Infinity))
    .sort((a, b) => a.at - b.at);
  const last = readings.at(-1);
  const needH = agreementHours(input.pitchedAt, input.at);
  const origin = how('hydrometer readings within 1 point over the days asked, float at rest, gravity within 2 points of the expected range or explained', SOURCES.bottleTest, [
    ['days of agreement asked', needH / 24, 'd'],
    ['readings by hand', readings.length, ''],
    ['float falls, at most', input.floatRate?.hi ?? null, 'points a day'],
  ]);
  if (!last) {
    return {
      verdict: 'unknown',
      explanation: null,
      gravity: null,
      remaining: null,
      stabilised: input.stabilised,
      reasons: [input.lastAdditionAt === null ? 'No hydrometer reading.' : 'No hydrometer reading since the last addition.'],
      changesIt: `A hydrometer reading now and one ${days(needH)} later.`,
      readAgainAt: input.at,
      how: origin,
    };
  }
  const settled = settle(input, readings, last, needH);
  const { explanation, high, trust } = explain(input, last.gravity);
  const verdict: DoneVerdict = settled.verdict !== 'done' ? settled.verdict : high && !explanation ? 'stopped_high' : explanation ? 'done' : 'unknown';
  const remaining = remainingPoints({
    kind: input.kind,
    gravity: last.gravity,
    originalGravity: input.originalGravity,
    expectedFinal: input.expectedFinal,
    trustExpected: trust,
    diastatic: input.diastatic,
    unfermentablePoints: input.unfermentablePoints,
    // Stabilising holds a yeast that has finished; it does not stop one at work.
    stabilised: input.stabilised && settled.verdict === 'done',
  });
  return {
    verdict,
    explanation: verdict === 'done' ? explanation : null,
    gravity: last.gravity,
    remaining,
    stabilised: input.stabilised,
    reasons: [...settled.reasons, ...reasonsOf(verdict, explanation, input, remaining.value.hi)],
    changesIt: changes(verdict, settled.changesIt),
    readAgainAt: verdict === 'done' ? null : settled.readAgainAt,
    how: origin,
  };
}

interface Settled {
  verdict: 'done' | 'not_yet' | 'unknown';
  reasons: string[];
  changesIt: string;
  readAgainAt: Instant | null;
}

/** Whether the gravity has stopped moving, wherever it stands. */
function settle(input: DoneInput, readings: readonly HydrometerReading[], last: HydrometerReading, needH: number): Settled {
  const say = (verdict: Settled['verdict'], reason: string, changesIt: string, readAgainAt: Instant | null): Settled => ({ verdict, reasons: [reason], changesIt, readAgainAt });
  if (input.lastAdditionAt !== null && input.at - input.lastAdditionAt < AFTER_ADDITION_H * HOUR) {
    return say('not_yet', 'Something was added less than 5 days ago.', 'Five days after the addition, two equal readings.', input.lastAdditionAt + AFTER_ADDITION_H * HOUR);
  }
  if (input.floatRate && input.floatRate.hi > FLOAT_MOVES) {
    return say('not_yet', `The float may still fall by ${input.floatRate.hi.toFixed(1)} points a day; at rest is ${FLOAT_MOVES} or less.`, 'The float at rest.', null);
  }
  if (input.at - last.at > STALE_H * HOUR) {
    return say('unknown', `The last hydrometer reading is ${days((input.at - last.at) / HOUR)} old.`, 'A hydrometer reading today.', input.at);
  }
  const window = readings.filter((r) => r.at >= last.at - needH * HOUR);
  const before = readings.filter((r) => r.at <= last.at - needH * HOUR).at(-1);
  const compared = before ? [before, ...window] : window;
  const spread = spreadOf(compared);
  const differ = spread > AGREE_POINTS + 1e-6;
  if (differ || !before) {
    const agreed = agreeing(readings);
    const first = agreed[0] ?? last;
    const askedH = agreedAfter(input.pitchedAt, first.at);
    const again = Math.ceil(first.at + askedH * HOUR);
    const short = `${agreed.length === readings.length ? 'Readings' : `The last ${agreed.length} readings`} agree, but over ${days((last.at - first.at) / HOUR)} only; ${days(askedH)} are asked.`;
    if (!differ) return say('unknown', agreed.length > 1 ? short : 'One hydrometer reading only.', `An equal reading ${days(askedH)} after the first.`, again);
    if (agreed.length > 1) return say('not_yet', short, `An equal reading ${days(askedH)} after the first of them.`, again);
    return say('not_yet', `The readings differ by ${spread.toFixed(1)} points over ${days((last.at - (compared[0]?.at ?? last.at)) / HOUR)}.`, `Equal readings ${days(askedH)} apart.`, again);
  }
  return { verdict: 'done', reasons: [`${compared.length} readings agree within a point over ${days((last.at - before.at) / HOUR)}.`], changesIt: 'A fall of more than 1 point.', readAgainAt: null };
}

interface Explained {
  explanation: Explanation | null;
  /** Above what was expected. */
  high: boolean;
  /** Whether the expected range bounds what may still ferment. It does not where only the alcohol holds the yeast. */
  trust: boolean;
}

/** Whether the gravity stands where it should, and if not, what explains it. */
function explain(input: DoneInput, gravity: number): Explained {
  const points = pointsOf(gravity);
  const sugary = points - input.unfermentablePoints;
  const expected = credible(input);
  const expectedTop = expected ? pointsOf(expected.hi) : null;
  const zoneTop = input.diastatic ? Math.min(0, expectedTop ?? 0) : expectedTop;
  const high = zoneTop !== null && sugary > zoneTop + HIGH_POINTS;
  const stabilised: Explanation | null = input.stabilised ? 'stabilised' : null;

  const abv = input.originalGravity === null ? null : abvBalling(input.originalGravity, gravity);
  const nearTolerance = abv !== null && input.toleranceAbv !== null && abv >= input.toleranceAbv - NEAR_TOLERANCE;
  const lowest = pointsOf(lowestGravity(input));
  if (nearTolerance && !input.diastatic && sugary > lowest + HIGH_POINTS) return { explanation: stabilised ?? 'tolerance', high, trust: false };

  if (high) return { explanation: stabilised, high, trust: false };
  if (zoneTop === null && sugary > 0) return { explanation: stabilised, high, trust: false };
  const sweetened = points > (zoneTop ?? 0) + HIGH_POINTS;
  return { explanation: points <= 0 ? 'dry' : sweetened ? 'sweetener' : 'as_expected', high, trust: true };
}

function reasonsOf(verdict: DoneVerdict, explanation: Explanation | null, input: DoneInput, remainingHi: number): string[] {
  if (verdict === 'stopped_high') return [`It stopped above the expected ${(credible(input)?.hi ?? 1).toFixed(3)} and nothing explains it. Up to ${Math.ceil(remainingHi)} points may still ferment.`];
  if (verdict === 'unknown' && !input.expectedFinal) return ['No expected final gravity: tell the yeast’s range, or ferment a warm sample out.'];
  if (verdict !== 'done') return [];
  switch (explanation) {
    case 'tolerance':
      return [`The yeast is at its tolerance; the ${Math.ceil(remainingHi)} points left are still sugar. Stabilise before glass.`];
    case 'sweetener':
      return [`${input.unfermentablePoints.toFixed(0)} points are a sweetener that does not ferment.`];
    case 'stabilised':
      return ['Sweet and stabilised. Keep a test bottle of PET and feel it weekly.'];
    case 'dry':
    case 'as_expected':
    case null:
      return [];
  }
}

function changes(verdict: DoneVerdict, settled: string): string {
  if (verdict === 'stopped_high') return 'A warm forced sample that falls no further, a restart, or stabilising.';
  return settled;
}

/** `3 days`, for sentences. */
function days(hours: number): string {
  const d = hours / 24;
  const text = d < 10 && Math.abs(d - Math.round(d)) > 0.05 ? d.toFixed(1) : String(Math.round(d));
  return `${text} ${text === '1' ? 'day' : 'days'}`;
}
