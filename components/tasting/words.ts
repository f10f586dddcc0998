import { how, type How } from '@/lib/core/how/how';
import { SOURCES } from '@/lib/core/how/sources';
import type { SPARKLES_FOUND, TastingSummary } from '@/lib/contracts/tastings';

export type Found = (typeof SPARKLES_FOUND)[number];
export const FOUND_WORDS: Record<Found, string> = { flat: 'flat', less: 'less than planned', as_planned: 'as planned', more: 'more than planned', gushing: 'it gushed' };

export const ASPECTS = ['look', 'smell', 'taste', 'balance'] as const;
export type Aspect = (typeof ASPECTS)[number];

/** Where an average of tasting notes comes from. */
export const HOW_TASTED: How = how('mean of those who gave a figure; after the ± their standard deviation, from two on', SOURCES.told);

type Spread = TastingSummary['score'];
/** `7.5 ± 0.8 of 10, by 3` */
export const spreadWords = (spread: Spread, top: number): string => (spread === null ? 'nobody said' : `${spread.mean.toFixed(1)}${spread.spread === null ? '' : ` ± ${spread.spread.toFixed(1)}`} of ${top}, by ${spread.count}`);
