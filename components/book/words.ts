import { how, type How } from '@/lib/core/how/how';
import { SOURCES } from '@/lib/core/how/sources';
import { dayName, wallTime } from '@/components/charts/zone';
import type { LotSummary, OPENING_KINDS } from '@/lib/contracts/lots';

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

/** Where a count of bottles comes from. */
export const HOW_COUNTED: How = how('bottled: as the bench planned it when it was bottled; left: those, less what was written down as opened, given away, broken or gushed, and not put back', SOURCES.told);

/** `2 of 8 left` */
export const leftWords = (counts: LotSummary['counts']): string => (counts.left === 0 ? `none of ${counts.bottled} left` : `${counts.left} of ${counts.bottled} left`);

/** `1.71`, `0.58 or more` where part of it was never told. */
export const costWords = (lot: Pick<LotSummary, 'cost_per_litre' | 'cost_known'>, money: (amount: number) => string): string => (lot.cost_per_litre ? `${money(lot.cost_per_litre.value)}${lot.cost_known ? '' : ' or more'}` : 'not told');
