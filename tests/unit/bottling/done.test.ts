import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { agreementHours, checkDone } from '@/lib/core/bottling/done';
import { DAY, doneInput, NOW } from '../../support/bench';

const twice = (gravity: number) => [
  { at: NOW - 8 * DAY, gravity },
  { at: NOW, gravity },
];

describe('is it done', () => {
  test('two equal readings a week apart, the float at rest, inside the expected range: done', () => {
    expect(checkDone(doneInput())).toMatchObject({ verdict: 'done', explanation: 'dry', readAgainAt: null });
  });

  test('one reading settles nothing, and it says when the next one does', () => {
    const check = checkDone(doneInput({ hydrometer: [{ at: NOW, gravity: 1.0 }] }));
    expect(check.verdict).toBe('unknown');
    expect(check.readAgainAt).toBe(NOW + agreementHours(NOW - 56 * DAY, NOW) * 3_600_000);
  });

  test('no reading by hand: unknown, and nothing is said of the sugar', () => {
    expect(checkDone(doneInput({ hydrometer: [] }))).toMatchObject({ verdict: 'unknown', gravity: null, remaining: null });
  });

  test('equal readings a day apart are too close together', () => {
    const check = checkDone(doneInput({ hydrometer: [{ at: NOW - DAY, gravity: 1 }, { at: NOW, gravity: 1 }] }));
    expect(check.verdict).toBe('unknown');
    expect(check.reasons[0]).toContain('1 day only');
  });

  test('the older the batch, the longer its readings must agree: 3 to 7 days', () => {
    expect(agreementHours(NOW - 5 * DAY, NOW)).toBe(72);
    expect(agreementHours(NOW - 25 * DAY, NOW)).toBe(120);
    expect(agreementHours(NOW - 300 * DAY, NOW)).toBe(168);
    expect(agreementHours(null, NOW)).toBe(168);
  });

  test('a fall of more than a point between readings: not yet', () => {
    expect(checkDone(doneInput({ hydrometer: [{ at: NOW - 8 * DAY, gravity: 1.0021 }, { at: NOW, gravity: 1.001 }] })).verdict).toBe('not_yet');
    expect(checkDone(doneInput({ hydrometer: [{ at: NOW - 8 * DAY, gravity: 1.002 }, { at: NOW, gravity: 1.001 }] })).verdict).toBe('done');
  });

  test('the reading it asks for settles it, however often it was read meanwhile and older as the batch is by then', () => {
    const pitchedAt = NOW - 20 * DAY;
    const fallen = [{ at: NOW - 6 * DAY, gravity: 1.004 }, { at: NOW - 3 * DAY, gravity: 0.9995 }, { at: NOW, gravity: 0.999 }];
    const check = checkDone(doneInput({ pitchedAt, hydrometer: fallen }));
    expect(check).toMatchObject({ verdict: 'not_yet', reasons: ['The last 2 readings agree, but over 3 days only; 4.3 days are asked.'] });
    const again = check.readAgainAt!;
    expect(again).toBeLessThan(NOW + 2 * DAY);
    const then = (at: number) => checkDone(doneInput({ pitchedAt, at, hydrometer: [...fallen, { at, gravity: 0.999 }] })).verdict;
    expect(then(again + 60_000)).toBe('done');
    expect(then(again - DAY / 4)).not.toBe('done');
  });

  test('equal readings do not help while the float may still fall by more than half a point a day', () => {
    expect(checkDone(doneInput({ floatRate: { lo: 0, value: 0.3, hi: 0.6 } })).verdict).toBe('not_yet');
  });

  test('readings from before an addition do not count, and five days must pass after it', () => {
    expect(checkDone(doneInput({ lastAdditionAt: NOW - 4 * DAY })).verdict).toBe('not_yet');
    expect(checkDone(doneInput({ lastAdditionAt: NOW - 6 * DAY })).verdict).toBe('unknown');
  });

  test('a reading older than a week says nothing of today', () => {
    expect(checkDone(doneInput({ hydrometer: [{ at: NOW - 20 * DAY, gravity: 1 }, { at: NOW - 9 * DAY, gravity: 1 }] })).verdict).toBe('unknown');
  });

  test('readings after now are not known now', () => {
    expect(checkDone(doneInput({ hydrometer: [{ at: NOW - 8 * DAY, gravity: 1 }, { at: NOW + DAY, gravity: 1 }] })).verdict).toBe('unknown');
  });
});

