import type { DrinkKind } from '../types';

/**
 * Intervals of the forecast: the fit's own standard deviation times a factor by
 * progress, so that they hold what they say (split conformal prediction: Lei,
 * G'Sell, Rinaldo, Tibshirani, Wasserman, JASA 113 (2018) 1094–1111). The factors
 * come from simulated batches of the evaluation’s tuning seeds, a little wider for those that follow other equations.
 */

/** Share of the whole fall already done, where one factor gives way to the next. */
const PROGRESS_EDGES = [0.15, 0.4, 0.65, 0.85, 0.95];

const FACTOR_80 = [1, 1, 1, 1, 1.02, 1.45];
const FACTOR_95 = [1.15, 1.15, 1.15, 1.15, 1.8, 3.0];
/** Half width of the 80 % interval of ln(time to the end + 12 h). */
const DATE_80 = [0.61, 0.61, 0.62, 0.62, 0.69, 1.2];
/** How late a curve and a tail are, by kind: from where the tail is asked for a beer and a cider; else where the yeast has alcohol to spare, and at its limit (about the middles on the tuning seeds). */
const LATE = { beer: { curve: -0.15, tail: -0.15 }, cider: { curve: -0.15, tail: 0.25 }, withRoom: { curve: 0.5, tail: 0.25 }, from: 0.7, atTolerance: -0.15 };

interface Lateness {
  curve: number;
  tail: number;
}

/** Share of the fall from which the tail tells of the date, and the share more at which it alone does (own simulations). */
const TAIL_SPEAKS_FROM = 0.65;
const TAIL_TAKES_OVER = 0.28;
/** Spans of time spread evenly in their logarithm; half a day keeps it tame near nought. */
const TAME_H = 12;
const Z80 = 1.2816;
const Z95 = 1.96;
/** What the curve's own shape may be wrong by at the end, points. */
export const SHAPE_SD = 0.6;

export function progressBin(done: number): number {
  let bin = 0;
  while (bin < PROGRESS_EDGES.length && done >= PROGRESS_EDGES[bin]!) bin += 1;
  return bin;
}

/** Half widths of the 80 % and the 95 % interval of the final gravity, points. */
export function finalGravityHalfWidths(fgSd: number, done: number): { half80: number; half95: number } {
  const sd = Math.hypot(fgSd, SHAPE_SD);
  const bin = progressBin(done);
  const half80 = Z80 * FACTOR_80[bin]! * sd;
  return { half80, half95: Math.max(half80, Z95 * FACTOR_95[bin]! * sd) };
}

/** 80 % interval of the hours still to go, from the likely number of them. */
export function hoursInterval(hours: number, done: number): { lo: number; hi: number } {
  const kappa = DATE_80[progressBin(done)]!;
  return {
    lo: Math.max(0, (hours + 12) * Math.exp(-kappa) - 12),
    hi: (hours + 12) * Math.exp(kappa) - 12,
  };
}

/** Whether the tail is asked for the date when so much of the fall is done. */
export const tailTellsDate = (done: number): boolean => done > TAIL_SPEAKS_FROM;

/**
 * By how much the hours to go are too many, as their logarithm (of the hours and 12), by
 * the curve and by the tail. For simple sugars both slow down too long, but not where
 * alcohol near what the yeast bears holds the end back (Levenspiel, Biotechnol. Bioeng. 22
 * (1980) 1671-1687); `burden` is the alcohol at the end over what the yeast bears.
 */
export function lateness(kind: DrinkKind, burden: number | null, done: number): Lateness {
  const nearing = tailTellsDate(done);
  // The priors of these two already tell how soon the curve ends, until its last third.
  if (kind === 'beer' || kind === 'cider') return nearing ? LATE[kind] : { ...LATE[kind], curve: 0 };
  if (burden === null) return { ...LATE.withRoom, curve: 0 };
  const share = Math.min(1, Math.max(0, (burden - LATE.from) / (1 - LATE.from)));
  const held = (late: number): number => late + share * (LATE.atTolerance - late);
  const curve = held(LATE.withRoom.curve);
  return { curve: nearing ? Math.min(0, curve) : curve, tail: held(LATE.withRoom.tail) };
}

/** The hours still to go, without what they are too late by: by the curve, and the further the fall the more by the tail. */
export function hoursToGo(byCurve: number, byTail: number | null, done: number, late: Lateness = { curve: 0, tail: 0 }): number {
  const curve = Math.log(byCurve + TAME_H) - late.curve;
  const share = byTail === null ? 0 : Math.min(1, Math.max(0, (done - TAIL_SPEAKS_FROM) / TAIL_TAKES_OVER));
  const tail = byTail === null ? 0 : Math.log(byTail + TAME_H) - late.tail;
  return Math.max(0, Math.exp((1 - share) * curve + share * tail) - TAME_H);
}
