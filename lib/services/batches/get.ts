import type { Transaction } from 'sequelize';
import { findBatches } from '@/db/queries/batches';
import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import type { BatchBody } from '@/lib/contracts/batches';
import { NotFoundError } from '@/lib/errors';
import { presentBatch } from './present';

/** @throws NotFoundError where the actor's cellar has no such batch. */
export async function getBatch(actor: Actor, id: string, transaction?: Transaction): Promise<BatchBody> {
  authorize(actor, 'batches.read');
  const [row] = await findBatches({ cellarId: actor.cellarId, id, limit: 1 }, transaction);
  if (!row) throw new NotFoundError('batch');
  return presentBatch(row, actor);
}
