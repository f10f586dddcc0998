import { describe, expect, it } from 'vitest';
import { finalGravityPrior, largerOf, normalBelow } from '../../../lib/core/fit/priors';
import { finalGravityHalfWidths, hoursInterval } from '../../../lib/core/fit/intervals';
import { Random } from '../../evaluation/random';

describe('the prior of the final gravity', () => {
  it('has the normal distribution of Abramowitz & Stegun 26.2.17 behind it', () => {
    // Table 26.1.
    for (const [z, p] of [[0, 0.5], [1, 0.84134475], [1.96, 0.97500211], [-2.5, 0.00620967]] as const) expect(normalBelow(z)).toBeCloseTo(p, 6);
  });

  it('takes the larger of two normals with Clark’s moments, as a million draws do', () => {
    const random = new Random(4, 'clark');
    const a = { mean: 2, sd: 3 };
    const b = { mean: 4, sd: 1.5 };
    let sum = 0;
    let square = 0;
    const n = 1_000_000;
    for (let i = 0; i < n; i += 1) {
      const x = Math.max(random.normal(a.mean, a.sd), random.normal(b.mean, b.sd));
      sum += x;
      square += x * x;
    }
    const clark = largerOf(a, b);
    expect(clark.mean).toBeCloseTo(sum / n, 1);
    expect(clark.sd).toBeCloseTo(Math.sqrt(square / n - (sum / n) ** 2), 1);
  });

  it('lies in the middle of the yeast’s range where the alcohol does not matter', () => {
    const prior = finalGravityPrior({ kind: 'beer', attenuation: { min: 0.72, max: 0.8 }, alcoholToleranceAbv: 12 }, 50, 1, false);
    expect(prior.mean).toBeCloseTo(12, 0);
  });

  it('holds the card of a yeast against the sugars of the must, which malt alone leaves to the card', () => {
    const low = { attenuation: { min: 0.9, max: 1 }, alcoholToleranceAbv: 18 };
    // Dry by composition: 94.3 % of honey's extract ferments, 0.5 g of alcohol from a gram (White et al. 1962; Balling).
    const mead = finalGravityPrior({ kind: 'mead', ...low }, 90, 1, false);
    expect(mead.mean).toBeLessThan(90 * 0.05 - 3);
    expect(mead.mean).toBeGreaterThan(-12);
    // An apple juice without a card ends near 0.998, as dry ciders do (common practice).
    const cider = finalGravityPrior({ kind: 'cider', attenuation: null, alcoholToleranceAbv: null }, 50, 1, false);
    expect(Math.abs(cider.mean + 2)).toBeLessThan(2);
    const beer = finalGravityPrior({ kind: 'beer', ...low }, 50, 1, false);
    expect(beer.mean).toBeCloseTo(2.5, 1);
    // A must whose alcohol would near what the yeast bears is left to the card.
    const strong = finalGravityPrior({ kind: 'mead', attenuation: { min: 0.6, max: 0.7 }, alcoholToleranceAbv: null }, 110, 1, false);
    expect(strong.mean).toBeCloseTo(110 * 0.35, 5);
  });

  it('is wider where the card and the sugars lie far apart than where they agree', () => {
    const of = (min: number, max: number) => finalGravityPrior({ kind: 'mead', attenuation: { min, max }, alcoholToleranceAbv: 18 }, 75, 1, false);
    const [agreed, apart] = [of(1.04, 1.14), of(0.92, 1.02)];
    // Two that agree know more than the card alone.
    expect(agreed.sd).toBeLessThan(75 * (0.05 / 1.28));
    expect(apart.sd).toBeGreaterThan(1.5 * agreed.sd);
    // What the card says is still within reach.
    expect(apart.mean + 1.28 * apart.sd).toBeGreaterThan(75 * 0.03);
  });

  it('stops a strong mead at what its yeast bears', () => {
    const prior = finalGravityPrior({ kind: 'mead', attenuation: { min: 1, max: 1.1 }, alcoholToleranceAbv: 12 }, 130, 1, false);
    expect(prior.mean).toBeGreaterThan(30);
  });
});

describe('the intervals', () => {
  it('nest at every stage', () => {
    for (const done of [0, 0.2, 0.5, 0.7, 0.9, 0.99]) {
      const { half80, half95 } = finalGravityHalfWidths(1.5, done);
      expect(half95).toBeGreaterThanOrEqual(half80);
      const { lo, hi } = hoursInterval(48, done);
      expect(lo).toBeLessThanOrEqual(48);
      expect(hi).toBeGreaterThanOrEqual(48);
    }
  });
});
