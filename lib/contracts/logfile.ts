import { z } from 'zod';
import { DRINK_KINDS, EVENT_KINDS, NECKS, type BatchSetup, type DrinkKind, type Instant, type Reading } from '../core/types';
import { plainTime } from './time';

/** The two files of `npm run assess`: a batch as JSON, its readings as CSV. */

/** A file that cannot be used; the message names the line or the field. */
export class WrongFile extends Error {}

const RFC3339 = /^(\d{4})-(\d{2})-(\d{2})[T ]([01]\d|2[0-3]):\d{2}(:\d{2}(\.\d+)?)?(Z|[+-]\d{2}:?\d{2})$/i;

/** Milliseconds of an RFC 3339 time with its zone; null for anything else, and for a day that its month does not have. */
export function instantOf(text: string): Instant | null {
  const plain = plainTime(text);
  const [, year, month, day] = RFC3339.exec(plain) ?? [];
  if (day === undefined || Number(day) > new Date(Date.UTC(Number(year), Number(month), 0)).getUTCDate()) return null;
  const at = Date.parse(plain.replace(' ', 'T'));
  return Number.isFinite(at) ? at : null;
}

const time = z.string().transform((text, context) => {
  const at = instantOf(text);
  if (at === null) {
    context.addIssue({ code: 'custom', message: 'must be a time with its zone, such as 2026-03-04T06:00:00Z' });
    return z.NEVER;
  }
  return at;
});

const GRAVITY = { min: 0.97, max: 1.2 };
const gravity = z.number('must be a specific gravity such as 1.062').min(GRAVITY.min, 'must be a specific gravity between 0.970 and 1.200').max(GRAVITY.max, 'must be a specific gravity between 0.970 and 1.200');

const event = z.object({
  at: time,
  kind: z.enum(EVENT_KINDS, `must be one of ${EVENT_KINDS.join(', ')}`),
  sugar_g: z.number().min(0).nullish(),
  fruit_g: z.number().min(0).nullish(),
  volume_l: z.number().min(0).nullish(),
  gravity: gravity.nullish(),
  neck: z.enum(NECKS, `must be one of ${NECKS.join(', ')}`).nullish(),
  known_at: time.nullish(),
});

const file = z.object({
  pitched_at: time.nullish(),
  original_gravity: gravity.nullish(),
  volume_l: z.number('must be a number of litres').positive('must be more than 0 L').max(100_000, 'must be litres'),
  vessel_l: z.number('must be a number of litres').positive('must be more than 0 L').max(100_000, 'must be litres').nullish(),
  kind: z.string().nullish(),
  attenuation: z.object({ min: z.number().min(0.1).max(1.5), max: z.number().min(0.1).max(1.5) }).nullish(),
  alcohol_tolerance_abv: z.number().min(1).max(30).nullish(),
  temperature: z.object({ min_c: z.number(), max_c: z.number() }).nullish(),
  neck: z.enum(NECKS).nullish(),
  time_zone: z.string().nullish(),
  events: z.array(event).nullish(),
});

/** Other names that people use for what is fermenting. */
const OTHER_KINDS: Record<string, DrinkKind> = {
  ale: 'beer',
  lager: 'beer',
  perry: 'cider',
  melomel: 'mead',
  metheglin: 'mead',
  'fruit wine': 'wine',
  'country wine': 'wine',
};

function kindOf(text: string | null | undefined, notes: string[]): DrinkKind {
  const word = (text ?? '').trim().toLowerCase().replace(/[_-]/g, ' ');
  const own = DRINK_KINDS.find((kind) => kind === word);
  if (own) return own;
  const other = OTHER_KINDS[word];
  if (other) return other;
  notes.push(`kind: ${text ? `"${text}" is not one of ${DRINK_KINDS.join(', ')}` : 'not told'}; taken as wine, which has the widest ranges.`);
  return 'wine';
}

/**
 * A batch file as a set-up. What is missing and can be missed is noted, not
 * refused; what is wrong throws {@link WrongFile}.
 */
export function parseBatchFile(text: string, firstReading: Instant | null): { setup: BatchSetup; notes: string[] } {
  let json: unknown;
  try {
    json = JSON.parse(text);
  } catch (error) {
    throw new WrongFile(`not JSON: ${(error as Error).message}`);
  }
  const parsed = file.safeParse(json);
  if (!parsed.success) {
    const issue = parsed.error.issues[0]!;
    throw new WrongFile(`${issue.path.join('.') || 'the file'}: ${issue.message}`);
  }
  const body = parsed.data;
  const notes: string[] = [];
  const kind = kindOf(body.kind, notes);
  let pitchedAt = body.pitched_at ?? null;
  if (pitchedAt === null) {
    pitchedAt = firstReading;
    notes.push('pitched_at: not told; the first reading is taken as the pitch.');
  }
  if (body.original_gravity == null) notes.push('original_gravity: not told; the first readings stand in for it.');
  const vesselL = Math.max(body.vessel_l ?? body.volume_l * 1.1, body.volume_l);
  if (body.vessel_l == null) notes.push('vessel_l: not told; a tenth more than the volume is taken.');
  else if (body.vessel_l < body.volume_l) notes.push('vessel_l: less than volume_l; taken as full to the brim.');
  const span = (low: number, high: number): [number, number] => [Math.min(low, high), Math.max(low, high)];
  const attenuation = body.attenuation ? span(body.attenuation.min, body.attenuation.max) : null;
  const temperature = body.temperature ? span(body.temperature.min_c, body.temperature.max_c) : null;
  const setup: BatchSetup = {
    kind,
    pitchedAt,
    originalGravity: body.original_gravity ?? null,
    volumeL: body.volume_l,
    vesselL,
    attenuation: attenuation && { min: attenuation[0], max: attenuation[1] },
    alcoholToleranceAbv: body.alcohol_tolerance_abv ?? null,
    temperature: temperature && { minC: temperature[0], maxC: temperature[1] },
    neck: body.neck ?? null,
    timeZone: body.time_zone ?? 'UTC',
    events: (body.events ?? []).map((item) => ({
      at: item.at,
      kind: item.kind,
      sugarG: item.sugar_g ?? null,
      fruitG: item.fruit_g ?? null,
      volumeL: item.volume_l ?? null,
      gravity: item.gravity ?? null,
      neck: item.neck ?? null,
      knownAt: item.known_at ?? null,
    })),
  };
  return { setup, notes };
}

