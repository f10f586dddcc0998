import type { IngredientBody } from '@/lib/contracts/catalogue';
import type { MeasureUnit } from '@/lib/core/units/measures';
import type { Range } from '@/lib/core/units/range';
import { amountOf } from './amount';
import { unitsFor } from './units-for';

/** How units are written, beside their own names. */
const ALSO: Partial<Record<MeasureUnit, readonly string[]>> = {
  g: ['gram', 'gramme', 'gr'],
  kg: ['kilo', 'kilogram'],
  oz: ['ounce'],
  lb: ['pound'],
  L: ['litre', 'liter'],
  ml: ['millilitre', 'milliliter'],
  tsp: ['teaspoon'],
  tbsp: ['tablespoon'],
  'US cup': ['cup'],
};

const namesOf = (unit: MeasureUnit, { each }: Pick<IngredientBody, 'each'>): string[] => (unit === 'each' ? [each?.name ?? 'piece'] : [unit, ...(ALSO[unit] ?? [])]).map((name) => name.toLowerCase());

export interface Written {
  quantity: Range;
  /** Null where only the number is written. */
  unit: MeasureUnit | null;
  /** The amount alone, without its unit. */
  bare: string;
}

/**
 * A line's amount with the unit that may be written behind it: `about half a jar`,
 * `340 g`, `2 teaspoons of it`. Null where it is no amount, or in a measure that
 * this ingredient cannot be weighed out in.
 */
export function written(text: string, ingredient: IngredientBody): Written | null {
  const plain = text.trim().replace(/\s+of\s.*$/i, '');
  const alone = amountOf(plain);
  if (alone) return { quantity: alone, unit: null, bare: plain };
  for (const unit of unitsFor(ingredient)) {
    for (const name of namesOf(unit, ingredient)) {
      const escaped = name.replace(/[.*+?^${}()|[\]\\]/g, '\\$&');
      const before = new RegExp(`^(.*?[\\d\\s¼½¾⅓⅔])${escaped}s?\\.?$`, 'i').exec(plain)?.[1]?.trim();
      // `half a jar`, and `a jar` itself.
      const bare = before?.replace(/(\S)\s+an?$/i, '$1');
      const quantity = bare === undefined ? null : amountOf(bare);
      if (quantity && bare !== undefined) return { quantity, unit, bare };
    }
  }
  return null;
}
