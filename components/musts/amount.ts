import { about, between, exactly, times, type Range } from '@/lib/core/units/range';

const FRACTIONS: Record<string, string> = { '¼': ' 1/4', '½': ' 1/2', '¾': ' 3/4', '⅓': ' 1/3', '⅔': ' 2/3' };
const NUMBER = '(?:\\d+\\s+)?\\d+/\\d+|\\d+(?:\\.\\d+)?|\\.\\d+';

const SMALL = ['one', 'two', 'three', 'four', 'five', 'six', 'seven', 'eight', 'nine', 'ten', 'eleven', 'twelve'];
/** Numbers that people write as words, the longer before the shorter. */
const WORDS: readonly (readonly [RegExp, string])[] = [
  [/\band a half\b/g, ' 1/2'],
  [/\b(?:a |one )?half\b/g, '1/2'],
  [/\bthree quarters\b/g, '3/4'],
  [/\b(?:a |one )?quarter\b/g, '1/4'],
  [/\btwo thirds\b/g, '2/3'],
  [/\b(?:a |one )?third\b/g, '1/3'],
  ...SMALL.map((word, index) => [new RegExp(`\\b${word}\\b`, 'g'), String(index + 1)] as const),
  [/\ban?$/g, '1'],
];
const inFigures = (text: string): string => WORDS.reduce((all, [word, figure]) => all.replace(word, figure), text);

function numberOf(text: string): number {
  const [, whole, over, under] = /^(?:(\d+)\s+)?(\d+)\/(\d+)$/.exec(text) ?? [];
  return over ? Number(whole ?? 0) + Number(over) / Number(under) : Number(text);
}

const MOST_LETTERS = 80;

/**
 * An amount as a person writes it: `340`, `1/2`, `1 ½`, `half`, `about 0.5`, `300 to 380`,
 * `340 (300 to 380)`. Null where it is none of these, or not a number of things.
 */
export function amountOf(text: string): Range | null {
  // No amount is so long, and the pattern below weighs every way to split a long run of digits.
  if (text.length > MOST_LETTERS) return null;
  const signs = text.replace(/[¼½¾⅓⅔]/g, (sign) => FRACTIONS[sign] ?? sign);
  const plain = inFigures(signs.replace(/,/g, '.').trim().toLowerCase()).trim();
  const match = new RegExp(`^(about|ca\\.?|~|≈)?\\s*(${NUMBER})(?:\\s*\\(?\\s*(?:(${NUMBER})\\s*)?(?:to|[-–])\\s*(${NUMBER})\\s*\\)?)?$`).exec(plain);
  if (!match?.[2]) return null;
  const first = numberOf(match[2]);
  const [middle, last] = [match[3] === undefined ? null : numberOf(match[3]), match[4] === undefined ? null : numberOf(match[4])];
  const range = last === null ? (match[1] ? about(first) : exactly(first)) : middle === null ? between(first, last) : { lo: middle, value: first, hi: last };
  return Number.isFinite(range.hi) && range.lo <= range.value && range.value <= range.hi && range.hi <= 1_000_000 ? range : null;
}

const short = (value: number): string => String(Number(value.toPrecision(4)));
const near = (a: number, b: number): boolean => Math.abs(a - b) <= 1e-6 * Math.max(1e-6, Math.abs(a), Math.abs(b));

/** The amount as it would be written; reading it again gives the same range, to four figures. */
export function amountText(range: Range): string {
  if (near(range.lo, range.hi)) return short(range.value);
  const judged = about(range.value);
  if (near(judged.lo, range.lo) && near(judged.hi, range.hi)) return `about ${short(range.value)}`;
  return near((range.lo + range.hi) / 2, range.value) ? `${short(range.lo)} to ${short(range.hi)}` : `${short(range.value)} (${short(range.lo)} to ${short(range.hi)})`;
}

/** The same amount, so many times. */
export function scaledText(text: string, factor: number): string {
  const range = amountOf(text);
  return range ? amountText(times(range, factor)) : text;
}
