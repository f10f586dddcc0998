/** Sorbate with sulphite, to hold a yeast that has finished. */
import { figure, how, type Figure } from '../how/how';
import { practice } from '../how/sources';
import { roundDown } from '../units/rounding';

/** Sorbic acid in potassium sorbate by mass: 112.13/150.22. */
const SORBIC_SHARE = 112.13 / 150.22;
/** Highest sorbic acid in wine in the EU, mg/L: recalled. */
export const SORBIC_LIMIT_MG_L = 200;

export interface StabiliseDose {
  sorbateG: Figure;
  /** Free sulphite that has to stand beside it, mg/L molecular. */
  molecularTarget: number;
  cautions: readonly string[];
}

/**
 * Potassium sorbate for a volume, rounded down: 200 mg/L of sorbic acid up to
 * 10 % vol, falling to 100 at 14 % vol and above (common practice: alcohol helps).
 */
export function stabiliseDose(volumeL: number, abvPercent: number): StabiliseDose {
  const sorbic = Math.min(SORBIC_LIMIT_MG_L, Math.max(100, 200 - 25 * (abvPercent - 10)));
  return {
    sorbateG: figure(
      roundDown((sorbic * volumeL) / SORBIC_SHARE / 1000, 0.1),
      'g',
      how('sorbic acid wanted × litres ÷ 0.746, rounded down', practice('100 to 200 mg/L of sorbic acid, less in strong drinks'), [
        ['sorbic acid', sorbic, 'mg/L'],
        ['volume', volumeL, 'L'],
      ]),
    ),
    molecularTarget: 0.8,
    cautions: [
      'Only a bright drink whose gravity stands still can be stabilised. It does not stop a working yeast.',
      'Sorbate without sulphite can turn to a smell of geraniums.',
      `At most ${SORBIC_LIMIT_MG_L} mg/L of sorbic acid, the EU limit for wine (from memory). Local law comes first.`,
    ],
  };
}
