import { inTransaction } from '@/db/client';
import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import { systemClock, type Clock } from '@/lib/clock';
import type { CopyMust, MustBody } from '@/lib/contracts/musts';
import { auditBy } from '../audit/write';
import { getMust } from './get';
import { loadMust, loadVersion } from './load';
import { keptSheet } from './sheet';
import { writeMust } from './write';

/** Copies a sheet with one change noted. The copy knows its source, so the notes for the next time go along. */
export async function copyMust(actor: Actor, id: string, input: CopyMust, clock: Clock = systemClock): Promise<MustBody> {
  authorize(actor, 'musts.write');
  return inTransaction(async (transaction) => {
    const source = await loadVersion(await loadMust(actor.cellarId, id, transaction), input.version, transaction);
    const sheet = { ...(input.sheet ?? keptSheet(source.body)), name: input.name };
    const must = await writeMust(actor, { sheet, changeNote: input.change_note, copiedFrom: source.id }, new Date(clock.now()), transaction);
    await auditBy(actor, 'must.copied', must.id, { from: id, version: source.version, note: input.change_note }, transaction);
    return getMust(actor, must.id, {}, transaction);
  });
}
