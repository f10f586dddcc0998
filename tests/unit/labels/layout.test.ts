import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { DESIGNS, STOCKS, type StockKey } from '@/lib/contracts/labels';
import { fallOf, highestFrom } from '@/lib/services/labels/fall';
import { boxOf, breakLines, fitText, type Box, type Measure } from '@/lib/services/labels/fit';
import { fontFiles, runsOf } from '@/lib/services/labels/fonts';
import { layLabel, MM, type LabelText } from '@/lib/services/labels/layout';

/** A face in which every letter is as wide as a wide one of the real faces. */
const measure: Measure = (text, face, size) => [...text].length * size * (face === 'name' ? 0.66 : 0.6);
const DAY = 86_400_000;

const fall = fallOf({
  pitchedAt: 0,
  bottledAt: 60 * DAY,
  originalGravity: 1.088,
  finalGravity: 0.996,
  curve: Array.from({ length: 60 }, (_, day) => ({ at: day * DAY, gravity: 0.996 + 0.092 * Math.exp(-day / 7) })),
  posts: [0, 1, 2, 25, 39, 59.9].map((day) => ({ at: day * DAY, letter: 'R' })),
});

const text = (over: Partial<LabelText> = {}): LabelText => ({
  name: 'Damson wine',
  under: 'fruit wine, still',
  facts: ['strength|12.1 % vol', 'volume|750 ml', 'pitched|5 Sept 2026', 'bottled|6 Nov 2026', 'ready from|13 Nov 2026', 'bottle|1 of 6', 'lot|26-041'].map((item) => ({ label: item.split('|')[0]!, value: item.split('|')[1]! })),
  small: 'Long shed. Contains sulphites, gluten, crustaceans. Under pressure: chill, open away from faces.',
  ends: { original: '1.088', final: '0.996' },
  qr: 'https://cellar.example/share/abcdefghijklmnopqrstuvwxyz012345',
  ...over,
});

const inside = (box: Box, width: number, height: number) => box.x >= -0.01 && box.y >= -0.01 && box.x + box.w <= width + 0.01 && box.y + box.h <= height + 0.01;
const overlap = (a: Box, b: Box) => Math.min(a.x + a.w, b.x + b.w) - Math.max(a.x, b.x) > 0.01 && Math.min(a.y + a.h, b.y + b.h) - Math.max(a.y, b.y) > 0.01;

/** Every word of it, in order, wherever lines were broken. */
const letters = (value: string) => value.replace(/\s+/g, '');

const words = fc.array(fc.string({ minLength: 1, maxLength: 24, unit: fc.constantFrom(...'abcdefgÄžšß-wWiI') }), { minLength: 1, maxLength: 8 }).map((list) => list.join(' '));

describe('a label', () => {
  for (const stock of Object.keys(STOCKS) as StockKey[]) {
    for (const design of DESIGNS) {
      it(`on ${stock} as ${design} holds all of every text, inside its edge, one over no other`, () => {
        const { label, neck } = STOCKS[stock];
        fc.assert(
          fc.property(words, words, fc.constantFrom('log', 'none'), (name, small, with_) => {
            const said = text({ name, small });
            const picture = layLabel(said, design, { ...label, neck }, with_ === 'log' ? fall : null, measure);
            const [width, height] = [label.width * MM, label.height * MM];
            const all = letters(picture.texts.map((placed) => placed.text).join(''));
            for (const wanted of [name, small, said.under, ...said.facts.flatMap((fact) => [fact.label, fact.value])]) expect(all).toContain(letters(wanted));
            const boxes = picture.texts.map(boxOf);
            for (const [index, box] of boxes.entries()) expect(inside(box, width, height), picture.texts[index]!.text).toBe(true);
            if (picture.qr) {
              const clear = { x: picture.qr.x - MM, y: picture.qr.y - MM, w: picture.qr.w + 2 * MM, h: picture.qr.h + 2 * MM };
              expect(inside(clear, width, height)).toBe(true);
              expect(picture.qr.w).toBeCloseTo(14 * MM, 6);
              for (const [index, box] of boxes.entries()) expect(overlap(box, clear), `${picture.texts[index]!.text} lies on the code`).toBe(false);
            }
            // Lines of one text stand close; those of different texts never on each other.
            const nameBoxes = picture.texts.filter((placed) => placed.face === 'name').map(boxOf);
            const others = picture.texts.filter((placed) => placed.face !== 'name').map(boxOf);
            for (const a of nameBoxes) for (const b of others) expect(overlap({ ...a, h: a.h * 0.9 }, b)).toBe(false);
          }),
          { numRuns: 20 },
        );
      });
    }
  }

  it('carries its code on every stock', () => {
    for (const [key, { label, neck }] of Object.entries(STOCKS)) for (const design of DESIGNS) expect(layLabel(text(), design, { ...label, neck }, fall, measure).qr, `${key} ${design}`).not.toBeNull();
  });

  it('keeps the name above the fall that stands under it', () => {
    const picture = layLabel(text(), 'log', { ...STOCKS.a4_cut.label, neck: false }, fall, measure);
    if (picture.art?.kind !== 'fall') throw new Error('a log label has its fall');
    const { box } = picture.art;
    const width = STOCKS.a4_cut.label.width * MM;
    for (const placed of picture.texts.filter((item) => item.face === 'name')) {
      const bottom = placed.y + placed.size * 0.24;
      expect(bottom).toBeLessThanOrEqual(box.y + box.h * (1 - highestFrom(fall!, placed.x / width)));
    }
  });

  it('steps the name down when it is long, so that sheets look alike', () => {
    const size = (name: string) => Math.max(...layLabel(text({ name }), 'plain', { ...STOCKS.a4_cut.label, neck: false }, null, measure).texts.filter((item) => item.face === 'name').map((item) => item.size));
    expect(size('Crab cider')).toBeGreaterThan(size('Crab cider, kept'));
    expect(size('Crab cider, kept')).toBeGreaterThan(size('Crab cider of the upper orchard'));
  });
});

