import type { DrinkKind } from '@/lib/core/types';
import { suggestName, type SugarFrom, type Suggestion } from '@/lib/core/naming/kind';
import { makeupOf } from '@/lib/core/naming/makeup';
import type { MustLine } from '@/lib/core/must/ingredients';
import { exactly } from '@/lib/core/units/range';
import { sheetOf } from '../musts/sheet';
import { detailOf } from './ledger';
import { ingredientNamed } from './load';
import type { DrinkState } from './state';

const NOTHING: SugarFrom = { apple: 0, pear: 0, grape: 0, otherFruit: 0, honey: 0, malt: 0, sugar: 0 };
/** Where no sheet tells what is in it, the batch's kind does. */
const BY_KIND: Record<DrinkKind, Partial<SugarFrom>> = { beer: { malt: 1 }, cider: { apple: 1 }, mead: { honey: 1 }, wine: { otherFruit: 1 } };

/** What the drink is called by what is in it, additions counted, and how strong it is: a suggestion with its rule. */
export function suggestionOf(state: DrinkState, abvPercent: number): Suggestion {
  const sheet = state.stories.of.get(state.batch.id)?.sheet ?? null;
  if (!sheet) return suggestName({ from: { ...NOTHING, ...BY_KIND[state.batch.kind] }, spiced: false, abvPercent });
  const added = state.entries.flatMap((entry): MustLine[] => {
    const { ingredient: key, grams } = detailOf(entry);
    const ingredient = ingredientNamed(key, state.stories.own);
    return ingredient && grams ? [{ id: entry.id, ingredient, amount: { quantity: exactly(grams), unit: 'g' }, costPerUnit: null }] : [];
  });
  return suggestName(makeupOf([...sheetOf(sheet).lines, ...added], abvPercent));
}
