import type { z } from 'zod';
import { findBatches } from '@/db/queries/batches';
import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import type { BatchList, batchQuery } from '@/lib/contracts/batches';
import { decodeCursor, pageOf } from '../paging';
import { presentBatch } from './present';

/** The cellar's batches, newest first. */
export async function listBatches(actor: Actor, query: z.infer<typeof batchQuery>): Promise<BatchList> {
  authorize(actor, 'batches.read');
  const rows = await findBatches({ cellarId: actor.cellarId, state: query.state, after: decodeCursor(query.cursor), limit: query.limit + 1 });
  return pageOf(
    rows,
    query.limit,
    (row) => ({ at: row.createdAtText, key: row.id }),
    (row) => presentBatch(row, actor),
  );
}
