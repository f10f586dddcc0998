import type { z } from 'zod';
import { Op } from 'sequelize';
import { Entry } from '@/db/models';
import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import type { pageQuery } from '@/lib/contracts/common';
import type { entryList } from '@/lib/contracts/batches';
import { loadBatch } from '../batches/load';
import { decodeCursor, pageOf } from '../paging';
import { namesOf } from './names';
import { presentEntry } from './present';

/** The log of a batch, newest first, without what was taken back. */
export async function listEntries(actor: Actor, batchId: string, query: z.infer<typeof pageQuery>): Promise<z.infer<typeof entryList>> {
  authorize(actor, 'batches.read');
  const after = decodeCursor(query.cursor);
  await loadBatch(actor.cellarId, batchId);
  const rows = await Entry.findAll({
    where: {
      batchId,
      removedAt: { [Op.is]: null },
      ...(after && { [Op.or]: [{ at: { [Op.lt]: after.at } }, { at: after.at, id: { [Op.gt]: after.key } }] }),
    },
    order: [
      ['at', 'DESC'],
      ['id', 'ASC'],
    ],
    limit: query.limit + 1,
  });
  const names = await namesOf(rows.map((row) => row.personId));
  return pageOf(
    rows,
    query.limit,
    (row) => ({ at: row.at.toISOString(), key: row.id }),
    (row) => presentEntry(row, actor, names),
  );
}
