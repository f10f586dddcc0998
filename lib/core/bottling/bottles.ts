/** Bottles and closures, and what they are taken to hold until the person confirms the maker's figure. */
import { how, type How, type Source } from '../how/how';
import { practice } from '../how/sources';

export const BOTTLE_KINDS = ['beer', 'heavy_beer', 'swing_top', 'sparkling_wine', 'still_wine', 'odd_glass', 'pet', 'keg'] as const;
export type BottleKind = (typeof BOTTLE_KINDS)[number];

export const CLOSURES = ['crown_26', 'crown_29', 'swing_top', 'wired_stopper', 'plain_cork', 'bar_top_cork', 'screw_cap', 'pet_cap', 'keg_lid'] as const;
export type Closure = (typeof CLOSURES)[number];

/** Gauge pressure, bar, in working order at any temperature; `never` for what must not stand under pressure at all. */
export type Rating = number | 'never';

export interface BottleEntry extends Source {
  kind: BottleKind;
  name: string;
  usualSizesMl: readonly number[];
  rating: Rating;
  closures: readonly Closure[];
  note: string;
}

const usual = (what: string): Source => practice(what);
const WINS = 'The maker’s figure wins.';

/** Ratings are the low end of common practice. A reused bottle with a chip or a scratch holds less: throw it out. */
export const BOTTLES: Record<BottleKind, BottleEntry> = {
  beer: {
    kind: 'beer',
    name: 'beer bottle',
    usualSizesMl: [330, 500],
    rating: 3,
    closures: ['crown_26'],
    note: `Up to about 3 volumes, under 3 bar at 25 °C. ${WINS}`,
    ...usual('standard beer bottle to about 3 volumes, below 3 bar at 25 °C'),
  },
  heavy_beer: {
    kind: 'heavy_beer',
    name: 'heavy returnable beer bottle',
    usualSizesMl: [330, 500],
    rating: 3.5,
    closures: ['crown_26'],
    note: `About 3.5 to 4 volumes. ${WINS}`,
    ...usual('heavy returnable beer bottle, 3.5 to 4 volumes'),
  },
  swing_top: {
    kind: 'swing_top',
    name: 'swing-top bottle of good make',
    usualSizesMl: [330, 500, 1000],
    rating: 3,
    closures: ['swing_top'],
    note: `Sold to hold drink under gas, not the ones for decoration. New rubber. ${WINS}`,
    ...usual('swing-top bottle of good make, 3 to 3.5 volumes'),
  },
  sparkling_wine: {
    kind: 'sparkling_wine',
    name: 'sparkling-wine bottle',
    usualSizesMl: [375, 750, 1500],
    rating: 6,
    closures: ['crown_29', 'crown_26', 'wired_stopper'],
    note: `Thick glass, deep punt. Stopper only with a wire cage. ${WINS}`,
    ...usual('sparkling-wine bottle, 6 to 7 bar at 20 °C'),
  },
  still_wine: {
    kind: 'still_wine',
    name: 'still-wine bottle',
    usualSizesMl: [375, 750],
    rating: 'never',
    closures: ['plain_cork', 'bar_top_cork', 'screw_cap'],
    note: 'Thin walls. Never under pressure.',
    ...usual('thin-walled still-wine bottle: not for pressure'),
  },
  odd_glass: {
    kind: 'odd_glass',
    name: 'square, decorative or unknown glass',
    usualSizesMl: [250, 500],
    rating: 'never',
    closures: ['bar_top_cork', 'screw_cap', 'swing_top', 'crown_26'],
    note: 'Corners break first. Never under pressure.',
    ...usual('decorative or square glass: not for pressure'),
  },
  pet: {
    kind: 'pet',
    name: 'PET soft-drink bottle',
    usualSizesMl: [500, 1000, 1500, 2000],
    rating: 6,
    closures: ['pet_cap'],
    note: `One that held a fizzy drink; squeeze it to feel the pressure. ${WINS}`,
    ...usual('PET soft-drink bottle, about 4 volumes, 6 bar'),
  },
  keg: {
    kind: 'keg',
    name: 'keg with a relief valve',
    usualSizesMl: [5000, 10000, 19000],
    rating: 6,
    closures: ['keg_lid'],
    note: 'Only with a relief valve that works, set at or under the rating on the plate.',
    ...usual('small kegs carry their rating on the plate and a relief valve'),
  },
};

