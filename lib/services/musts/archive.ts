import { inTransaction } from '@/db/client';
import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import { systemClock, type Clock } from '@/lib/clock';
import { auditBy } from '../audit/write';
import { notifyChange } from '../changes';
import { loadMust } from './load';

/** Puts a sheet away: it leaves the list, and its batches keep it. */
export async function archiveMust(actor: Actor, id: string, clock: Clock = systemClock): Promise<void> {
  authorize(actor, 'musts.write');
  await inTransaction(async (transaction) => {
    const must = await loadMust(actor.cellarId, id, transaction);
    await must.update({ archivedAt: must.archivedAt ?? new Date(clock.now()) }, { transaction });
    await auditBy(actor, 'must.archived', id, { name: must.name }, transaction);
    await notifyChange({ cellar: actor.cellarId, kind: 'must', batch: null }, transaction);
  });
}
