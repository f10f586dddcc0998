import { FiningRun } from '@/db/models';
import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import { systemClock, type Clock } from '@/lib/clock';
import type { FiningBody } from '@/lib/contracts/family';
import { loadBatch } from '../batches/load';
import { presentFining } from './present';

/** Finings of a batch, newest first. */
export async function listFinings(actor: Actor, batchId: string, clock: Clock = systemClock): Promise<{ items: FiningBody[] }> {
  authorize(actor, 'batches.read');
  await loadBatch(actor.cellarId, batchId);
  const runs = await FiningRun.findAll({ where: { batchId }, order: [['firstAt', 'DESC']], limit: 100 });
  return { items: runs.map((run) => presentFining(run, clock.now())) };
}
