/** Slopes of a state at a time. */
export type Slopes = (time: number, state: readonly number[]) => number[];

/** One step of the classical fourth-order Runge-Kutta method. */
export function rungeKutta(slopes: Slopes, time: number, state: readonly number[], step: number): number[] {
  const ahead = (by: number, slope: readonly number[]) => state.map((value, index) => value + by * (slope[index] ?? 0));
  const first = slopes(time, state);
  const second = slopes(time + step / 2, ahead(step / 2, first));
  const third = slopes(time + step / 2, ahead(step / 2, second));
  const fourth = slopes(time + step, ahead(step, third));
  return state.map(
    (value, index) => value + (step / 6) * ((first[index] ?? 0) + 2 * (second[index] ?? 0) + 2 * (third[index] ?? 0) + (fourth[index] ?? 0)),
  );
}
