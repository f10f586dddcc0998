import { neckForecast } from '@/lib/core/must/neck';
import type { DrinkKind, Neck } from '@/lib/core/types';
import type { Range } from '@/lib/core/units/range';

/** What is usual for a kind of drink where the yeast's own packet says nothing else. */
export interface Usual {
  attenuation: { min: number; max: number };
  tolerance: number;
  temperature: { min: number; max: number };
  colour: 'straw' | 'gold' | 'amber' | 'damson';
  neck: Neck;
}

/**
 * Common practice, rounded; the yeast's packet goes before it. Apparent
 * attenuation of dry cider, mead and wine passes 100 % because alcohol is
 * lighter than water.
 */
export const USUAL: Record<DrinkKind, Usual> = {
  beer: { attenuation: { min: 72, max: 80 }, tolerance: 10, temperature: { min: 17, max: 21 }, colour: 'amber', neck: 'blow_off' },
  cider: { attenuation: { min: 95, max: 105 }, tolerance: 12, temperature: { min: 12, max: 20 }, colour: 'straw', neck: 'airlock' },
  mead: { attenuation: { min: 90, max: 105 }, tolerance: 14, temperature: { min: 16, max: 21 }, colour: 'gold', neck: 'airlock' },
  wine: { attenuation: { min: 95, max: 106 }, tolerance: 14, temperature: { min: 17, max: 24 }, colour: 'damson', neck: 'blow_off' },
};

/** Points that a must of this kind falls where nobody told its gravity: common practice. */
const USUAL_FALL: Record<DrinkKind, Range> = {
  beer: { lo: 30, value: 38, hi: 50 },
  cider: { lo: 42, value: 50, hi: 60 },
  mead: { lo: 70, value: 90, hi: 115 },
  wine: { lo: 70, value: 85, hi: 100 },
};

export interface Room {
  kind: DrinkKind;
  volumeL: number | null;
  vesselL: number | null;
  neck: Neck;
  originalGravity: number | null;
  /** Per cent. */
  attenuation: { min: number | null; max: number | null };
}

function fallOf({ kind, originalGravity, attenuation: { min, max } }: Room): Range {
  if (originalGravity === null || !(originalGravity > 1) || min === null || max === null || !(max >= min)) return USUAL_FALL[kind];
  const points = (originalGravity - 1) * 1000;
  return { lo: (points * min) / 100, value: (points * (min + max)) / 200, hi: (points * max) / 100 };
}

/** One sentence about the room over the drink, by the rule that the must sheet has; null until both volumes are known. */
export function headspaceNote(room: Room): { text: string; tight: boolean } | null {
  const { kind, volumeL, vesselL, neck } = room;
  if (volumeL === null || vesselL === null || !(volumeL > 0) || !(vesselL > 0)) return null;
  if (volumeL > vesselL) return { text: 'The vessel does not hold that much.', tight: true };
  const forecast = neckForecast(kind, { lo: volumeL, value: volumeL, hi: volumeL }, vesselL, fallOf(room));
  return { text: forecast.sentence, tight: forecast.startOn === 'blow_off' && neck !== 'blow_off' };
}
