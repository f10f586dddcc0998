import { brixOf, platoOf, sgOfPlato } from '@/lib/core/gravity/plato';
import { USUAL_UNITS, type ChosenUnits } from '@/lib/core/units/chosen';
import { fahrenheitOf, LITRES_PER_IMPERIAL_GALLON, LITRES_PER_US_GALLON } from '@/lib/core/units/convert';

/**
 * The units that the person before this screen reads. They are the page's, not a
 * component's: figures are made in sentences, charts and words alike. The shell
 * sets them before it draws what is below it, and draws it anew when they change.
 */
let chosen: ChosenUnits = USUAL_UNITS;

export function readIn(units: ChosenUnits): void {
  // The server draws for many at once, and draws no figures.
  if (typeof window !== 'undefined') chosen = units;
}

export const unitsRead = (): ChosenUnits => chosen;

const minus = (text: string) => text.replace('-', '−');

const ofGravity = { sg: (sg: number) => sg, brix: brixOf, plato: platoOf };
const GRAVITY_NAMES = { sg: '', brix: ' °Bx', plato: ' °P' };
const VOLUMES = { l: { name: 'L', litres: 1 }, us_gal: { name: 'gal', litres: LITRES_PER_US_GALLON }, imp_gal: { name: 'gal', litres: LITRES_PER_IMPERIAL_GALLON } };

/** A gravity without its unit, for axes and columns whose head names it: `1.041`, `10.2`. Never a minus before a nought. */
export function gravityNumber(sg: number, units = chosen): string {
  const value = ofGravity[units.gravity](sg);
  return minus(units.gravity === 'sg' ? value.toFixed(3) : (Number(value.toFixed(1)) || 0).toFixed(1));
}

/** ` °Bx`, ` °P`; nothing for SG. */
export const gravityName = (units = chosen): string => GRAVITY_NAMES[units.gravity];

/** `1.041`, `10.2 °Bx`, `10.2 °P`. */
export const gravityText = (sg: number, units = chosen): string => `${gravityNumber(sg, units)}${GRAVITY_NAMES[units.gravity]}`;

/** No must and no drink has such an SG; as °P it is 1.3 to 35, or a dry drink's apparent extract. */
const cannotBeSg = (value: number) => (value > 1.3 && value <= 35) || (value < 0.9 && value >= -6);

/** What somebody typed for a gravity, as SG: in °Bx or °P where they read those and it cannot be an SG. */
export const gravityTyped = (value: number, units = chosen): number => (units.gravity !== 'sg' && cannotBeSg(value) ? Number(sgOfPlato(value).toFixed(4)) : value);

/** `1.045 to 1.052`, `11.2 to 12.9 °P`, or the one figure where both ends read the same. */
export const gravityEnds = ({ lo, hi }: { lo: number; hi: number }, units = chosen): string => (gravityNumber(lo, units) === gravityNumber(hi, units) ? gravityText(hi, units) : `${gravityNumber(lo, units)} to ${gravityText(hi, units)}`);

/** `± 0.003`, or `± 0.7 °P`: half an interval about a gravity. */
export function gravityDoubt(sg: number, half: number, units = chosen): string {
  if (units.gravity === 'sg') return `± ${half.toFixed(3)}`;
  const of = ofGravity[units.gravity];
  return `± ${Math.max(0.1, (of(sg + half) - of(sg - half)) / 2).toFixed(1)}${GRAVITY_NAMES[units.gravity]}`;
}

/** `15.4 °C`, `59.7 °F`. */
export const temperatureText = (celsius: number, digits = 1, units = chosen): string => `${temperatureNumber(celsius, digits, units)} ${temperatureName(units)}`;
export const temperatureNumber = (celsius: number, digits = 1, units = chosen): string => minus((Number((units.temperature === 'f' ? fahrenheitOf(celsius) : celsius).toFixed(digits)) || 0).toFixed(digits));
export const temperatureName = (units = chosen): string => (units.temperature === 'f' ? '°F' : '°C');
/** What hydrometers are made for, as it is printed on them: of late, and on older ones. */
export const hydrometerMarks = (units = chosen): readonly [string, string] => (units.temperature === 'f' ? ['68 °F', '60 °F'] : ['20 °C', '15.6 °C']);
/** A difference of temperatures, which has no nought of its own. */
export const temperatureSpan = (celsius: number, units = chosen): number => (units.temperature === 'f' ? celsius * 1.8 : celsius);

/** `4.5 L`, `1.19 gal`; a real minus. */
export function volumeText(litres: number, digits?: number, units = chosen): string {
  const { name, litres: per } = VOLUMES[units.volume];
  const value = litres / per;
  const asked = digits ?? (litres < 10 ? 2 : 1);
  // A gallon is about four litres: two decimals are a wine glass.
  return minus(`${Number(value.toFixed(units.volume === 'l' ? asked : 2)) || 0} ${name}`);
}

/** `4.4 to 4.6 L`; undefined where both ends read the same. */
export function volumeEnds({ lo, hi }: { lo: number; hi: number }, units = chosen): string | undefined {
  const [from, to] = [volumeText(lo, 1, units), volumeText(hi, 1, units)];
  return from === to ? undefined : `${from.split(' ')[0]} to ${to}`;
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
export function figureRead(text: string, before = '', units = chosen): string {
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
