import type { SPARKLES_FOUND, TastingSummary } from '@/lib/contracts/tastings';

export type Found = (typeof SPARKLES_FOUND)[number];
export const FOUND_WORDS: Record<Found, string> = { flat: 'flat', less: 'less than planned', as_planned: 'as planned', more: 'more than planned', gushing: 'it gushed' };

export const ASPECTS = ['look', 'smell', 'taste', 'balance'] as const;
export type Aspect = (typeof ASPECTS)[number];

type Spread = TastingSummary['score'];
/** `7.5 ± 0.8 of 10, by 3` */
export const spreadWords = (spread: Spread, top: number): string => (spread === null ? 'nobody said' : `${spread.mean.toFixed(1)}${spread.spread === null ? '' : ` ± ${spread.spread.toFixed(1)}`} of ${top}, by ${spread.count}`);
