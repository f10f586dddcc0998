/** Carbon dioxide in water and in drink: how much dissolves, and what it presses. */
import { figure, how, type Figure } from '../how/how';
import { SOURCES } from '../how/sources';
import { waterDensity } from '../gravity/density';

/** Mass of CO2 in one volume, g/L: gas at 0 °C and 101.325 kPa (Weiss 1974 virial coefficient, molar mass 44.0095). */
export const VOLUME_G_PER_L = 1.9768;
const MOLAR_MASS = 44.0095;
const BAR_PER_ATM = 1.01325;
/** cm³ atm/(mol K). */
const GAS_CONSTANT = 82.05746;
/** Partial molar volume of dissolved CO2, cm³/mol: Weiss 1974, recalled. */
const DISSOLVED_MOLAR_VOLUME = 32.3;

/** Solubility by Weiss, Marine Chemistry 2 (1974) 203-215, salinity 0, mol/(L atm of fugacity); −1 to 40 °C. */
export function weissSolubility(celsius: number): number {
  const t = (celsius + 273.15) / 100;
  return Math.exp(-58.0931 + 90.5069 / t + 22.294 * Math.log(t));
}

/** Solubility by Carroll, Slupsky, Mather, J. Phys. Chem. Ref. Data 20 (1991) 1201-1209, mol/(L atm of fugacity); 0 to 160 °C. */
export function carrollSolubility(celsius: number): number {
  const t = celsius + 273.15;
  const henryMPa = Math.exp(-6.8346 + 1.2817e4 / t - 3.7668e6 / t ** 2 + 2.997e8 / t ** 3);
  const moleFraction = 0.101325 / henryMPa;
  return (moleFraction / (1 - moleFraction)) * (waterDensity(celsius) / 18.01528);
}

/** Vapour pressure of water, atm: Magnus formula, recalled; 0.023 at 20 °C. */
export const vapourPressureAtm = (celsius: number): number => (6.112 * Math.exp((17.62 * celsius) / (243.12 + celsius))) / 1013.25;

/** Second virial coefficient of CO2, cm³/mol (Weiss 1974). */
const virial = (kelvin: number): number => -1636.75 + 12.0408 * kelvin - 3.27957e-2 * kelvin ** 2 + 3.16528e-5 * kelvin ** 3;

/**
 * Share of water's solubility that alcohol and sugar leave: the terms of the
 * former EU method, (0.86 − 0.01 A)(1 − 0.00144 S)/0.86. 1 for water.
 */
export function solubilityShare(abvPercent: number, sugarGPerL: number): number {
  return ((0.86 - 0.01 * abvPercent) * (1 - 0.00144 * sugarGPerL)) / 0.86;
}

/** Volumes that water holds under one atmosphere of CO2, gas alone, vapour not counted. */
export const volumesPerAtm = (solubility: number): number => (solubility * MOLAR_MASS) / VOLUME_G_PER_L;

/**
 * Partial pressure of CO2, atm, over water that holds so many volumes, with the
 * gas not ideal and the liquid pressed (Weiss 1974): bisection, to 1e-9 atm.
 */
function partialPressureAtm(volumes: number, celsius: number, solubility: number): number {
  const kelvin = celsius + 273.15;
  const rt = GAS_CONSTANT * kelvin;
  const held = (p: number): number => {
    const fugacity = p * Math.exp((p * virial(kelvin)) / rt);
    const total = p + vapourPressureAtm(celsius);
    return volumesPerAtm(solubility) * fugacity * Math.exp(((1 - total) * DISSOLVED_MOLAR_VOLUME) / rt);
  };
  // Above about 40 atm the virial form bends back; no bottle is asked about there.
  let [lo, hi] = [0, 40];
  if (held(hi) < volumes) return hi;
  for (let i = 0; i < 60; i += 1) {
    const mid = (lo + hi) / 2;
    if (held(mid) < volumes) lo = mid;
    else hi = mid;
  }
  return hi;
}

/** Gauge pressure, bar, over water holding so many volumes: Weiss 1974 with fugacity; below 0 where the water is not saturated. */
export function waterGaugeBar(volumes: number, celsius: number, solubility = weissSolubility(celsius)): number {
  return (partialPressureAtm(volumes, celsius, solubility) + vapourPressureAtm(celsius) - 1) * BAR_PER_ATM;
}