export interface ClosureEntry extends Source {
  closure: Closure;
  name: string;
  rating: Rating;
  note: string;
}

const closure = (key: Closure, name: string, rating: Rating, note: string): ClosureEntry => ({ closure: key, name, rating, note, ...usual('what closures are used for') });

export const CLOSURE_CATALOGUE: Record<Closure, ClosureEntry> = {
  crown_26: closure('crown_26', 'crown cap, 26 mm', 6, 'New caps, crimped square.'),
  crown_29: closure('crown_29', 'crown cap, 29 mm', 8, 'Fits the wide lip of some sparkling-wine bottles only.'),
  swing_top: closure('swing_top', 'swing top', 3, 'New rubber washer each time.'),
  wired_stopper: closure('wired_stopper', 'stopper with a wire cage', 8, 'Never a stopper without its cage. Keep a hand over it when the cage comes off, away from faces.'),
  plain_cork: closure('plain_cork', 'straight cork', 'never', 'Still drink only.'),
  bar_top_cork: closure('bar_top_cork', 'bar-top cork', 'never', 'Still drink only.'),
  screw_cap: closure('screw_cap', 'screw cap on glass', 'never', 'Still drink only.'),
  pet_cap: closure('pet_cap', 'screw cap of the PET bottle', 6, 'The cap the bottle came with.'),
  keg_lid: closure('keg_lid', 'keg lid', 6, 'With the relief valve.'),
};

/** A bottle with its closure as it stands on the bench. */
export interface BottleChoice {
  kind: BottleKind;
  closure: Closure;
  sizeMl: number;
  /** What the maker says, bar gauge, read and confirmed by the person; null: nobody has looked. */
  confirmedBar: number | null;
}

export interface Holds extends Source {
  rating: Rating;
  /** True where a person has read the maker's figure, or where nothing is claimed (`never`). */
  confirmed: boolean;
}

/**
 * What a bottle with its closure holds: the weaker of the two. A confirmed figure
 * takes the place of the catalogue's for the bottle; it never turns `never` into
 * a pressure, and never lifts the closure's own limit.
 */
export function holds(choice: BottleChoice): Holds {
  const bottle = BOTTLES[choice.kind];
  const cap = CLOSURE_CATALOGUE[choice.closure];
  if (bottle.rating === 'never' || cap.rating === 'never') {
    const weaker = bottle.rating === 'never' ? bottle : cap;
    return { rating: 'never', confirmed: true, source: weaker.source, status: weaker.status };
  }
  const confirmed = choice.confirmedBar !== null;
  const glass = choice.confirmedBar ?? bottle.rating;
  return glass <= cap.rating
    ? { rating: glass, confirmed, source: confirmed ? 'the maker’s figure, confirmed by the person' : bottle.source, status: confirmed ? 'told' : bottle.status }
    : { rating: cap.rating, confirmed, source: cap.source, status: cap.status };
}

/** Where the figure comes from that a bottle is held against. */
export function howOfHolds(choice: Pick<BottleChoice, 'kind' | 'closure' | 'confirmedBar'>): How {
  const [bottle, cap] = [BOTTLES[choice.kind], CLOSURE_CATALOGUE[choice.closure]];
  const told = (rating: Rating) => (rating === 'never' ? 'never under pressure' : `${rating.toFixed(1)} bar`);
  return how('the weaker of bottle and closure; the maker’s figure, once somebody has read it, in place of the bottle’s usual one, never of the closure’s', holds({ ...choice, sizeMl: 0 }), [
    [`usual for a ${bottle.name}`, told(bottle.rating), ''],
    [`usual for a ${cap.name}`, told(cap.rating), ''],
    ['maker’s figure', choice.confirmedBar, 'bar'],
  ]);
}

/** Cautions for a bench with pressure on it, in the order they are needed. */
export const PRESSURE_CAUTIONS = [
  'Wear eye protection and gloves when you move bottles that may be over pressure.',
  'Cage every stopper. Box the bottles, upright, a towel over the box, away from people and from heat.',
  'Chill a bottle well before you open it; open it outdoors or over a sink, away from faces.',
  'If one gushes: move the whole lot somewhere cold, gloves and eyes, and let the gas out of every bottle outdoors.',
  'Glass that is chipped, scratched or square does not go under pressure.',
] as const;
