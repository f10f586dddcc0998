import { describe, expect, it } from 'vitest';
import { ascending, columnsOf, SERIES } from '@/components/charts/columns';
import { cutAt, gravityNow, valueAt, wholeSpan } from '@/components/charts/picture';
import { layOut, roundSteps, stretched } from '@/components/charts/strips';
import { HOUR, NOW, picture, straight } from './fixtures';

const shown = (data: ReturnType<typeof columnsOf>, series: number) => data[0].filter((_, index) => typeof data[series]![index] === 'number');

describe('a curve', () => {
  it('is read between its points along a straight line, and not outside them', () => {
    const curve = straight();
    expect(valueAt(curve, NOW - 118 * HOUR)!.gravity).toBeCloseTo(1.0595, 9);
    expect(valueAt(curve, NOW - 119.5 * HOUR)!.lo).toBeCloseTo(1.06 - 0.000125 - 0.002, 9);
    expect(valueAt(curve, NOW + 49 * HOUR)).toBeNull();
  });

  it('is cut so that the known part and the forecast meet in one point', () => {
    const { past, coming } = cutAt(straight(), NOW - 0.5 * HOUR);
    expect(past.at(-1)).toEqual(coming[0]);
    expect(past.at(-1)!.at).toBe(NOW - 0.5 * HOUR);
  });
});

describe('the columns of a chart', () => {
  it('ascend strictly in time whatever comes twice or out of order', () => {
    expect(ascending([[3, 1, 3, 2], [30, 10, 31, 20]])).toEqual([[1, 2, 3], [10, 20, 31]]);
    const data = columnsOf(picture({ curve: straight(), readings: { at: [NOW - 9, NOW - 9, NOW - 5], gravity: [1.04, 1.05, 1.06], temperature: [18, 18, 18] } }));
    data[0].forEach((at, index) => index > 0 && expect(at).toBeGreaterThan(data[0][index - 1]!));
  });

  it('end the solid line at now and begin the forecast there', () => {
    const data = columnsOf(picture({ curve: straight() }));
    expect(shown(data, SERIES.fit).at(-1)).toBe(NOW);
    expect(shown(data, SERIES.forecast)[0]).toBe(NOW);
    expect(shown(data, SERIES.forecast).at(-1)).toBe(NOW + 48 * HOUR);
  });

  it('draw the level of the readings up to where the curve begins anew', () => {
    const at = Array.from({ length: 40 }, (_, index) => NOW - 60 * HOUR + index * HOUR);
    const data = columnsOf(picture({ curve: straight(NOW - 20 * HOUR), readings: { at, gravity: at.map(() => 1.07), temperature: at.map(() => null) } }));
    const solid = shown(data, SERIES.fit);
    expect(solid[0]).toBe(NOW - 60 * HOUR);
    expect(solid.at(-1)).toBe(NOW);
    expect(shown(data, SERIES.bandHigh)[0]).toBe(NOW - 20 * HOUR);
  });

  it('end the solid line where a silent sensor was last heard', () => {
    const data = columnsOf(picture({ curve: straight(), silentAt: NOW - 5 * HOUR }));
    expect(shown(data, SERIES.fit).at(-1)).toBe(NOW - 5 * HOUR);
  });

  it('draw a line through the readings of a lane where nothing is fitted, with no band of doubt, and leave a page its dots', () => {
    const unfitted = picture({ readings: { at: [NOW - 20, NOW - 10], gravity: [1.05, 1.049], temperature: [null, 18] } });
    expect(shown(columnsOf(unfitted), SERIES.fit)).toEqual([]);
    expect(shown(columnsOf(unfitted), SERIES.readings)).toEqual([NOW - 20, NOW - 10]);
    const data = columnsOf(unfitted, true);
    expect(shown(data, SERIES.fit)).toEqual([NOW - 20, NOW - 10]);
    expect(shown(data, SERIES.bandHigh)).toEqual([]);
  });

  it('give a batch that stopped no forecast, but the band of what it should have done', () => {
    const flat = { from: NOW - 31 * HOUR, to: NOW, gravity: 1.041, words: 'flat 31 h', kind: 'flat' as const };
    const data = columnsOf(picture({ curve: straight(), expected: straight(NOW - 40 * HOUR), bracket: flat }));
    expect(shown(data, SERIES.forecast)).toEqual([]);
    expect(shown(data, SERIES.bandHigh)).toEqual([]);
    expect(shown(data, SERIES.expectedHigh).length).toBeGreaterThan(10);
    const slow = columnsOf(picture({ curve: straight(), expected: straight(NOW - 40 * HOUR) }));
    expect(shown(slow, SERIES.forecast).length).toBeGreaterThan(10);
    expect(shown(slow, SERIES.expectedHigh)).toEqual([]);
    expect(shown(slow, SERIES.expected).length).toBeGreaterThan(10);
  });
});

describe('a batch that stopped', () => {
  it('follows its own level to now instead of a fit that must also lie flat, past bubbles that lift two readings', () => {
    const from = NOW - 4 * HOUR;
    const at = Array.from({ length: 16 }, (_, index) => from + index * 900);
    const gravity = at.map((_, index) => (index === 5 || index === 6 ? 1.06 : 1.041));
    const flat = { from, to: NOW, gravity: 1.041, words: 'flat 4 h', kind: 'flat' as const };
    const data = columnsOf(picture({ curve: straight(), expected: straight(from), bracket: flat, readings: { at, gravity, temperature: at.map(() => null) } }));
    const after = Array.from(data[0]).flatMap((time, index) => (time > from && typeof data[SERIES.fit]![index] === 'number' ? [data[SERIES.fit]![index]] : []));
    expect(new Set(after)).toEqual(new Set([1.041]));
    expect(shown(data, SERIES.fit).at(-1)).toBe(NOW);
  });
});

