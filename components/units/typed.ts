import { unitsRead } from '@/components/ui/units';
import { brixOf, platoOf, sgOfPlato } from '@/lib/core/gravity/plato';
import type { ChosenUnits } from '@/lib/core/units/chosen';
import { celsiusOf, fahrenheitOf, LITRES_PER_IMPERIAL_GALLON, LITRES_PER_US_GALLON } from '@/lib/core/units/convert';

/** What a field may ask for in the person's own unit. Kept and sent: SG at 20 °C, °C, litres. */
export type Measure = 'gravity' | 'temperature' | 'volume';

interface Unit {
  /** As it stands in the field. */
  name: string;
  kept: (typed: number) => number;
  shown: (kept: number) => number;
  /** Decimals that a person reads. */
  decimals: number;
}

const SG: Unit = { name: 'SG', kept: (sg) => sg, shown: (sg) => sg, decimals: 3 };
const CELSIUS: Unit = { name: '°C', kept: (c) => c, shown: (c) => c, decimals: 1 };
const FAHRENHEIT: Unit = { name: '°F', kept: celsiusOf, shown: fahrenheitOf, decimals: 1 };
const PLATO: Unit = { name: '°P', kept: sgOfPlato, shown: platoOf, decimals: 1 };
const BRIX: Unit = { name: '°Bx', kept: sgOfPlato, shown: brixOf, decimals: 1 };
const per = (name: string, litres: number, decimals: number): Unit => ({ name, kept: (value) => value * litres, shown: (kept) => kept / litres, decimals });
const LITRES = per('L', 1, 3);

const OWN = {
  gravity: { sg: SG, brix: BRIX, plato: PLATO },
  temperature: { c: CELSIUS, f: FAHRENHEIT },
  volume: { l: LITRES, us_gal: per('gal', LITRES_PER_US_GALLON, 2), imp_gal: per('gal', LITRES_PER_IMPERIAL_GALLON, 2) },
};
const USUAL: Record<Measure, Unit> = { gravity: SG, temperature: CELSIUS, volume: LITRES };
/** Decimals that are kept: a tenth of what the finest of the units shows. */
const KEPT_DECIMALS: Record<Measure, number> = { gravity: 5, temperature: 2, volume: 3 };

/** Units that may be written behind the figure, whatever the person usually reads. */
const NAMED: Record<Measure, Record<string, Unit>> = {
  gravity: { sg: SG, p: PLATO, plato: PLATO, bx: BRIX, brix: BRIX },
  temperature: { c: CELSIUS, f: FAHRENHEIT },
  volume: { l: LITRES, litre: LITRES, litres: LITRES, liter: LITRES, liters: LITRES, ml: per('ml', 0.001, 0) },
};

function ownUnit(measure: Measure, units: ChosenUnits): Unit {
  if (measure === 'gravity') return OWN.gravity[units.gravity];
  return measure === 'temperature' ? OWN.temperature[units.temperature] : OWN.volume[units.volume];
}

/** A number as a person types it: `1,048`, `1.048`, ` 12 `. Null where it is empty, NaN where it is no number. */
export function typedNumber(text: string): number | null {
  const trimmed = text.trim().replace(',', '.').replace('−', '-');
  if (trimmed === '') return null;
  return /^[-+]?(\d+\.?\d*|\.\d+)$/.test(trimmed) ? Number(trimmed) : NaN;
}

/** No must has this many °P; a hydrometer is often read aloud without its point. */
const POINTLESS = /^(9\d\d|1[0-2]\d\d)$/;
/** Nobody writes three decimals of a °P: `1.048` is an SG, `1.2` may be either. */
const WRITTEN_SG = /^(0[.,]9|1[.,][0-2])\d\d+$/;

interface Understood {
  unit: Unit;
  value: number;
}

function understood(text: string, measure: Measure, units: ChosenUnits): Understood | null {
  const [, figure = '', suffix] = /^\s*(.*?)\s*°?([a-z]+)?\s*$/i.exec(text) ?? [];
  const value = typedNumber(figure);
  if (value === null || Number.isNaN(value)) return null;
  if (suffix) {
    const own = ownUnit(measure, units);
    const unit = NAMED[measure][suffix.toLowerCase()] ?? (own.name === suffix.toLowerCase() ? own : null);
    return unit && { unit, value };
  }
  if (measure === 'gravity' && POINTLESS.test(figure)) return { unit: SG, value: value / 1000 };
  if (measure === 'gravity' && WRITTEN_SG.test(figure)) return { unit: SG, value };
  return { unit: ownUnit(measure, units), value };
}

const short = (value: number, decimals: number) => String(Number(value.toFixed(decimals)) || 0);

/** What was typed, as it is kept; what cannot be understood stays as it is, for the form to say so. */
export function keptText(text: string, measure: Measure, units = unitsRead()): string {
  const read = understood(text, measure, units);
  if (!read) return text;
  // A figure in the unit that is kept stays as it was typed.
  if (read.unit === USUAL[measure] && typedNumber(text) === read.value) return text;
  return short(read.unit.kept(read.value), KEPT_DECIMALS[measure]);
}

/** What is kept, as the person would type it. */
export function shownText(kept: string, measure: Measure, units = unitsRead()): string {
  const unit = ownUnit(measure, units);
  const value = typedNumber(kept);
  if (unit === USUAL[measure] || value === null || Number.isNaN(value)) return kept;
  return measure === 'gravity' ? (Number(unit.shown(value).toFixed(1)) || 0).toFixed(1) : short(unit.shown(value), unit.decimals);
}

/** The unit that a field shows: the one that its figure was understood in. */
export const unitOf = (text: string, measure: Measure, units = unitsRead()): string => (understood(text, measure, units)?.unit ?? ownUnit(measure, units)).name;

/** A complaint about a figure, with its limits in the person's unit. */
export function complaintIn(text: string, measure: Measure, units = unitsRead()): string {
  const unit = ownUnit(measure, units);
  if (unit === USUAL[measure]) return text;
  return text
    .replace(/\blitres\b/g, 'gallons')
    .replace(/[−-]?\d+(?:\.\d+)?/g, (figure) => short(unit.shown(Number(figure.replace('−', '-'))), unit.decimals).replace('-', '−'))
    .replace(/°C\b|\bL\b/g, unit.name);
}
