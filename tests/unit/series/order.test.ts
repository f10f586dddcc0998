import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { median, medianBetween, medianInPlace, middleTwo, select } from '../../../lib/core/series/order';

/** A coarse float repeats its values: whole numbers make many equal ones. */
const values = fc.oneof(
  fc.array(fc.double({ min: -50, max: 150, noNaN: true, noDefaultInfinity: true }), { minLength: 1, maxLength: 200 }),
  fc.array(fc.integer({ min: 0, max: 6 }), { minLength: 1, maxLength: 200 }),
);

describe('order statistics', () => {
  it('selects what a sort would find, with nothing larger before it and nothing smaller behind', () => {
    fc.assert(
      fc.property(values, fc.nat(), (list, seed) => {
        const k = seed % list.length;
        const copy = Float64Array.from(list);
        const found = select(copy, 0, list.length, k);
        expect(found).toBe(Float64Array.from(list).sort()[k]);
        for (let i = 0; i < list.length; i += 1) {
          if (i < k) expect(copy[i]).toBeLessThanOrEqual(found);
          else expect(copy[i]).toBeGreaterThanOrEqual(found);
        }
      }),
    );
  });

  it('finds the same median wherever it is looked for first', () => {
    fc.assert(
      fc.property(values, fc.double({ min: -60, max: 160, noNaN: true }), fc.double({ min: 0, max: 60, noNaN: true }), (list, about, reach) => {
        const near = medianBetween(Float64Array.from(list), list.length, about - reach, about + reach);
        expect(near - median(list)).toBe(0);
      }),
    );
  });

  it('finds the median of four without putting them in order', () => {
    const number = fc.double({ min: -1e3, max: 1e3, noNaN: true });
    fc.assert(
      fc.property(number, number, number, number, (a, b, c, d) => {
        expect(middleTwo(a, b, c, d) - median([a, b, c, d])).toBe(0);
      }),
    );
  });

  it('leaves what lies outside the stretch alone', () => {
    const list = Float64Array.from({ length: 40 }, (_, i) => (i * 7) % 40);
    const around = list.slice();
    medianInPlace(list, 10, 35);
    expect([...list.slice(0, 10), ...list.slice(35)]).toEqual([...around.slice(0, 10), ...around.slice(35)]);
  });

  it('gives the mean of the middle two of an even number', () => {
    expect(median([4, 1, 3, 2])).toBe(2.5);
    expect(median(Array.from({ length: 100 }, (_, i) => (i * 37) % 100))).toBe(49.5);
    expect(median([])).toBeNaN();
  });

  it('ends among values that are not numbers', () => {
    expect(median(new Float64Array(50).fill(Number.NaN))).toBeNaN();
  });
});
