import type { Transaction } from 'sequelize';
import { inTransaction } from '@/db/client';
import { Job } from '@/db/models';
import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import { systemClock, type Clock } from '@/lib/clock';
import { UNDO_S, type JobBody } from '@/lib/contracts/jobs';
import { ConflictError, ForbiddenError } from '@/lib/errors';
import { auditBy } from '../audit/write';
import { notifyChange } from '../changes';
import { giveSecond, takeSecondBack } from '../finings/dose';
import { jobBody, loadJob } from './load';

const DAY_MS = 86_400_000;
/** What the way to the server may take on a bad line. */
const GRACE_MS = 5_000;

/** Marks it done, and puts its next turn on the rounds where it repeats. */
export async function finish(job: Job, personId: string, now: Date, transaction: Transaction): Promise<void> {
  await job.update({ doneAt: now, doneBy: personId }, { transaction });
  if (!job.repeatDays) return;
  const from = Math.max(now.getTime(), job.dueAt.getTime());
  await Job.create(
    { cellarId: job.cellarId, batchId: job.batchId, lotId: job.lotId, kind: job.kind, title: job.title, note: job.note, source: job.source, dueAt: new Date(from + job.repeatDays * DAY_MS), exact: job.exact, repeatDays: job.repeatDays, repeats: job.id, createdBy: job.createdBy },
    { transaction },
  );
}

/** Ticks a job. Ticked twice it counts once; a second dose of a fining is logged with it. `at`: when it was done, where that was before now. */
export async function doJob(actor: Actor, id: string, at: string | null = null, clock: Clock = systemClock): Promise<JobBody> {
  authorize(actor, 'jobs.do');
  return inTransaction(async (transaction) => {
    const job = await loadJob(actor.cellarId, id, transaction);
    if (job.doneAt) return jobBody(actor.cellarId, id, transaction);
    if (job.droppedAt) throw new ConflictError('This job is no longer on the rounds.');
    const now = new Date(at === null ? clock.now() : Math.min(clock.now(), Math.max(Date.parse(at), job.createdAt.getTime())));
    await finish(job, actor.personId, now, transaction);
    if (job.kind === 'fining_b' && job.finingId) await giveSecond(actor, job.finingId, { at: now, text: null, dose: null, clientId: null }, transaction);
    await auditBy(actor, 'job.done', id, { title: job.title }, transaction);
    await notifyChange({ cellar: actor.cellarId, kind: 'job', batch: job.batchId }, transaction);
    return jobBody(actor.cellarId, id, transaction);
  });
}

/** Takes a tick back, in its first ten seconds. */
export async function undoJob(actor: Actor, id: string, clock: Clock = systemClock): Promise<JobBody> {
  authorize(actor, 'jobs.do');
  return inTransaction(async (transaction) => {
    const job = await loadJob(actor.cellarId, id, transaction);
    if (!job.doneAt) return jobBody(actor.cellarId, id, transaction);
    if (job.doneBy !== actor.personId) throw new ForbiddenError('Only who ticked it can take the tick back.');
    if (clock.now() - job.doneAt.getTime() > UNDO_S * 1000 + GRACE_MS) throw new ConflictError(`A tick can be taken back for ${UNDO_S} s. Put the job on the rounds anew.`);
    await Job.destroy({ where: { repeats: id, doneAt: null }, transaction });
    if (job.kind === 'fining_b' && job.finingId) await takeSecondBack(actor, job.finingId, new Date(clock.now()), transaction);
    await job.update({ doneAt: null, doneBy: null }, { transaction });
    await auditBy(actor, 'job.undone', id, { title: job.title }, transaction);
    await notifyChange({ cellar: actor.cellarId, kind: 'job', batch: job.batchId }, transaction);
    return jobBody(actor.cellarId, id, transaction);
  });
}
