import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { overRatingFrom, pressureByDay, readyFrom } from '@/lib/core/bottling/conditioning';
import { planBottles } from '@/lib/core/bottling/plan';
import { doseFor, gasFromSugar, primingSugar, PRIMING_KINDS } from '@/lib/core/bottling/priming';
import { roundDown, roundTo, roundUp } from '@/lib/core/units/rounding';
import { exactly } from '@/lib/core/units/range';
import { DAY, NOW } from '../../support/bench';

const size = (sizeMl: number, atHand: number | null = null) => ({ key: `${sizeMl}`, sizeMl, atHand });

describe('planning bottles', () => {
  test('five of 750 ml and the rest into a small one', () => {
    expect(planBottles(4.3, 0.2, [size(750), size(330)])).toEqual({
      filled: [{ key: '750', sizeMl: 750, count: 5 }, { key: '330', sizeMl: 330, count: 1 }],
      bottledL: 4.08,
      lostL: 0.2,
      overL: 0.02,
      bottles: 6,
    });
  });

  test('no more than are at hand', () => {
    expect(planBottles(5, 0, [size(750, 2), size(500)]).filled).toEqual([{ key: '750', sizeMl: 750, count: 2 }, { key: '500', sizeMl: 500, count: 7 }]);
  });

  test('binary fractions cost no bottle: 0.3 L less 0.1 fill a 200 ml bottle', () => {
    expect(planBottles(0.3, 0.1, [size(200)]).bottles).toBe(1);
  });

  test('volume is conserved: bottles, losses and what is over make up what was there', () => {
    const litres = fc.double({ min: 0, max: 60, noNaN: true });
    fc.assert(
      fc.property(litres, litres, fc.array(fc.integer({ min: 100, max: 2000 }), { maxLength: 4 }), (volume, losses, sizes) => {
        const plan = planBottles(volume, losses, sizes.map((ml, i) => ({ key: `${i}`, sizeMl: ml, atHand: null })));
        expect(plan.bottledL + plan.lostL + plan.overL).toBeLessThanOrEqual(volume + 1e-6);
        expect(plan.bottledL + plan.lostL + plan.overL).toBeGreaterThan(volume - 0.0011);
      }),
    );
  });
});

describe('priming errs to less gas', () => {
  test('whatever the sugar, what is wanted is never passed', () => {
    const volumes = fc.double({ min: 0, max: 6, noNaN: true });
    const kind = fc.constantFrom(...PRIMING_KINDS.filter((k) => k !== 'syrup' && k !== 'drops'));
    fc.assert(
      fc.property(volumes, volumes, kind, fc.double({ min: 0.5, max: 50, noNaN: true }), (wanted, residual, of, litres) => {
        const sugar = primingSugar(of);
        const dose = doseFor(wanted, residual, sugar, litres);
        const most = residual + gasFromSugar(sugar, exactly(dose.gPerL)).hi;
        expect(most).toBeLessThanOrEqual(Math.max(wanted, residual) + 1e-9);
        expect(dose.totalG).toBeLessThanOrEqual(dose.gPerL * litres + 1e-9);
      }),
    );
  });
});

describe('rounding to the safe side', () => {
  test('up for pressure, down for doses; what stands on a step stays there', () => {
    expect(roundUp(2.91, 0.1)).toBe(3);
    expect(roundUp(0.1 + 0.2, 0.1)).toBe(0.3);
    expect(roundUp(3.0000001, 0.1)).toBe(3.1);
    expect(roundDown(2.99, 0.1)).toBe(2.9);
    expect(roundDown(0.3 * 3, 0.1)).toBe(0.9);
    expect(roundTo(2.25, 0.1)).toBe(2.3);
  });

  test('never to the wrong side by more than a billionth of a step', () => {
    fc.assert(
      fc.property(fc.double({ min: 0, max: 1000, noNaN: true }), (x) => {
        expect(roundUp(x, 0.1)).toBeGreaterThanOrEqual(x - 1e-9);
        expect(roundDown(x, 0.1)).toBeLessThanOrEqual(x + 1e-9);
      }),
    );
  });
});

describe('conditioning', () => {
  const bottle = { residualVolumes: 0.9, addedVolumes: 1.5, remainingPoints: 5, drink: { abvPercent: 6, sugarGPerL: 10 } };

  test('pressure rises day by day, the worst case above what was asked', () => {
    const points = pressureByDay(bottle, NOW, 25);
    points.forEach((p, i) => {
      expect(p.worstBar).toBeGreaterThanOrEqual(p.bar);
      expect(p.bar).toBeGreaterThanOrEqual(points[i - 1]?.bar ?? 0);
    });
    expect(points).toHaveLength(57);
  });

  test('the day a rating is passed is told, and none where it never is', () => {
    const points = pressureByDay(bottle, NOW, 25);
    const day = overRatingFrom(points, 4);
    expect(day).toBeGreaterThan(NOW + DAY);
    expect(overRatingFrom(points, 12)).toBeNull();
  });

  test('two weeks warm, longer in the cold, never less', () => {
    expect(readyFrom(NOW, 20, true).at).toBe(NOW + 14 * DAY);
    expect(readyFrom(NOW, 12, true).days).toBeGreaterThan(20);
    expect(readyFrom(NOW, 28, true).days).toBe(14);
  });
});
