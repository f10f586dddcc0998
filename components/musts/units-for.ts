import type { IngredientBody } from '@/lib/contracts/catalogue';
import { isMassUnit, isVolumeUnit, MEASURE_UNITS, type MeasureUnit } from '@/lib/core/units/measures';

/** Units in which an ingredient can be weighed out. */
export function unitsFor(ingredient: Pick<IngredientBody, 'density_g_per_ml' | 'kind' | 'each'>): MeasureUnit[] {
  const byVolume = ingredient.density_g_per_ml !== null || ingredient.kind === 'juice';
  return MEASURE_UNITS.filter((unit) => isMassUnit(unit) || (isVolumeUnit(unit) && byVolume) || (unit === 'each' && ingredient.each !== null));
}
