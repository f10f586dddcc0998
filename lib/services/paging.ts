import { z } from 'zod';
import { InvalidError } from '../errors';

/** Where a page ended: the order's time, as exactly as it is kept, and the row's key. */
export interface Cursor {
  at: string;
  key: string;
}

const shape = z.tuple([z.string().refine((value) => /^\d{4}-\d\d-\d\d[ T]\d\d:\d\d:\d\d/.test(value) && !Number.isNaN(Date.parse(value))), z.string().max(64)]);

export const encodeCursor = ({ at, key }: Cursor): string => Buffer.from(JSON.stringify([at, key])).toString('base64url');

/** @throws InvalidError for one that was not made here. */
export function decodeCursor(cursor: string | undefined, key: z.ZodType = z.uuid()): Cursor | null {
  if (cursor === undefined) return null;
  try {
    const [at, id] = shape.parse(JSON.parse(Buffer.from(cursor, 'base64url').toString('utf8')));
    key.parse(id);
    return { at, key: id };
  } catch {
    throw new InvalidError('The page to go on from is not one of this list.', { cursor: ['is not a cursor of this list'] });
  }
}

/** A page from one row more than it holds: the extra one only tells that there is a next. */
export function pageOf<R, T>(rows: readonly R[], limit: number, cursorOf: (row: R) => Cursor, present: (row: R) => T): { items: T[]; next_cursor: string | null } {
  const shown = rows.slice(0, limit);
  const last = shown.at(-1);
  return { items: shown.map(present), next_cursor: rows.length > limit && last ? encodeCursor(cursorOf(last)) : null };
}
