/** Sugar for sparkle: what each kind gives, by weight, as syrup or as drops. */
import { figure, how, type Figure, type How, type RangeFigure, type Source } from '../how/how';
import { memory, practice, SOURCES } from '../how/sources';
import { exactly, type Range } from '../units/range';
import { roundDown } from '../units/rounding';
import { VOLUME_G_PER_L } from './co2';

/** CO2 from a hexose and from sucrose, g/g: computed from IUPAC standard atomic weights. */
const CO2_PER_HEXOSE = (2 * 44.009) / 180.156;
const CO2_PER_SUCROSE = (4 * 44.009) / 342.297;
/** Water of crystallisation of glucose monohydrate, by mass. */
const GLUCOSE_IN_MONOHYDRATE = 180.156 / 198.171;

export const PRIMING_KINDS = ['sucrose', 'glucose', 'glucose_monohydrate', 'fructose', 'honey', 'malt', 'syrup', 'drops'] as const;
export type PrimingKind = (typeof PRIMING_KINDS)[number];

export interface PrimingSugar extends Source {
  kind: PrimingKind;
  name: string;
  /** CO2 that 1 g as weighed gives when all of it ferments, g. */
  co2PerG: Range;
}

const entry = (kind: PrimingKind, name: string, co2PerG: Range, source: Source): PrimingSugar => ({ kind, name, co2PerG, ...source });

const ofHexose = (lo: number, value: number, hi: number): Range => ({ lo: lo * CO2_PER_HEXOSE, value: value * CO2_PER_HEXOSE, hi: hi * CO2_PER_HEXOSE });

const STOICHIOMETRIC: Record<Exclude<PrimingKind, 'syrup' | 'drops'>, PrimingSugar> = {
  sucrose: entry('sucrose', 'table sugar', exactly(CO2_PER_SUCROSE), SOURCES.stoichiometry),
  glucose: entry('glucose', 'grape sugar, dry', exactly(CO2_PER_HEXOSE), SOURCES.stoichiometry),
  glucose_monohydrate: entry('glucose_monohydrate', 'grape sugar, as usually sold', exactly(GLUCOSE_IN_MONOHYDRATE * CO2_PER_HEXOSE), SOURCES.stoichiometry),
  fructose: entry('fructose', 'fruit sugar', exactly(CO2_PER_HEXOSE), SOURCES.stoichiometry),
  honey: entry('honey', 'honey', ofHexose(0.75, 0.8, 0.83), practice('honey is about 80 % sugar by mass')),
  malt: entry('malt', 'dry malt extract', ofHexose(0.55, 0.62, 0.72), memory('dry malt extract: 55 to 72 % of its mass ferments, by maker and yeast')),
};

/** Table sugar, grape sugar, honey and the like as weighed. */
export const primingSugar = (kind: keyof typeof STOICHIOMETRIC): PrimingSugar => STOICHIOMETRIC[kind];

/** A syrup of table sugar and water of a known share of sugar by mass (°Bx/100). */
export function syrup(sugarShare: number): PrimingSugar {
  if (!(sugarShare > 0 && sugarShare <= 1)) throw new RangeError('the share of sugar in a syrup lies between 0 and 1');
  return entry('syrup', `syrup of ${Math.round(100 * sugarShare)} % sugar`, exactly(sugarShare * CO2_PER_SUCROSE), SOURCES.stoichiometry);
}

/** Sugar drops are reckoned as pure table sugar, which gives more gas for its weight than any other here. */
export const DROPS: PrimingSugar = entry('drops', 'sugar drops', exactly(CO2_PER_SUCROSE), SOURCES.stoichiometry);

/** Weight of a drop where nobody has weighed one, g. Weigh ten of yours. */
export const USUAL_DROP_G: Range = { lo: 2, value: 2.5, hi: 3 };

/** Drops for a bottle as the trade has it: one for 250 ml, three for 750 ml. */
export const usualDrops = (bottleL: number): number => Math.max(0, Math.floor(bottleL / 0.25 + 1e-9));

