import { describe, expect, test } from 'vitest';
import { molecularShare, sulphitePk } from '@/lib/core/sulphite/pk';
import { SULPHITE_SALTS } from '@/lib/core/sulphite/dose';
import { num, publishedTable } from '../support/table';

describe('pK of sulphur dioxide (OIV-MA-AS323-04C, Table I)', () => {
  const cells = publishedTable('sulphite_pk_oiv.csv').flatMap((row) =>
    ['20', '25', '30', '35', '40'].map((t) => [num(row, 'alcohol_percent_vol'), Number(t), num(row, `pKT_${t}C`)] as const),
  );

  test.each(cells)('%s %% vol at %s °C is %s', (abv, t, pk) => {
    expect(sulphitePk(abv, t)).toMatchObject({ outsideTable: false });
    expect(sulphitePk(abv, t).pk).toBeCloseTo(pk, 9);
  });

  test('between the lines it stays between the lines', () => {
    const { pk } = sulphitePk(12, 22);
    expect(pk).toBeGreaterThan(1.997);
    expect(pk).toBeLessThan(2.301);
  });

  test('outside the table its edge is used, and said', () => {
    expect(sulphitePk(10, 12)).toMatchObject({ celsius: 20, outsideTable: true });
    expect(sulphitePk(17, 20)).toMatchObject({ abvPercent: 15, outsideTable: true });
  });

  test('1.81 understates the molecular share by a third at 10 % vol and 20 °C, and by more than half at 25 °C', () => {
    const simple = molecularShare(3.4, 1.81);
    expect(1 - simple / molecularShare(3.4, sulphitePk(10, 20).pk)).toBeCloseTo(0.34, 1);
    expect(1 - simple / molecularShare(3.4, sulphitePk(10, 25).pk)).toBeGreaterThan(0.5);
  });
});

describe('molecular sulphite at pK 1.81 (textbook table)', () => {
  test.each(publishedTable('sulphite_molecular_pka181.csv'))('pH $pH', (row) => {
    const share = molecularShare(num(row, 'pH'), 1.81);
    expect(100 * share).toBeCloseTo(num(row, 'molecular_percent'), 2);
    expect(0.8 / share).toBeCloseTo(num(row, 'free_for_0_8'), 0);
  });
});

test('SO2 in the salts by IUPAC standard atomic weights', () => {
  const [k, na, s, o] = [39.0983, 22.9898, 32.06, 15.999];
  const so2 = s + 2 * o;
  expect(SULPHITE_SALTS.potassium_metabisulphite.so2Share).toBeCloseTo((2 * so2) / (2 * k + 2 * s + 5 * o), 3);
  expect(SULPHITE_SALTS.sodium_metabisulphite.so2Share).toBeCloseTo((2 * so2) / (2 * na + 2 * s + 5 * o), 3);
});
