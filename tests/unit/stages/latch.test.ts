import { describe, expect, it } from 'vitest';
import { clear, hold, latch } from '../../../lib/core/stages/latch';

describe('a statement with hysteresis', () => {
  it('becomes true only after so many looks in a row', () => {
    const state = latch();
    for (const [hour, condition] of [[3, true], [6, true], [9, false], [12, true], [15, true]] as const) hold(state, hour, condition, 3, false);
    expect(state.on).toBe(false);
    hold(state, 18, true, 3, false);
    expect(state).toMatchObject({ on: true, since: 18, firstHeld: 12 });
  });

  it('stays true while its condition fails, until its own release', () => {
    const state = latch();
    hold(state, 3, true, 1, false);
    hold(state, 6, false, 1, false);
    expect(state.on).toBe(true);
    hold(state, 9, false, 1, true);
    expect(state).toMatchObject({ on: false, since: 9 });
  });

  it('is not released while its condition holds', () => {
    const state = latch();
    hold(state, 3, true, 1, false);
    hold(state, 6, true, 1, true);
    expect(state.on).toBe(true);
  });

  it('can be forgotten', () => {
    const state = latch();
    hold(state, 3, true, 1, false);
    clear(state);
    expect(state).toMatchObject({ on: false, since: null, run: 0 });
  });
});
