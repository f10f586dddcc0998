import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { acidDose, tanninDose } from '@/lib/core/additions/acid';
import { asSugar, effectOf, sugarForPoints } from '@/lib/core/additions/effect';
import { brightFrom, FININGS, finingState } from '@/lib/core/additions/fining';
import { HAZES } from '@/lib/core/additions/haze';
import { nutrientPlan, PORTIONS_AT, sugarUsedShare, type NutrientInput } from '@/lib/core/additions/nutrients';
import { contentsOf } from '@/lib/core/family/contents';
import { catalogued } from '@/lib/core/must/catalogue';

const vat = { volumeL: 10, originalGravity: 1.06, gravity: 1.02 };

describe('what an addition does', () => {
  test('sugar lifts gravity and effective original gravity, and thins the alcohol a little', () => {
    const effect = effectOf(vat, { what: 'sugar', sugarG: 500, waterG: 0 });
    expect(effect?.gravityChangePoints).toBeGreaterThan(15);
    expect(effect?.ogChangePoints).toBeGreaterThan(15);
    expect(effect?.abvChangePercent).toBeLessThan(0);
    expect(effect?.cautions.join(' ')).toContain('foams over');
  });

  test('water takes the strength down in proportion', () => {
    const effect = effectOf(vat, { what: 'water', volumeL: 10 });
    expect(effect?.after.abvPercent).toBeCloseTo((effect?.before.abvPercent ?? 0) / 2, 1);
  });

  test('honey brings its water too', () => {
    const honey = catalogued('honey');
    if (!honey) throw new Error('no honey');
    const addition = asSugar(honey, 1000);
    expect(addition).toMatchObject({ what: 'sugar' });
    const direct = effectOf(vat, addition);
    const dry = effectOf(vat, { what: 'sugar', sugarG: 1000, waterG: 0 });
    expect(direct?.ogChangePoints).toBeLessThan(dry?.ogChangePoints ?? 0);
  });

  test('sugar and alcohol are conserved through any two additions, in any order', () => {
    const value = (min: number, max: number) => fc.double({ min, max, noNaN: true });
    fc.assert(
      fc.property(value(0, 2000), value(0, 5), value(1.0, 1.1), (sugarG, volumeL, gravity) => {
        const before = contentsOf(vat);
        const first = effectOf(vat, { what: 'sugar', sugarG, waterG: 0 });
        if (!first) throw new Error('no effect');
        const second = effectOf({ volumeL: first.after.volumeL, originalGravity: first.after.effectiveOg, gravity: first.after.gravity }, { what: 'must', volumeL, gravity });
        const must = contentsOf({ volumeL, originalGravity: gravity, gravity });
        expect(second?.contents.extractG).toBeCloseTo(before.extractG + sugarG + must.extractG, 3);
        expect(second?.contents.ethanolG).toBeCloseTo(before.ethanolG + must.ethanolG, 3);
        expect(second?.contents.massG).toBeCloseTo(before.massG + sugarG + must.massG, 3);
      }),
    );
  });

  test('the sugar for a wanted lift gives that lift', () => {
    const grams = sugarForPoints(vat, 12);
    expect(effectOf(vat, { what: 'sugar', sugarG: grams ?? 0, waterG: 0 })?.gravityChangePoints).toBeCloseTo(12, 3);
    expect(sugarForPoints(vat, -1)).toBeNull();
    expect(sugarForPoints(vat, 5000)).toBeNull();
  });
});