/** One parsed line of the readings, with its line number in the file. */
export interface CsvLine {
  line: number;
  cells: readonly string[];
}

const REQUIRED = ['measured_at', 'gravity', 'temperature_c'] as const;

const filled = (cells: readonly string[]) => cells.findLastIndex((cell) => cell.trim() !== '') + 1;

/** Readings of a CSV whose first line is the header. Throws {@link WrongFile} naming the line; what is left out of the judgement is noted. */
export function parseReadings(lines: readonly CsvLine[], notes: string[] = []): Reading[] {
  const header = lines[0];
  if (!header) throw new WrongFile('line 1: the file is empty; a header is wanted.');
  const names = header.cells.map((cell) => cell.trim().toLowerCase());
  const column = (name: string): number => names.indexOf(name);
  for (const name of REQUIRED) {
    if (column(name) < 0) throw new WrongFile(`line ${header.line}: no column "${name}"; the header needs ${REQUIRED.join(', ')}.`);
  }
  const twice = names.find((name, i) => name !== '' && names.indexOf(name) < i);
  if (twice !== undefined) throw new WrongFile(`line ${header.line}: the column "${twice}" is there twice.`);
  const number = (row: CsvLine, name: string): number | null => {
    const cell = (row.cells[column(name)] ?? '').trim();
    if (cell === '') return null;
    const value = Number(cell);
    if (!Number.isFinite(value)) throw new WrongFile(`line ${row.line}: ${name} "${cell}" is not a number.`);
    return value;
  };
  const instant = (row: CsvLine, name: string): Instant | null => {
    const cell = column(name) < 0 ? '' : (row.cells[column(name)] ?? '').trim();
    if (cell === '') return null;
    const at = instantOf(cell);
    if (at === null) throw new WrongFile(`line ${row.line}: ${name} "${cell}" is not a time with its zone, such as 2026-03-04T06:00:00Z.`);
    return at;
  };
  const outside: CsvLine[] = [];
  const readings = lines.slice(1).map((row) => {
    // A decimal comma would otherwise move every value into the next column.
    if (filled(row.cells) > names.length) throw new WrongFile(`line ${row.line}: ${filled(row.cells)} values for ${names.length} columns; decimals need a point.`);
    const at = instant(row, 'measured_at');
    if (at === null) throw new WrongFile(`line ${row.line}: measured_at is empty.`);
    const sg = number(row, 'gravity');
    if (sg === null) throw new WrongFile(`line ${row.line}: gravity is empty.`);
    if (sg < GRAVITY.min || sg > GRAVITY.max) outside.push(row);
    return {
      at,
      gravity: sg,
      temperature: number(row, 'temperature_c'),
      battery: column('battery_v') < 0 ? null : number(row, 'battery_v'),
      receivedAt: instant(row, 'received_at'),
    };
  });
  const [first] = outside;
  if (first) {
    const told = `line ${first.line}: gravity "${first.cells[column('gravity')]}" is not a specific gravity between 0.970 and 1.200`;
    // One is a float that was knocked; all of them are another unit.
    if (outside.length === readings.length) throw new WrongFile(`${told}, nor is that of any other line.`);
    notes.push(`${told}; ${outside.length === 1 ? 'it is' : `${outside.length} such readings are`} left out.`);
  }
  return readings;
}

const LONGEST_YEARS = 10;

/** No batch lasts so long: a time that far from the pitch is a clock that was never set. Throws {@link WrongFile} naming the line or the field. */
export function checkSpan(pitchedAt: Instant, lines: readonly CsvLine[], readings: readonly Reading[], events: BatchSetup['events']): void {
  const latest = pitchedAt + LONGEST_YEARS * 365.25 * 86_400_000;
  const tooLate = (at: Instant | null | undefined) => at != null && at > latest;
  const told = `more than ${LONGEST_YEARS} years after the pitch (${new Date(pitchedAt).toISOString()})`;
  readings.forEach((reading, i) => {
    if (tooLate(reading.at) || tooLate(reading.receivedAt)) throw new WrongFile(`line ${lines[i + 1]!.line}: ${tooLate(reading.at) ? 'measured_at' : 'received_at'} is ${told}.`);
  });
  events.forEach((event, i) => {
    if (tooLate(event.at) || tooLate(event.knownAt)) throw new WrongFile(`events.${i}.${tooLate(event.at) ? 'at' : 'known_at'}: is ${told}.`);
  });
}
