/** How a volume goes into bottles of several sizes: "five of 750 ml and the rest into a small one". */
import { how, type How } from '../how/how';
import { SOURCES } from '../how/sources';
import { roundDown } from '../units/rounding';

/** A size on the bench. `atHand` null: as many as it takes. */
export interface SizeAtHand {
  key: string;
  sizeMl: number;
  atHand: number | null;
}

export interface Filled {
  key: string;
  sizeMl: number;
  count: number;
}

export interface BottlePlan {
  filled: readonly Filled[];
  /** In bottles, L. */
  bottledL: number;
  /** Left on the lees and lost on the way, L. */
  lostL: number;
  /** Too little for another bottle, L: a tasting glass. */
  overL: number;
  bottles: number;
}

/**
 * Fills the sizes in the order given, whole bottles only: a half-filled bottle has
 * too much air and, primed, the wrong pressure. Put the small size last, for the
 * rest. What fills no bottle is left over.
 *
 * @param volumeL what is in the vessel, L
 * @param lossesL what stays on the lees and in the hose, L
 */
export function planBottles(volumeL: number, lossesL: number, sizes: readonly SizeAtHand[]): BottlePlan {
  const lostL = Math.min(Math.max(0, lossesL), Math.max(0, volumeL));
  // Whole millilitres, down: nobody fills to less, and binary residue must not cost a bottle.
  let leftMl = roundDown((Math.max(0, volumeL) - lostL) * 1000, 1);
  const counts = new Map<string, number>();
  const room = (size: SizeAtHand): number => (size.atHand ?? Infinity) - (counts.get(size.key) ?? 0);
  for (const size of sizes.filter((s) => s.sizeMl > 0)) {
    const count = Math.max(0, Math.min(room(size), Math.floor(leftMl / size.sizeMl)));
    counts.set(size.key, (counts.get(size.key) ?? 0) + count);
    leftMl -= count * size.sizeMl;
  }
  const filled = sizes.map(({ key, sizeMl }) => ({ key, sizeMl, count: counts.get(key) ?? 0 })).filter(({ count }) => count > 0);
  return {
    filled,
    bottledL: filled.reduce((sum, f) => sum + f.count * f.sizeMl, 0) / 1000,
    lostL,
    overL: leftMl / 1000,
    bottles: filled.reduce((sum, f) => sum + f.count, 0),
  };
}

/** How the plan came about. */
export const howOfPlan = (volumeL: number, plan: BottlePlan, sizes: readonly SizeAtHand[]): How =>
  how('what is in the vessel less what stays on the lees, whole bottles only, the sizes in the order they stand in and as many as are at hand; what fills no bottle is over', SOURCES.ownRule, [
    ['in the vessel', Number(volumeL.toFixed(2)), 'L'],
    ['left on lees', Number(plan.lostL.toFixed(2)), 'L'],
    ...sizes.map(({ sizeMl, atHand }) => ['size, and how many are at hand', `${sizeMl} ml, ${atHand ?? 'enough'}`, ''] as const),
  ]);