describe('nutrient by the sugar used', () => {
  const input: NutrientInput = { volumeL: 10, neededMgL: 200, givenMgL: 80, givenG: 0, nutrient: 'complex', originalGravity: 1.1, gravity: 1.1, expectedFinal: 1.0, abvPercent: 0 };

  test('four equal portions at 0, 10, 20 and 33 % of the sugar, with the gravity of each', () => {
    const plan = nutrientPlan({ ...input, nutrient: 'complex', neededMgL: 130 });
    expect(plan.portions.map((p) => p.atShare)).toEqual(PORTIONS_AT);
    expect(plan.portions.map((p) => Number(p.atGravity.toFixed(3)))).toEqual([1.1, 1.09, 1.08, 1.067]);
    expect(plan.portions.map((p) => p.state)).toEqual(['due', 'later', 'later', 'later']);
    // 50 mg/L × 10 L ÷ 100 mg/g = 5 g in four.
    expect(plan.totalG.value).toBe(5);
    expect(plan.portions[0]?.grams).toBe(1.2);
  });

  test('portions never add to more than the total', () => {
    fc.assert(
      fc.property(fc.double({ min: 0, max: 500, noNaN: true }), fc.double({ min: 1.0, max: 1.1, noNaN: true }), (neededMgL, gravity) => {
        const plan = nutrientPlan({ ...input, neededMgL, gravity });
        expect(plan.portions.reduce((all, p) => all + p.grams, 0)).toBeLessThanOrEqual(plan.totalG.value + 1e-9);
      }),
    );
  });

  test('DAP stays within 0.3 g/L of all that was given (OIV Code, Annex A.1)', () => {
    const plan = nutrientPlan({ ...input, nutrient: 'dap', neededMgL: 400, givenMgL: 0, givenG: 2 });
    expect(plan.totalG.value).toBe(1);
    expect(plan.heldByLimit).toBe(true);
  });

  test('none after half of the sugar, and no DAP above 9 % vol', () => {
    expect(nutrientPlan({ ...input, gravity: 1.045 }).totalG.value).toBe(0);
    expect(nutrientPlan({ ...input, nutrient: 'dap', gravity: 1.06, abvPercent: 9.5 }).totalG.value).toBe(0);
    expect(nutrientPlan({ ...input, gravity: 1.06 }).totalG.value).toBeGreaterThan(0);
  });

  test('the share of sugar used stays between none and all', () => {
    expect(sugarUsedShare(1.1, 1.05, 1.0)).toBeCloseTo(0.5, 9);
    expect(sugarUsedShare(1.1, 1.11, 1.0)).toBe(0);
    expect(sugarUsedShare(1.1, 0.99, 1.0)).toBe(1);
    expect(sugarUsedShare(1.0, 1.0, 1.0)).toBe(1);
  });
});

describe('acid and tannin', () => {
  test('malic acid for 1.5 g/L as tartaric in 10 L, rounded down', () => {
    expect(acidDose(4, 5.5, 10, 'malic').grams.value).toBe(13.4);
  });

  test('large changes are held to a step, and chalk is for what is too sharp', () => {
    expect(acidDose(2, 8, 10, 'tartaric')).toMatchObject({ heldToStep: true, grams: { value: 20 } });
    expect(acidDose(9, 7, 10, 'tartaric')).toMatchObject({ heldToStep: true, of: 'chalk (calcium carbonate)', grams: { value: 6.6 } });
  });

  test('tannin over the usual range is told', () => {
    expect(tanninDose(0.3, 4.5)).toMatchObject({ standing: 'usual', grams: { value: 1.3 } });
    expect(tanninDose(0.8, 4.5).standing).toBe('above');
  });
});

describe('finings', () => {
  const at = 1_900_000_000_000;
  const minutes = (n: number) => at + n * 60_000;
  const run = { intervalMin: 60, settleDays: 5, firstAt: at, secondAt: null };

  test('the second dose is due after its hour, and late is told in minutes', () => {
    expect(finingState(run, minutes(38))).toEqual({ state: 'waiting_for_second', dueAt: minutes(60) });
    expect(finingState(run, minutes(60))).toEqual({ state: 'second_due', dueAt: minutes(60), lateMin: 0 });
    expect(finingState(run, minutes(82))).toMatchObject({ state: 'second_due', lateMin: 22 });
  });

  test('it settles from the second dose on, not from the first', () => {
    const both = { ...run, secondAt: minutes(300) };
    expect(finingState(both, minutes(301))).toEqual({ state: 'settling', brightFrom: minutes(300) + 5 * 86_400_000 });
    expect(finingState(both, minutes(300) + 5 * 86_400_000)).toMatchObject({ state: 'settled' });
  });

  test('while the second dose is out, it is bright so many days after it is due, or after now where it is late', () => {
    expect(brightFrom(run, minutes(5))).toBe(minutes(60) + 5 * 86_400_000);
    expect(brightFrom(run, minutes(90))).toBe(minutes(90) + 5 * 86_400_000);
    expect(brightFrom({ ...run, intervalMin: null }, minutes(90))).toBe(at + 5 * 86_400_000);
  });

  test('finings in one part settle from it', () => {
    expect(finingState({ ...run, intervalMin: null }, minutes(1)).state).toBe('settling');
  });

  test('every fining in two parts has an interval, and every one a caution and a source', () => {
    for (const fining of FININGS) {
      expect(fining.parts.length > 1).toBe(fining.intervalMin !== null);
      expect(fining.caution).not.toBe('');
      expect(fining.status).toBe('common practice');
    }
    expect(FININGS.find((f) => f.key === 'two-part')?.intervalMin).toBe(60);
  });

  test('the four usual hazes each have a test and a remedy', () => {
    for (const cause of ['pectin', 'protein', 'yeast', 'starch']) {
      expect(HAZES.find((h) => h.cause === cause)).toMatchObject({ test: expect.stringMatching(/.{10,}/), remedy: expect.stringMatching(/.{5,}/) });
    }
  });
});
