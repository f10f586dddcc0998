import { parse, CsvError } from 'csv-parse/sync';
import { IMPORT_LIMIT_ROWS } from '@/lib/contracts/imports';
import { undefuse } from '@/lib/core/importing/cells';
import { InvalidError } from '@/lib/errors';

export interface Table {
  header: string[];
  rows: { line: number; cells: string[] }[];
}

const DELIMITERS = [',', ';', '\t'] as const;
const MOST_COLUMNS = 200;
const MOST_IN_A_CELL = 20_000;

const refuse = (says: string) => new InvalidError('The file cannot be read.', { text: [says] });

/** The delimiter that the header is cut by most often, outside quotes. */
function delimiterOf(text: string): string {
  const head = text.slice(0, 10_000).split(/\r\n|\n|\r/, 1)[0]!.replace(/"[^"]*"/g, '');
  const count = (delimiter: string) => head.split(delimiter).length - 1;
  return [...DELIMITERS].sort((a, b) => count(b) - count(a))[0]!;
}

/**
 * A CSV file as rows (RFC 4180, or cut by semicolons or tabs). Quotes that a
 * formula was defused with come off.
 * @throws InvalidError with the line where it cannot be read
 */
export function readTable(text: string): Table {
  if (text.includes('\u0000')) throw refuse('is no text: it holds zero bytes');
  if (!text.isWellFormed()) throw refuse('is no well-formed text');
  let records: { record: string[]; info: { lines: number } }[];
  try {
    records = parse(text, { bom: true, delimiter: delimiterOf(text), relax_column_count: true, skip_empty_lines: true, info: true, to: IMPORT_LIMIT_ROWS + 2, max_record_size: 500_000 }) as unknown as typeof records;
  } catch (error) {
    throw refuse(error instanceof CsvError ? `cannot be read at line ${Number(error.lines) || '?'}: ${error.code === 'CSV_QUOTE_NOT_CLOSED' ? 'a quote is never closed' : 'its quotes are wrong'}` : 'cannot be read');
  }
  const [head, ...rest] = records;
  if (!head || rest.length === 0) throw refuse('holds no rows below its header');
  if (rest.length > IMPORT_LIMIT_ROWS) throw refuse(`has more than ${IMPORT_LIMIT_ROWS} rows; cut it in parts`);
  if (head.record.length > MOST_COLUMNS) throw refuse(`has more than ${MOST_COLUMNS} columns`);
  const cell = (value: string) => undefuse(value.slice(0, MOST_IN_A_CELL));
  return { header: head.record.map(cell), rows: rest.map(({ record, info }) => ({ line: info.lines, cells: record.map(cell) })) };
}
