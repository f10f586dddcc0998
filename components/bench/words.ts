import type { BenchFacts } from '@/lib/contracts/bench';
import type { PrimingKind } from '@/lib/core/bottling/priming';
import type { BottleKind } from '@/lib/core/bottling/bottles';
import type { DoneVerdict, Explanation } from '@/lib/core/bottling/done';
import type { StateWord } from '@/lib/core/calls/attention';

export const SHORT_BOTTLE: Record<BottleKind, string> = {
  beer: 'beer',
  heavy_beer: 'heavy beer',
  swing_top: 'swing top',
  sparkling_wine: 'sparkling',
  still_wine: 'still wine',
  odd_glass: 'odd glass',
  pet: 'PET',
  keg: 'keg',
};

export const SUGAR_WORDS: Record<Exclude<PrimingKind, 'drops' | 'syrup'>, string> = {
  sucrose: 'table sugar',
  glucose: 'grape sugar, dry',
  glucose_monohydrate: 'grape sugar, as sold',
  fructose: 'fruit sugar',
  honey: 'honey',
  malt: 'dry malt extract',
};

export const DONE_WORDS: Record<DoneVerdict, { state: StateWord; word: string; sentence: string }> = {
  done: { state: 'Ready', word: 'Done', sentence: 'It is done.' },
  not_yet: { state: 'Leave be', word: 'Not yet', sentence: 'It is not done yet.' },
  stopped_high: { state: 'Stop', word: 'Stop', sentence: 'It stopped high, and nothing explains it.' },
  unknown: { state: 'Check', word: 'Check', sentence: 'It is not known whether it is done.' },
};

export const EXPLAINED: Record<Explanation, string> = {
  dry: 'dry',
  as_expected: 'where it was expected to end',
  sweetener: 'what is left does not ferment',
  tolerance: 'the yeast is at its tolerance',
  stabilised: 'stabilised',
};

/** Why strength and sugar are taken at their upper ends: what nobody has told. Null where they are reckoned from what was. */
export function assumedWords({ for_gas, drink }: Pick<BenchFacts, 'for_gas' | 'drink'>): string | null {
  if (!for_gas.assumed) return null;
  const missing = drink.effective_og === null ? 'Nobody told the original gravity' : 'Nobody has read what stands in this vessel';
  return `${missing}: strength and sugar are taken at the upper end of what they may be.`;
}

/** `0.5 L`, `330 ml` */
export const sizeWords = (ml: number) => (ml >= 500 ? `${Number((ml / 1000).toFixed(3))} L` : `${ml} ml`);

/** A field of the bench by the contract's name, as the form calls it. */
export const FIELD_WORDS: Record<string, string> = {
  volume_l: 'In the vessel',
  losses_l: 'Left on lees',
  cellar_c: 'Cellar',
  warmest_store_c: 'Warmest they stand',
  warmest_since_end_c: 'Warmest since it finished',
  size_ml: 'Size of a bottle',
  at_hand: 'Bottles at hand',
  confirmed_bar: 'Maker’s figure',
  drops: 'Drops in each',
  syrup_share: 'Sugar in the syrup',
};
