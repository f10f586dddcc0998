import { inTransaction } from '@/db/client';
import { Alert } from '@/db/models';
import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import { systemClock, type Clock } from '@/lib/clock';
import type { JobBody } from '@/lib/contracts/jobs';
import { CALL_OF_KIND } from '@/lib/core/rounds/wanted';
import { ConflictError } from '@/lib/errors';
import { acknowledgeAlert } from '../alerts/acknowledge';
import { auditBy } from '../audit/write';
import { notifyChange } from '../changes';
import { jobBody, loadJob } from './load';

/** Takes a job in hand, its alert with it, or leaves it to others. Taken by somebody else it can be taken over. */
export async function takeJob(actor: Actor, id: string, taken: boolean, clock: Clock = systemClock): Promise<JobBody> {
  authorize(actor, 'jobs.do');
  const { body, alerts } = await inTransaction(async (transaction) => {
    const job = await loadJob(actor.cellarId, id, transaction);
    if (job.doneAt || job.droppedAt) throw new ConflictError('This job is no longer on the rounds.');
    await job.update({ takenBy: taken ? actor.personId : null, takenAt: taken ? new Date(clock.now()) : null }, { transaction });
    await auditBy(actor, taken ? 'job.taken' : 'job.left', id, { title: job.title }, transaction);
    await notifyChange({ cellar: actor.cellarId, kind: 'job', batch: job.batchId }, transaction);
    const call = job.source === 'call' ? CALL_OF_KIND[job.kind] : undefined;
    const open = taken && call && job.batchId ? await Alert.findAll({ where: { batchId: job.batchId, call, state: 'open' }, transaction }) : [];
    return { body: await jobBody(actor.cellarId, id, transaction), alerts: open };
  });
  // Whoever has the job has the alert that it comes from; it asks nobody else any more. The watch locks alerts before
  // jobs: so only now, and one that has passed meanwhile wants nobody.
  for (const alert of alerts) await acknowledgeAlert(actor, alert.id, { note: null, look_again_at: null }, { clock }).catch(unlessPassed);
  return body;
}

function unlessPassed(error: unknown): void {
  if (!(error instanceof ConflictError)) throw error;
}
