/** Kitchen and trade measures, against grams and litres. */
import { LITRES_PER_IMPERIAL_GALLON, LITRES_PER_US_GALLON } from './convert';

/** Grams in a measure of mass. Pound and ounce by the international agreement of 1959 (0.45359237 kg). */
export const GRAMS_PER = { mg: 0.001, g: 1, kg: 1000, oz: 28.349523125, lb: 453.59237 } as const;

/**
 * Litres in a measure of volume. Spoons are the metric kitchen's, 5 ml and 15 ml:
 * common practice. A US cup is a sixteenth of a US gallon, an imperial pint an eighth of an imperial one.
 */
export const LITRES_PER = {
  ml: 0.001,
  L: 1,
  tsp: 0.005,
  tbsp: 0.015,
  'US cup': LITRES_PER_US_GALLON / 16,
  'imperial pint': LITRES_PER_IMPERIAL_GALLON / 8,
  'US gallon': LITRES_PER_US_GALLON,
  'imperial gallon': LITRES_PER_IMPERIAL_GALLON,
} as const;

export type MassUnit = keyof typeof GRAMS_PER;
export type VolumeUnit = keyof typeof LITRES_PER;
/** `each` counts pieces, jars, tablets: whatever one of the ingredient is. */
export type MeasureUnit = MassUnit | VolumeUnit | 'each';

export const MASS_UNITS = Object.keys(GRAMS_PER) as MassUnit[];
export const VOLUME_UNITS = Object.keys(LITRES_PER) as VolumeUnit[];
export const MEASURE_UNITS: readonly MeasureUnit[] = [...MASS_UNITS, ...VOLUME_UNITS, 'each'];

export const isMassUnit = (unit: MeasureUnit): unit is MassUnit => unit in GRAMS_PER;
export const isVolumeUnit = (unit: MeasureUnit): unit is VolumeUnit => unit in LITRES_PER;
