import type { DrinkKind } from '../types';

/**
 * Intervals of the forecast: the fit's own standard deviation times a factor by
 * progress, so that they hold what they say (split conformal prediction: Lei,
 * G'Sell, Rinaldo, Tibshirani, Wasserman, JASA 113 (2018) 1094–1111). The factors
 * come from simulated batches of the evaluation's tuning seeds.
 */

/** Share of the whole fall already done, where one factor gives way to the next. */
const PROGRESS_EDGES = [0.15, 0.4, 0.65, 0.85, 0.95];

const FACTOR_80 = [0.92, 0.95, 0.95, 0.98, 1.1, 1.6];
const FACTOR_95 = [1.15, 1.15, 1.15, 1.15, 1.8, 3.0];
/** Half width of the 80 % interval of ln(time to the end + 12 h). */
const DATE_80 = [0.87, 0.61, 0.62, 0.62, 0.69, 1.2];
/**
 * By how much the hours to go are too many, as their logarithm (of the hours and 12) by
 * progress: by the curve, which slows down too long for honey and fruit, and by the
 * tail. About the middle on the tuning seeds and on batches of other equations.
 */
const LATE: Record<DrinkKind, { curve: readonly number[]; tail: number }> = {
  beer: { curve: [0.1, 0.1, 0.05, 0, 0, 0], tail: 0 },
  cider: { curve: [0.1, 0.1, 0.1, 0.1, 0.1, 0.1], tail: 0.25 },
  mead: { curve: [0.3, 0.3, 0.25, 0.2, 0.2, 0.2], tail: 0.25 },
  wine: { curve: [0.3, 0.3, 0.25, 0.2, 0.2, 0.2], tail: 0.25 },
};
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

/** The hours still to go by the curve and by the tail, without their leaning to the late side; the further the fall, the more by the tail. */
export function calibratedHours(byCurve: number, byTail: number | null, done: number, kind: DrinkKind): number {
  const late = LATE[kind];
  const curve = Math.log(byCurve + TAME_H) - late.curve[progressBin(done)]!;
  const share = byTail === null ? 0 : Math.min(1, Math.max(0, (done - TAIL_SPEAKS_FROM) / TAIL_TAKES_OVER));
  const tail = byTail === null ? 0 : Math.log(byTail + TAME_H) - late.tail;
  return Math.max(0, Math.exp((1 - share) * curve + share * tail) - TAME_H);
}
