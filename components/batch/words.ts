import { wallTime } from '@/components/charts/zone';
import type { DrinkKind, Foam, Neck, Stage } from '@/lib/core/types';
import type { BatchBody, CLARITIES, SUBSTANCES } from '@/lib/contracts/batches';
import { litres } from './figures';

export const KIND_WORDS: Record<DrinkKind, string> = { beer: 'beer', cider: 'cider or perry', mead: 'mead', wine: 'country wine' };
export const NECK_WORDS: Record<Neck, string> = { blow_off: 'blow-off tube', airlock: 'airlock', bung: 'bung', open: 'open neck' };
export const STAGE_WORDS: Record<Stage, string> = {
  not_started: 'not started',
  lag: 'in lag',
  accelerating: 'gathering pace',
  peak: 'at its peak',
  slowing: 'slowing',
  terminal: 'finished',
  unknown: 'not known',
};

/** `tag 5, 10 L carboy, back row by the door` */
export function placeWords(batch: Pick<BatchBody, 'tag' | 'volume_l' | 'vessel_l' | 'vessel_kind' | 'place'>): string {
  const volume = batch.volume_l === batch.vessel_l ? litres(batch.vessel_l) : `${litres(batch.volume_l)} in a ${litres(batch.vessel_l)}`;
  return [batch.tag === null ? null : `tag ${batch.tag}`, `${volume} ${batch.vessel_kind}`, batch.place].filter((part) => part !== null).join(', ');
}

/** Days on the wall calendar since the pitch: pitched yesterday evening is day 1. Null: not pitched, or not yet. `nowS` in seconds since 1970. */
export function dayOf(pitchedAt: string | null, nowS: number, timeZone: string): number | null {
  if (pitchedAt === null) return null;
  const midnight = (at: number) => {
    const wall = wallTime(at, timeZone);
    return Date.UTC(wall.year, wall.month - 1, wall.day);
  };
  const days = Math.round((midnight(nowS) - midnight(Date.parse(pitchedAt) / 1000)) / 86_400_000);
  return days < 0 ? null : days;
}

export const CLARITY_WORDS: Record<(typeof CLARITIES)[number], string> = { cloudy: 'cloudy', hazy: 'hazy', clearing: 'clearing', bright: 'bright' };
export const FOAM_WORDS: Record<Foam, string> = { none: 'none', ring: 'a ring', cover: 'a cover', at_neck: 'at the neck' };
export const SUBSTANCE_WORDS: Record<(typeof SUBSTANCES)[number], string> = {
  sugar: 'sugar',
  honey: 'honey',
  fruit: 'fruit',
  juice: 'juice, must or syrup',
  nutrient: 'yeast nutrient',
  acid: 'acid',
  chalk: 'chalk',
  tannin: 'tannin',
  enzyme: 'enzyme',
  sulphite: 'sulphite',
  sorbate: 'sorbate',
  sweetener: 'sweetener',
  fining: 'fining',
  yeast: 'yeast',
  spice: 'spice',
  water: 'water',
  other: 'something else',
};
