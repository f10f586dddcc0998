import { describe, expect, it } from 'vitest';
import { fitPolynomial } from '@/lib/core/calibration/polynomial';
import { num, publishedTable } from '../support/table';

/** Correct digits of a figure against the certified one: the measure of the NIST data sets themselves. */
const digits = (value: number, certified: number) => -Math.log10(Math.max(1e-16, Math.abs((value - certified) / certified)));

/** National Institute of Standards and Technology, Statistical Reference Datasets, linear regression. */
const SETS = [
  { name: 'norris', degree: 1, certified: [-0.262323073774029, 1.00211681802045], sigma: 0.884796396144373 },
  { name: 'pontius', degree: 2, certified: [0.673565789473684e-3, 0.732059160401003e-6, -0.316081871345029e-14], sigma: 0.205177424076185e-3 },
] as const;

describe('least-squares polynomials against certified values', () => {
  for (const { name, degree, certified, sigma } of SETS) {
    it(`finds every coefficient of ${name} to ten digits`, () => {
      const rows = publishedTable(`nist/${name}.csv`);
      const fit = fitPolynomial(rows.map((row) => num(row, 'x')), rows.map((row) => num(row, 'y')), degree);
      certified.forEach((value, power) => expect(digits(fit!.coefficients[power]!, value), `power ${power}`).toBeGreaterThan(10));
      expect(digits(fit!.sigma!, sigma)).toBeGreaterThan(10);
    });
  }
});
