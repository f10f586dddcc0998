import type { MustLine } from '../must/ingredients';
import type { DrinkKind } from '../types';
import { bring, inputsOf } from '../must/line';
import { FROM_KIND, type Makeup, type SugarFrom } from './kind';

/** Which fruit a line is, by the words of its name. */
const FRUIT_WORDS: readonly (readonly [RegExp, keyof SugarFrom])[] = [
  [/\bapples?\b/i, 'apple'],
  [/\b(pears?|perry)\b/i, 'pear'],
  [/\b(grapes?|raisins?|sultanas?)\b/i, 'grape'],
];

function sourceOf({ ingredient }: MustLine): keyof SugarFrom | null {
  if (ingredient.kind === 'juice' || ingredient.kind === 'fruit') return FRUIT_WORDS.find(([word]) => word.test(ingredient.name))?.[1] ?? 'otherFruit';
  return FROM_KIND[ingredient.kind] ?? null;
}

/** What the sugar of a must sheet comes from, g, with whether it is spiced: the grounds for its name. */
export function makeupOf(lines: readonly MustLine[], abvPercent: number): Makeup {
  const from: SugarFrom = { apple: 0, pear: 0, grape: 0, otherFruit: 0, honey: 0, malt: 0, sugar: 0 };
  for (const line of lines) {
    const source = sourceOf(line);
    if (!source) continue;
    const own = inputsOf(line);
    from[source] += bring(line.ingredient, {
      grams: own.grams.value,
      extractShare: own.extractShare.value,
      fermentableShare: own.fermentableShare.value,
      efficiency: own.efficiency.value,
      yanMgPerG: 0,
      sulphiteMgPerG: 0,
    }).extractG;
  }
  return { from, spiced: lines.some(({ ingredient }) => ingredient.kind === 'spice'), abvPercent };
}

/**
 * The kind to judge by how far a drink may ferment. Only malt leaves dextrins: what
 * is called beer, and by its must has less than half of its sugar from malt, may
 * end as dry as honey or fruit.
 */
export function kindByMust(kind: DrinkKind, lines: readonly MustLine[]): DrinkKind {
  const { from } = makeupOf(lines, 0);
  const total = Object.values(from).reduce((sum, grams) => sum + grams, 0);
  if (kind !== 'beer' || total === 0 || from.malt >= total / 2) return kind;
  return from.honey >= total / 2 ? 'mead' : 'wine';
}
