/**
 * Two-sided 95 % points of Student's t, 1 to 30 degrees of freedom: NIST/SEMATECH
 * e-Handbook of Statistical Methods, section 1.3.6.7.2.
 */
const T95 = [12.706, 4.303, 3.182, 2.776, 2.571, 2.447, 2.365, 2.306, 2.262, 2.228, 2.201, 2.179, 2.16, 2.145, 2.131, 2.12, 2.11, 2.101, 2.093, 2.086, 2.08, 2.074, 2.069, 2.064, 2.06, 2.056, 2.052, 2.048, 2.045, 2.042];

/** Factor of a standard error that gives a two-sided 95 % interval; past the table a little too wide. */
export function t95(degreesOfFreedom: number): number {
  if (!(degreesOfFreedom >= 1)) return Infinity;
  return T95[Math.floor(degreesOfFreedom) - 1] ?? 1.96 + 2.5 / degreesOfFreedom;
}
