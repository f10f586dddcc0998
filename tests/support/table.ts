import { readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { parse } from 'csv-parse/sync';

/** Rows of a published table in tests/reference/data, by column; comment lines start with `#`. */
export function publishedTable(name: string): Record<string, string>[] {
  const path = fileURLToPath(new URL(`../reference/data/${name}`, import.meta.url));
  return parse(readFileSync(path, 'utf8'), { columns: true, comment: '#', comment_no_infix: true, skip_empty_lines: true, relax_column_count: true });
}

/** A column as a number; a missing or empty one is an error, not a zero. */
export function num(row: Record<string, string>, column: string): number {
  const text = row[column];
  if (text === undefined || text.trim() === '') throw new Error(`no figure in column ${column}`);
  const value = Number(text);
  if (!Number.isFinite(value)) throw new Error(`${column} is not a number: ${text}`);
  return value;
}
