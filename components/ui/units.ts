import { sgOfPlato } from '@/lib/core/gravity/plato';
import { USUAL_UNITS, type ChosenUnits } from '@/lib/core/units/chosen';
import * as read from '@/lib/core/units/read';

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

/** A gravity without its unit, for axes and columns whose head names it: `1.041`, `10.2`. */
export const gravityNumber = (sg: number, units = chosen): string => read.gravityNumber(sg, units);

/** ` °Bx`, ` °P`; nothing for SG. */
export const gravityName = (units = chosen): string => read.GRAVITY_NAMES[units.gravity];

/** `1.041`, `10.2 °Bx`, `10.2 °P`. */
export const gravityText = (sg: number, units = chosen): string => read.gravityText(sg, units);

/** No must and no drink has such an SG; as °P it is 1.3 to 35, or a dry drink's apparent extract. */
const cannotBeSg = (value: number) => (value > 1.3 && value <= 35) || (value < 0.9 && value >= -6);

/** What somebody typed for a gravity, as SG: in °Bx or °P where they read those and it cannot be an SG. */
export const gravityTyped = (value: number, units = chosen): number => (units.gravity !== 'sg' && cannotBeSg(value) ? Number(sgOfPlato(value).toFixed(4)) : value);

/** `1.045 to 1.052`, `11.2 to 12.9 °P`, or the one figure where both ends read the same. */
export const gravityEnds = ({ lo, hi }: { lo: number; hi: number }, units = chosen): string => (gravityNumber(lo, units) === gravityNumber(hi, units) ? gravityText(hi, units) : `${gravityNumber(lo, units)} to ${gravityText(hi, units)}`);

/** `± 0.003`, or `± 0.7 °P`: half an interval about a gravity. */
export const gravityDoubt = (sg: number, half: number, units = chosen): string => read.gravityDoubt(sg, half, units);

/** `15.4 °C`, `59.7 °F`. */
export const temperatureText = (celsius: number, digits = 1, units = chosen): string => `${temperatureNumber(celsius, digits, units)} ${temperatureName(units)}`;
export const temperatureNumber = (celsius: number, digits = 1, units = chosen): string => read.temperatureNumber(celsius, digits, units);
export const temperatureName = (units = chosen): string => read.temperatureName(units);
/** What hydrometers are made for, as it is printed on them: of late, and on older ones. */
export const hydrometerMarks = (units = chosen): readonly [string, string] => (units.temperature === 'f' ? ['68 °F', '60 °F'] : ['20 °C', '15.6 °C']);
/** A difference of temperatures, which has no nought of its own. */
export const temperatureSpan = (celsius: number, units = chosen): number => read.temperatureSpan(celsius, units);

/** `4.5 L`, `1.19 gal`; a real minus. */
export const volumeText = (litres: number, digits?: number, units = chosen): string => read.volumeText(litres, digits, units);

/** `4.4 to 4.6 L`; undefined where both ends read the same. */
export function volumeEnds({ lo, hi }: { lo: number; hi: number }, units = chosen): string | undefined {
  const [from, to] = [volumeText(lo, 1, units), volumeText(hi, 1, units)];
  return from === to ? undefined : `${from.split(' ')[0]} to ${to}`;
}

/**
 * A figure of a sentence, as the person reads it; whatever else it is stays as it is.
 * @param before the prose that it follows, which tells a step of temperature from a temperature
 */
export const figureRead = (text: string, before = '', units = chosen): string => read.figureRead(text, before, units);
