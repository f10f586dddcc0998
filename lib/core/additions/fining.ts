/** Finings in one or two doses: what is due, and when it is bright. */
import type { Source } from '../how/how';
import { practice } from '../how/sources';
import type { Allergen } from '../must/ingredients';
import type { Instant } from '../types';
import { between, type Range } from '../units/range';

const MINUTE = 60_000;
const DAY = 86_400_000;

export interface Fining extends Source {
  key: string;
  name: string;
  /** The parts in their order; one or two. */
  parts: readonly string[];
  /** Between the two parts, minutes; null for one part. */
  intervalMin: number | null;
  settleDays: Range;
  /** For a demijohn of 4.5 L. */
  usualDose: string;
  takes: string;
  allergens: readonly Allergen[];
  caution: string;
}

const usual = practice('usual doses of finings; the packet wins');

export const FININGS: readonly Fining[] = [
  { key: 'two-part', name: 'two-part finings', parts: ['silica sol', 'gelatine or chitosan'], intervalMin: 60, settleDays: between(3, 7), usualDose: 'a teaspoon of each', takes: 'yeast and protein', allergens: ['crustaceans'], caution: 'Keep the order. Chitosan from shellfish is an allergen; read the packet.', ...usual },
  { key: 'bentonite', name: 'bentonite', parts: ['bentonite slurry'], intervalMin: null, settleDays: between(5, 10), usualDose: '2 to 5 g, swollen in warm water the day before', takes: 'protein', allergens: [], caution: 'Takes some colour and aroma. Thick lees.', ...usual },
  { key: 'isinglass', name: 'isinglass', parts: ['isinglass'], intervalMin: null, settleDays: between(3, 7), usualDose: 'as the packet says', takes: 'yeast', allergens: ['fish'], caution: 'From fish. Not above 20 °C.', ...usual },
  { key: 'gelatine', name: 'gelatine', parts: ['gelatine solution'], intervalMin: null, settleDays: between(5, 10), usualDose: '0.5 g, dissolved in warm water, not boiled', takes: 'tannin and yeast', allergens: [], caution: 'Needs tannin to fall: a pale drink may stay cloudy.', ...usual },
  { key: 'egg-white', name: 'egg white', parts: ['egg white'], intervalMin: null, settleDays: between(7, 14), usualDose: 'a quarter of one white', takes: 'harsh tannin', allergens: ['egg'], caution: 'Raw egg: fresh, clean, and told on the label.', ...usual },
  { key: 'pectic-enzyme', name: 'pectic enzyme', parts: ['pectic enzyme'], intervalMin: null, settleDays: between(7, 21), usualDose: 'twice the dose for a must', takes: 'pectin', allergens: [], caution: 'Slower in a finished drink: alcohol and cold hold it back.', ...usual },
];

export interface FiningRun {
  intervalMin: number | null;
  settleDays: number;
  firstAt: Instant;
  /** When the second part went in; null: not yet. */
  secondAt: Instant | null;
}

export type FiningState =
  | { state: 'waiting_for_second'; dueAt: Instant }
  | { state: 'second_due'; dueAt: Instant; lateMin: number }
  | { state: 'settling'; brightFrom: Instant }
  | { state: 'settled'; brightFrom: Instant };

/** From when it should be bright; a second dose that has not gone in counts from when it is due, or from now where it is late. */
export function brightFrom({ intervalMin, settleDays, firstAt, secondAt }: FiningRun, now: Instant): Instant {
  const last = secondAt ?? (intervalMin === null ? firstAt : Math.max(now, firstAt + intervalMin * MINUTE));
  return last + settleDays * DAY;
}

/** Where a fining stands now. `dueAt` is when the phone rings. */
export function finingState(run: FiningRun, now: Instant): FiningState {
  if (run.intervalMin !== null && run.secondAt === null) {
    const dueAt = run.firstAt + run.intervalMin * MINUTE;
    return now < dueAt ? { state: 'waiting_for_second', dueAt } : { state: 'second_due', dueAt, lateMin: Math.floor((now - dueAt) / MINUTE) };
  }
  const bright = brightFrom(run, now);
  return { state: now < bright ? 'settling' : 'settled', brightFrom: bright };
}
