import { describe, expect, it } from 'vitest';
import { fitModel, MODEL_NAMES, modelGradient, modelGravity, MOST_POINTS, namesOf, type ModelName } from '../../../lib/core/fit/models';
import { KineticCurve } from '../../../lib/core/fit/kinetic';

const TRUE: Record<ModelName, number[]> = {
  logistic: [62, 8, 0.9, 4],
  logistic5: [62, 8, 0.9, 3, 0.6],
  gompertz: [62, 8, 11, 1.5],
  richards: [62, 8, 11, 1.5, 0.4],
  kinetic: [62, 8, -0.9, 0.2, -1.2, -0.8],
};

const days = Array.from({ length: 240 }, (_, i) => i / 12);

describe('the attenuation curves', () => {
  for (const model of MODEL_NAMES) {
    it(`recovers the parameters of a ${model} curve that made the data`, () => {
      const fit = fitModel(model, days, days.map((day) => modelGravity(model, TRUE[model], day)));
      if (fit.reason === 'no fit') throw new Error('no fit');
      fit.parameters!.forEach((value, j) => expect(value, namesOf(model)[j]).toBeCloseTo(TRUE[model][j]!, 4));
      expect(fit.rms).toBeLessThan(1e-5);
      expect(fit.converged).toBe(true);
    });

    it(`has derivatives of the ${model} curve that agree with differences`, () => {
      const p = TRUE[model];
      const step = 1e-6;
      for (const day of [0.5, 2, 5, 11]) {
        const out = modelGradient(model, p, day);
        p.forEach((value, j) => {
          const up = p.slice();
          const down = p.slice();
          up[j] = value + step;
          down[j] = value - step;
          const difference = (modelGravity(model, up, day) - modelGravity(model, down, day)) / (2 * step);
          expect(out[j], `${namesOf(model)[j]} at ${day} d`).toBeCloseTo(difference, 4);
        });
      }
    });
  }

  it('falls as its differential equation says (Runge–Kutta 4, step 0.001 d)', () => {
    const [, , kappa, m, kr, delta] = [60, 5, Math.exp(-0.8), Math.exp(0.1), Math.exp(-1.2), 1 / (1 + Math.exp(1.3))];
    const k = kappa! * (1 + kr!);
    const w = 0.18 * m! + 0.02;
    const slope = (t: number, s: number): number => ((-k / (1 + Math.exp(-(t - m!) / w))) * s * (1 - delta! * (1 - s))) / (kr! + s);
    let s = 1;
    const h = 0.001;
    for (let i = 0; i < 6000; i += 1) {
      const t = i * h;
      const k1 = slope(t, s);
      const k2 = slope(t + h / 2, s + (h / 2) * k1);
      const k3 = slope(t + h / 2, s + (h / 2) * k2);
      const k4 = slope(t + h, s + h * k3);
      s += (h / 6) * (k1 + 2 * k2 + 2 * k3 + k4);
    }
    const curve = new KineticCurve([60, 5, -0.8, 0.1, -1.2, -1.3]);
    expect(curve.share(6)).toBeCloseTo(s, 9);
    expect(curve.tauOfShare(s)).toBeCloseTo(6, 6);
  });
});

describe('what cannot be fitted', () => {
  const flat = days.map(() => 50);
  const falling = days.map((day) => modelGravity('logistic', TRUE.logistic, day));
  it.each([
    ['values that are not numbers', days, days.map((_, i) => (i === 7 ? Number.NaN : 50 - i)), 'a value is not a number'],
    ['a constant', days, flat, 'the gravity does not change'],
    ['three points', [1, 2, 3], [60, 50, 40], 'too few points'],
    ['a million points', { length: 1_000_000 } as ArrayLike<number>, { length: 1_000_000 } as ArrayLike<number>, `more than ${MOST_POINTS} points`],
  ])('says so of %s, within 100 ms', (_, t, g, why) => {
    const begun = performance.now();
    const fit = fitModel('logistic', t, g);
    expect(performance.now() - begun).toBeLessThan(100);
    expect(fit).toMatchObject({ reason: 'no fit', why });
  });

  it('says so of bounds the wrong way round', () => {
    const fit = fitModel('logistic', days, falling, { lower: [0, 0, 5, 0], upper: [100, 100, 1, 10] });
    expect(fit).toMatchObject({ reason: 'no fit', why: 'a lower bound is not below its upper one' });
  });

  it('keeps the parameters within their bounds', () => {
    const fit = fitModel('logistic', days, falling, { lower: [0, 20, 0.01, 0], upper: [100, 100, 10, 10] });
    if (fit.reason === 'no fit') throw new Error('no fit');
    expect(fit.parameters![1]).toBe(20);
  });
});
