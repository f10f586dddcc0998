import type { IngredientBody } from '@/lib/contracts/catalogue';
import type { MeasureUnit } from '@/lib/core/units/measures';
import type { Sweetness } from '@/lib/core/must/sheet';
import type { DrinkKind } from '@/lib/core/types';
import type { Range } from '@/lib/core/units/range';

export const KIND_WORDS: Record<IngredientBody['kind'], string> = {
  juice: 'Juice',
  honey: 'Honey',
  sugar: 'Sugar',
  syrup: 'Syrup',
  malt_extract: 'Malt extract',
  grain: 'Grain',
  fruit: 'Fruit',
  candied_fruit: 'Candied fruit',
  water: 'Water',
  tannin: 'Tannin',
  acid: 'Acid',
  enzyme: 'Enzyme',
  nutrient: 'Nutrient',
  preservative: 'Preservative',
  sweetener: 'Sweetener',
  spice: 'Spice',
};

export const PRESERVATIVE_WORDS = { '': 'none, or not told', sorbate: 'sorbate', benzoate: 'benzoate', sulphite: 'sulphite', unknown: 'something not named' } as const;

export const DRINK_WORDS: Record<DrinkKind, string> = { beer: 'Beer', cider: 'Cider', mead: 'Mead', wine: 'Country wine' };
export const SWEET_WORDS: Record<Sweetness, string> = { dry: 'dry', medium_dry: 'medium dry', semi_sweet: 'semi-sweet', sweet: 'sweet' };

export const unitWord = (unit: MeasureUnit, ingredient: Pick<IngredientBody, 'each'>): string => (unit === 'each' ? (ingredient.each?.name ?? 'piece') : unit);

/** `1.052 to 1.056`, or the one figure where both ends read the same. */
export function ends(range: Range, digits: number): string {
  const [lo, hi] = [range.lo.toFixed(digits), range.hi.toFixed(digits)];
  return lo === hi ? lo : `${lo} to ${hi}`;
}

const grams = (value: number): string => (Math.abs(value) >= 1000 ? `${Number((value / 1000).toPrecision(3))} kg` : `${Number(value.toPrecision(value < 10 ? 2 : 3))} g`);
export const weight = (value: number): string => grams(value).replace('-', '−');
