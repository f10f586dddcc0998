import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { sulphiteDose, TABLET_SO2_MG, TOTAL_LIMIT_MG_L, type SulphiteInput } from '@/lib/core/sulphite/dose';
import { SORBIC_LIMIT_MG_L, stabiliseDose } from '@/lib/core/sulphite/stabilise';

const input: SulphiteInput = { pH: 3.4, abvPercent: 10, celsius: 20, volumeL: 10, freeMgL: 5, totalMgL: 20, molecularTarget: 0.5, salt: 'potassium_metabisulphite' };

describe('sulphite dose', () => {
  test('at pH 3.4, 10 % vol and 20 °C half a milligram of molecular takes 13 mg/L free, not the 20 of the textbook pK', () => {
    const dose = sulphiteDose(input);
    expect(dose.freeNeededMgL.value).toBeCloseTo(0.5 * (1 + 10 ** (3.4 - 1.997)), 6);
    expect(dose.freeNeededMgL.value).toBeCloseTo(13.1, 1);
    // (13.1 − 5)/0.7 = 11.6 mg/L, 0.116 g of SO2, 0.202 g of salt.
    expect(dose.saltG.value).toBe(0.2);
    expect(dose.totalAfterMgL.value).toBeCloseTo(20 + 11.5, 1);
  });

  test('the higher the pH, the more it takes', () => {
    fc.assert(
      fc.property(fc.double({ min: 2.8, max: 4, noNaN: true }), (pH) => {
        expect(sulphiteDose({ ...input, pH: pH + 0.1 }).freeNeededMgL.value).toBeGreaterThan(sulphiteDose({ ...input, pH }).freeNeededMgL.value);
      }),
    );
  });

  test('the total never passes the limit, whatever is asked', () => {
    fc.assert(
      fc.property(fc.double({ min: 2.6, max: 4.5, noNaN: true }), fc.double({ min: 0, max: 199, noNaN: true }), fc.double({ min: 0, max: 1.5, noNaN: true }), (pH, totalMgL, molecularTarget) => {
        const dose = sulphiteDose({ ...input, pH, totalMgL, molecularTarget, freeMgL: null });
        expect(dose.totalAfterMgL.value).toBeLessThanOrEqual(TOTAL_LIMIT_MG_L + 1e-9);
        expect(dose.heldByLimit || dose.saltG.value >= 0).toBe(true);
      }),
    );
  });

  test('a dose cut by the limit says so and points to the pH', () => {
    const dose = sulphiteDose({ ...input, pH: 4.4, molecularTarget: 0.8 });
    expect(dose.heldByLimit).toBe(true);
    expect(dose.cautions.join(' ')).toContain('Lower the pH first');
  });

  test('enough is enough: no dose', () => {
    expect(sulphiteDose({ ...input, freeMgL: 40 }).saltG.value).toBe(0);
  });

  test('it always says that sulphite does not stop a working yeast, and is dangerous to people with asthma', () => {
    const words = sulphiteDose(input).cautions.join(' ');
    expect(words).toContain('does not stop');
    expect(words).toContain('asthma');
  });

  test('unmeasured free sulphite is told; a cold or strong drink outside the table too', () => {
    expect(sulphiteDose({ ...input, freeMgL: null })).toMatchObject({ molecularNow: { value: null } });
    expect(sulphiteDose({ ...input, celsius: 12 }).cautions.join(' ')).toContain('edge is used');
  });

  test('a tablet nominally brings 254 mg: about 67 mg/L in a US gallon', () => {
    expect(TABLET_SO2_MG / 3.785).toBeCloseTo(67, 0);
  });

  test('a pH that is no drink’s is refused', () => {
    expect(() => sulphiteDose({ ...input, pH: 7 })).toThrow(RangeError);
  });
});

describe('stabilising', () => {
  test('sorbate stays within the limit and falls with the strength', () => {
    const weak = stabiliseDose(10, 8).sorbateG.value;
    expect(weak * 0.7464 * 100).toBeLessThanOrEqual(SORBIC_LIMIT_MG_L);
    expect(weak).toBe(2.6);
    expect(stabiliseDose(10, 14).sorbateG.value).toBe(1.3);
  });
});