/** Absolute pressure at 20 °C, bar, by the former EU method: g/L = 1.951e-5 P (0.86 − 0.01 A)(1 − 0.00144 S), P in Pa. */
export function formerEuAbsoluteBarAt20(volumes: number, abvPercent: number, sugarGPerL: number): number {
  const gPerL = volumes * VOLUME_G_PER_L;
  return gPerL / (1.951e-5 * (0.86 - 0.01 * abvPercent) * (1 - 0.00144 * sugarGPerL)) / 1e5;
}

/** The EU method carried to another temperature by the ratio of ideal pressures over water. */
function formerEuGaugeBar(volumes: number, celsius: number, abvPercent: number, sugarGPerL: number): number {
  const ratio = weissSolubility(20) / weissSolubility(celsius);
  return formerEuAbsoluteBarAt20(volumes, abvPercent, sugarGPerL) * ratio - BAR_PER_ATM;
}

/** A drink as far as its gas is concerned. */
export interface DrinkForGas {
  abvPercent: number;
  /** Sugar left, g/L. */
  sugarGPerL: number;
}

export interface DrinkPressure {
  /** Gauge pressure to reckon with: the highest of the methods, bar. */
  gaugeBar: number;
  /** Which method gave it, and what the others give. */
  methods: readonly Figure[];
  how: Figure['how'];
}

/**
 * Gauge pressure of a bottle, bar: the highest of the former EU method (alcohol
 * and sugar), Weiss in water, Carroll in water, and Weiss with the EU's alcohol
 * and sugar terms. The gas that would fill the headspace is left in the liquid,
 * which is on the safe side. 0 to 40 °C.
 */
export function drinkPressure(volumes: number, celsius: number, drink: DrinkForGas): DrinkPressure {
  if (!(celsius >= 0 && celsius <= 40)) throw new RangeError('pressure is reckoned from 0 to 40 °C');
  if (!(volumes >= 0)) throw new RangeError('volumes of gas must not be negative');
  const { abvPercent, sugarGPerL } = drink;
  if (!(abvPercent >= 0 && abvPercent <= 30)) throw new RangeError('pressure is reckoned from 0 to 30 % vol');
  if (!(sugarGPerL >= 0 && sugarGPerL <= 400)) throw new RangeError('pressure is reckoned from 0 to 400 g/L of sugar');
  const inputs = [
    ['gas', volumes, 'volumes'],
    ['temperature', celsius, '°C'],
    ['strength', abvPercent, '% vol'],
    ['sugar', sugarGPerL, 'g/L'],
  ] as const;
  const watery = inputs.slice(0, 2);
  const share = solubilityShare(abvPercent, sugarGPerL);
  const methods: Figure[] = [
    figure(
      formerEuGaugeBar(volumes, celsius, abvPercent, sugarGPerL),
      'bar',
      how('g/L = 1.951e-5 P (0.86 − 0.01 A)(1 − 0.00144 S) at 20 °C, P then times the ratio of pressures over water', SOURCES.eec2676, inputs),
    ),
    figure(waterGaugeBar(volumes, celsius), 'bar', how('water: ln K0 = −58.0931 + 90.5069 (100/T) + 22.2940 ln(T/100), real gas', SOURCES.weiss, watery)),
    figure(
      waterGaugeBar(volumes, celsius, carrollSolubility(celsius)),
      'bar',
      how('water: ln(H/MPa) = −6.8346 + 1.2817e4/T − 3.7668e6/T² + 2.997e8/T³, real gas', SOURCES.carroll, watery),
    ),
    figure(
      waterGaugeBar(volumes / share, celsius),
      'bar',
      how('Weiss in water with the solubility lowered by the EU method’s alcohol and sugar terms, real gas', SOURCES.ownRule, inputs),
    ),
  ];
  const gaugeBar = Math.max(...methods.map((m) => m.value));
  const highest = methods.find((m) => m.value === gaugeBar);
  return {
    gaugeBar,
    methods,
    how: how(`the highest of ${methods.length} methods; here ${highest?.how.formula ?? ''}`, highest?.how ?? SOURCES.ownRule, inputs),
  };
}

/** Highest content, volumes, that a bottle of given gauge pressure holds at a temperature: bisection on {@link drinkPressure}, to 1e-6. */
export function volumesAtPressure(gaugeBar: number, celsius: number, drink: DrinkForGas): number {
  let [lo, hi] = [0, 20];
  for (let i = 0; i < 45; i += 1) {
    const mid = (lo + hi) / 2;
    if (drinkPressure(mid, celsius, drink).gaugeBar <= gaugeBar) lo = mid;
    else hi = mid;
  }
  return lo;
}
