/** The must sheets that the demo's batches were made from: amounts as somebody would weigh them out. */
import type { NitrogenNeed } from '../../lib/core/must/ingredients';
import type { MeasureUnit } from '../../lib/core/units/measures';

export interface DemoLine {
  /** Key of the catalogue. */
  of: string;
  /** One figure, or least and most where it was judged by eye. */
  amount: number | readonly [least: number, most: number];
  unit: MeasureUnit;
  /** Of one unit, in the cellar's own money. */
  cost?: number;
  note?: string;
  /** As a refractometer showed it. */
  brix?: number;
  /** What this cellar calls it. */
  name?: string;
}

export interface DemoSheet {
  /** The scenario that its batch follows. */
  scenario: string;
  need: NitrogenNeed;
  boiledL?: number;
  method: string;
  lines: readonly DemoLine[];
}

const nutrient = (grams: number): DemoLine => ({ of: 'complex-nutrient', amount: grams, unit: 'g', cost: 0.04, note: 'half now, half with a third of the sugar gone' });

export const DEMO_SHEETS: readonly DemoSheet[] = [
  {
    scenario: 'foaming',
    need: 'low',
    method: 'Press, let it stand a night, rack off the sediment. Sugar dissolved in a little of the juice. Fill to the shoulder; start on a tube.',
    lines: [
      { of: 'pear-juice', amount: 4.3, unit: 'L', brix: 12.2, cost: 1.1, note: 'two thirds hard pears' },
      { of: 'table-sugar', amount: 110, unit: 'g', cost: 0.0014 },
      { of: 'pectic-enzyme', amount: 1.5, unit: 'g', cost: 0.09 },
    ],
  },
  {
    scenario: 'ready-to-rack',
    need: 'low',
    method: 'Crab apples for a third of it. No sulphite: the acid keeps it.',
    lines: [
      { of: 'apple-juice', amount: 4.4, unit: 'L', brix: 12, cost: 0.9, note: 'a third of it from crab apples' },
      { of: 'honey', amount: [45, 90], unit: 'g', cost: 0.012, note: 'what was left in the jar' },
    ],
  },
  {
    scenario: 'racking',
    need: 'high',
    method: 'Stone the damsons, pour the hot syrup over them in a steel pan, let it cool under a cloth. Enzyme cold. Press after five days.',
    lines: [
      { of: 'damson', amount: 1800, unit: 'g', cost: 0.0025, note: 'frozen first, so that the skins burst' },
      { of: 'table-sugar', amount: 815, unit: 'g', cost: 0.0014 },
      { of: 'water', amount: 2.43, unit: 'L', cost: 0 },
      { of: 'pectic-enzyme', amount: 1.5, unit: 'g', cost: 0.09 },
      { of: 'sulphite-tablet', amount: 1, unit: 'each', cost: 0.05, note: 'a day before the yeast' },
      nutrient(2),
    ],
  },
  {
    scenario: 'finished',
    need: 'high',
    method: 'Fruit in a bag, five days. Strong tea for tannin.',
    lines: [
      { of: 'blackberry', amount: 2000, unit: 'g', cost: 0, note: 'picked along the lane' },
      { of: 'table-sugar', amount: 860, unit: 'g', cost: 0.0014 },
      { of: 'water', amount: 2.05, unit: 'L', cost: 0 },
      { of: 'black-tea', amount: 0.15, unit: 'L', cost: 0.3 },
      { of: 'pectic-enzyme', amount: 1.5, unit: 'g', cost: 0.09 },
      nutrient(2),
    ],
  },
  {
    scenario: 'stuck-cold',
    need: 'low',
    boiledL: 1.5,
    method: 'Mash at 66 °C for an hour, boil for an hour. Chill before it goes into glass.',
    lines: [
      { of: 'pale-malt', amount: 2.6, unit: 'kg', cost: 2.2 },
      { of: 'crystal-malt', amount: 0.4, unit: 'kg', cost: 2.8 },
      { of: 'water', amount: 13.3, unit: 'L', cost: 0 },
      { of: 'liquid-malt-extract', amount: 100, unit: 'g', cost: 0.008 },
      { of: 'spice', amount: 22, unit: 'g', cost: 0.06, name: 'hops' },
    ],
  },
  {
    scenario: 'in-lag',
    need: 'medium',
    method: 'Grate the quinces into the juice, warm to 60 °C, cool, enzyme, a night’s rest.',
    lines: [
      { of: 'apple-juice', amount: 1, unit: 'L', brix: 12, cost: 0.9 },
      { of: 'raisins', amount: 120, unit: 'g', cost: 0.006 },
      { of: 'table-sugar', amount: 430, unit: 'g', cost: 0.0014 },
      { of: 'water', amount: 1.7, unit: 'L', cost: 0 },
      { of: 'spice', amount: [350, 450], unit: 'g', cost: 0, name: 'grated quince', note: 'for the smell; its sugar is not counted' },
      { of: 'pectic-enzyme', amount: 1, unit: 'g', cost: 0.09 },
      nutrient(1.5),
    ],
  },
  {
    scenario: 'healthy-mead',
    need: 'medium',
    method: 'Honey stirred into water no warmer than the hand. Flowers in a bag for three days. Four feeds, the last before half the sugar is gone.',
    lines: [
      { of: 'honey', amount: 1470, unit: 'g', cost: 0.012 },
      { of: 'water', amount: 3.45, unit: 'L', cost: 0 },
      { of: 'spice', amount: [15, 25], unit: 'g', cost: 0, name: 'elderflowers' },
    ],
  },
  {
    scenario: 'healthy-beer',
    need: 'low',
    boiledL: 3,
    method: 'Mash at 67 °C. Boil for an hour, hops at the start and at the end. Chill before it goes into glass.',
    lines: [
      { of: 'pale-malt', amount: 3.55, unit: 'kg', cost: 2.2 },
      { of: 'crystal-malt', amount: 0.35, unit: 'kg', cost: 2.8 },
      { of: 'table-sugar', amount: 250, unit: 'g', cost: 0.0014 },
      { of: 'water', amount: 25.4, unit: 'L', cost: 0 },
      { of: 'spice', amount: 45, unit: 'g', cost: 0.06, name: 'hops' },
    ],
  },
  {
    scenario: 'healthy-cider',
    need: 'low',
    method: 'Juice from the press, not boiled. Honey stirred in warm.',
    lines: [
      { of: 'apple-juice', amount: 4.4, unit: 'L', brix: 12.4, cost: 0.9 },
      { of: 'honey', amount: 64, unit: 'g', cost: 0.012 },
      nutrient(1),
    ],
  },
];
