import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { at20, feltAt, gravityBy, validSpan, type Calibration } from '@/lib/core/calibration/apply';
import { fitCalibration, type CalibrationPoint } from '@/lib/core/calibration/calibrate';
import { valueOf } from '@/lib/core/calibration/polynomial';
import { correctHydrometer, GLASS_EXPANSION } from '@/lib/core/gravity/hydrometer';

/** A float whose inclination follows the density that it feels by a gentle curve. */
const TRUE = [0.985, 0.9e-3, 8e-6];
const pointAt = (inclination: number, temperature = 20, off = 0): CalibrationPoint => ({ inclination, temperature, gravity: at20(valueOf(TRUE, inclination), temperature) + off });
const tilts = [8, 18, 27, 38, 49, 60];

const calibrationOf = (points: CalibrationPoint[], degree: 1 | 2 | 3, correctsTemperature = true): Calibration => {
  const outcome = fitCalibration(points, degree, correctsTemperature);
  if (!outcome.ok) throw new Error(outcome.reason);
  return { coefficients: outcome.fit.coefficients, low: outcome.fit.low, high: outcome.fit.high, offset: 0, correctsTemperature };
};

describe('a calibration', () => {
  it('gives back the gravity of liquids it never saw, at temperatures it never saw', () => {
    const calibration = calibrationOf(tilts.map((tilt) => pointAt(tilt)), 2);
    for (const [inclination, temperature] of [[12, 10], [33, 25], [55, 4], [44, 32]] as const) {
      const { gravity } = pointAt(inclination, temperature);
      expect(gravityBy(calibration, { gravity: null, inclination, temperature })).toBeCloseTo(gravity, 9);
    }
  });

  it('may be made from points of different temperatures', () => {
    const calibration = calibrationOf(tilts.map((tilt, index) => pointAt(tilt, 8 + 4 * index)), 2);
    expect(gravityBy(calibration, { gravity: null, inclination: 30, temperature: 20 })).toBeCloseTo(valueOf(TRUE, 30), 9);
  });

  it('takes out expansion as the hydrometer correction does, but for the glass', () => {
    // The hydrometer correction with the glass taken out again is the same density of the same solution.
    for (const celsius of [5, 12, 28, 35]) {
      const shown = feltAt(1.05, celsius) * (1 + GLASS_EXPANSION * (celsius - 20));
      expect(correctHydrometer(shown, celsius)).toBeCloseTo(1.05, 6);
      expect(at20(feltAt(1.05, celsius), celsius)).toBeCloseTo(1.05, 10);
    }
  });

  it('recovers the curve within its own band when the points are read to a point', () => {
    let inside = 0;
    let total = 0;
    fc.assert(
      fc.property(fc.array(fc.integer({ min: -1, max: 1 }), { minLength: 8, maxLength: 8 }), (errors) => {
        const outcome = fitCalibration([6, 14, 22, 30, 38, 46, 54, 62].map((tilt, index) => pointAt(tilt, 20, errors[index]! * 0.0005)), 2, true);
        if (!outcome.ok) return false;
        for (const at of outcome.fit.curve.filter((one) => one.inclination >= 6 && one.inclination <= 62)) {
          total += 1;
          if (Math.abs(at.felt - valueOf(TRUE, at.inclination)) <= at.half + 1e-12) inside += 1;
        }
        return outcome.fit.rightTo < 0.004;
      }),
      { numRuns: 200, seed: 5 },
    );
    expect(inside / total).toBeGreaterThan(0.9);
  });

  it('shows the point that is wrong by what the others would have made of it', () => {
    const outcome = fitCalibration(tilts.map((tilt, index) => pointAt(tilt, 20, index === 3 ? 0.01 : 0)), 1, true);
    if (!outcome.ok) throw new Error(outcome.reason);
    const missed = outcome.fit.points.map((point) => Math.abs(point.missedBy ?? 0));
    expect(missed.indexOf(Math.max(...missed))).toBe(3);
    const without = calibrationOf(tilts.filter((_, index) => index !== 3).map((tilt) => pointAt(tilt)), 1);
    expect(outcome.fit.points[3]!.missedBy).toBeCloseTo(outcome.fit.points[3]!.gravity - valueOf(without.coefficients!, tilts[3]!), 9);
  });

  it('is refused where one inclination would mean two gravities', () => {
    const bent = [10, 20, 30, 40, 50].map((inclination) => ({ inclination, temperature: 20, gravity: 1.06 - ((inclination - 32) / 100) ** 2 }));
    const outcome = fitCalibration(bent, 2, false);
    expect(outcome).toMatchObject({ ok: false });
    expect(!outcome.ok && outcome.reason).toMatch(/turns back near 3[12]/);
  });

  it('is refused just outside its points too, where it would still be used', () => {
    // The vertex of this parabola lies half a degree past the last point.
    const bent = [10, 20, 30, 40, 50].map((inclination) => ({ inclination, temperature: 20, gravity: 1.06 - ((inclination - 50.5) / 160) ** 2 }));
    expect(fitCalibration(bent, 2, false)).toMatchObject({ ok: false });
  });

  it('says how many points are missing, and that they lie too close together', () => {
    expect(fitCalibration([pointAt(10), pointAt(40)], 1, true)).toEqual({ ok: false, reason: 'A curve of degree 1 needs 3 points or more; there are 2.' });
    expect(fitCalibration([pointAt(10), pointAt(12), pointAt(14)], 1, true)).toMatchObject({ ok: false, reason: expect.stringContaining('must span 20') });
  });

  it('takes a float that leans the other way', () => {
    const turned = tilts.map((tilt) => ({ ...pointAt(tilt), inclination: 80 - tilt }));
    expect(fitCalibration(turned, 2, true)).toMatchObject({ ok: true });
  });
});

describe('what a calibration makes of a reading', () => {
  const calibration = calibrationOf(tilts.map((tilt) => pointAt(tilt)), 2);

  it('tells no gravity far outside its points, and one a little outside', () => {
    expect(validSpan(8, 60)).toEqual({ from: expect.closeTo(0.2, 9), to: expect.closeTo(67.8, 9) });
    expect(gravityBy(calibration, { gravity: null, inclination: 67, temperature: 20 })).not.toBeNull();
    expect(gravityBy(calibration, { gravity: null, inclination: 69, temperature: 20 })).toBeNull();
  });

  it('moves a gravity that is sent by the offset alone', () => {
    const offset: Calibration = { coefficients: null, low: null, high: null, offset: -0.003, correctsTemperature: false };
    expect(gravityBy(offset, { gravity: 1.02, inclination: null, temperature: 12 })).toBeCloseTo(1.017, 12);
    expect(gravityBy(offset, { gravity: 0.971, inclination: null, temperature: 12 })).toBeNull();
  });

  it('takes the inclination where a float sends both', () => {
    expect(gravityBy(calibration, { gravity: 1.2, inclination: 30, temperature: 20 })).toBeCloseTo(valueOf(TRUE, 30), 9);
    expect(gravityBy(calibration, { gravity: 1.03, inclination: null, temperature: 20 })).toBe(1.03);
  });

  it('is finite or absent for anything that telemetry lets through', () => {
    fc.assert(
      fc.property(fc.double({ min: 0, max: 90, noNaN: true }), fc.double({ min: -10, max: 60, noNaN: true }), (inclination, temperature) => {
        const gravity = gravityBy(calibration, { gravity: null, inclination, temperature });
        return gravity === null || (gravity >= 0.97 && gravity <= 1.2);
      }),
      { seed: 3 },
    );
  });
});
