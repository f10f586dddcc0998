/** Nitrogen that yeast needs and is given. */
import { figure, how, spell, type RangeFigure } from '../how/how';
import { SOURCES } from '../how/sources';
import { mapRange, type Range } from '../units/range';
import type { NitrogenNeed } from './ingredients';

/** mg of nitrogen for each g of sugar, by the yeast's need: common practice. */
export const NITROGEN_PER_SUGAR: Record<NitrogenNeed, number> = { low: 0.75, medium: 0.9, high: 1.25 };
/** Nitrogen in diammonium phosphate by mass: stoichiometry. */
export const DAP_NITROGEN = 0.2121;
/** Highest dose of diammonium phosphate, g/L (OIV Code, Annex A.1). The EU allows more in a first fermentation; the lower is held to. */
export const DAP_LIMIT_G_PER_L = 0.3;
/** Above this a must may run away and leave nitrogen for others, mg/L (an extension service's figure, read). */
const TOO_MUCH_MG_L = 300;

export interface NitrogenSheet {
  neededMgL: RangeFigure;
  givenMgL: RangeFigure;
  /** Missing at the middle values, mg/L; 0 where there is enough. */
  missingMgL: number;
  notes: readonly string[];
}

/**
 * Nitrogen needed by the sugar and the yeast, against what the lines bring. The
 * need is a habit of the trade, good to a third; what fruit and honey hold varies more.
 *
 * @param sugarGPerL fermentable sugar, g/L
 * @param need null where no yeast is chosen: from the low to the high habit
 */
export function nitrogenSheet(sugarGPerL: Range, need: NitrogenNeed | null, givenMgL: Range, dapGPerL: number): NitrogenSheet {
  const factor = NITROGEN_PER_SUGAR[need ?? 'medium'];
  const needed = need
    ? mapRange(sugarGPerL, (s) => s * factor)
    : { lo: sugarGPerL.lo * NITROGEN_PER_SUGAR.low, value: sugarGPerL.value * factor, hi: sugarGPerL.hi * NITROGEN_PER_SUGAR.high };
  const missingMgL = Math.max(0, needed.value - givenMgL.value);
  return {
    neededMgL: figure(
      needed,
      'mg N/L',
      how('sugar × mg of nitrogen for each g of sugar, by the yeast’s need', SOURCES.nitrogenDemand, [
        ['fermentable sugar', spell(sugarGPerL, 0), 'g/L'],
        ['need', need ?? 'not told: low to high', ''],
      ]),
    ),
    givenMgL: figure(givenMgL, 'mg N/L', how('nitrogen of each line ÷ volume', SOURCES.practice, [])),
    missingMgL,
    notes: [
      ...(dapGPerL > DAP_LIMIT_G_PER_L ? [`${dapGPerL.toFixed(2)} g/L of DAP is over ${DAP_LIMIT_G_PER_L} g/L, the OIV limit. Give the rest as a complex nutrient.`] : []),
      ...(givenMgL.value > TOO_MUCH_MG_L ? [`Over ${TOO_MUCH_MG_L} mg N/L it may work too fast and leave nitrogen for spoilage.`] : []),
      ...(missingMgL > 0.25 * needed.value ? [`About ${Math.round(missingMgL)} mg N/L short: a hungry yeast stops early and smells of sulphur.`] : []),
    ],
  };
}
