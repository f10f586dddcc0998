import { dayName, wallTime } from '@/components/charts/zone';
import type { Answer } from '@/components/how/AskHow';
import type { LotSummary, OPENING_KINDS } from '@/lib/contracts/lots';
import { HOW_COUNTED, HOW_TASTED } from '@/lib/core/how/lots';

export const SPARKLE_WORDS: Record<LotSummary['sparkle'], string> = { still: 'still', light: 'lightly sparkling', sparkling: 'sparkling' };
export const OPENING_WORDS: Record<(typeof OPENING_KINDS)[number], string> = { opened: 'opened', given: 'given away', broken: 'broken', gushed: 'gushed' };

/** `Wed 15 Oct`, with the year where it is another. */
export function dayWords(at: string, timeZone: string, now: number): string {
  const seconds = Date.parse(at) / 1000;
  const year = wallTime(seconds, timeZone).year;
  return `${dayName(seconds, timeZone)}${year === wallTime(now / 1000, timeZone).year ? '' : ` ${year}`}`;
}

/** `6.7 %`, `6.4–6.9 %` where the span shows. */
export const strengthWords = (abv: { lo: number; value: number; hi: number } | null): string => (abv === null ? 'not known' : `${abv.value.toFixed(1)} %`);

/** `2 of 8 left` */
export const leftWords = (counts: LotSummary['counts']): string => (counts.left === 0 ? `none of ${counts.bottled} left` : `${counts.left} of ${counts.bottled} left`);

/** `1.71`, `0.58 or more` where part of it was never told. */
export const costWords = (lot: Pick<LotSummary, 'cost_per_litre' | 'cost_known'>, money: (amount: number) => string): string => (lot.cost_per_litre ? `${money(lot.cost_per_litre.value)}${lot.cost_known ? '' : ' or more'}` : 'not told');

/** What a row of the book says, each with where it comes from. */
export function answersOfLot(lot: LotSummary, money: (amount: number) => string): Answer[] {
  const { abv_percent: abv, cost_per_litre: cost, tastings } = lot;
  return [
    { name: 'left', says: leftWords(lot.counts), how: HOW_COUNTED },
    ...(abv ? [{ name: 'strength', says: strengthWords(abv), how: lot.how.strength }] : []),
    ...(cost ? [{ name: 'cost a litre', says: costWords(lot, money), how: lot.how.cost }] : []),
    ...(tastings.score ? [{ name: 'tasted', says: `${tastings.score.mean.toFixed(1)} of 10 by ${tastings.score.count}`, how: HOW_TASTED }] : []),
  ];
}
