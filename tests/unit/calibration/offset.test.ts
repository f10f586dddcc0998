import { describe, expect, it } from 'vitest';
import { pairUp, suggestOffset } from '@/lib/core/calibration/offset';

const HOUR = 3_600_000;
const DAY = 24 * HOUR;
const START = Date.UTC(2026, 2, 1);
/** A float that reads high by `high(at)` on a slow fall, every 30 min for twelve days. */
const readings = (high: (at: number) => number) =>
  Array.from({ length: 12 * 48 }, (_, index) => {
    const at = START + index * HOUR / 2;
    return { at, gravity: truth(at) + high(at), temperature: 20 };
  });
const truth = (at: number) => 1.05 - (0.03 * (at - START)) / (12 * DAY);
const hand = (day: number, off = 0) => ({ at: START + day * DAY, gravity: truth(START + day * DAY) + off });

describe('an offset from readings by hand', () => {
  it('is proposed from the first reading by hand that agrees with it', () => {
    const since = START + 4 * DAY;
    const suggestion = suggestOffset(readings((at) => (at >= since - HOUR ? 0.003 : 0)), [hand(1), hand(3), hand(4.2), hand(7), hand(10, 0.0004)]);
    expect(suggestion).toMatchObject({ since: START + 4.2 * DAY, offset: expect.closeTo(-0.003, 3) });
    expect(suggestion?.pairs).toHaveLength(3);
  });

  it('is not proposed for less than a hydrometer can tell', () => {
    expect(suggestOffset(readings(() => 0.0012), [hand(2), hand(5)])).toBeNull();
  });

  it('asks more of one reading alone, which may be misread', () => {
    expect(suggestOffset(readings(() => 0.0025), [hand(5)])).toBeNull();
    expect(suggestOffset(readings(() => 0.0025), [hand(4), hand(5)])).not.toBeNull();
    expect(suggestOffset(readings(() => 0.005), [hand(5)])).toMatchObject({ offset: -0.005 });
  });

  it('is not made from readings by hand that disagree with each other', () => {
    expect(suggestOffset(readings(() => 0), [hand(3, 0.006), hand(5, -0.001)])).toBeNull();
  });

  it('leaves out readings by hand with no float reading beside them', () => {
    const silent = readings(() => 0.005).filter((reading) => reading.at < START + 5 * DAY);
    expect(pairUp(silent, [hand(4), hand(8)])).toHaveLength(1);
    expect(suggestOffset([], [hand(4)])).toBeNull();
  });
});
