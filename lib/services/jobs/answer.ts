import { Op, type Transaction } from 'sequelize';
import { Job, type Batch, type Entry } from '@/db/models';
import type { Actor } from '@/lib/auth/policies';
import { notifyChange } from '../changes';
import { detailOf } from '../drink/ledger';

/** What an entry of a kind answers. */
const ANSWERS: Partial<Record<string, string[]>> = { reading: ['reading'], neck: ['neck', 'airlock'], rack: ['rack'], bottling: ['bottle'] };

/** The program's jobs that an entry answers are done with it: nobody ticks what they have just logged. */
export async function answerJobs(actor: Pick<Actor, 'personId' | 'cellarId'>, batch: Pick<Batch, 'id'>, entry: Pick<Entry, 'kind' | 'detail'>, now: Date, transaction: Transaction): Promise<void> {
  const kinds = entry.kind === 'addition' && detailOf(entry).substance === 'nutrient' ? ['feed'] : ANSWERS[entry.kind];
  if (!kinds) return;
  const [count] = await Job.update(
    { doneAt: now, doneBy: actor.personId },
    { where: { batchId: batch.id, kind: kinds, source: { [Op.in]: ['call', 'schedule'] }, doneAt: null, droppedAt: null }, transaction },
  );
  if (count > 0) await notifyChange({ cellar: actor.cellarId, kind: 'job', batch: batch.id }, transaction);
}
