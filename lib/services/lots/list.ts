import { findLots, type LotFilter } from '@/db/queries/lots';
import { authorize } from '@/lib/auth/authorize';
import { may, type Actor } from '@/lib/auth/policies';
import { systemClock, type Clock } from '@/lib/clock';
import type { LotList, LotQuery } from '@/lib/contracts/lots';
import { InvalidError } from '@/lib/errors';
import { presentLot } from './present';

/** The book is sorted by what people ask for, so a page begins at a place in that order. */
const encode = (offset: number) => Buffer.from(`from ${offset}`).toString('base64url');

function decode(cursor: string | undefined): number {
  if (cursor === undefined) return 0;
  const offset = Number(/^from (\d{1,7})$/.exec(Buffer.from(cursor, 'base64url').toString('utf8'))?.[1] ?? NaN);
  if (!Number.isInteger(offset)) throw new InvalidError('The page to go on from is not one of this list.', { cursor: ['is not a cursor of this list'] });
  return offset;
}

export const lotFilter = (actor: Actor, query: LotQuery, now: Date): Omit<LotFilter, 'limit'> => ({ cellarId: actor.cellarId, q: query.q, searchGiven: may(actor.role, 'lots.serve'), kind: query.kind, placeId: query.place, batchId: query.batch, state: query.state, sort: query.sort, order: query.order, now });

/** The cellar book, searched, filtered and sorted. */
export async function listLots(actor: Actor, query: LotQuery, clock: Clock = systemClock): Promise<LotList> {
  authorize(actor, 'lots.read');
  const offset = decode(query.cursor);
  const rows = await findLots({ ...lotFilter(actor, query, new Date(clock.now())), offset, limit: query.limit + 1 });
  return { items: rows.slice(0, query.limit).map((row) => presentLot(row, clock.now())), next_cursor: rows.length > query.limit ? encode(offset + query.limit) : null };
}
