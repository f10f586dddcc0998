import { catalogued, YEASTS } from '@/lib/core/must/catalogue';
import type { Amount, Ingredient, MustLine, Yeast } from '@/lib/core/must/ingredients';
import { reckonMust } from '@/lib/core/must/outcome';
import type { MustOutcome, MustSheet } from '@/lib/core/must/sheet';
import { exactly, type Range } from '@/lib/core/units/range';

export function known(key: string): Ingredient {
  const ingredient = catalogued(key);
  if (!ingredient) throw new Error(`no ${key} in the catalogue`);
  return ingredient;
}

export function yeastNamed(name: string): Yeast {
  const yeast = YEASTS.find((y) => y.name === name);
  if (!yeast) throw new Error(`no ${name}`);
  return yeast;
}

export function line(key: string, quantity: number | Range, unit: Amount['unit'], over: Partial<Ingredient> = {}, costPerUnit: number | null = null): MustLine {
  return { id: key, ingredient: { ...known(key), ...over }, amount: { quantity: typeof quantity === 'number' ? exactly(quantity) : quantity, unit }, costPerUnit };
}

/** Water and table sugar, exact: 10 kg of water and 1.5 kg of sugar unless told. */
export function sheet(lines: readonly MustLine[] = [line('water', 10, 'kg'), line('table-sugar', 1.5, 'kg')], over: Partial<MustSheet> = {}): MustSheet {
  return { name: 'trial', kind: 'wine', lines, yeast: null, boiledAwayL: 0, vesselL: null, ...over };
}

export function outcomeOf(of: MustSheet): MustOutcome {
  const result = reckonMust(of);
  if (!result.ok) throw new Error(result.problems.map((p) => p.sentence).join(' '));
  return result.outcome;
}
