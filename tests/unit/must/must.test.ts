import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { CATALOGUE, YEASTS } from '@/lib/core/must/catalogue';
import { compareSheets } from '@/lib/core/must/compare';
import { reckonMust } from '@/lib/core/must/outcome';
import { amountFor, scaleSheet, scaleToFill } from '@/lib/core/must/solve';
import { readSpread, swing } from '@/lib/core/must/spread';
import { about, between, exactly, isRange, type Range } from '@/lib/core/units/range';
import { line, outcomeOf, sheet, yeastNamed } from '../../support/must';

describe('volume and gravity', () => {
  test('1.5 kg of sugar in 10 kg of water: 13.04 % by mass, 1.0527, and 10.94 L (ICUMSA)', () => {
    const { originalGravity, volumeL } = outcomeOf(sheet());
    // 13.043 %: density 1050.83 kg/m³ between the table's 1050.653 (13 %) and 1054.892 (14 %).
    expect(originalGravity.value.value).toBeCloseTo((1050.653 + 0.0435 * 4.239) / 998.203, 4);
    expect(volumeL.value.value).toBeCloseTo(11.5 / 1.05084, 3);
    expect(originalGravity.value.lo).toBe(originalGravity.value.hi);
  });

  test('sugar takes room: a kilo of it makes about 0.62 L', () => {
    const more = outcomeOf(sheet([line('water', 10, 'kg'), line('table-sugar', 2.5, 'kg')]));
    expect(more.volumeL.value.value - outcomeOf(sheet()).volumeL.value.value).toBeCloseTo(0.62, 1);
  });

  test('an apple juice alone has the gravity of its °Bx', () => {
    const { originalGravity } = outcomeOf(sheet([line('apple-juice', 10, 'L', { extractShare: exactly(0.12) })]));
    expect(originalGravity.value.value).toBeCloseTo(1.04833, 4);
  });

  test('pulp fills the vessel and not the glass', () => {
    const { volumeL, fillL } = outcomeOf(sheet([line('water', 8, 'L'), line('damson', 3, 'kg')]));
    expect(fillL.value.value - volumeL.value.value).toBeCloseTo((3 * 0.09) / 1.5, 3);
  });

  test('grain keeps water and yields what the mash wins', () => {
    const { volumeL, originalGravity } = outcomeOf(sheet([line('water', 15, 'L'), line('pale-malt', 2, 'kg')], { kind: 'beer' }));
    expect(volumeL.value.value).toBeLessThan(14);
    // 2000 × 0.79 × 0.725 = 1145 g in about 13.7 L: 83.7 g/L, 1.032.
    expect(originalGravity.value.value).toBeCloseTo(1.032, 3);
  });

  test('water boiled away makes it stronger', () => {
    const boiled = outcomeOf(sheet(undefined, { boiledAwayL: 2 }));
    expect(boiled.originalGravity.value.value).toBeGreaterThan(outcomeOf(sheet()).originalGravity.value.value);
  });

  test('slow sugar is not there at the pitch, and is told with its days', () => {
    const of = outcomeOf(sheet([line('water', 5, 'L'), line('table-sugar', 0.5, 'kg'), line('candied-peel', 300, 'g')]));
    expect(of.gravityAtPitch.value.value).toBeLessThan(of.originalGravity.value.value);
    expect(of.releases).toMatchObject([{ line: 'candied-peel', overDays: { lo: 5, hi: 14 } }]);
    expect(of.notes.map((n) => n.kind)).toContain('release');
  });
});

describe('amounts by eye', () => {
  test('"about half a jar" is a range, and the result shows it', () => {
    const of = outcomeOf(sheet([line('water', 3, 'L'), line('honey', about(0.5), 'each', { extractShare: exactly(0.82) })]));
    const { lo, value, hi } = of.originalGravity.value;
    expect(hi - value).toBeGreaterThan(0.002);
    expect(value - lo).toBeGreaterThan(0.002);
    expect(of.originalGravity.value.value).toBeCloseTo(outcomeOf(sheet([line('water', 3, 'L'), line('honey', 227, 'g', { extractShare: exactly(0.82) })])).originalGravity.value.value, 9);
  });

  test('a spoon of what nobody has weighed is a problem, not a guess', () => {
    const result = reckonMust(sheet([line('water', 3, 'L'), line('spice', 2, 'tsp')]));
    expect(result).toMatchObject({ ok: false, problems: [{ line: 'spice' }] });
  });

  test('spreads of independent inputs add as squares', () => {
    const spread = readSpread(swing([between(9, 11), between(18, 22)], ([a = 0, b = 0]) => a + b), (total) => total);
    expect(spread.value).toBe(30);
    expect(spread.hi - 30).toBeCloseTo(Math.hypot(1, 2), 9);
    expect(30 - spread.lo).toBeCloseTo(Math.hypot(1, 2), 9);
  });
});

