import { describe, expect, it } from 'vitest';
import { calibratedHours } from '../../../lib/core/fit/intervals';
import { KineticCurve } from '../../../lib/core/fit/kinetic';

describe('the hours still to go', () => {
  it('are the curve’s while most of the fall is to come, and the tail’s at its end', () => {
    expect(calibratedHours(100, 10, 0.5, 'beer')).toBeCloseTo(calibratedHours(100, null, 0.5, 'beer'), 12);
    expect(calibratedHours(100, 10, 0.99, 'beer')).toBeCloseTo(10, 9);
    const between = calibratedHours(100, 10, 0.8, 'beer');
    expect(between).toBeGreaterThan(10);
    expect(between).toBeLessThan(100);
  });

  it('are never negative, nor more than was told', () => {
    for (const kind of ['beer', 'cider', 'mead', 'wine'] as const) {
      for (const done of [0.05, 0.3, 0.6, 0.8, 0.9, 1]) {
        expect(calibratedHours(0, 0, done, kind)).toBeGreaterThanOrEqual(0);
        expect(calibratedHours(200, 200, done, kind)).toBeLessThanOrEqual(200 + 1e-9);
      }
    }
  });
});

describe('the steepest place of the curve', () => {
  it('is where its fall is greatest', () => {
    const curve = new KineticCurve([60, 2, -0.8, 0.3, -1.2, -0.6]);
    const at = curve.peakTau(5);
    for (let tau = 0.05; tau < 8; tau += 0.05) expect(curve.rate(tau)).toBeLessThan(1.01 * curve.rate(at));
  });
});
