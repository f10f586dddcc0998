/** Safe or stop, and what a brewer may put aside in writing. */
import type { BenchOverridden, BenchPicture, BenchRequest, BenchSafe, BenchVerdict, Problem } from './bench';
import type { Instant } from '../types';
import { primes, ratedBar, work, type Worked } from './judge';
import { waysOut } from './ways';

/** Judges the bench. A stop carries its problems and the ways out, and no dose. */
export function judgeBench(request: BenchRequest): BenchVerdict {
  const worked = work(request);
  if (worked.problems.length === 0) return safe(request, worked);
  const [first] = worked.problems;
  return {
    verdict: 'stop',
    headline: headlineOf(worked.problems),
    sentence: first?.sentence ?? '',
    problems: worked.problems,
    ways: waysOut(request, worked),
    ...worked.picture,
  };
}

function safe(request: BenchRequest, worked: Worked): BenchSafe {
  return {
    verdict: 'safe',
    headline: primes(request) ? 'These bottles hold it, even at worst' : 'Bottle it still',
    sentence: safeSentence(worked.picture),
    dose: worked.dose,
    abvAddedPercent: worked.abvAddedPercent,
    ...worked.picture,
  };
}

function safeSentence({ bottles, remaining }: BenchPicture): string {
  const tightest = bottles.toSorted((a, b) => margin(a) - margin(b))[0];
  if (!tightest) return '';
  const { warm, worst } = tightest;
  const asAsked = `As asked they reach ${warm.bar.toFixed(1)} bar at ${warm.celsius} °C.`;
  const left = remaining.value.hi;
  const atWorst = left > 0 ? ` If the last ${left.toFixed(1)} points of sugar ferment, ${worst.bar.toFixed(1)} bar.` : '';
  const rating = tightest.holds.rating;
  return `${asAsked}${atWorst}${rating === 'never' ? ' They are for still drink.' : ` They are rated for ${ratedBar(rating).toFixed(1)}.`}`;
}

const margin = (picture: BenchPicture['bottles'][number]): number => (picture.holds.rating === 'never' ? 0 : picture.holds.rating) - picture.worst.bar;

function headlineOf(problems: readonly Problem[]): string {
  const kinds = new Set(problems.map((p) => p.kind));
  if (kinds.has('stopped_high')) return 'Do not bottle it: it stopped high and nothing explains it';
  if (kinds.has('not_done')) return 'Do not bottle it yet';
  if (kinds.has('nothing_to_fill')) return 'Nothing to fill';
  if (kinds.has('stabilised_and_primed')) return 'Do not prime a stabilised drink';
  if (kinds.has('never_under_pressure') || kinds.has('over_rating') || kinds.has('over_rating_at_worst')) return 'Do not fill these bottles';
  return 'Confirm what these bottles hold';
}

/** Shortest reason that says something. Our own rule. */
export const REASON_MIN_LETTERS = 12;
/** Letters of a written reason; dots and digits say nothing. */
export const lettersIn = (reason: string): number => (reason.match(/\p{L}/gu) ?? []).length;

export interface OverrideRefused {
  verdict: 'refused';
  /** Why it cannot be put aside. */
  why: 'nothing_to_override' | 'reason_too_short' | 'never';
  problems: readonly Problem[];
}

export interface WrittenReason {
  reason: string;
  /** Who takes it upon themselves. */
  by: string;
  at: Instant;
}

/**
 * Puts a stop aside for a brewer's written reason. The result keeps every problem
 * and the worst case, for the lot to carry. Refused where nothing is stopped,
 * where the reason says nothing, and for still-wine glass under pressure, always.
 */
export function overrideStop(request: BenchRequest, written: WrittenReason): BenchOverridden | OverrideRefused {
  const worked = work(request);
  const { problems } = worked;
  if (problems.length === 0) return { verdict: 'refused', why: 'nothing_to_override', problems };
  if (problems.some((p) => !p.overridable)) return { verdict: 'refused', why: 'never', problems };
  if (lettersIn(written.reason) < REASON_MIN_LETTERS) return { verdict: 'refused', why: 'reason_too_short', problems };
  return {
    verdict: 'overridden',
    headline: headlineOf(problems),
    problems,
    reason: written.reason.trim(),
    by: written.by,
    at: written.at,
    worstBar: worked.worstBar,
    dose: worked.dose,
    abvAddedPercent: worked.abvAddedPercent,
    ...worked.picture,
  };
}