describe('strength and sweetness', () => {
  test('the three methods stand side by side with why they differ', () => {
    const { strength } = outcomeOf(sheet([line('water', 10, 'kg'), line('table-sugar', 2.2, 'kg')]));
    expect(strength.simple.value.value).toBeLessThan(strength.balling.value.value);
    expect(strength.difference).toBeGreaterThan(0.2);
    expect(strength.why).toContain('131.25');
    expect(strength.excise.how.source).toContain('Notice 226');
  });

  test('a yeast at its tolerance leaves sugar, and the sheet says it is not safe in closed bottles', () => {
    const strong = [line('water', 10, 'kg'), line('table-sugar', 4, 'kg')];
    const of = outcomeOf(sheet(strong, { yeast: { ...yeastNamed('cider yeast'), toleranceAbv: exactly(11) } }));
    expect(of.strength.balling.value.value).toBeCloseTo(11, 1);
    expect(of.sugarLeftGPerL.value.value).toBeGreaterThan(45);
    expect(of.sweetness).toMatchObject({ from: 'sweet', to: 'sweet' });
    expect(of.notes.find((n) => n.kind === 'tolerance')?.sentence).toContain('not safe in closed bottles');
    expect(of.potential.balling.value.value).toBeGreaterThan(of.strength.balling.value.value + 3);
  });

  test('a dry must ends dry', () => {
    expect(outcomeOf(sheet(undefined, { yeast: yeastNamed('white wine yeast') })).sweetness).toMatchObject({ from: 'dry', to: 'dry' });
  });

  test('malt ends where the yeast’s attenuation says, fruit sugar does not', () => {
    const beer = outcomeOf(sheet([line('water', 10, 'kg'), line('dry-malt-extract', 1.3, 'kg')], { kind: 'beer', yeast: { ...yeastNamed('ale yeast'), attenuation: exactly(0.75) } }));
    const { value: og } = beer.originalGravity.value;
    const { value: fg } = beer.finalGravity.value;
    expect((og - fg) / (og - 1)).toBeCloseTo(0.75, 1);
  });
});

