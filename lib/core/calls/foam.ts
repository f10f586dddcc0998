import type { BatchEvent, Foam, Instant } from '../types';

/** Least height of what counts as a ring and as a cover, mm (ours: a ring is what sticks at the glass). */
const RING_MM = 3;
const COVER_MM = 10;
/** How long foam that somebody saw is believed, ms: krausen rises and falls within a day (common practice). */
const BELIEVED_MS = 24 * 3_600_000;

/** The word for a height of foam above the drink, mm. How far it is to the neck a height alone does not tell. */
export const foamOf = (mm: number): Foam => (mm < RING_MM ? 'none' : mm < COVER_MM ? 'ring' : 'cover');

export interface SeenFoam {
  foam: Foam;
  at: Instant;
}

/** The foam as it was last seen, by eye or by a probe, within a day of `at` and known by then; null: nobody looked. */
export function foamSeen(events: readonly BatchEvent[], at: Instant): SeenFoam | null {
  let last: SeenFoam | null = null;
  for (const { foam, at: seen, knownAt } of events) {
    if (!foam || seen > at || (knownAt ?? seen) > at || at - seen > BELIEVED_MS) continue;
    if (!last || seen >= last.at) last = { foam, at: seen };
  }
  return last;
}

/** Foam that may yet reach an airlock. */
export const standsHigh = (seen: SeenFoam | null): seen is SeenFoam => seen?.foam === 'cover' || seen?.foam === 'at_neck';
