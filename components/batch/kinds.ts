import type { DrinkKind, Neck } from '@/lib/core/types';

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

/** Room that foam wants over the drink while it works, as a share of the vessel: common practice. */
const FOAM_ROOM: Record<DrinkKind, number> = { beer: 0.2, cider: 0.1, mead: 0.15, wine: 0.15 };

/** One sentence about the room over the drink; null until both volumes are known. */
export function headspaceNote(kind: DrinkKind, volumeL: number | null, vesselL: number | null, neck: Neck): { text: string; tight: boolean } | null {
  if (volumeL === null || vesselL === null || !(volumeL > 0) || !(vesselL > 0)) return null;
  if (volumeL > vesselL) return { text: 'The vessel does not hold that much.', tight: true };
  const room = vesselL - volumeL;
  const share = room / vesselL;
  const figures = `${Number(room.toFixed(2))} L of room, ${Math.round(share * 100)} %`;
  if (share >= FOAM_ROOM[kind]) return { text: `${figures}: enough for foam.`, tight: false };
  const wanted = `${Math.round(FOAM_ROOM[kind] * 100)} % is usual while it foams`;
  return neck === 'blow_off'
    ? { text: `${figures}; ${wanted}. The blow-off tube carries the foam away.`, tight: false }
    : { text: `${figures}; ${wanted}. Begin with a blow-off tube, or fill less.`, tight: true };
}
