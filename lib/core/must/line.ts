/** What one line of a must sheet brings. */
import { sucroseDensity } from '../gravity/density';
import { exactly, product, times, type Range } from '../units/range';
import { GRAMS_PER, isMassUnit, isVolumeUnit, LITRES_PER } from '../units/measures';
import type { Amount, Ingredient, MustLine } from './ingredients';

/** Solids that do not dissolve, kg/L: plant cell walls, recalled. */
const PULP_DENSITY = 1.5;

/** Why a line cannot be weighed. */
export class UnweighableLine extends RangeError {}

/** Grams in an amount of an ingredient; a juice weighs what its °Bx says; anything else without a density or a weight of one says so. */
export function gramsOf(amount: Amount, ingredient: Ingredient): Range {
  const { quantity, unit } = amount;
  if (isMassUnit(unit)) return times(quantity, GRAMS_PER[unit]);
  if (isVolumeUnit(unit)) {
    const density = ingredient.densityGPerMl ?? (ingredient.kind === 'juice' ? exactly(sucroseDensity(ingredient.extractShare.value, 20) / 1000) : null);
    if (!density) throw new UnweighableLine(`${ingredient.name}: weigh it; nobody knows what a spoon or a jug of it weighs`);
    return product(times(quantity, LITRES_PER[unit] * 1000), density);
  }
  if (!ingredient.each) throw new UnweighableLine(`${ingredient.name}: say what one of them weighs`);
  return product(quantity, ingredient.each.grams);
}

/** A line as the uncertain numbers it stands for, in the order of {@link Brought}'s inputs. */
export interface LineInputs {
  grams: Range;
  extractShare: Range;
  fermentableShare: Range;
  efficiency: Range;
  yanMgPerG: Range;
  sulphiteMgPerG: Range;
}

export function inputsOf(line: MustLine): LineInputs {
  const { ingredient } = line;
  return {
    grams: gramsOf(line.amount, ingredient),
    extractShare: ingredient.extractShare,
    fermentableShare: ingredient.fermentableShare,
    efficiency: ingredient.mash?.efficiency ?? exactly(1),
    yanMgPerG: ingredient.yanMgPerG,
    sulphiteMgPerG: ingredient.sulphiteMgPerG,
  };
}

/** What a line brings, g. */
export interface Brought {
  extractG: number;
  fermentableG: number;
  /** May be negative: grain keeps water. */
  waterG: number;
  /** Room that pulp takes in the vessel, L. Spent grain does not go in. */
  pulpL: number;
  yanMg: number;
  sulphiteMg: number;
}

/** Masses from single values of the inputs; shares are held within what adds to 1. */
export function bring(ingredient: Ingredient, at: Record<keyof LineInputs, number>): Brought {
  const extractShare = Math.min(1 - ingredient.insolubleShare, Math.max(0, at.extractShare));
  const extractG = at.grams * extractShare * at.efficiency;
  const base = { extractG, fermentableG: extractG * Math.min(1, at.fermentableShare), yanMg: at.grams * at.yanMgPerG * at.efficiency, sulphiteMg: at.grams * at.sulphiteMgPerG };
  if (ingredient.mash) return { ...base, waterG: -at.grams * ingredient.mash.absorbsLPerKg * 0.998, pulpL: 0 };
  // Powders by the gram are neither sugar nor water and move neither.
  const dry = ingredient.kind === 'acid' || ingredient.kind === 'enzyme' || ingredient.kind === 'nutrient' || ingredient.kind === 'preservative';
  const powder = dry || (ingredient.kind === 'tannin' && ingredient.usualGPerL !== null);
  const waterG = powder ? 0 : at.grams * (1 - extractShare - ingredient.insolubleShare);
  return { ...base, waterG, pulpL: (at.grams * ingredient.insolubleShare) / 1000 / PULP_DENSITY };
}
