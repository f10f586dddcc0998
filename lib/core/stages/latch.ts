/** A statement with hysteresis: it takes several looks in a row to become true, and its own condition to end. */
export interface Latch {
  on: boolean;
  /** Hour of the look that turned it on, or off again. */
  since: number | null;
  /** While it is off: looks in a row, up to now, at which its condition held. */
  run: number;
}

export function latch(): Latch {
  return { on: false, since: null, run: 0 };
}

/**
 * One look: `condition` true `times` in a row turns it on; `release` turns it off unless the condition holds too.
 * What cannot change it is not worked out: the release of one that is off, the condition of one that nothing releases.
 */
export function hold(state: Latch, hour: number, condition: () => boolean, times: number, release: () => boolean): void {
  if (state.on) {
    if (!release() || condition()) return;
    state.on = false;
    state.since = hour;
    return;
  }
  state.run = condition() ? state.run + 1 : 0;
  if (state.run < times) return;
  state.on = true;
  state.since = hour;
  state.run = 0;
}

/** The release of a statement that only a new stretch ends. */
export const never = (): boolean => false;

/** Forgets it: a new stretch has begun. */
export function clear(one: Latch): void {
  one.on = false;
  one.since = null;
  one.run = 0;
}