describe('sugar left, explained or not', () => {
  test('stopped high without a reason: the dangerous one; all its sugar counts', () => {
    const check = checkDone(doneInput({ hydrometer: twice(1.012) }));
    expect(check).toMatchObject({ verdict: 'stopped_high', explanation: null });
    // 1.050 at 107 % attenuation is 0.9965.
    expect(check.remaining?.value.hi).toBeCloseTo(15.5, 6);
  });

  test('a yeast at its tolerance explains sweetness, but the sugar is still sugar', () => {
    const check = checkDone(doneInput({ kind: 'mead', originalGravity: 1.11, toleranceAbv: 12, expectedFinal: { lo: 1.018, value: 1.022, hi: 1.026 }, hydrometer: twice(1.02) }));
    expect(check).toMatchObject({ verdict: 'done', explanation: 'tolerance' });
    expect(check.remaining?.value.hi).toBeGreaterThan(30);
  });

  test('a sweetener that does not ferment explains its own points and is not counted as sugar', () => {
    const check = checkDone(doneInput({ hydrometer: twice(1.01), unfermentablePoints: 9 }));
    expect(check).toMatchObject({ verdict: 'done', explanation: 'sweetener' });
    expect(check.remaining?.value.hi).toBeCloseTo(1.5, 6);
  });

  test('stabilised at rest: nothing is left to ferment; stabilised at work: everything still is', () => {
    expect(checkDone(doneInput({ hydrometer: twice(1.012), stabilised: true }))).toMatchObject({ verdict: 'done', explanation: 'stabilised', remaining: { value: { hi: 0 } } });
    const working = checkDone(doneInput({ hydrometer: [{ at: NOW - 8 * DAY, gravity: 1.02 }, { at: NOW, gravity: 1.012 }], stabilised: true }));
    expect(working.verdict).toBe('not_yet');
    expect(working.remaining?.value.hi).toBeGreaterThan(10);
  });

  test('a range that has a yeast leave the sugar of fruit or honey behind explains nothing, and its sugar counts', () => {
    // 1.050 at 65 to 75 % would end at 1.0125 to 1.0175.
    const claimed = { lo: 1.0125, value: 1.015, hi: 1.0175 };
    for (const kind of ['cider', 'mead', 'wine'] as const) {
      const check = checkDone(doneInput({ kind, expectedFinal: claimed, hydrometer: twice(1.015) }));
      expect(check, kind).toMatchObject({ verdict: 'stopped_high', explanation: null });
      expect(check.remaining?.value.hi, kind).toBeGreaterThan(15);
    }
    // Below 1.007 it is let pass as dry enough, with every point down to 1.000 counted.
    expect(checkDone(doneInput({ expectedFinal: claimed, hydrometer: twice(1.006) })).remaining?.value.hi).toBeCloseTo(6, 6);
    // Malt leaves dextrins, but not half of it.
    const beer = { kind: 'beer', originalGravity: 1.05 } as const;
    expect(checkDone(doneInput({ ...beer, expectedFinal: claimed, hydrometer: twice(1.015) })).verdict).toBe('done');
    expect(checkDone(doneInput({ ...beer, expectedFinal: { lo: 1.024, value: 1.026, hi: 1.028 }, hydrometer: twice(1.026) })).verdict).toBe('stopped_high');
  });

  test('without anything known of the yeast a sweet batch is unknown, a dry one done', () => {
    expect(checkDone(doneInput({ expectedFinal: null, hydrometer: twice(1.006) })).verdict).toBe('unknown');
    expect(checkDone(doneInput({ expectedFinal: null, hydrometer: twice(0.998) })).verdict).toBe('done');
  });

  test('a diastatic yeast is not trusted above 1.000, whatever its range says', () => {
    const check = checkDone(doneInput({ kind: 'beer', originalGravity: 1.06, diastatic: true, expectedFinal: { lo: 1.006, value: 1.008, hi: 1.01 }, hydrometer: twice(1.008) }));
    expect(check.verdict).toBe('stopped_high');
    expect(check.remaining?.value.hi).toBeGreaterThanOrEqual(8);
  });

  test('a hydrometer is never trusted to better than half a point of sugar', () => {
    fc.assert(
      fc.property(fc.double({ min: 0.985, max: 1.06, noNaN: true }), fc.boolean(), fc.boolean(), (gravity, known, diastatic) => {
        const { remaining } = checkDone(doneInput({ hydrometer: twice(gravity), diastatic, ...(known ? {} : { expectedFinal: null, originalGravity: null }) }));
        expect(remaining?.value.hi).toBeGreaterThanOrEqual(0.5);
        expect(remaining?.value.lo).toBeLessThanOrEqual(remaining?.value.value ?? NaN);
        expect(remaining?.value.value).toBeLessThanOrEqual(remaining?.value.hi ?? NaN);
      }),
    );
  });
});
