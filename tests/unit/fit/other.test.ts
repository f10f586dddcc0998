import { describe, expect, it } from 'vitest';
import { assess } from '../../../lib/core/assess';
import { modelGravity, type ModelName } from '../../../lib/core/fit/models';
import { aicc, layBeside, OTHER_CURVES, type Beside } from '../../../lib/core/fit/other';
import type { Footing, Reading } from '../../../lib/core/types';
import { Random } from '../../evaluation/random';

const PITCH = Date.UTC(2026, 1, 20, 18);
const DAY = 86_400_000;

/** A beer at 20 °C whose fall follows one of the curves, read every 30 min for some days. */
function footingOf(model: ModelName, parameters: readonly number[], days: number): Footing {
  const random = new Random(11, 'other');
  const readings: Reading[] = Array.from({ length: days * 48 }, (_, i) => ({ at: PITCH + (i / 48) * DAY, gravity: 1 + (modelGravity(model, parameters, i / 48) + random.normal(0, 0.3)) / 1000, temperature: 20 }));
  const { footing } = assess({ kind: 'beer', pitchedAt: PITCH, originalGravity: 1.05, volumeL: 10, vesselL: 14, attenuation: { min: 0.72, max: 0.8 }, alcoholToleranceAbv: 10, temperature: { minC: 18, maxC: 22 }, neck: 'blow_off', events: [], timeZone: 'UTC' }, readings, PITCH + days * DAY);
  expect(footing).not.toBeNull();
  return footing!;
}

const laid = (footing: Footing, name: (typeof OTHER_CURVES)[number]): Beside => {
  const beside = layBeside(footing, name);
  expect('rms' in beside).toBe(true);
  return beside as Beside;
};

describe('another curve over the readings', () => {
  it('finds the end of a record that it describes itself', () => {
    const footing = footingOf('gompertz', [50, 12, 18, 0.8], 9);
    const beside = laid(footing, 'gompertz');
    expect(beside.end.other).toBeCloseTo(12, 0);
    expect(beside.rms.other).toBeLessThan(0.4);
    expect(beside.gravity(PITCH + 9 * DAY)).toBeCloseTo(12, 0);
    expect(beside.gravity(PITCH)).toBeGreaterThan(48);
  });

  it('is worse supported on a record that another curve made', () => {
    const kinetic = footingOf('kinetic', [50, 12, -0.6, -0.45, -1.9, -0.5], 9);
    for (const name of OTHER_CURVES) expect(laid(kinetic, name).aicMore).toBeGreaterThan(2);
    const logistic = footingOf('logistic', [50, 12, 2, 2], 9);
    expect(laid(logistic, 'logistic').aicMore!).toBeLessThan(laid(logistic, 'gompertz').aicMore!);
  });

  it('misses the end early on by more than the curve that knows the yeast', () => {
    const early = footingOf('kinetic', [50, 12, -0.6, -0.45, -1.9, -0.5], 2);
    for (const name of OTHER_CURVES) {
      const { end } = laid(early, name);
      expect(Math.abs(end.other - 12)).toBeGreaterThan(Math.abs(end.own - 12));
    }
  });

  it('weighs by Akaike’s criterion for small samples, and not with too few readings', () => {
    // n ln(RSS/n) + 2K + 2K(K+1)/(n−K−1) with n = 20, RSS = 5, K = 5 (four parameters and the variance).
    expect(aicc(5, 20, 4)).toBeCloseTo(20 * Math.log(0.25) + 10 + 60 / 14, 10);
    expect(aicc(5, 6, 4)).toBeNull();
    const footing = footingOf('kinetic', [50, 12, -0.6, -0.45, -1.9, -0.5], 3);
    const few = { ...footing, data: { hours: footing.data.hours.slice(0, 4), tau: footing.data.tau.slice(0, 4), points: footing.data.points.slice(0, 4), sd: footing.data.sd.slice(0, 4) } };
    expect(layBeside(few, 'logistic')).toMatchObject({ reason: 'no fit', why: 'too few points' });
  });
});