describe('nitrogen, neck and notes', () => {
  test('a honey must is hungry; nutrient fills it; too much DAP is told', () => {
    const mead = [line('water', 8, 'L'), line('honey', 2.5, 'kg')];
    const hungry = outcomeOf(sheet(mead, { kind: 'mead', yeast: yeastNamed('mead yeast') }));
    expect(hungry.nitrogen.missingMgL).toBeGreaterThan(100);
    const fed = outcomeOf(sheet([...mead, line('dap', 5, 'g')], { kind: 'mead', yeast: yeastNamed('mead yeast') }));
    expect(fed.nitrogen.givenMgL.value.value - hungry.nitrogen.givenMgL.value.value).toBeCloseTo((5000 * 0.2121) / hungry.volumeL.value.value, 0);
    expect(fed.nitrogen.notes.join(' ')).toContain('OIV limit');
  });

  test.each(['potassium-sorbate', 'candied-peel', 'sulphite-tablet'])('%s could hold the yeast back, and it says so', (key) => {
    const of = outcomeOf(sheet([line('water', 5, 'L'), line('table-sugar', 1, 'kg'), key === 'sulphite-tablet' ? line(key, 1, 'each') : line(key, 5, 'g')]));
    expect(of.notes.some((n) => n.kind === 'preservative')).toBe(true);
  });

  test('filled to the neck: start on a tube; with a third free an airlock will do', () => {
    const cider = sheet([line('apple-juice', 4.4, 'L')], { kind: 'cider', vesselL: 4.5 });
    expect(outcomeOf(cider).neck).toMatchObject({ startOn: 'blow_off', fits: true, foam: 'high' });
    expect(outcomeOf({ ...cider, lines: [line('apple-juice', 3, 'L')] }).neck).toMatchObject({ startOn: 'airlock', foam: 'low' });
    expect(outcomeOf({ ...cider, lines: [line('apple-juice', 5, 'L')] }).neck).toMatchObject({ fits: false });
  });

  test('allergens and sulphite of all lines are gathered', () => {
    const of = outcomeOf(sheet([line('water', 5, 'L'), line('dry-malt-extract', 500, 'g'), line('lactose', 100, 'g'), line('potassium-metabisulphite', 0.4, 'g')]));
    expect(of.allergens.toSorted()).toEqual(['gluten', 'milk', 'sulphites']);
    expect(of.notes.find((n) => n.kind === 'sulphite')?.sentence).toContain('label');
  });

  test('cost adds up, and says when a line has none', () => {
    const of = outcomeOf(sheet([line('water', 5, 'L', {}, 0), line('honey', 2, 'kg', {}, 9.5)]));
    expect(of.cost).toMatchObject({ value: { value: 19 }, known: true });
    expect(outcomeOf(sheet([line('water', 5, 'L'), line('honey', 2, 'kg', {}, 9.5)])).cost.known).toBe(false);
  });

  test('an empty or waterless sheet says so', () => {
    expect(reckonMust(sheet([]))).toMatchObject({ ok: false });
    expect(reckonMust(sheet([line('table-sugar', 1, 'kg')]))).toMatchObject({ ok: false, problems: [{ sentence: expect.stringContaining('No water') }] });
  });
});

const anySheet = fc
  .record({ water: fc.double({ min: 8, max: 30, noNaN: true }), sugar: fc.double({ min: 0.1, max: 3, noNaN: true }), honey: fc.double({ min: 0.1, max: 3, noNaN: true }), fruit: fc.double({ min: 0, max: 3, noNaN: true }) })
  .map((a) => sheet([line('water', a.water, 'L'), line('table-sugar', about(a.sugar), 'kg'), line('honey', a.honey, 'kg'), line('blackberry', a.fruit, 'kg')], { yeast: yeastNamed('mead yeast'), boiledAwayL: 0.1 }));

describe('scaling', () => {
  test('is linear: volumes, sugar and cost grow with the factor, gravities and strengths stay', () => {
    fc.assert(
      fc.property(anySheet, fc.double({ min: 0.1, max: 8, noNaN: true }), (of, factor) => {
        const [one, other] = [outcomeOf(of), outcomeOf(scaleSheet(of, factor))];
        const grows = (a: Range, b: Range) => (['lo', 'value', 'hi'] as const).forEach((end) => expect(b[end] / (a[end] * factor)).toBeCloseTo(1, 6));
        const stays = (a: Range, b: Range) => (['lo', 'value', 'hi'] as const).forEach((end) => expect(b[end]).toBeCloseTo(a[end], 6));
        grows(one.volumeL.value, other.volumeL.value);
        grows(one.sugarG.value, other.sugarG.value);
        stays(one.originalGravity.value, other.originalGravity.value);
        stays(one.finalGravity.value, other.finalGravity.value);
        stays(one.strength.balling.value, other.strength.balling.value);
        stays(one.nitrogen.neededMgL.value, other.nitrogen.neededMgL.value);
      }),
      { numRuns: 30 },
    );
  });

  test('to another vessel it fills what was asked', () => {
    const scaled = scaleToFill(sheet(), 4.2, 5);
    expect(scaled && outcomeOf(scaled).fillL.value.value).toBeCloseTo(4.2, 6);
    expect(scaled?.vesselL).toBe(5);
  });

  test('sugar brought is conserved: what the lines bring is what the must holds', () => {
    fc.assert(
      fc.property(anySheet, (of) => {
        const { sugarG, volumeL, originalGravity } = outcomeOf(of);
        // g/L by the gravity's own mass percent.
        const grams = sugarG.value.value / volumeL.value.value;
        expect(grams / (1000 * (originalGravity.value.value - 1))).toBeGreaterThan(2.5);
        expect(grams / (1000 * (originalGravity.value.value - 1))).toBeLessThan(2.7);
      }),
      { numRuns: 50 },
    );
  });

  test('every range of every outcome is in order', () => {
    fc.assert(
      fc.property(anySheet, (of) => {
        const o = outcomeOf(of);
        for (const range of [o.volumeL, o.fillL, o.sugarG, o.originalGravity, o.gravityAtPitch, o.fermentableShare, o.finalGravity, o.sugarLeftGPerL, o.strength.simple, o.strength.balling, o.nitrogen.neededMgL]) {
          expect(isRange(range.value)).toBe(true);
        }
      }),
      { numRuns: 50 },
    );
  });
});

