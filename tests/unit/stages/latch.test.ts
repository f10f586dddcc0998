import { describe, expect, it } from 'vitest';
import { clear, hold, latch, never } from '../../../lib/core/stages/latch';

const yes = (): boolean => true;
const no = (): boolean => false;
const unasked = (): boolean => {
  throw new Error('this cannot change it');
};

describe('a statement with hysteresis', () => {
  it('becomes true only after so many looks in a row', () => {
    const state = latch();
    for (const [hour, condition] of [[3, yes], [6, yes], [9, no], [12, yes], [15, yes]] as const) hold(state, hour, condition, 3, never);
    expect(state).toMatchObject({ on: false, run: 2 });
    hold(state, 18, yes, 3, never);
    expect(state).toEqual({ on: true, since: 18, run: 0 });
  });

  it('stays true while its condition fails, until its own release', () => {
    const state = latch();
    hold(state, 3, yes, 1, never);
    hold(state, 6, no, 1, no);
    expect(state.on).toBe(true);
    hold(state, 9, no, 1, yes);
    expect(state).toEqual({ on: false, since: 9, run: 0 });
  });

  it('is not released while its condition holds', () => {
    const state = latch();
    hold(state, 3, yes, 1, never);
    hold(state, 6, yes, 1, yes);
    expect(state).toMatchObject({ on: true, since: 3 });
  });

  it('counts its looks anew once it was released', () => {
    const state = latch();
    for (const hour of [3, 6]) hold(state, hour, yes, 2, never);
    hold(state, 9, no, 2, yes);
    hold(state, 12, yes, 2, yes);
    expect(state).toMatchObject({ on: false, run: 1 });
    hold(state, 15, yes, 2, yes);
    expect(state).toMatchObject({ on: true, since: 15 });
  });

  it('asks only what can change it', () => {
    const state = latch();
    hold(state, 3, yes, 1, unasked);
    hold(state, 6, unasked, 1, no);
    expect(state.on).toBe(true);
  });

  it('can be forgotten', () => {
    const state = latch();
    hold(state, 3, yes, 1, never);
    clear(state);
    expect(state).toEqual({ on: false, since: null, run: 0 });
  });
});
