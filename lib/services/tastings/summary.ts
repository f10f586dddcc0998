import { mean, sampleStandardDeviation } from 'simple-statistics';
import type { TastingFigures } from '@/db/queries/lots';
import { SPARKLES_FOUND, type TastingSummary } from '@/lib/contracts/tastings';

const round = (value: number) => Number(value.toFixed(2));

function spreadOf(values: readonly (number | null)[]): TastingSummary['score'] {
  const given = values.filter((value) => value !== null);
  if (given.length === 0) return null;
  return { count: given.length, mean: round(mean(given)), spread: given.length > 1 ? round(sampleStandardDeviation(given)) : null, lowest: Math.min(...given), highest: Math.max(...given) };
}

/** Average and spread of what people found; a figure that nobody gave is none. */
export function summaryOf(tastings: readonly TastingFigures[]): TastingSummary {
  const of = (pick: (tasting: TastingFigures) => number | null) => spreadOf(tastings.map(pick));
  return {
    count: tastings.length,
    score: of((tasting) => tasting.score),
    look: of((tasting) => tasting.look),
    smell: of((tasting) => tasting.smell),
    taste: of((tasting) => tasting.taste),
    balance: of((tasting) => tasting.balance),
    sparkle: Object.fromEntries(SPARKLES_FOUND.map((found) => [found, tastings.filter((tasting) => tasting.sparkle === found).length])) as TastingSummary['sparkle'],
  };
}
