import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { blendInto, CellarWorkError, rack, split } from '@/lib/core/family/cellarwork';
import { blend, contentsOf, portion, readContents, sweetened, unfermented, water, type Contents } from '@/lib/core/family/contents';
import { ancestry, FamilyError } from '@/lib/core/family/tree';

const number = (min: number, max: number) => fc.double({ min, max, noNaN: true });
const drink = fc
  .record({ volumeL: number(0.5, 50), originalGravity: number(1.02, 1.12), fallen: number(0, 1.05) })
  .map(({ volumeL, originalGravity, fallen }) => contentsOf({ volumeL, originalGravity, gravity: originalGravity - fallen * (originalGravity - 1) }));

function sameMasses(a: Contents, b: Contents) {
  for (const key of ['massG', 'ethanolG', 'extractG'] as const) expect(Math.abs(a[key] - b[key])).toBeLessThan(1e-6 * Math.max(1, a.massG));
}

describe('the ledger of a vessel', () => {
  test('reads back what was put in: volume, effective original gravity, gravity and strength', () => {
    fc.assert(
      fc.property(number(0.5, 50), number(1.02, 1.12), number(0, 1.05), (volumeL, originalGravity, fallen) => {
        const gravity = originalGravity - fallen * (originalGravity - 1);
        const back = readContents(contentsOf({ volumeL, originalGravity, gravity }));
        expect(back?.volumeL).toBeCloseTo(volumeL, 6);
        expect(back?.effectiveOg).toBeCloseTo(originalGravity, 8);
        expect(back?.gravity).toBeCloseTo(gravity, 8);
      }),
    );
  });

  test('an empty vessel reads as nothing', () => {
    expect(readContents({ massG: 0, ethanolG: 0, extractG: 0 })).toBeNull();
  });

  test('water halves a must’s points, and sugar lifts them by 0.3865 a gram a litre (NBS C440), within 1.5 %', () => {
    const must = unfermented(10, 1.06);
    expect(readContents(blend([must, water(10)]))?.gravity).toBeCloseTo(1.03, 3);
    const fed = readContents(blend([must, sweetened(500, 0)]));
    // 500 g also takes up 0.3 L: reckoned on the volume it ends in.
    const points = (600 + 0.3865 * 500) / (fed?.volumeL ?? NaN);
    expect(Math.abs(1000 * ((fed?.effectiveOg ?? 0) - 1) / points - 1)).toBeLessThan(0.015);
  });
});

describe('racking, splitting and blending conserve mass, sugar and alcohol', () => {
  test('racking: what is left and what moved make up what was there', () => {
    fc.assert(
      fc.property(drink, number(0, 0.9), (from, share) => {
        const litres = readContents(from)?.volumeL ?? 0;
        const { contents, left } = rack(from, share * litres);
        sameMasses(from, blend([contents, left]));
      }),
    );
  });

  test('racking and topping up: the top-up is there in full', () => {
    fc.assert(
      fc.property(drink, drink, number(0, 0.5), (from, topUp, share) => {
        const litres = readContents(from)?.volumeL ?? 0;
        const { contents, left } = rack(from, share * litres, [topUp]);
        sameMasses(blend([from, topUp]), blend([contents, left]));
      }),
    );
  });

  test('splitting: the parts and the rest make up what was there, and each is the same drink', () => {
    fc.assert(
      fc.property(drink, number(0.05, 0.45), number(0.05, 0.45), (from, a, b) => {
        const litres = readContents(from)?.volumeL ?? 0;
        const { parts, rest } = split(from, [a * litres, b * litres]);
        sameMasses(from, blend([...parts, rest]));
        for (const part of parts) expect(readContents(part)?.gravity).toBeCloseTo(readContents(from)?.gravity ?? 0, 8);
      }),
    );
  });

  test('blending: the order does not matter, and the strength lies between those of the parts', () => {
    fc.assert(
      fc.property(drink, drink, (a, b) => {
        sameMasses(blend([a, b]), blend([b, a]));
        const strengths = [a, b].map((c) => readContents(c)?.abvPercent ?? NaN);
        const mixed = blendInto([a, b]).reading?.abvPercent ?? NaN;
        expect(mixed).toBeGreaterThan(Math.min(...strengths) - 0.05);
        expect(mixed).toBeLessThan(Math.max(...strengths) + 0.05);
      }),
    );
  });

  test('more cannot be taken than is there', () => {
    const five = contentsOf({ volumeL: 5, originalGravity: 1.05, gravity: 1.0 });
    expect(() => rack(five, 5.1)).toThrow(CellarWorkError);
    expect(() => rack(five, -1)).toThrow(CellarWorkError);
    expect(() => split(five, [3, 3])).toThrow(CellarWorkError);
    expect(split(five, [2.5, 2.5]).rest.massG).toBe(0);
  });

  test('topping up with water weakens; with juice it feeds, and says so', () => {
    const five = contentsOf({ volumeL: 5, originalGravity: 1.06, gravity: 1.0 });
    const watered = rack(five, 0.5, [water(0.5)]);
    expect(watered.abvChangePercent).toBeCloseTo(-0.8, 1);
    expect(watered.cautions).toEqual([]);
    const fed = rack(five, 0.5, [unfermented(0.5, 1.05)]);
    expect(fed.gravityChangePoints).toBeGreaterThan(3);
    expect(fed.cautions[0]).toContain('may work again');
  });

  test('a portion is a portion of everything', () => {
    const whole = contentsOf({ volumeL: 10, originalGravity: 1.06, gravity: 1.01 });
    sameMasses(blend([portion(whole, 0.3), portion(whole, 0.7)]), whole);
  });
});

describe('the family tree', () => {
  test('a blend of a blend knows its grandparents by volume', () => {
    const tree = [
      { from: 'crab', to: 'first blend', litres: 3 },
      { from: 'russet', to: 'first blend', litres: 1 },
      { from: 'first blend', to: 'second blend', litres: 2 },
      { from: 'perry', to: 'second blend', litres: 2 },
    ];
    expect(ancestry('second blend', tree)).toEqual([
      { batch: 'perry', share: 0.5 },
      { batch: 'crab', share: 0.375 },
      { batch: 'russet', share: 0.125 },
    ]);
  });

  test('a batch topped up keeps its own share; one that came from nowhere is its own', () => {
    expect(ancestry('a', [{ from: 'b', to: 'a', litres: 1 }], { a: 4 })).toEqual([{ batch: 'a', share: 0.8 }, { batch: 'b', share: 0.2 }]);
    expect(ancestry('a', [])).toEqual([{ batch: 'a', share: 1 }]);
  });

  test('shares always add to one', () => {
    const branch = fc.record({ from: fc.integer({ min: 0, max: 5 }), step: fc.integer({ min: 1, max: 3 }), litres: number(0.1, 20) });
    fc.assert(
      fc.property(fc.array(branch, { maxLength: 15 }), (branches) => {
        const tree = branches.map((b) => ({ from: `${b.from}`, to: `${b.from + b.step}`, litres: b.litres }));
        expect(ancestry('5', tree).reduce((all, a) => all + a.share, 0)).toBeCloseTo(1, 9);
      }),
    );
  });

  test('nobody is their own ancestor', () => {
    expect(() => ancestry('a', [{ from: 'a', to: 'b', litres: 1 }, { from: 'b', to: 'a', litres: 1 }])).toThrow(FamilyError);
  });
});