/** Grams of a sugar for one volume in one litre; the lower end is the sugar at its strongest. */
export function gramsPerVolume(sugar: PrimingSugar): RangeFigure {
  const { lo, value, hi } = sugar.co2PerG;
  return figure(
    { lo: VOLUME_G_PER_L / hi, value: VOLUME_G_PER_L / value, hi: VOLUME_G_PER_L / lo },
    'g/L a volume',
    how('1.9768 g/L of CO2 ÷ CO2 from 1 g of the sugar', sugar, [['CO2 from 1 g', value, 'g']]),
  );
}

/** Gas that so many grams in a litre give, volumes. */
export function gasFromSugar(sugar: PrimingSugar, gPerL: Range): Range {
  const { lo, value, hi } = sugar.co2PerG;
  return { lo: (gPerL.lo * lo) / VOLUME_G_PER_L, value: (gPerL.value * value) / VOLUME_G_PER_L, hi: (gPerL.hi * hi) / VOLUME_G_PER_L };
}

export interface Dose {
  /** Sugar for each litre, g. */
  gPerL: number;
  /** For all of it, g, rounded down. */
  totalG: number;
  how: Figure['how'];
}

/**
 * Sugar for a wanted sparkle, rounded down to 0.1 g/L and to whole grams from
 * 10 g on: the sugar is taken at its strongest, and the gas already there at its
 * most, so the bottle has at most what was asked.
 *
 * @param wantedVolumes gas wanted in the bottle, volumes
 * @param residualVolumes gas there already, upper end
 */
export function doseFor(wantedVolumes: number, residualVolumes: number, sugar: PrimingSugar, litres: number): Dose {
  const missing = Math.max(0, wantedVolumes - residualVolumes);
  const gPerL = roundDown(missing * gramsPerVolume(sugar).value.lo, 0.1);
  const total = gPerL * litres;
  return {
    gPerL,
    totalG: roundDown(total, total >= 10 ? 1 : 0.1),
    how: how('(wanted − there already) × grams for a volume × litres, rounded down', sugar, [
      ['wanted', wantedVolumes, 'volumes'],
      ['there already, at most', residualVolumes, 'volumes'],
      ['to prime', litres, 'L'],
    ]),
  };
}

/** Strength that priming adds, % vol: ethanol by stoichiometry at full yield, 789.24 g/L; the upper end. */
export const abvFromPriming = (sugar: PrimingSugar, gPerL: number): number => (100 * gPerL * sugar.co2PerG.hi * (46.069 / 44.009)) / 789.24;

/** How the strength that the sugar for fizz adds comes about. */
export const howOfAbvAdded = (sugar: PrimingSugar, abvAddedPercent: number): How =>
  how('grams a litre, at most, × CO2 from 1 g × 46.069 ÷ 44.009 g of alcohol for a gram of CO2 ÷ 789.24 g/L, all of it fermented', SOURCES.stoichiometry, [
    ['CO2 from 1 g of the sugar, at most', sugar.co2PerG.hi, 'g'],
    ['added, at most', Number(abvAddedPercent.toFixed(2)), '% vol'],
  ]);

/** How the drops in all come about. */
export const howOfDrops = (gramsEach: Range, totalDrops: number): How =>
  how('drops in each × bottles of that size, all sizes; the gas is reckoned with the heaviest drop', SOURCES.practice, [
    ['drops in all', totalDrops, ''],
    ['one drop weighs', `${gramsEach.value} (${gramsEach.lo} to ${gramsEach.hi})`, 'g'],
  ]);

/** Sparkle by name, volumes wanted: common practice. Dry (still) gets no sugar. */
export const SPARKLES = {
  still: { name: 'still', volumes: null },
  light: { name: 'lightly sparkling', volumes: 2 },
  sparkling: { name: 'sparkling', volumes: 2.8 },
} as const;
export type Sparkle = keyof typeof SPARKLES;
