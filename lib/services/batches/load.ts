import type { Transaction } from 'sequelize';
import { Batch } from '@/db/models';
import { NotFoundError } from '@/lib/errors';

/**
 * The batch, where it is the cellar's; locked against a change by somebody else
 * when `transaction` will write. Rows that only name the batch, such as the
 * watch's alerts, are still let in: they would wait for us, and we for them.
 * @throws NotFoundError for another cellar's batch as for none at all.
 */
export async function loadBatch(cellarId: string, id: string, transaction?: Transaction): Promise<Batch> {
  const batch = await Batch.findOne({ where: { id, cellarId }, transaction, ...(transaction && { lock: transaction.LOCK.NO_KEY_UPDATE }) });
  if (!batch) throw new NotFoundError('batch');
  return batch;
}
