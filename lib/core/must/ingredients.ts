/** What a must sheet is made of. */
import type { HowStatus, Source } from '../how/how';
import type { Range } from '../units/range';
import type { MeasureUnit } from '../units/measures';

export const INGREDIENT_KINDS = [
  'juice', 'honey', 'sugar', 'syrup', 'malt_extract', 'grain', 'fruit', 'candied_fruit', 'water', 'tannin', 'acid', 'enzyme', 'nutrient', 'preservative', 'sweetener', 'spice',
] as const;
export type IngredientKind = (typeof INGREDIENT_KINDS)[number];

/** Those of Regulation (EU) 1169/2011, Annex II, that come into drinks of this kind. */
export const ALLERGENS = ['gluten', 'milk', 'egg', 'fish', 'crustaceans', 'nuts', 'soya', 'celery', 'mustard', 'sulphites'] as const;
export type Allergen = (typeof ALLERGENS)[number];

export const PRESERVATIVES = ['sorbate', 'benzoate', 'sulphite', 'unknown'] as const;
export type Preservative = (typeof PRESERVATIVES)[number];

/**
 * An ingredient as the catalogue has it: typical ranges, to be replaced by what
 * the label or a measurement says. Shares are by mass, 0 to 1.
 */
export interface Ingredient extends Source {
  key: string;
  name: string;
  kind: IngredientKind;
  /** Dissolved solids of 1 g: for a juice its °Bx/100; for grain the extract a laboratory mash gives. */
  extractShare: Range;
  /** What does not dissolve: pulp, skins, husks. The rest is water. */
  insolubleShare: number;
  /** Part of the extract that yeast can use. */
  fermentableShare: Range;
  /** As measured in a jug or a level spoon, g/ml; null where nobody measures it so, and for a juice, whose °Bx tells it. */
  densityGPerMl: Range | null;
  /** One piece, jar or tablet, g, and what one is called. */
  each: { name: string; grams: Range } | null;
  /** Days over which pieces give up their sugar; null: at once. */
  releasesOverDays: Range | null;
  /** Nitrogen that yeast can use, mg in 1 g. */
  yanMgPerG: Range;
  sulphiteMgPerG: Range;
  allergens: readonly Allergen[];
  preservative: Preservative | null;
  /** Grain only: share of the extract that the mash wins, and water that stays in it, L/kg. */
  mash: { efficiency: Range; absorbsLPerKg: number } | null;
  /** Usual dose of what is added by the gram, g/L. */
  usualGPerL: Range | null;
  caution: string | null;
}

export const NITROGEN_NEEDS = ['low', 'medium', 'high'] as const;
export type NitrogenNeed = (typeof NITROGEN_NEEDS)[number];

export interface Yeast {
  name: string;
  /** Apparent attenuation in wort as fractions; null for wine and mead yeasts, which take all the sugar. */
  attenuation: Range | null;
  toleranceAbv: Range;
  temperatureC: { min: number; max: number };
  nitrogenNeed: NitrogenNeed;
  /** Eats dextrins that others leave: the batch may go on in the bottle. */
  diastatic: boolean;
  status: HowStatus;
}

export interface Amount {
  /** How many of the unit; a range where it was judged by eye. */
  quantity: Range;
  unit: MeasureUnit;
}

export interface MustLine {
  id: string;
  /** The ingredient as it was, so that a sheet never changes under a batch. */
  ingredient: Ingredient;
  amount: Amount;
  /** Cost of one unit of the amount, in the cellar's currency; null: not told. */
  costPerUnit: number | null;
}
