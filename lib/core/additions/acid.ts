/** Acid, chalk and tannin, by the gram a litre. */
import { figure, how, type Figure } from '../how/how';
import { practice, SOURCES } from '../how/sources';
import { between, type Range } from '../units/range';
import { roundDown } from '../units/rounding';
import { doseStanding } from './effect';

/**
 * Grams of each acid that are worth 1 g of titratable acid told as tartaric:
 * molar mass over its protons, against tartaric acid (150.087/2). Stoichiometry.
 */
export const ACIDS = {
  tartaric: { name: 'tartaric acid', gramsPerTartaric: 1 },
  malic: { name: 'malic acid', gramsPerTartaric: 134.088 / 2 / (150.087 / 2) },
  citric: { name: 'citric acid, anhydrous', gramsPerTartaric: 192.124 / 3 / (150.087 / 2) },
  lactic: { name: 'lactic acid, pure', gramsPerTartaric: 90.078 / (150.087 / 2) },
} as const;
export type Acid = keyof typeof ACIDS;

/** Chalk (calcium carbonate) that takes away 1 g of acid told as tartaric: 100.087/150.087. */
export const CHALK_PER_TARTARIC = 100.087 / 150.087;

/** Titratable acid that drinks usually have, g/L as tartaric: common practice. */
export const USUAL_ACID: Record<'cider' | 'mead' | 'wine', Range> = { cider: between(4, 7), mead: between(3.5, 6), wine: between(5, 8) };
/** pH a drink should have, for taste and keeping: common practice. */
export const USUAL_PH: Range = { lo: 3.1, value: 3.4, hi: 3.8 };
/** Largest steps at once, g/L: common practice. */
const LARGEST_ACID_STEP = 2;
const LARGEST_CHALK_STEP = 1;

export interface AcidDose {
  grams: Figure;
  /** Of what: an acid, or chalk where the drink is too sharp. */
  of: string;
  /** Cut to the largest step at once. */
  heldToStep: boolean;
  cautions: readonly string[];
}

/**
 * Acid that lifts the titratable acid to a wanted figure, or chalk that lowers it,
 * rounded down. What it does to the pH depends on the drink's buffers and is not
 * foretold: taste and measure.
 *
 * @param now titratable acid measured, g/L as tartaric
 * @param wanted titratable acid wanted, g/L as tartaric
 */
export function acidDose(now: number, wanted: number, volumeL: number, acid: Acid): AcidDose {
  const change = wanted - now;
  const up = change >= 0;
  const step = up ? LARGEST_ACID_STEP : LARGEST_CHALK_STEP;
  const taken = Math.min(Math.abs(change), step);
  const perG = up ? ACIDS[acid].gramsPerTartaric : CHALK_PER_TARTARIC;
  return {
    grams: figure(
      roundDown(taken * perG * volumeL, 0.1),
      'g',
      how('change in g/L as tartaric × grams for it × litres, rounded down', SOURCES.stoichiometry, [
        ['acid now', now, 'g/L as tartaric'],
        ['wanted', wanted, 'g/L as tartaric'],
        ['grams for 1 g', Number(perG.toFixed(3)), 'g'],
        ['volume', volumeL, 'L'],
      ]),
    ),
    of: up ? ACIDS[acid].name : 'chalk (calcium carbonate)',
    heldToStep: Math.abs(change) > step,
    cautions: [
      'Try it in a glass first: measure 100 ml, taste, then the vessel.',
      ...(up ? [] : ['Chalk foams. Leave room, stir, wait some weeks before bottling: crystals fall late.']),
      ...(Math.abs(change) > step ? [`Not more than ${step} g/L at once. Measure again before the rest.`] : []),
      ...(acid === 'citric' && up ? ['Citric acid late can turn to vinegar taste; EU wine may hold 1 g/L (from memory).'] : []),
    ],
  };
}

/** Tannin usually added, g/L: common practice. */
export const USUAL_TANNIN: Range = between(0.1, 0.5);

export interface TanninDose {
  grams: Figure;
  standing: 'below' | 'usual' | 'above';
  cautions: readonly string[];
}

/** Tannin powder for a volume, rounded down to 0.1 g. */
export function tanninDose(gPerL: number, volumeL: number): TanninDose {
  const standing = doseStanding(gPerL, USUAL_TANNIN);
  return {
    grams: figure(
      roundDown(gPerL * volumeL, 0.1),
      'g',
      how('g/L × litres, rounded down', practice('tannin powder 0.1 to 0.5 g/L'), [
        ['dose', gPerL, 'g/L'],
        ['volume', volumeL, 'L'],
      ]),
    ),
    standing,
    cautions: ['Half now, half after tasting: it cannot be taken out again.', ...(standing === 'above' ? ['Over the usual 0.5 g/L: harsh for months.'] : [])],
  };
}
