import { describe, expect, test } from 'vitest';
import { ACIDS, CHALK_PER_TARTARIC } from '@/lib/core/additions/acid';
import { abvFromPriming, gramsPerVolume, primingSugar, syrup } from '@/lib/core/bottling/priming';
import { DAP_NITROGEN } from '@/lib/core/must/nitrogen';
import { GRAPE_FERMENTABLE } from '@/lib/core/must/catalogue';
import { sucroseDensity } from '@/lib/core/gravity/density';
import { correctBrix, gravityByRefractometer, brixShown, sgOfBrix } from '@/lib/core/gravity/refractometer';
import { brixOf } from '@/lib/core/gravity/plato';
import { num, publishedTable } from '../support/table';

describe('priming stoichiometry (IUPAC standard atomic weights, 1 volume = 1.9768 g/L)', () => {
  test.each([
    ['sucrose', 3.844],
    ['glucose', 4.046],
    ['glucose_monohydrate', 4.451],
    ['fructose', 4.046],
  ] as const)('%s: %s g/L for a volume', (kind, grams) => {
    expect(gramsPerVolume(primingSugar(kind)).value.value).toBeCloseTo(grams, 2);
  });

  test('common practice agrees: about 4 g/L of table sugar a volume, and 4 g/L adds about 0.27 % vol', () => {
    expect(gramsPerVolume(primingSugar('sucrose')).value.value).toBeCloseTo(4, 0);
    expect(abvFromPriming(primingSugar('sucrose'), 4)).toBeCloseTo(0.273, 2);
  });

  test('a syrup of two thirds sugar takes half as much again by weight', () => {
    expect(gramsPerVolume(syrup(2 / 3)).value.value / gramsPerVolume(primingSugar('sucrose')).value.value).toBeCloseTo(1.5, 9);
    expect(() => syrup(0)).toThrow(RangeError);
  });
});

describe('stoichiometry of acids and nitrogen', () => {
  test('1 g of tartaric acid is worth 0.893 g of malic, 0.853 g of citric, 1.200 g of lactic acid and 0.667 g of chalk', () => {
    expect(ACIDS.malic.gramsPerTartaric).toBeCloseTo(0.893, 3);
    expect(ACIDS.citric.gramsPerTartaric).toBeCloseTo(0.853, 3);
    expect(ACIDS.lactic.gramsPerTartaric).toBeCloseTo(1.2, 3);
    expect(CHALK_PER_TARTARIC).toBeCloseTo(0.667, 3);
  });

  test('diammonium phosphate is 21.21 % nitrogen: 100 mg/L adds about 21 mg N/L', () => {
    expect(DAP_NITROGEN).toBeCloseTo((2 * 14.007) / 132.056, 4);
  });
});

describe('grape must is not a sugar solution (OIV-MA-AS2-02, Table II)', () => {
  const share = (row: Record<string, string>): number => {
    const w = num(row, 'mass_percent_sucrose_scale') / 100;
    return num(row, 'sugar_g_per_L') / (w * sucroseDensity(w, 20));
  };

  test('the catalogue’s fermentable share holds from 16 to 22 °Bx, within 0.004', () => {
    for (const row of publishedTable('grape_must_oiv_table.csv')) {
      const brix = num(row, 'mass_percent_sucrose_scale');
      if (brix < 16 || brix > 22) continue;
      expect(share(row)).toBeGreaterThan(GRAPE_FERMENTABLE.lo - 0.004);
      expect(share(row)).toBeLessThan(GRAPE_FERMENTABLE.hi + 0.004);
    }
  });

  test('at 20 °Bx a must holds 191.9 g/L of sugar where sucrose would be 216.2', () => {
    expect(0.2 * sucroseDensity(0.2, 20)).toBeCloseTo(216.2, 1);
  });
});

describe('refractometer', () => {
  test.each(publishedTable('refractometer_temperature_correction_oiv.csv'))('temperature correction at $sample_C °C (OIV-MA-AS2-02, Table I)', (row) => {
    for (const brix of [10, 15, 20, 25, 30]) {
      expect((correctBrix(brix, num(row, 'sample_C')) ?? NaN) - brix).toBeCloseTo(num(row, `at_${brix}pct`), 9);
    }
  });

  test('nothing is corrected where no published figure is at hand', () => {
    expect(correctBrix(20, 25)).toBeNull();
    expect(correctBrix(20, 5)).toBeNull();
    expect(correctBrix(20, 20)).toBe(20);
  });

  test.each(publishedTable('density_sucrose_20C.csv').filter((row) => row.sg2020_nbs_c440_in_air !== ''))('$mass_percent °Bx to gravity (NBS C440), within 0.00003', (row) => {
    expect(Math.abs(sgOfBrix(num(row, 'mass_percent')) - num(row, 'sg2020_nbs_c440_in_air'))).toBeLessThan(3e-5);
    expect(brixOf(sgOfBrix(12.3))).toBeCloseTo(12.3, 9);
  });

  test('the gravity of a drink comes back from what the refractometer would show', () => {
    for (const [og, fg] of [[1.05, 1.01], [1.06, 0.997], [1.1, 1.02]] as const) {
      expect(gravityByRefractometer(og, brixShown(og, fg))).toBeCloseTo(fg, 9);
    }
    expect(gravityByRefractometer(1.05, 13.5)).toBeNull();
  });
});
