import { sgOfPlato } from '../gravity/plato';
import { numberIn } from './numbers';
import { orderOf, timeIn, type DateOrder } from './times';

/** What a column of a log file may hold. */
export const READING_FIELDS = ['at', 'gravity', 'temperature', 'battery', 'signal'] as const;
export type ReadingField = (typeof READING_FIELDS)[number];

export type GravityUnit = 'sg' | 'points' | 'plato';
export type TemperatureUnit = 'c' | 'f';

export interface ReadingOptions {
  /** Column of each field, counted from 0; null: there is none. */
  columns: Record<ReadingField, number | null>;
  gravityUnit: GravityUnit;
  temperatureUnit: TemperatureUnit;
  timeZone: string;
  dateOrder: DateOrder;
}

export interface ImportedReading {
  /** ms since 1970. */
  at: number;
  gravity: number;
  temperature: number | null;
  battery: number | null;
  signal: number | null;
}

export interface LineError {
  /** As an editor counts it, the header being 1. */
  line: number;
  says: string;
}

const NAMES: Record<ReadingField, RegExp> = {
  at: /^(measured|created|logged|recorded)?[ _]?(at|time|date|datetime|timestamp|when)$|time|date|zeit|datum/i,
  gravity: /gravity|^sg$|density|plato|brix|^g$|°p|extract|wort/i,
  temperature: /temp|°c|°f/i,
  battery: /batt|volt|cell/i,
  signal: /rssi|signal|dbm/i,
};

const median = (values: readonly number[]) => [...values].sort((a, b) => a - b)[Math.floor(values.length / 2)] ?? null;

/** Columns and units as they look, from the header and the first rows. A person looks at them before anything is kept. */
export function guessReadings(header: readonly string[], rows: readonly string[][], timeZone: string): ReadingOptions {
  const columns = { at: null, gravity: null, temperature: null, battery: null, signal: null } as ReadingOptions['columns'];
  const taken = new Set<number>();
  for (const field of READING_FIELDS) {
    const index = header.findIndex((name, column) => !taken.has(column) && NAMES[field].test(name.trim()));
    if (index < 0) continue;
    columns[field] = index;
    taken.add(index);
  }
  const valuesOf = (column: number | null) => (column === null ? [] : rows.flatMap((row) => numberIn(row[column] ?? '') ?? []));
  const gravity = median(valuesOf(columns.gravity));
  const temperature = median(valuesOf(columns.temperature));
  const temperatureName = columns.temperature === null ? '' : (header[columns.temperature] ?? '');
  return {
    columns,
    gravityUnit: gravity !== null && gravity > 500 ? 'points' : gravity !== null && gravity > 1.3 ? 'plato' : 'sg',
    temperatureUnit: /°?f\b|fahrenheit|_f$/i.test(temperatureName) || (temperature !== null && temperature > 45) ? 'f' : 'c',
    timeZone,
    dateOrder: orderOf(columns.at === null ? [] : rows.map((row) => row[columns.at!] ?? '')) ?? 'day',
  };
}

function gravityIn(value: number, unit: GravityUnit): number {
  if (unit === 'points') return value > 500 ? value / 1000 : 1 + value / 1000;
  return unit === 'plato' ? sgOfPlato(value) : value;
}

const within = (value: number, low: number, high: number) => value >= low && value <= high;

/** One row as a reading, or what is wrong with it. `latest` in ms: nothing is measured after it. */
export function readingIn(row: readonly string[], options: ReadingOptions, latest: number): ImportedReading | string {
  const { columns } = options;
  const cell = (field: ReadingField) => (columns[field] === null ? '' : (row[columns[field]] ?? '').trim());
  const at = timeIn(cell('at'), options.timeZone, options.dateOrder);
  if (at === null) return cell('at') === '' ? 'the time is empty' : `“${cell('at').slice(0, 40)}” is no time`;
  if (at > latest) return 'the time lies ahead';
  if (at < Date.UTC(2000, 0, 1)) return 'the time is before 2000';
  const shown = numberIn(cell('gravity'));
  if (shown === null) return cell('gravity') === '' ? 'the gravity is empty' : `“${cell('gravity').slice(0, 40)}” is no gravity`;
  const gravity = Math.round(gravityIn(shown, options.gravityUnit) * 1e6) / 1e6;
  if (!within(gravity, 0.97, 1.2)) return `a gravity of ${gravity.toFixed(3)} cannot be`;
  const told = numberIn(cell('temperature'));
  const temperature = told === null ? null : options.temperatureUnit === 'f' ? Math.round(((told - 32) / 1.8) * 100) / 100 : told;
  if (temperature !== null && !within(temperature, -10, 60)) return `a temperature of ${temperature.toFixed(1)} °C cannot be`;
  const battery = numberIn(cell('battery'));
  const signal = numberIn(cell('signal'));
  return { at, gravity, temperature, battery: battery !== null && within(battery, 0, 15) ? battery : null, signal: signal !== null && within(signal, -130, 0) ? signal : null };
}
