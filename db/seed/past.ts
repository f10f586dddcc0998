/** What the demo's cellar made before this season: bottled, opened, tasted. */
import type { BottleBatchForm } from '@/lib/contracts/bench';
import type { CreateTasting } from '@/lib/contracts/tastings';

export interface DemoPlace {
  name: string;
  capacity: number;
  temperatureC: number;
}

export const DEMO_PLACES: readonly DemoPlace[] = [
  { name: 'warm shelf', capacity: 12, temperatureC: 21 },
  { name: 'north rack', capacity: 60, temperatureC: 14 },
  { name: 'under the stairs', capacity: 24, temperatureC: 18 },
];

/** Hours count from the pitch, days from the bottling. */
export interface DemoPast {
  scenario: string;
  seed: number;
  yeast: string;
  pitchedDaysAgo: number;
  bottledAfterDays: number;
  rack: { atH: number; leftL: number; topUpL: number; sulphiteG: number };
  fining: { fining: string; atH: number; dose: string } | null;
  /** Sulphite and sorbate together, so that nothing begins again. */
  stabiliseAtH: number | null;
  readAtH: readonly number[];
  bottling: Pick<BottleBatchForm, 'losses_l' | 'bottles' | 'cellar_c' | 'warmest_store_c' | 'warmest_since_end_c' | 'priming' | 'other_cost' | 'name'>;
  /** By its name among the places. */
  place: string;
  movedTo: { place: string; afterDays: number; bottle: string; count: number } | null;
  openings: ReadonlyArray<{ afterDays: number; by: string; kind: 'opened' | 'given'; bottle: string; count: number; to?: string; note?: string }>;
  tastings: ReadonlyArray<{ afterDays: number; by: string | null; guest?: string } & Pick<CreateTasting, 'look' | 'smell' | 'taste' | 'balance' | 'sparkle' | 'score' | 'words' | 'next_time'>>;
  nextTime: { by: string; note: string } | null;
  note: string | null;
  shared: boolean;
  copy: { name: string; note: string; honeyG: number } | null;
}

const beer = (key: string, size_ml: number, at_hand: number | null) => ({ key, kind: 'beer' as const, closure: 'crown_26' as const, size_ml, confirmed_bar: 4, at_hand, drops: 0 });

export const DEMO_PAST: readonly DemoPast[] = [
  {
    scenario: 'healthy-cider',
    seed: 31,
    yeast: 'dry cider yeast',
    pitchedDaysAgo: 151,
    bottledAfterDays: 46,
    rack: { atH: 26 * 24, leftL: 0.25, topUpL: 0, sulphiteG: 0.2 },
    fining: null,
    stabiliseAtH: null,
    readAtH: [20 * 24, 26 * 24, 37 * 24, 46 * 24 - 3],
    bottling: { losses_l: 0.15, bottles: [beer('half', 500, 7), beer('third', 330, null)], cellar_c: 14, warmest_store_c: 22, warmest_since_end_c: 19, priming: { way: 'weighed', sugar: 'sucrose', syrup_share: null, wanted_volumes: 2.3 }, other_cost: 1.8, name: 'Orchard cider, first press' },
    place: 'warm shelf',
    movedTo: { place: 'north rack', afterDays: 16, bottle: 'half', count: 7 },
    openings: [
      { afterDays: 7, by: 'Inga Farrow', kind: 'opened', bottle: 'third', count: 1, note: 'Test bottle: a soft hiss, no more.' },
      { afterDays: 24, by: 'Una Thorne', kind: 'opened', bottle: 'half', count: 2 },
      { afterDays: 40, by: 'Piet Marsh', kind: 'given', bottle: 'half', count: 2, to: 'the neighbours' },
    ],
    tastings: [
      { afterDays: 24, by: 'Una Thorne', look: 4, smell: 4, taste: 4, balance: 3, sparkle: 'as_planned', score: 7.5, words: 'Clear, a little tart, apples before honey. Fine bubbles that stay.', next_time: 'A little less honey: it hides the apple at the end.' },
      { afterDays: 24, by: 'Piet Marsh', look: 4, smell: 3, taste: 4, balance: 4, sparkle: 'as_planned', score: 7, words: 'Dry and clean. Would take more acid.', next_time: null },
      { afterDays: 41, by: null, guest: 'Ruth, next door', look: 5, smell: 4, taste: 5, balance: 4, sparkle: 'less', score: 8.5, words: 'Went with the cheese until there was no cheese.', next_time: null },
      { afterDays: 43, by: 'Bo Lark', look: 4, smell: 5, taste: 4, balance: 4, sparkle: 'as_planned', score: 8, words: 'Smells of the orchard after rain.', next_time: null },
    ],
    nextTime: { by: 'Una Thorne', note: 'Half the honey, and keep back a litre of the sharp juice to top up with.' },
    note: 'First press from the two old trees by the wall.',
    shared: true,
    copy: { name: 'Orchard cider, less honey', note: 'Half the honey: it hid the apple.', honeyG: 32 },
  },
  {
    scenario: 'healthy-country-wine',
    seed: 32,
    yeast: 'white wine yeast',
    pitchedDaysAgo: 96,
    bottledAfterDays: 92,
    rack: { atH: 40 * 24, leftL: 0.3, topUpL: 0.25, sulphiteG: 0.3 },
    fining: { fining: 'two-part', atH: 52 * 24, dose: 'a teaspoon' },
    stabiliseAtH: 85 * 24,
    readAtH: [40 * 24 - 1, 66 * 24, 82 * 24, 92 * 24 - 4],
    bottling: {
      losses_l: 0.1,
      bottles: [
        { key: 'wine', kind: 'still_wine', closure: 'plain_cork', size_ml: 750, confirmed_bar: null, at_hand: 5, drops: 0 },
        { key: 'small', kind: 'still_wine', closure: 'bar_top_cork', size_ml: 375, confirmed_bar: null, at_hand: null, drops: 0 },
      ],
      cellar_c: 14,
      warmest_store_c: 22,
      warmest_since_end_c: 19,
      priming: { way: 'none' },
      other_cost: 2.4,
      name: null,
    },
    place: 'under the stairs',
    movedTo: null,
    openings: [],
    tastings: [],
    nextTime: null,
    note: null,
    shared: false,
    copy: null,
  },
];