describe('working back', () => {
  test('from an original gravity to the amount of one line', () => {
    const solved = amountFor(sheet(), 'table-sugar', { original: 1.09 });
    if (!solved.ok) throw new Error(solved.sentence);
    expect(outcomeOf(solved.sheet).originalGravity.value.value).toBeCloseTo(1.09, 5);
  });

  test('from a strength, and from the water as well as from the sugar', () => {
    const solved = amountFor(sheet(undefined, { yeast: yeastNamed('white wine yeast') }), 'water', { abvPercent: 10 });
    if (!solved.ok) throw new Error(solved.sentence);
    expect(outcomeOf(solved.sheet).strength.balling.value.value).toBeCloseTo(10, 3);
  });

  test('what one line cannot do is told with what it can', () => {
    const solved = amountFor(sheet(undefined, { yeast: yeastNamed('bread yeast') }), 'table-sugar', { abvPercent: 15 });
    expect(solved).toMatchObject({ ok: false, sentence: expect.stringContaining('between') });
    expect(amountFor(sheet(), 'nothing', { original: 1.05 }).ok).toBe(false);
  });
});

describe('versions', () => {
  test('one change is noted in words', () => {
    const before = sheet([line('water', 5, 'L'), line('honey', about(0.5), 'each'), line('spice', 10, 'g')]);
    const after = { ...before, lines: before.lines.map((l) => (l.id === 'spice' ? { ...l, amount: { ...l.amount, quantity: exactly(6) } } : l)) };
    expect(compareSheets(before, after)).toEqual([{ kind: 'less', line: 'spice', sentence: 'Less spice or herb: 10 g → 6 g.' }]);
    expect(compareSheets(before, before)).toEqual([]);
  });

  test('added, left out, replaced, and figures changed', () => {
    const before = sheet([line('water', 5, 'L'), line('honey', 1, 'kg')]);
    const kinds = (after: typeof before) => compareSheets(before, after).map((c) => c.kind);
    expect(kinds(sheet([line('water', 5, 'L')]))).toEqual(['left_out']);
    expect(kinds(sheet([...before.lines, line('spice', 1, 'g')]))).toEqual(['added']);
    expect(kinds(sheet([line('water', 5, 'L'), { ...line('treacle', 1, 'kg'), id: 'honey' }]))).toEqual(['other_ingredient']);
    expect(kinds(sheet([line('water', 5, 'L'), line('honey', 1, 'kg', { extractShare: exactly(0.79) })]))).toEqual(['figures']);
    expect(kinds(sheet([line('water', 5000, 'ml'), line('honey', 1.2, 'kg')], { yeast: yeastNamed('mead yeast') }))).toContain('yeast');
  });
});

describe('the catalogue', () => {
  test.each(CATALOGUE)('$name is in order and says where its figures come from', (entry) => {
    for (const range of [entry.extractShare, entry.fermentableShare, entry.yanMgPerG, entry.sulphiteMgPerG, entry.densityGPerMl, entry.usualGPerL, entry.releasesOverDays, entry.each?.grams ?? null]) {
      expect(range === null || isRange(range)).toBe(true);
    }
    expect(entry.extractShare.value + entry.insolubleShare).toBeLessThanOrEqual(1);
    expect(entry.fermentableShare.hi).toBeLessThanOrEqual(1);
    expect(entry.source).not.toBe('');
  });

  test('keys are unique, and every yeast has its ranges in order', () => {
    expect(new Set(CATALOGUE.map((i) => i.key)).size).toBe(CATALOGUE.length);
    for (const yeast of YEASTS) {
      expect(isRange(yeast.toleranceAbv)).toBe(true);
      expect(yeast.temperatureC.min).toBeLessThan(yeast.temperatureC.max);
    }
  });
});
