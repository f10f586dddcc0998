import { Op } from 'sequelize';
import { inTransaction } from '@/db/client';
import { Entry } from '@/db/models';
import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import { systemClock, type Clock } from '@/lib/clock';
import { partOfWork } from '@/lib/contracts/work';
import { ConflictError, ForbiddenError, NotFoundError } from '@/lib/errors';
import { auditBy } from '../audit/write';
import { loadBatch } from '../batches/load';
import { notifyChange } from '../changes';
import { followOriginal, settleBatch } from './effects';
import { mayRemove } from './present';

/** Takes an entry back: the log no longer shows it, the past can still be explained by it, and the batch stands as without it. */
export async function removeEntry(actor: Actor, batchId: string, entryId: string, clock: Clock = systemClock): Promise<void> {
  authorize(actor, 'entries.remove-own');
  await inTransaction(async (transaction) => {
    const batch = await loadBatch(actor.cellarId, batchId, transaction);
    const entry = await Entry.findOne({ where: { id: entryId, batchId, removedAt: { [Op.is]: null } }, transaction });
    if (!entry) throw new NotFoundError('entry');
    if (!mayRemove(actor, entry)) throw new ForbiddenError('You can take back only what you logged yourself.');
    const work = partOfWork(entry);
    if (work) throw new ConflictError(`This line is part of ${work}, and cannot be taken back by itself.`);
    await entry.update({ removedAt: new Date(clock.now()), removedBy: actor.personId }, { transaction });
    await settleBatch(batch, entry, transaction);
    await followOriginal(batch, entry, null, transaction);
    await auditBy(actor, 'entry.removed', entryId, { batch: batchId, kind: entry.kind }, transaction);
    await notifyChange({ cellar: actor.cellarId, kind: 'entry', batch: batchId }, transaction);
  });
}
