/** Nutrient by the sugar used so far: small portions early, none late. */
import { figure, how, type Figure } from '../how/how';
import { practice, SOURCES } from '../how/sources';
import { DAP_LIMIT_G_PER_L, DAP_NITROGEN } from '../must/nitrogen';
import { roundDown } from '../units/rounding';
import { pointsOf, sgOf } from '../units/convert';

/** Shares of the fermentable sugar used at which a portion is due, the first once the yeast works: common practice. */
export const PORTIONS_AT = [0, 0.1, 0.2, 0.33] as const;
/** After this share no more: what the yeast leaves feeds others. Common practice. */
export const NO_MORE_AFTER = 0.5;
/** Above this strength yeast hardly takes up ammonia, % vol: common practice. */
const DAP_UP_TO_ABV = 9;

/** Nobody is asked to feed again so soon after the last time, whatever the plan says. Our own rule. */
export const FED_LATELY_MS = 12 * 3_600_000;

export const NUTRIENTS = {
  dap: { name: 'diammonium phosphate (DAP)', mgNPerG: 1000 * DAP_NITROGEN, limitGPerL: DAP_LIMIT_G_PER_L, source: SOURCES.dapOiv },
  complex: { name: 'complex yeast nutrient', mgNPerG: 100, limitGPerL: 0.6, source: practice('complex nutrients hold 80 to 130 mg of nitrogen a gram; the packet wins') },
} as const;
export type Nutrient = keyof typeof NUTRIENTS;

export interface NutrientPortion {
  /** Share of the sugar used when it is due. */
  atShare: number;
  /** Gravity at which it is due, SG. */
  atGravity: number;
  grams: number;
  state: 'past' | 'due' | 'later';
}

export interface NutrientPlan {
  sugarUsedShare: number;
  missingMgL: number;
  totalG: Figure;
  portions: readonly NutrientPortion[];
  /** Cut by the limit. */
  heldByLimit: boolean;
  cautions: readonly string[];
}

export interface NutrientInput {
  volumeL: number;
  /** Needed and already there or given, mg N/L. */
  neededMgL: number;
  givenMgL: number;
  /** Of this nutrient, given so far, g. */
  givenG: number;
  nutrient: Nutrient;
  originalGravity: number;
  /** Null: no reading yet. */
  gravity: number | null;
  expectedFinal: number;
  abvPercent: number;
}

/** Share of the fermentable sugar gone, by the fall of gravity, 0 to 1. */
export function sugarUsedShare(originalGravity: number, gravity: number, expectedFinal: number): number {
  const drop = pointsOf(originalGravity) - pointsOf(expectedFinal);
  return drop > 0 ? Math.min(1, Math.max(0, (pointsOf(originalGravity) - pointsOf(gravity)) / drop)) : 1;
}

/** What is still to give, in equal portions over those not past, rounded down and held under the limit. */
export function nutrientPlan(input: NutrientInput): NutrientPlan {
  const nutrient = NUTRIENTS[input.nutrient];
  const used = input.gravity === null ? 0 : sugarUsedShare(input.originalGravity, input.gravity, input.expectedFinal);
  const missingMgL = Math.max(0, input.neededMgL - input.givenMgL);
  const tooLate = used > NO_MORE_AFTER || (input.nutrient === 'dap' && input.abvPercent > DAP_UP_TO_ABV);
  const wantedG = (missingMgL * input.volumeL) / nutrient.mgNPerG;
  const allowedG = Math.max(0, nutrient.limitGPerL * input.volumeL - input.givenG);
  const totalG = tooLate ? 0 : roundDown(Math.min(wantedG, allowedG), 0.1);
  // A portion is due until the next one is; the last until no more is given.
  const ends = PORTIONS_AT.map((_, i) => PORTIONS_AT[i + 1] ?? NO_MORE_AFTER);
  const states = PORTIONS_AT.map((share, i): NutrientPortion['state'] => (tooLate || used >= (ends[i] ?? 1) ? 'past' : used >= share ? 'due' : 'later'));
  const open = states.filter((s) => s !== 'past').length;
  const each = open > 0 ? roundDown(totalG / open, 0.1) : 0;
  const drop = pointsOf(input.originalGravity) - pointsOf(input.expectedFinal);
  return {
    sugarUsedShare: used,
    missingMgL,
    totalG: figure(
      totalG,
      'g',
      how('nitrogen missing × litres ÷ nitrogen in 1 g, at most the limit, rounded down', nutrient.source, [
        ['missing', missingMgL, 'mg N/L'],
        ['volume', input.volumeL, 'L'],
        ['nitrogen in 1 g', nutrient.mgNPerG, 'mg'],
        ['at most', nutrient.limitGPerL, 'g/L'],
        ['given so far', input.givenG, 'g'],
      ]),
    ),
    portions: PORTIONS_AT.map((share, i) => ({
      atShare: share,
      atGravity: sgOf(pointsOf(input.originalGravity) - share * drop),
      grams: states[i] === 'past' ? 0 : each,
      state: states[i] ?? 'past',
    })),
    heldByLimit: !tooLate && wantedG > allowedG,
    cautions: [
      'Stir it in slowly: powder in a drink full of gas foams over.',
      ...(tooLate && missingMgL > 0 ? [used > NO_MORE_AFTER ? 'Half of the sugar is gone: nutrient now feeds spoilage rather than yeast.' : `Over ${DAP_UP_TO_ABV} % vol yeast hardly takes DAP up.`] : []),
      ...(!tooLate && wantedG > allowedG ? [`Held under ${nutrient.limitGPerL} g/L of ${nutrient.name}. The packet and local law come first.`] : []),
      ...(input.nutrient === 'dap' ? ['Never in the water of dry yeast.'] : []),
    ],
  };
}
