import { Entry, EntryRevision } from '@/db/models';
import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import type { RevisionList } from '@/lib/contracts/batches';
import { NotFoundError } from '@/lib/errors';
import { loadBatch } from '../batches/load';
import { iso } from '../iso';
import { namesOf } from './names';
import type { Before } from './update';

/** What an entry said before each correction, newest first. */
export async function listRevisions(actor: Actor, batchId: string, entryId: string): Promise<RevisionList> {
  authorize(actor, 'batches.read');
  await loadBatch(actor.cellarId, batchId);
  if ((await Entry.count({ where: { id: entryId, batchId } })) === 0) throw new NotFoundError('entry');
  const rows = await EntryRevision.findAll({ where: { entryId }, order: [['id', 'DESC']], limit: 200 });
  const names = await namesOf(rows.map((row) => row.personId));
  return {
    items: rows.map((row) => {
      const name = row.personId === null ? undefined : names.get(row.personId);
      return { at: iso(row.at), by: row.personId !== null && name !== undefined ? { id: row.personId, name } : null, before: row.before as Before };
    }),
  };
}
