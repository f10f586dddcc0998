import type { BatchesFile, ImportPreviewForm, ReadingsFile } from '@/lib/contracts/imports';
import { archiveSchema, type Archive } from '@/lib/contracts/archive';
import { batchIn, guessBatches, type BatchOptions, type ImportedBatch } from '@/lib/core/importing/batches';
import { guessReadings, readingIn, type ImportedReading, type LineError, type ReadingOptions } from '@/lib/core/importing/readings';
import { isTimeZone } from '@/lib/core/importing/times';
import { InvalidError } from '@/lib/errors';
import { checkNames } from './archive';
import { readTable, type Table } from './table';

/** Rows that the guess goes by. */
const LOOKED_AT = 200;

export interface ReadFile<T, O> {
  table: Table;
  options: O;
  good: { line: number; value: T }[];
  errors: LineError[];
}

function zoneOf(given: string | undefined, usual: string): string {
  if (given === undefined) return usual;
  if (!isTimeZone(given)) throw new InvalidError('There is no such time zone.', { time_zone: ['is no time zone that clocks know'] });
  return given;
}

function sorted<T>(table: Table, read: (cells: string[]) => T | string): Pick<ReadFile<T, never>, 'good' | 'errors'> {
  const good: { line: number; value: T }[] = [];
  const errors: LineError[] = [];
  for (const { line, cells } of table.rows) {
    const result = read(cells);
    if (typeof result === 'string') errors.push({ line, says: result });
    else good.push({ line, value: result });
  }
  return { good, errors };
}

/** A log file with the columns and units that were given, or as they look. */
export function readReadings(file: ReadingsFile, timeZone: string, now: number): ReadFile<ImportedReading, ReadingOptions> {
  const table = readTable(file.text);
  const guess = guessReadings(table.header, table.rows.slice(0, LOOKED_AT).map((row) => row.cells), zoneOf(file.time_zone, timeZone));
  const options: ReadingOptions = {
    ...guess,
    ...(file.columns && { columns: file.columns }),
    ...(file.gravity_unit && { gravityUnit: file.gravity_unit }),
    ...(file.temperature_unit && { temperatureUnit: file.temperature_unit }),
    ...(file.date_order && { dateOrder: file.date_order }),
  };
  return { table, options, ...sorted(table, (cells) => readingIn(cells, options, now)) };
}

/** A list of old batches. */
export function readBatches(file: BatchesFile, timeZone: string, now: number): ReadFile<ImportedBatch, BatchOptions> {
  const table = readTable(file.text);
  const guess = guessBatches(table.header, zoneOf(file.time_zone, timeZone));
  const options: BatchOptions = { ...guess, ...(file.columns && { columns: file.columns }), ...(file.date_order && { dateOrder: file.date_order }) };
  return { table, options, ...sorted(table, (cells) => batchIn(cells, options, now)) };
}

/** @throws InvalidError with what is wrong and where, first come. */
export function readArchive(file: Extract<ImportPreviewForm, { kind: 'archive' }>): Archive {
  let value: unknown;
  // PostgreSQL keeps neither; what stands for them in JSON is found before they are.
  if (file.text.includes('\\u0000')) throw new InvalidError('The file cannot be read.', { text: ['holds zero bytes'] });
  try {
    value = JSON.parse(file.text);
  } catch {
    throw new InvalidError('The file cannot be read.', { text: ['is not JSON'] });
  }
  const parsed = archiveSchema.safeParse(value);
  if (!parsed.success) {
    const [issue] = parsed.error.issues;
    throw new InvalidError('The file cannot be read.', { text: [`${issue?.path.join('.') || 'the file'} ${issue?.message ?? 'is wrong'}`.slice(0, 300)] });
  }
  checkNames(parsed.data);
  return parsed.data;
}
