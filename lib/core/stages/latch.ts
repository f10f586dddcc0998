/** A statement with hysteresis: it takes several looks in a row to become true, and its own condition to end. */
export interface Latch {
  on: boolean;
  /** Hour of the first of the looks that made it true. */
  since: number | null;
  /** Looks in a row at which the condition held. */
  run: number;
  firstHeld: number | null;
}

export function latch(): Latch {
  return { on: false, since: null, run: 0, firstHeld: null };
}

/** One look: `condition` true `times` in a row turns it on; `release` turns it off unless the condition holds too. */
export function hold(state: Latch, hour: number, condition: boolean, times: number, release: boolean): void {
  if (condition) {
    if (state.run === 0) state.firstHeld = hour;
    state.run += 1;
  } else {
    state.run = 0;
    state.firstHeld = null;
  }
  if (!state.on && state.run >= times) {
    state.on = true;
    state.since = hour;
  } else if (state.on && release && !condition) {
    state.on = false;
    state.since = hour;
  }
}

/** Forgets it: a new stretch has begun. */
export function clear(one: Latch): void {
  one.on = false;
  one.since = null;
  one.run = 0;
}
