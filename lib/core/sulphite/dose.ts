/** How much sulphite for a wanted protection, and how much is too much. */
import { figure, how, type Figure, type How } from '../how/how';
import { practice, SOURCES } from '../how/sources';
import { roundDown } from '../units/rounding';
import { molecularShare, sulphitePk } from './pk';

/** SO2 by mass in the usual salts: computed from molar masses. */
export const SULPHITE_SALTS = {
  potassium_metabisulphite: { name: 'potassium metabisulphite', so2Share: 0.5763 },
  sodium_metabisulphite: { name: 'sodium metabisulphite', so2Share: 0.674 },
} as const;
export type SulphiteSalt = keyof typeof SULPHITE_SALTS;

/** SO2 of a tablet, mg: nominally 0.44 g of potassium metabisulphite; common practice, makers differ. */
export const TABLET_SO2_MG = 440 * SULPHITE_SALTS.potassium_metabisulphite.so2Share;

/** Usual targets of molecular SO2, mg/L: common practice. */
export const MOLECULAR_TARGETS = { usual: 0.5, secure: 0.8 } as const;

/** Part of added sulphite that stays free; the rest binds. Common practice; more binds in sweet and in young drinks. */
const STAYS_FREE = { lo: 0.5, hi: 0.7 } as const;

/** Highest total, mg/L, held to here: that of a dry white wine in the EU. Red wine 150; local law for the drink comes first. */
export const TOTAL_LIMIT_MG_L = 200;
/** Above this share of free sulphite people notice it, mg/L molecular: common practice. */
const NOTICED_MOLECULAR = 2;

export interface SulphiteInput {
  pH: number;
  abvPercent: number;
  celsius: number;
  volumeL: number;
  /** Free sulphite measured, mg/L; null: not measured, taken as none for the need and as unknown for the total. */
  freeMgL: number | null;
  /** Total sulphite so far, measured or from the log, mg/L. */
  totalMgL: number;
  /** Wanted molecular sulphite, mg/L. */
  molecularTarget: number;
  salt: SulphiteSalt;
}

export interface SulphiteDose {
  /** Molecular now, mg/L; null where the free is not measured. */
  molecularNow: Figure<number | null>;
  freeNeededMgL: Figure;
  /** Of the salt, g, rounded down to 0.1 g (0.01 under 1 g); 0 where none is needed. */
  saltG: Figure;
  tablets: number;
  /** Total after the dose, mg/L: all that was ever added counts. */
  totalAfterMgL: Figure;
  /** True where the dose was cut so that the total stays within the limit. */
  heldByLimit: boolean;
  cautions: readonly string[];
}

const CAUTIONS = [
  'The powder and its gas hurt eyes and lungs: weigh it with the window open, never smell at the jar. Dangerous to people with asthma.',
  'It does not stop a fermentation that works.',
  'Dissolve it in a little of the drink, stir in, measure again after a day.',
] as const;

/**
 * Sulphite to add so that the molecular part reaches a target, with the pK at the
 * drink's strength and temperature. Good to a quarter at best: how much binds is
 * a guess, so measure after. The dose is reckoned with the least binding and
 * rounded down; the total is kept within the limit.
 */
export function sulphiteDose(input: SulphiteInput): SulphiteDose {
  const { pH, volumeL, salt } = input;
  if (!(pH >= 2.5 && pH <= 4.6)) throw new RangeError('a drink’s pH lies between 2.5 and 4.6');
  const { pk, outsideTable } = sulphitePk(input.abvPercent, input.celsius);
  const share = molecularShare(pH, pk);
  const chemistry = [
    ['pH', pH, ''],
    ['pK', Number(pk.toFixed(3)), ''],
    ['strength', input.abvPercent, '% vol'],
    ['temperature', input.celsius, '°C'],
  ] as const;
  const origin = (formula: string): How => how(formula, SOURCES.oivSulphite, chemistry);
  const needed = input.molecularTarget / share;
  const missing = Math.max(0, needed - (input.freeMgL ?? 0));
  const wanted = missing / STAYS_FREE.hi;
  const allowed = Math.max(0, TOTAL_LIMIT_MG_L - input.totalMgL);
  const addMgL = Math.min(wanted, allowed);
  const grams = (addMgL * volumeL) / 1000 / SULPHITE_SALTS[salt].so2Share;
  const saltG = roundDown(grams, grams < 1 ? 0.01 : 0.1);
  const addedMgL = volumeL > 0 ? (saltG * SULPHITE_SALTS[salt].so2Share * 1000) / volumeL : 0;
  const molecularNow = input.freeMgL === null ? null : input.freeMgL * share;
  return {
    molecularNow: figure(molecularNow, 'mg/L', origin('free/(1 + 10^(pH − pK))')),
    freeNeededMgL: figure(needed, 'mg/L', origin('target × (1 + 10^(pH − pK))')),
    saltG: figure(
      saltG,
      'g',
      how('(free needed − free now) ÷ part that stays free × litres ÷ SO2 in the salt, rounded down', practice('half to seven tenths of added sulphite stays free'), [
        ['free needed', needed, 'mg/L'],
        ['free now', input.freeMgL, 'mg/L'],
        ['stays free, at most', STAYS_FREE.hi, ''],
        ['volume', volumeL, 'L'],
        ['SO2 in the salt', SULPHITE_SALTS[salt].so2Share, ''],
      ]),
    ),
    tablets: Math.floor((addMgL * volumeL) / TABLET_SO2_MG + 1e-9),
    totalAfterMgL: figure(
      input.totalMgL + addedMgL,
      'mg/L',
      how('total so far + all that is added', SOURCES.sulphiteLimits, [
        ['total so far', input.totalMgL, 'mg/L'],
        ['added', addedMgL, 'mg/L'],
      ]),
    ),
    heldByLimit: wanted > allowed,
    cautions: [
      ...CAUTIONS,
      ...(wanted > allowed ? [`The target would take the total over ${TOTAL_LIMIT_MG_L} mg/L, the EU limit for dry white wine. Lower the pH first.`] : []),
      ...(needed > 60 ? ['At this pH it takes so much that it is tasted. Sharpen the drink with acid first, then measure again.'] : []),
      ...(molecularNow !== null && molecularNow > NOTICED_MOLECULAR ? ['It already smells of sulphite to most people.'] : []),
      ...(outsideTable ? ['The published table covers 20 to 40 °C and up to 15 % vol; its edge is used. A colder drink has less molecular sulphite than shown.'] : []),
      ...(input.freeMgL === null ? ['Free sulphite was not measured and is taken as none. Measure it if any was added before.'] : []),
    ],
  };
}
