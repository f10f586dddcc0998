import { isDeepStrictEqual } from 'node:util';
import { inTransaction } from '@/db/client';
import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import { systemClock, type Clock } from '@/lib/clock';
import type { MustBody, UpdateMust } from '@/lib/contracts/musts';
import { ConflictError } from '@/lib/errors';
import { auditBy } from '../audit/write';
import { getMust } from './get';
import { loadMust, loadVersion } from './load';
import { keptSheet } from './sheet';
import { writeVersion } from './write';

/**
 * Writes a new version; the old ones stay, and batches keep theirs. A sheet that
 * says the same makes no version.
 * @throws ConflictError where somebody wrote a newer one meanwhile.
 */
export async function updateMust(actor: Actor, id: string, input: UpdateMust, clock: Clock = systemClock): Promise<MustBody> {
  authorize(actor, 'musts.write');
  return inTransaction(async (transaction) => {
    const must = await loadMust(actor.cellarId, id, transaction);
    if (input.base_version !== must.latest) throw new ConflictError(`Version ${must.latest} was written meanwhile. Look at it before you write over it.`);
    const latest = await loadVersion(must, undefined, transaction);
    if (input.change_note === null && isDeepStrictEqual(keptSheet(latest.body), input.sheet)) return getMust(actor, id, {}, transaction);
    await writeVersion(actor, must, { sheet: input.sheet, changeNote: input.change_note }, new Date(clock.now()), transaction);
    // Who writes on a sheet that was put away wants it back.
    if (must.archivedAt !== null) await must.update({ archivedAt: null }, { transaction });
    await auditBy(actor, 'must.updated', id, { version: must.latest, note: input.change_note }, transaction);
    return getMust(actor, id, {}, transaction);
  });
}
