import { gravityDoubt, gravityText, gravityTyped, temperatureText, volumeText } from '@/components/ui/units';
import { typedNumber } from '@/components/units/typed';

/** Figures as the log writes them, in the units that the person reads: a real minus, a unit beside each. */

const minus = (text: string): string => text.replace('-', '−');

export { gravityText, typedNumber };
export const degrees = (value: number): string => temperatureText(value);
export const percent = (value: number): string => `${value.toFixed(1)} %`;
export const litres = (value: number): string => volumeText(value);
/** A pinch has its own places: `0.4 g` is not nothing. */
export const grams = (value: number): string => (value >= 10_000 ? `${Number((value / 1000).toFixed(1))} kg` : `${Number(value.toFixed(value < 1 ? 2 : value < 10 ? 1 : 0))} g`);

export function points(value: number): string {
  const text = Math.abs(value) >= 9.95 ? value.toFixed(0) : value.toFixed(1).replace(/\.0$/, '');
  return `${minus(text)} ${text === '1' || text === '-1' ? 'point' : 'points'}`;
}

/** Half the width of an interval, as `± 0.003`; never less than the last decimal shown. */
export const doubt = (estimate: { lo: number; hi: number }): string => gravityDoubt((estimate.lo + estimate.hi) / 2, Math.max(0.001, (estimate.hi - estimate.lo) / 2));

/**
 * As `typedNumber`; a hydrometer is often read aloud without its point: `1048` is
 * 1.048, `998` is 0.998. Who reads °Bx or °P may type those too, wherever the figure cannot be an SG.
 */
export function typedGravity(text: string): number | null {
  const value = typedNumber(text);
  if (value === null || Number.isNaN(value)) return value;
  if (Number.isInteger(value) && value >= 900 && value <= 1300) return value / 1000;
  return gravityTyped(value);
}
