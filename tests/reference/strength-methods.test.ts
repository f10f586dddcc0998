import { describe, expect, test } from 'vitest';
import { abvExcise, EXCISE_FACTORS } from '@/lib/core/strength/excise';
import { abvOfMassFraction, ethanolDensity, massFractionOfAbv } from '@/lib/core/strength/ethanol';
import { fermented, shareForStrength } from '@/lib/core/strength/expected';
import { strengthByMethods } from '@/lib/core/strength/methods';
import { abvBalling, abvSimple } from '@/lib/core/strength/strength';
import { correctHydrometerInDrink } from '@/lib/core/gravity/hydrometer-in-drink';
import { exactly } from '@/lib/core/units/range';
import { num, publishedTable } from '../support/table';

describe('strength of the same two gravities by each method (formulas of HMRC Notice 226, Balling, the 131.25 rule)', () => {
  test.each(publishedTable('abv_method_comparison.csv'))('OG $og, FG $fg', (row) => {
    const [og, fg] = [num(row, 'og'), num(row, 'fg')];
    expect(abvSimple(og, fg)).toBeCloseTo(num(row, 'abv_131_25'), 2);
    expect(abvBalling(og, fg)).toBeCloseTo(num(row, 'abv_balling'), 2);
    const excise = abvExcise(og, fg);
    expect(excise?.factor).toBe(num(row, 'hmrc_f'));
    expect(excise?.full).toBeCloseTo(num(row, 'abv_hmrc'), 3);
    expect(excise?.truncated).toBe(num(row, 'abv_hmrc_trunc'));
  });

  test('check value, common practice: OG 1.096 and FG 1.022 give 9.7 % by the 131.25 rule; 9.8 by the excise and 10.1 by Balling', () => {
    const { simple, excise, balling } = strengthByMethods(exactly(1.096), exactly(1.022));
    expect(simple.value.value.toFixed(1)).toBe('9.7');
    expect(excise.value?.truncated).toBe(9.8);
    expect(balling.value.value.toFixed(1)).toBe('10.1');
  });
});

describe('UK excise factors (Notice 226, section 30.3)', () => {
  test.each(publishedTable('abv_hmrc_factor_table.csv'))('a fall of $og_minus_pg_from to $og_minus_pg_to points takes $f', (row) => {
    for (const fall of [num(row, 'og_minus_pg_from'), num(row, 'og_minus_pg_to')]) {
      expect(abvExcise(1.12, 1.12 - fall / 1000)?.factor).toBe(num(row, 'f'));
    }
  });

  test('the notice’s own example: 1045.6 to 1010.2 is a fall of 35.4, factor 0.129', () => {
    expect(abvExcise(1.0456, 1.0102)).toMatchObject({ factor: 0.129, truncated: 4.5 });
  });

  test('strength is truncated, never rounded: 7.59 becomes 7.5; and 5.2 stays 5.2 in spite of binary fractions', () => {
    expect(abvExcise(1.0575, 1.0)).toMatchObject({ factor: 0.132, truncated: 7.5 });
    expect(abvExcise(1.04, 1.0)).toMatchObject({ factor: 0.13, truncated: 5.2 });
    expect(abvExcise(1.1, 1.0)).toMatchObject({ factor: 0.135, truncated: 13.5 });
  });

  test('nothing is claimed above a fall of 100.7 points, nor for a gravity above the original', () => {
    expect(abvExcise(1.1107, 1.01)).not.toBeNull();
    expect(abvExcise(1.1108, 1.01)).toBeNull();
    expect(abvExcise(1.05, 1.06)).toBeNull();
    expect(EXCISE_FACTORS).toHaveLength(11);
    expect(strengthByMethods(exactly(1.14), exactly(1.01)).excise.value).toBeNull();
  });
});

describe('ethanol and water (OIML R 22)', () => {
  // Printed values of the International Alcoholometric Tables; four with both alcohol and temperature off zero.
  test.each([
    [0.31, 13, 956.42],
    [0.88, -10, 848.57],
    [1, 40, 771.93],
    [1, 20, 789.24],
    [0, 0, 999.84],
    [0, 10, 999.7],
  ])('mass fraction %s at %s °C has density %s kg/m³, within 0.006', (p, t, density) => {
    expect(Math.abs(ethanolDensity(p, t) - density)).toBeLessThan(0.006);
  });

  test.each(publishedTable('ethanol_water_20C.csv'))('$abv_percent % vol', (row) => {
    const p = massFractionOfAbv(num(row, 'abv_percent'));
    expect(100 * p).toBeCloseTo(num(row, 'abw_percent'), 2);
    expect(ethanolDensity(p, 20)).toBeCloseTo(num(row, 'rho20_kg_m3'), 2);
    expect(ethanolDensity(p, 15.56)).toBeCloseTo(num(row, 'rho_at_15_56C'), 2);
    expect(abvOfMassFraction(p)).toBeCloseTo(num(row, 'abv_percent'), 9);
  });
});

describe('a hydrometer in a dry drink (ISO 1768 glass, OIML R 22)', () => {
  const rows = publishedTable('hydrometer_temperature_correction_alcohol.csv');

  test.each(rows)('made for $calibration_C °C, $abv_percent % vol at $sample_C °C, within 0.0001', (row) => {
    const calibration = num(row, 'calibration_C');
    const p = massFractionOfAbv(num(row, 'abv_percent'));
    const truth = ethanolDensity(p, 20) / ethanolDensity(0, 20);
    expect(Math.abs(correctHydrometerInDrink(num(row, 'reading'), num(row, 'sample_C'), num(row, 'abv_percent'), calibration) - truth)).toBeLessThan(1e-4);
  });
});

describe('Balling run forwards', () => {
  test('what ferments out and back gives the same strength: the two forms of the relation are one', () => {
    for (const og of [1.03, 1.05, 1.08, 1.11]) {
      for (const share of [0.3, 0.65, 0.9, 1]) {
        const { finalGravity, abvPercent } = fermented(og, share);
        expect(abvBalling(og, finalGravity)).toBeCloseTo(abvPercent, 6);
      }
    }
  });

  test('a dry drink with no extract left is as light as alcohol and water of its strength, within 0.0025 (OIML R 22)', () => {
    for (const og of [1.04, 1.06, 1.08, 1.1]) {
      const { finalGravity, abvPercent } = fermented(og, 1);
      const truth = ethanolDensity(massFractionOfAbv(abvPercent), 20) / ethanolDensity(0, 20);
      expect(Math.abs(finalGravity - truth)).toBeLessThan(0.0025);
    }
  });

  test('the share for a strength gives that strength, and 1 where the must cannot reach it', () => {
    expect(fermented(1.09, shareForStrength(1.09, 8)).abvPercent).toBeCloseTo(8, 6);
    expect(shareForStrength(1.04, 14)).toBe(1);
  });
});
