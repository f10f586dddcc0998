/** The lines of fact on a label: strength, allergens and sulphite. */
import { how, type How } from '../how/how';
import { SOURCES } from '../how/sources';
import type { Allergen } from '../must/ingredients';
import type { Range } from '../units/range';
import { roundTo, roundUp } from '../units/rounding';

/** Sulphite is told above this, mg/L of total SO2 (Regulation (EU) 1169/2011, Annex II point 12). */
export const SULPHITE_TOLD_MG_L = 10;
/** Drinks above this strength tell it, % vol (Article 9(1)(k)). */
export const STRENGTH_TOLD_ABV = 1.2;

export interface StrengthLine {
  /** `6.4 % vol`; null at 1.2 % vol and below. */
  text: string | null;
  note: string;
  how: How;
}

/** The strength as it is written: one decimal, % vol, at 20 °C. The law's tolerance is 0.5 to 1.5 % vol by kind of drink. */
export function strengthLine(abvPercent: Range): StrengthLine {
  const { value, lo, hi } = abvPercent;
  return {
    text: value > STRENGTH_TOLD_ABV ? `${roundTo(value, 0.1).toFixed(1)} % vol` : null,
    note: `Reckoned, not distilled: between ${lo.toFixed(1)} and ${hi.toFixed(1)} % vol.`,
    how: how('strength by Balling, rounded to 0.1 % vol', SOURCES.eu1169, [
      ['least', lo, '% vol'],
      ['likely', value, '% vol'],
      ['most', hi, '% vol'],
    ]),
  };
}

export interface AllergenLine {
  /** `Contains sulphites, gluten.`; null where there is nothing to tell. */
  text: string | null;
  notes: readonly string[];
  how: How;
}

const ORDER: readonly Allergen[] = ['gluten', 'milk', 'egg', 'fish', 'crustaceans', 'nuts', 'soya', 'celery', 'mustard'];

/**
 * Allergens as a label names them. Sulphite counts by the upper end of what may
 * be in it; where some was added and nobody measured, it is told.
 *
 * @param totalSulphite total SO2, mg/L; null: unknown
 */
export function allergenLine(allergens: readonly Allergen[], totalSulphite: Range | null, sulphiteAdded: boolean): AllergenLine {
  const present = new Set(allergens);
  const over = totalSulphite !== null && roundUp(totalSulphite.hi, 0.1) > SULPHITE_TOLD_MG_L;
  const told = over || (totalSulphite === null && (sulphiteAdded || present.has('sulphites')));
  const named = [...(told ? ['sulphites'] : []), ...ORDER.filter((a) => present.has(a))];
  return {
    text: named.length > 0 ? `Contains ${named.join(', ')}.` : null,
    notes: [
      ...(!told && totalSulphite === null ? ['Yeast itself makes some sulphite, often 10 to 30 mg/L: without a measurement nobody can say it is free of it.'] : []),
      ...(present.has('fish') || present.has('egg') || present.has('milk') ? ['Finings of fish, egg or milk are told where residues may remain.'] : []),
      'Law differs by country; drink made at home is generally not for sale without a licence.',
    ],
    how: how('sulphite told above 10 mg/L of total SO2, by the upper end; allergens of every line and fining', SOURCES.eu1169, [
      ['total sulphite, at most', totalSulphite?.hi ?? null, 'mg/L'],
      ['sulphite added', sulphiteAdded ? 'yes' : 'no', ''],
    ]),
  };
}
