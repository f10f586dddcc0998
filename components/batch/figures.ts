/** Figures as the log writes them: three decimals for gravity, a real minus, a unit beside each. */

const minus = (text: string): string => text.replace('-', '−');

export const gravityText = (value: number): string => value.toFixed(3);
export const degrees = (value: number): string => `${minus(value.toFixed(1))} °C`;
export const percent = (value: number): string => `${value.toFixed(1)} %`;
export const litres = (value: number): string => `${Number(value.toFixed(value < 10 ? 2 : 1))} L`;
export const grams = (value: number): string => (value >= 10_000 ? `${Number((value / 1000).toFixed(1))} kg` : `${Number(value.toFixed(0))} g`);

export function points(value: number): string {
  const text = Math.abs(value) >= 9.95 ? value.toFixed(0) : value.toFixed(1).replace(/\.0$/, '');
  return `${minus(text)} ${text === '1' || text === '-1' ? 'point' : 'points'}`;
}

/** Half the width of an interval, as `± 0.003`; never less than the last decimal shown. */
export const doubt = (estimate: { lo: number; hi: number }): string => `± ${Math.max(0.001, (estimate.hi - estimate.lo) / 2).toFixed(3)}`;

/** A number as a person types it: `1,048`, `1.048`, ` 12 `. Null where it is empty, NaN where it is no number. */
export function typedNumber(text: string): number | null {
  const trimmed = text.trim().replace(',', '.').replace('−', '-');
  if (trimmed === '') return null;
  return /^[-+]?(\d+\.?\d*|\.\d+)$/.test(trimmed) ? Number(trimmed) : NaN;
}

/** As `typedNumber`; a hydrometer is often read aloud without its point: `1048` is 1.048, `998` is 0.998. */
export function typedGravity(text: string): number | null {
  const value = typedNumber(text);
  return value !== null && Number.isInteger(value) && value >= 900 && value <= 1300 ? value / 1000 : value;
}
