import { describe, expect, test } from 'vitest';
import { suggestName, type SugarFrom } from '@/lib/core/naming/kind';
import { allergenLine, strengthLine } from '@/lib/core/naming/label';
import { kindByMust, makeupOf } from '@/lib/core/naming/makeup';
import { exactly } from '@/lib/core/units/range';
import { line } from '../../support/must';

const NOTHING: SugarFrom = { apple: 0, pear: 0, grape: 0, otherFruit: 0, honey: 0, malt: 0, sugar: 0 };
const named = (from: Partial<SugarFrom>, abvPercent = 7, spiced = false) => suggestName({ from: { ...NOTHING, ...from }, abvPercent, spiced });

describe('the name of a drink', () => {
  test.each([
    [{ apple: 1 }, 6, false, 'cider'],
    [{ apple: 0.8, pear: 0.2 }, 6, false, 'cider'],
    [{ pear: 1 }, 6, false, 'perry'],
    [{ honey: 1 }, 12, false, 'mead'],
    [{ honey: 0.6, apple: 0.4 }, 9, false, 'cyser'],
    [{ honey: 0.7, otherFruit: 0.3 }, 11, false, 'melomel'],
    [{ honey: 0.7, apple: 0.15, otherFruit: 0.15 }, 11, false, 'melomel'],
    [{ honey: 1 }, 12, true, 'metheglin'],
    [{ honey: 0.6, grape: 0.4 }, 12, false, 'pyment'],
    [{ honey: 0.5, malt: 0.5 }, 8, false, 'braggot'],
    [{ malt: 0.9, sugar: 0.1 }, 5, false, 'beer'],
    [{ grape: 1 }, 12, false, 'wine'],
    [{ otherFruit: 0.3, sugar: 0.7 }, 12, false, 'fruit wine'],
    [{ apple: 0.6, otherFruit: 0.4 }, 6, false, 'fruit wine'],
    [{ sugar: 1 }, 11, true, 'flower or herb wine'],
    [{ sugar: 1 }, 11, false, 'fermented drink'],
    [{}, 5, false, 'fermented drink'],
  ] as const)('%o at %s % vol, spiced %s: %s', (from, abv, spiced, name) => {
    expect(named(from, abv, spiced).name).toBe(name);
  });

  test('8.5 % vol is the line between cider and wine: below it is cider, at it no more', () => {
    expect(named({ apple: 1 }, 8.49).name).toBe('cider');
    expect(named({ apple: 1 }, 8.5).name).toBe('apple wine');
    expect(named({ pear: 1 }, 8.5).name).toBe('pear wine');
  });

  test('it is a suggestion: the rule is shown, and that law differs', () => {
    for (const suggestion of [named({ apple: 1 }), named({ honey: 1 }), named({ malt: 1 }), named({})]) {
      expect(suggestion.rule).not.toBe('');
      expect(suggestion.source).not.toBe('');
      expect(suggestion.law).toContain('Law differs by country');
    }
  });

  test('weak and strong meads are told apart', () => {
    expect(named({ honey: 1 }, 6).style).toBe('session');
    expect(named({ honey: 1 }, 15).style).toBe('sack');
  });

  test('the makeup of a sheet is read from its lines, by the sugar they bring', () => {
    const makeup = makeupOf([line('pear-juice', 4, 'L'), line('honey', 0.1, 'kg'), line('spice', 5, 'g'), line('raisins', 50, 'g'), line('water', 1, 'L')], 6);
    expect(makeup.spiced).toBe(true);
    expect(makeup.from.pear).toBeCloseTo(4 * 0.1225 * 1047.6, -1);
    expect(makeup.from.grape).toBeGreaterThan(30);
    expect(makeup.from.apple).toBe(0);
  });

  test('what is called beer is judged as one only where malt brings half of its sugar', () => {
    const juice = line('pear-juice', 4, 'L');
    expect(kindByMust('beer', [juice])).toBe('wine');
    expect(kindByMust('beer', [line('honey', 1, 'kg'), juice])).toBe('mead');
    expect(kindByMust('beer', [])).toBe('beer');
    expect(kindByMust('cider', [juice])).toBe('cider');
  });
});

describe('the lines of fact on a label', () => {
  test('the strength has one decimal, and is not told at 1.2 % vol and below (Regulation (EU) 1169/2011)', () => {
    expect(strengthLine({ lo: 6.1, value: 6.35, hi: 6.6 })).toMatchObject({ text: '6.4 % vol' });
    expect(strengthLine(exactly(1.2)).text).toBeNull();
  });

  test('sulphite is told above 10 mg/L, by the upper end of what may be in it', () => {
    expect(allergenLine([], exactly(10), true).text).toBeNull();
    expect(allergenLine([], { lo: 5, value: 8, hi: 10.2 }, true).text).toBe('Contains sulphites.');
  });

  test('added and never measured counts as told', () => {
    expect(allergenLine([], null, true).text).toBe('Contains sulphites.');
    expect(allergenLine([], null, false)).toMatchObject({ text: null });
    expect(allergenLine([], null, false).notes.join(' ')).toContain('without a measurement');
  });

  test('allergens of must and finings stand in one line, each once', () => {
    expect(allergenLine(['fish', 'gluten', 'sulphites', 'gluten'], exactly(40), true).text).toBe('Contains sulphites, gluten, fish.');
  });
});
