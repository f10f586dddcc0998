import { describe, expect, it } from 'vitest';
import { between, DAY_S, dayTicks, heightOf, ticks, wholeOf } from '@/components/compare/scales';
import type { Curve } from '@/components/compare/curves';

const points = [{ day: 0, value: 1.05 }, { day: 10, value: 1.01 }, { day: 20, value: 1.0 }];
const curve: Curve = { id: 'a', name: 'A', colour: '#000', points, rings: [{ day: 24, value: 0.999 }], posts: [] };

describe('the scales of the comparison', () => {
  it('span all there is of the longest, a reading by hand after the curve too', () => {
    expect(wholeOf([curve])).toEqual({ from: 0, to: 24 * DAY_S });
    expect(wholeOf([])).toEqual({ from: 0, to: DAY_S });
  });

  it('cut a curve at the edges of what is shown, by its value there', () => {
    expect(between(points, 5, 15)).toEqual([{ day: 5, value: expect.closeTo(1.03, 9) as number }, { day: 10, value: 1.01 }, { day: 15, value: expect.closeTo(1.005, 9) as number }]);
    expect(between(points, 15, 30)).toEqual([{ day: 15, value: expect.closeTo(1.005, 9) as number }, { day: 20, value: 1.0 }]);
    expect(between(points, 30, 40)).toEqual([]);
  });

  it('fit the height to what is shown, so that a part is larger when one looks closer', () => {
    const [all, part] = [heightOf(points)!, heightOf(between(points, 15, 20))!];
    expect(part.top - part.bottom).toBeLessThan((all.top - all.bottom) / 5);
    expect(heightOf([])).toBeNull();
  });

  it('write round figures inside, never outside', () => {
    expect(ticks(0.996, 1.052, 6).map((value) => value.toFixed(2))).toEqual(['1.00', '1.01', '1.02', '1.03', '1.04', '1.05']);
    expect(dayTicks(0, 40, 12)).toEqual([0, 5, 10, 15, 20, 25, 30, 35, 40]);
    expect(dayTicks(3.1, 4.4, 6)).toEqual([3.25, 3.5, 3.75, 4, 4.25]);
  });
});
