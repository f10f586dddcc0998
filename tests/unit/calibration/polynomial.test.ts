import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { fitPolynomial, slopeExtremes, valueOf } from '@/lib/core/calibration/polynomial';

const cubic = [0.9, 2e-3, -3e-5, 5e-7];
const degrees = [10, 18, 25, 33, 41, 50, 58, 67];

describe('a polynomial through points', () => {
  it('gives back the cubic that made them, to the last digits', () => {
    const fit = fitPolynomial(degrees, degrees.map((x) => valueOf(cubic, x)), 3)!;
    fit.coefficients.forEach((value, power) => expect(value).toBeCloseTo(cubic[power]!, 12));
    expect(fit.sigma).toBeLessThan(1e-13);
  });

  it('agrees with the closed form of a straight line', () => {
    const x = [1, 2, 3, 4, 5];
    const y = [2.1, 3.9, 6.2, 7.8, 10.1];
    const fit = fitPolynomial(x, y, 1)!;
    // Sxy / Sxx = 19.9 / 10 and ȳ − b x̄; leverage 1/n + (x − x̄)²/Sxx.
    expect(fit.coefficients[1]).toBeCloseTo(1.99, 12);
    expect(fit.coefficients[0]).toBeCloseTo(0.05, 12);
    expect(fit.leverage).toEqual([0.6, 0.3, 0.2, 0.3, 0.6].map((value) => expect.closeTo(value, 12)));
    const rss = y.reduce((sum, value, index) => sum + (value - 0.05 - 1.99 * x[index]!) ** 2, 0);
    expect(fit.sigma).toBeCloseTo(Math.sqrt(rss / 3), 12);
    expect(fit.standardError(5)).toBeCloseTo(Math.sqrt((rss / 3) * 0.6), 12);
  });

  it('has leverages that sum to the number of coefficients and residuals that sum to zero, whatever the points', () => {
    const points = fc.uniqueArray(fc.tuple(fc.integer({ min: 0, max: 180 }), fc.double({ min: 0.97, max: 1.2, noNaN: true })), { minLength: 6, maxLength: 20, selector: ([halfDegrees]) => halfDegrees });
    fc.assert(
      fc.property(points, fc.integer({ min: 1, max: 3 }), (given, degree) => {
        const x = given.map(([halfDegrees]) => halfDegrees / 2);
        const fit = fitPolynomial(x, given.map(([, gravity]) => gravity), degree)!;
        expect(fit.leverage.reduce((sum, value) => sum + value, 0)).toBeCloseTo(degree + 1, 6);
        expect(fit.residuals.reduce((sum, value) => sum + value, 0)).toBeCloseTo(0, 8);
      }),
      { numRuns: 200, seed: 11 },
    );
  });

  it('is refused where fewer inclinations than coefficients are told apart', () => {
    expect(fitPolynomial([20, 20, 40], [1, 1.01, 1.05], 2)).toBeNull();
    expect(fitPolynomial([20, NaN, 40], [1, 1.01, 1.05], 1)).toBeNull();
  });

  it('knows where its slope is least and greatest, inside the span too', () => {
    // x³ − 3x: slope 3x² − 3, least at 0.
    expect(slopeExtremes([0, -3, 0, 1], -2, 2)).toEqual({ min: -3, max: 9 });
    expect(slopeExtremes([0, 5], 0, 1)).toEqual({ min: 5, max: 5 });
  });
});
