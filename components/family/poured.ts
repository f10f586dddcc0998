import type { DrinkBody } from '@/lib/contracts/family';
import { rack, type Racking } from '@/lib/core/family/cellarwork';
import { contentsOf, readContents, unfermented, water, type Contents } from '@/lib/core/family/contents';

/** What a drink of the cellar holds in so many litres; null where its gravity is not known. */
export function contentsIn(drink: DrinkBody, volumeL: number): Contents | null {
  const { effective_og: og, gravity } = drink;
  return og === null || gravity === null || !(volumeL > 0) ? null : contentsOf({ volumeL, originalGravity: Math.max(og, gravity), gravity });
}

export interface TopUp {
  what: '' | 'water' | 'must' | 'drink' | 'batch';
  litres: number | null;
  gravity: number | null;
  original: number | null;
  /** What the other batch holds, once it is known. */
  from: DrinkBody | null;
}

const positive = (value: number | null): value is number => value !== null && value > 0;

/** What is poured in; null while something of it is not told yet. */
export function inflowOf({ what, litres, gravity, original, from }: TopUp): Contents | null {
  if (!positive(litres)) return null;
  if (what === 'water') return water(litres);
  if (what === 'must') return positive(gravity) ? unfermented(litres, gravity) : null;
  if (what === 'drink') return positive(gravity) && positive(original) && original >= gravity ? contentsOf({ volumeL: litres, originalGravity: original, gravity }) : null;
  return what === 'batch' && from ? contentsIn(from, litres) : null;
}

/** Little more than what a warm day needs; above a drink that no longer works more air than this browns it. Common practice. */
const AIR_SHARE = 0.06;

export interface Poured {
  /** Litres in the vessel afterwards. */
  litres: number;
  vesselL: number;
  room: 'too_much' | 'air' | 'fits';
  /** Null where no gravity is known, or the top-up is not told yet. */
  moved: Racking | null;
}

/**
 * What a racking or topping up comes to before it is done, by the server's own
 * reckoning. Null while what is left behind makes no sense.
 */
export function poured(drink: DrinkBody | undefined, volumeL: number, leftL: number, vesselL: number, topUp: TopUp): Poured | null {
  if (!(leftL >= 0) || leftL >= volumeL || !(vesselL > 0)) return null;
  const inflow = topUp.what === '' ? null : inflowOf(topUp);
  const litres = volumeL - leftL + (topUp.what !== '' && positive(topUp.litres) ? topUp.litres : 0);
  const before = drink ? contentsIn(drink, volumeL) : null;
  // Its volume by its masses is what the racking reckons with.
  const held = before && readContents(before)?.volumeL;
  const told = topUp.what === '' || inflow !== null;
  return {
    litres,
    vesselL,
    room: litres > vesselL + 1e-6 ? 'too_much' : vesselL - litres > AIR_SHARE * vesselL ? 'air' : 'fits',
    moved: before && held && told ? rack(before, Math.min(leftL, held), inflow ? [inflow] : []) : null,
  };
}