describe('stock', () => {
  it('fits its page: no label hangs over the edge or over its neighbour', () => {
    for (const [key, stock] of Object.entries(STOCKS)) {
      expect(stock.origin.x + (stock.across - 1) * stock.pitch.x + stock.label.width, key).toBeLessThanOrEqual(stock.page.width);
      expect(stock.origin.y + (stock.down - 1) * stock.pitch.y + stock.label.height, key).toBeLessThanOrEqual(stock.page.height);
      expect(stock.pitch.x, key).toBeGreaterThanOrEqual(stock.label.width);
      expect(stock.pitch.y, key).toBeGreaterThanOrEqual(stock.label.height);
    }
  });
});

describe('text', () => {
  it('breaks at words, and inside a word only where nothing else is left', () => {
    const ten = (line: string) => line.length;
    expect(breakLines('aaa bbb ccc', 7, ten, false)).toEqual(['aaa bbb', 'ccc']);
    expect(breakLines('aaaaaaaaaa', 4, ten, false)).toBeNull();
    expect(breakLines('aaaaaaaaaa', 4, ten, true)).toEqual(['aaaa', 'aaaa', 'aa']);
  });

  it('is set as large as fits and no larger than asked', () => {
    const box = { x: 0, y: 0, w: 100, h: 30 };
    const [line] = fitText('abc', box, { face: 'name', largest: 20, smallest: 7, lines: 1, align: 'right' }, measure);
    expect(line!.size).toBe(20);
    expect(line!.x + line!.w).toBeCloseTo(100, 6);
  });

  it('is set in the face that has its letters, and a sign that none has is a dot', () => {
    const has = new Set(['name-latin', 'name-latin-ext', 'strong-cyrillic', 'strong-latin']);
    expect(runsOf('Žď Mead', 'name', has)).toMatchObject([{ font: 'name-latin-ext', text: 'Žď' }, { font: 'name-latin', text: ' Mead' }]);
    expect(runsOf('Сидр', 'name', has)).toMatchObject([{ font: 'strong-cyrillic', text: 'Сидр' }]);
    expect(runsOf('🍐', 'name', has)).toMatchObject([{ font: 'name-latin', text: '·' }]);
  });

  it('that runs leftwards stands so, its figures and Latin words the other way', () => {
    const has = new Set(fontFiles().map(({ font }) => font));
    const set = (line: string) => runsOf(line, 'name', has).map((run) => run.text);
    expect(set('סיידר תפוחים 2026')).toEqual(['2026', ' ', 'תפוחים', ' ', 'סיידר']);
    expect(set('Crab סיידר cider')).toEqual(['Crab ', 'סיידר', ' cider']);
    expect(set('תפוח (חדש)').join('')).toBe('(חדש) תפוח');
    expect(runsOf('نبيذ', 'name', has)).toMatchObject([{ font: 'name-arabic', text: 'نبيذ' }]);
  });

  it('breaks a long word into pieces about as long as each other', () => {
    expect(breakLines('abcdefghijk', 10, (line) => line.length, true)).toEqual(['abcdef', 'ghijk']);
  });

  it('of the law is never set smaller than can be read where there is room for it, whatever the facts beside it', () => {
    const small = 'Contains sulphites, milk, egg. Made from wheat and barley (gluten) and honey; may contain traces of nuts, soya and celery.';
    for (const stock of Object.keys(STOCKS) as StockKey[]) {
      for (const design of DESIGNS) {
        const { label, neck } = STOCKS[stock];
        const { texts } = layLabel(text({ small }), design, { ...label, neck }, fall, measure);
        const lines = texts.filter((placed) => small.includes(placed.text) && placed.text.length > 8);
        expect(Math.min(...lines.map((line) => line.size)), `${stock} ${design}`).toBeGreaterThanOrEqual(4.5);
      }
    }
  });
});

describe('the fall on a label', () => {
  it('goes from the original gravity at the pitch to the end at the bottling', () => {
    expect(fall!.points[0]).toEqual({ t: 0, level: 1 });
    expect(fall!.points.at(-1)).toEqual({ t: 1, level: 0 });
    expect(fallOf({ pitchedAt: 0, bottledAt: 0, originalGravity: 1.05, finalGravity: 1, curve: [], posts: [] })).toBeNull();
    expect(fallOf({ pitchedAt: 0, bottledAt: DAY, originalGravity: 1, finalGravity: 1, curve: [], posts: [] })).toBeNull();
  });
});
