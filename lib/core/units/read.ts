import { brixOf, platoOf } from '../gravity/plato';
import type { ChosenUnits } from './chosen';
import { fahrenheitOf, LITRES_PER_IMPERIAL_GALLON, LITRES_PER_US_GALLON } from './convert';
import { splitFigures } from './figures';

/** What is kept in SG, °C and litres, as a person with these units reads it. */

export const minus = (text: string) => text.replace('-', '−');

export const ofGravity = { sg: (sg: number) => sg, brix: brixOf, plato: platoOf };
export const GRAVITY_NAMES = { sg: '', brix: ' °Bx', plato: ' °P' };
const VOLUMES = { l: { name: 'L', litres: 1 }, us_gal: { name: 'gal', litres: LITRES_PER_US_GALLON }, imp_gal: { name: 'gal', litres: LITRES_PER_IMPERIAL_GALLON } };

/** A gravity without its unit, for axes and columns whose head names it: `1.041`, `10.2`. Never a minus before a nought. */
export function gravityNumber(sg: number, units: ChosenUnits): string {
  const value = ofGravity[units.gravity](sg);
  return minus(units.gravity === 'sg' ? value.toFixed(3) : (Number(value.toFixed(1)) || 0).toFixed(1));
}

/** `1.041`, `10.2 °Bx`, `10.2 °P`. */
export const gravityText = (sg: number, units: ChosenUnits): string => `${gravityNumber(sg, units)}${GRAVITY_NAMES[units.gravity]}`;

/** `± 0.003`, or `± 0.7 °P`: half an interval about a gravity. */
export function gravityDoubt(sg: number, half: number, units: ChosenUnits): string {
  if (units.gravity === 'sg') return `± ${half.toFixed(3)}`;
  const of = ofGravity[units.gravity];
  return `± ${Math.max(0.1, (of(sg + half) - of(sg - half)) / 2).toFixed(1)}${GRAVITY_NAMES[units.gravity]}`;
}

export const temperatureNumber = (celsius: number, digits: number, units: ChosenUnits): string => minus((Number((units.temperature === 'f' ? fahrenheitOf(celsius) : celsius).toFixed(digits)) || 0).toFixed(digits));
export const temperatureName = (units: ChosenUnits): string => (units.temperature === 'f' ? '°F' : '°C');
/** A difference of temperatures, which has no nought of its own. */
export const temperatureSpan = (celsius: number, units: ChosenUnits): number => (units.temperature === 'f' ? celsius * 1.8 : celsius);

/** `4.5 L`, `1.19 gal`; a real minus. */
export function volumeText(litres: number, digits: number | undefined, units: ChosenUnits): string {
  const { name, litres: per } = VOLUMES[units.volume];
  const value = litres / per;
  const asked = digits ?? (litres < 10 ? 2 : 1);
  // A gallon is about four litres: two decimals are a wine glass.
  return minus(`${Number(value.toFixed(units.volume === 'l' ? asked : 2)) || 0} ${name}`);
}

/** A value and its unit, in the reader's: what has no unit of theirs stays as it is. */
export function valueRead(value: number, unit: string, units: ChosenUnits): { value: number; unit: string } {
  if (unit === 'SG' && units.gravity !== 'sg') return { value: ofGravity[units.gravity](value), unit: GRAVITY_NAMES[units.gravity].trim() };
  if (unit === '°C' && units.temperature === 'f') return { value: fahrenheitOf(value), unit: '°F' };
  if (unit === 'L' && units.volume !== 'l') return { value: value / VOLUMES[units.volume].litres, unit: VOLUMES[units.volume].name };
  return { value, unit };
}

/** A gravity in a sentence: three decimals between 0.970 and 1.200, perhaps with its doubt. */
const GRAVITY = /^([01]\.\d{3})(?: ± (0\.\d{3}))?$/;
const GRAVITIES = /^([01]\.\d{3})[–-]([01]\.\d{3})$/;
const TEMPERATURE = /^([−+-]?\d+(?:\.\d+)?)(?:[–-](\d+(?:\.\d+)?))?[  ]?°C(?: ± (\d+(?:\.\d+)?))?$/;
const VOLUME = /^(\d+(?:\.\d+)?)(?:[–-](\d+(?:\.\d+)?))?[  ]?L$/;

const decimals = (text: string) => text.split('.')[1]?.length ?? 0;
const number = (text: string) => Number(text.replace('−', '-'));
const isGravity = (sg: number) => sg >= 0.97 && sg <= 1.2;

/** `within 10 °C`, `warmed by 3 °C`: degrees between two temperatures. */
const BETWEEN = /\b(within|by|of at most|times for)\s$/;

/**
 * A figure of a sentence, as the person reads it; whatever else it is stays as it is.
 * @param before the prose that it follows, which tells a step of temperature from a temperature
 */
export function figureRead(text: string, before: string, units: ChosenUnits): string {
  if (units.gravity !== 'sg') {
    const one = GRAVITY.exec(text);
    if (one && isGravity(Number(one[1]))) return `${gravityText(Number(one[1]), units)}${one[2] ? ` ${gravityDoubt(Number(one[1]), Number(one[2]), units)}` : ''}`;
    const two = GRAVITIES.exec(text);
    if (two && isGravity(Number(two[1]))) return `${gravityNumber(Number(two[1]), units)}–${gravityText(Number(two[2]), units)}`;
  }
  if (units.temperature !== 'c') {
    const found = TEMPERATURE.exec(text);
    if (found) {
      const [, from = '', to, doubt] = found;
      const read = (value: string) => (BETWEEN.test(before) ? minus(temperatureSpan(number(value), units).toFixed(decimals(value))) : temperatureNumber(number(value), decimals(value), units));
      return `${read(from)}${to ? `–${read(to)}` : ''} ${temperatureName(units)}${doubt ? ` ± ${temperatureSpan(Number(doubt), units).toFixed(decimals(doubt))}` : ''}`;
    }
  }
  if (units.volume !== 'l') {
    const found = VOLUME.exec(text);
    if (found) return `${found[2] ? `${volumeText(Number(found[1]), decimals(found[1]!), units).split(' ')[0]}–` : ''}${volumeText(Number(found[2] ?? found[1]), decimals(found[2] ?? found[1]!), units)}`;
  }
  return text;
}

/** A sentence with its figures in the reader's units. */
export const sentenceRead = (sentence: string, units: ChosenUnits): string =>
  splitFigures(sentence)
    .map((piece, index, pieces) => (piece.figure ? figureRead(piece.text, pieces[index - 1]?.text ?? '', units) : piece.text))
    .join('');
