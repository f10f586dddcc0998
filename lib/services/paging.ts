import { z } from 'zod';
import { timestamp } from '../contracts/common';
import { InvalidError } from '../errors';

/** Where a page ended: the order's time, as exactly as it is kept, and the row's key. */
export interface Cursor {
  at: string;
  key: string;
}

/** PostgreSQL writes `2026-03-04 06:00:00.123456+00`, an ISO date has a T and minutes in its zone. Zones go no further than 15 hours there. */
const asRfc3339 = (value: string) => value.replace(' ', 'T').replace(/([+-](?:0\d|1[0-5]))$/, '$1:00');
const isTime = (value: string) => timestamp.safeParse(asRfc3339(value)).success && !/[+-](1[6-9]|2\d):\d\d$/.test(value);

const shape = z.tuple([z.string().refine(isTime), z.string().max(64)]);

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
