import type { z } from 'zod';
import { inTransaction } from '@/db/client';
import { endMute as endRow, muteBatch as muteRow, mutesOf, type MuteRow } from '@/db/queries/mutes';
import { askMutedAgain } from '@/db/queries/outbox';
import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import { systemClock, type Clock } from '@/lib/clock';
import type { createMute, MuteBody, muteList } from '@/lib/contracts/messages';
import { InvalidError, NotFoundError } from '@/lib/errors';
import { auditBy } from '../audit/write';
import { loadBatch } from '../batches/load';
import { notifyChange } from '../changes';

/** Longer is no mute but a rule that should be off. */
const LONGEST_MS = 31 * 86_400_000;

export const presentMute = ({ id, batch, by, fromAt, untilAt }: MuteRow): MuteBody => ({ id, batch, by, from: fromAt.toISOString(), until: untilAt.toISOString() });

interface Deps {
  clock?: Clock;
}

/** Vessels that are muted now. */
export async function listMutes(actor: Actor, { clock = systemClock }: Deps = {}): Promise<z.infer<typeof muteList>> {
  authorize(actor, 'alerts.read');
  return { items: (await mutesOf(actor.cellarId, new Date(clock.now()))).map(presentMute) };
}

/** Mutes a vessel for a time: its alerts stand, and nobody is told but of what can hurt someone. */
export async function muteBatch(actor: Actor, batchId: string, { until }: z.infer<typeof createMute>, { clock = systemClock }: Deps = {}): Promise<MuteBody> {
  authorize(actor, 'alerts.mute');
  const now = clock.now();
  const end = new Date(until);
  if (end.getTime() <= now) throw new InvalidError('The mute would be over already.', { until: ['must lie ahead'] });
  if (end.getTime() - now > LONGEST_MS) throw new InvalidError('The mute is too long.', { until: ['must be at most 31 days ahead; switch a rule off for this vessel instead'] });
  return inTransaction(async (transaction) => {
    await loadBatch(actor.cellarId, batchId, transaction);
    const row = await muteRow({ cellarId: actor.cellarId, batchId, personId: actor.personId, at: new Date(now), until: end }, transaction);
    // A shorter mute in place of a longer one lets go of what that one held; what waits for the end of quiet hours may wait longer.
    await askMutedAgain(batchId, new Date(now), transaction);
    await auditBy(actor, 'batch.muted', batchId, { until }, transaction);
    await notifyChange({ cellar: actor.cellarId, kind: 'alert', batch: batchId }, transaction);
    return presentMute(row);
  });
}

/** Ends a mute before its time; what it held goes out now. @throws NotFoundError */
export async function endMute(actor: Actor, id: string, { clock = systemClock }: Deps = {}): Promise<void> {
  authorize(actor, 'alerts.mute');
  await inTransaction(async (transaction) => {
    const at = new Date(clock.now());
    const batchId = await endRow(actor.cellarId, id, actor.personId, at, transaction);
    if (batchId === null) throw new NotFoundError('mute');
    await askMutedAgain(batchId, at, transaction);
    await auditBy(actor, 'batch.unmuted', batchId, {}, transaction);
    await notifyChange({ cellar: actor.cellarId, kind: 'alert', batch: batchId }, transaction);
  });
}
