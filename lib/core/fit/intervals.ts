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
const DATE_80 = [0.87, 0.61, 0.56, 0.52, 0.69, 1.2];
/** By how much the curve's hours to go are too many, as the logarithm of the hours and 12: the middle on the tuning seeds. */
const DATE_LATE = [0.2, 0.2, 0.12, 0.06, 0.06, 0];
const Z80 = 1.2816;
const Z95 = 1.96;
/** What the curve's own shape may be wrong by at the end, points. */
const SHAPE_SD = 0.6;

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

/** The hours still to go by the curve alone, without its leaning to the late side. */
export function calibratedHours(hours: number, done: number): number {
  return Math.max(0, (hours + 12) * Math.exp(-DATE_LATE[progressBin(done)]!) - 12);
}
