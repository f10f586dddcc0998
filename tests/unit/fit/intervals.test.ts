import { describe, expect, it } from 'vitest';
import { hoursToGo, lateness } from '../../../lib/core/fit/intervals';
import { KineticCurve } from '../../../lib/core/fit/kinetic';

describe('the hours still to go', () => {
  it('are the curve’s while most of the fall is to come, and the tail’s at its end', () => {
    expect(hoursToGo(100, 10, 0.5)).toBeCloseTo(100, 9);
    expect(hoursToGo(100, null, 0.99)).toBeCloseTo(100, 9);
    expect(hoursToGo(100, 10, 0.99)).toBeCloseTo(10, 9);
    const between = hoursToGo(100, 10, 0.8);
    expect(between).toBeGreaterThan(10);
    expect(between).toBeLessThan(100);
  });

  it('are never negative, and what both say where they agree', () => {
    for (const done of [0.05, 0.3, 0.6, 0.8, 0.9, 1]) {
      expect(hoursToGo(0, 0, done)).toBeGreaterThanOrEqual(0);
      expect(hoursToGo(200, 200, done)).toBeCloseTo(200, 9);
    }
  });
});

describe('the lateness of the curve', () => {
  it('is less the nearer the alcohol comes to what the yeast bears, and not asked of what is weak or not told', () => {
    const late = [0.5, 0.75, 0.9, 1, 1.2].map((burden) => lateness('mead', burden, 0.4).curve);
    expect(late).toEqual([...late].sort((a, b) => b - a));
    expect(late[0]).toBeGreaterThan(0);
    expect(late.at(-1)).toBeLessThan(0);
    expect(lateness('wine', 0.6, 0.9)).toMatchObject({ curve: 0 });
    expect(lateness('wine', 1, 0.9).curve).toBeLessThan(0);
    for (const none of [lateness('beer', 0.9, 0.3), lateness('cider', 0.9, 0.3), lateness('mead', null, 0.3)]) expect(none.curve).toBe(0);
    for (const kind of ['beer', 'cider'] as const) expect(lateness(kind, null, 0.8).curve).toBeLessThan(0);
    expect(lateness('mead', 1, 0.9).tail).toBeLessThan(lateness('mead', 0.6, 0.9).tail);
    expect(hoursToGo(100, null, 0.4, { curve: 0.3, tail: 0 })).toBeLessThan(100);
    expect(hoursToGo(100, 100, 0.99, { curve: 0, tail: 0.3 })).toBeLessThan(100);
  });
});

describe('the steepest place of the curve', () => {
  it('is where its fall is greatest', () => {
    const curve = new KineticCurve([60, 2, -0.8, 0.3, -1.2, -0.6]);
    const at = curve.peakTau(5);
    for (let tau = 0.05; tau < 8; tau += 0.05) expect(curve.rate(tau)).toBeLessThan(1.01 * curve.rate(at));
  });
});
