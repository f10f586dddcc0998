/**
 * Rounding to a safe side. Binary fractions are guarded: 0.1 + 0.2 counts as 0.3,
 * so that a figure which stands on a step is not pushed to the next one.
 */
const GUARD = 1e-9;

/** A whole number of steps, printed without binary residue. */
function steps(count: number, step: number): number {
  return Number((count * step).toPrecision(12));
}

/** Up to a step: for pressure, volumes of gas, allergens. */
export function roundUp(value: number, step: number): number {
  return steps(Math.ceil(value / step - GUARD), step) + 0;
}

/** Down to a step: for doses, ratings, excise strength. */
export function roundDown(value: number, step: number): number {
  return steps(Math.floor(value / step + GUARD), step) + 0;
}

/** To the nearest step, halves up. */
export function roundTo(value: number, step: number): number {
  return steps(Math.floor(value / step + 0.5 + GUARD), step) + 0;
}