describe('the strips', () => {
  it('map their own ends to their own pixels on a scale stretched over all', () => {
    for (const style of ['page', 'phone', 'lane'] as const) {
      const layout = layOut(picture({ gas: [{ at: NOW, value: 0.4 }], readings: { at: [NOW], gravity: [1.04], temperature: [12] } }), style);
      for (const strip of [layout.gravity, layout.temperature, layout.gas]) {
        if (!strip) continue;
        const [min, max] = stretched(strip, layout.height);
        const pixel = (value: number) => ((max - value) / (max - min)) * layout.height;
        expect(pixel(strip.max)).toBeCloseTo(strip.top, 6);
        expect(pixel(strip.min)).toBeCloseTo(strip.top + strip.height, 6);
        expect(strip.top).toBeGreaterThanOrEqual(0);
        expect(strip.top + strip.height).toBeLessThan(layout.height);
      }
    }
  });

  it('put the bed on the floor and the original gravity at the ceiling of a lane', () => {
    const { gravity } = layOut(picture({ curve: straight() }), 'lane', 97);
    expect([gravity.min, gravity.max]).toEqual([1.01, 1.06]);
  });

  it('keep a span of ten points where hardly anything fell', () => {
    const { gravity } = layOut(picture({ originalGravity: null, bed: null, readings: { at: [NOW], gravity: [1.05], temperature: [null] } }), 'lane');
    expect(gravity.max - gravity.min).toBeCloseTo(0.01, 9);
  });

  it('are not pressed flat by a few readings that a bubble lifted', () => {
    const gravity = Array.from({ length: 100 }, (_, index) => (index === 40 ? 1.12 : 1.06 - index * 0.0003));
    const { max } = layOut(picture({ readings: { at: gravity.map((_, index) => NOW - index), gravity, temperature: gravity.map(() => null) } }), 'page').gravity;
    expect(max).toBe(1.06);
  });

  it('have finite ends before there is any reading', () => {
    const { gravity, temperature } = layOut(picture({ originalGravity: null, bed: null, range: null }), 'page');
    expect(Number.isFinite(gravity.min) && gravity.max > gravity.min).toBe(true);
    expect(temperature).toBeNull();
  });

  it('write no figure onto the bed’s: 1.020 gives way to a bed of 1.017 on a phone', () => {
    const { gravity, ticks } = layOut(picture({ originalGravity: 1.068, bed: { value: 1.017, lo: 1.015, hi: 1.019 } }), 'phone');
    const y = (value: number) => ((gravity.max - value) / (gravity.max - gravity.min)) * gravity.height;
    expect(ticks.gravity).not.toContain(1.02);
    expect(ticks.gravity.length).toBeGreaterThan(2);
    for (const value of ticks.gravity) expect(Math.abs(y(value) - y(1.017))).toBeGreaterThanOrEqual(13);
  });

  it('leave out the round value that the bed’s own figure would cover', () => {
    expect(layOut(picture({ bed: { value: 1.0105, lo: 1.009, hi: 1.012 }, curve: straight() }), 'page').ticks.gravity).not.toContain(1.01);
  });
});

describe('round steps', () => {
  it('are steps of 1, 2 or 5 inside the span, both ends included', () => {
    expect(roundSteps(1.01, 1.06, 5)).toEqual([1.01, 1.02, 1.03, 1.04, 1.05, 1.06]);
    expect(roundSteps(0, 1.6, 3)).toEqual([0, 1]);
    expect(roundSteps(0, 1.6, 4)).toEqual([0, 0.5, 1, 1.5]);
    expect(roundSteps(5, 5, 4)).toEqual([]);
  });
});

describe('the span a page opens with', () => {
  it('holds the pitch and now, and looks no further ahead than back', () => {
    const pitched = NOW - 5 * 86_400;
    const span = wholeSpan(picture({ likelyEnd: { lo: NOW + 20 * 86_400, hi: NOW + 40 * 86_400, words: '' } }), pitched);
    expect(span.from).toBeLessThan(pitched);
    expect(span.to - NOW).toBeLessThanOrEqual(5 * 86_400);
    expect(span.to - NOW).toBeGreaterThanOrEqual(3 * 86_400);
  });

  it('is three days ahead of a batch pitched this minute', () => {
    const span = wholeSpan(picture(), NOW);
    expect(span.to).toBe(NOW + 3 * 86_400);
    expect(span.from).toBeLessThan(NOW);
  });
});

describe('gravity now', () => {
  it('is the fit’s, or the last reading’s before there is a fit, or not known', () => {
    expect(gravityNow(picture({ curve: straight() }))).toBeCloseTo(1.03, 9);
    expect(gravityNow(picture({ readings: { at: [NOW - 9, NOW - 5], gravity: [1.044, null], temperature: [1, 1] } }))).toBe(1.044);
    expect(gravityNow(picture())).toBeNull();
  });
});
