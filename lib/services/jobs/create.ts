import { inTransaction } from '@/db/client';
import { Job, Lot } from '@/db/models';
import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import type { CreateJob, JobBody } from '@/lib/contracts/jobs';
import { NotFoundError } from '@/lib/errors';
import { auditBy } from '../audit/write';
import { loadBatch } from '../batches/load';
import { notifyChange } from '../changes';
import { jobBody } from './load';

/** Puts a job on the rounds. */
export async function createJob(actor: Actor, input: CreateJob): Promise<JobBody> {
  authorize(actor, 'jobs.do');
  return inTransaction(async (transaction) => {
    if (input.batch_id !== null) await loadBatch(actor.cellarId, input.batch_id, transaction);
    if (input.lot_id !== null && (await Lot.count({ where: { id: input.lot_id, cellarId: actor.cellarId }, transaction })) === 0) throw new NotFoundError('lot');
    const job = await Job.create(
      { cellarId: actor.cellarId, batchId: input.batch_id, lotId: input.lot_id, kind: input.kind, title: input.title, note: input.note, source: 'person', dueAt: new Date(input.due_at), exact: input.exact, repeatDays: input.repeat_days, createdBy: actor.personId },
      { transaction },
    );
    await auditBy(actor, 'job.created', job.id, { title: input.title }, transaction);
    await notifyChange({ cellar: actor.cellarId, kind: 'job', batch: input.batch_id }, transaction);
    return jobBody(actor.cellarId, job.id, transaction);
  });
}
