import type { Transaction } from 'sequelize';
import { inTransaction } from '@/db/client';
import { FiningRun, type Job } from '@/db/models';
import { authorize } from '@/lib/auth/authorize';
import { may, type Actor } from '@/lib/auth/policies';
import { systemClock, type Clock } from '@/lib/clock';
import type { JobBody, UpdateJob } from '@/lib/contracts/jobs';
import { ConflictError, ForbiddenError, InvalidError } from '@/lib/errors';
import { auditBy } from '../audit/write';
import { notifyChange } from '../changes';
import { ringLater, silenceSecond } from '../finings/ring';
import { jobBody, loadJob } from './load';

/** Nobody puts a job off for longer. */
const LONGEST_SNOOZE_MS = 366 * 86_400_000;

async function change(actor: Actor, id: string, action: string, work: (job: Job, transaction: Transaction) => Promise<Record<string, unknown>>): Promise<JobBody> {
  return inTransaction(async (transaction) => {
    const job = await loadJob(actor.cellarId, id, transaction);
    if (job.doneAt || job.droppedAt) throw new ConflictError(job.doneAt ? 'This job is done already.' : 'This job is no longer on the rounds.');
    await auditBy(actor, action, id, await work(job, transaction), transaction);
    await notifyChange({ cellar: actor.cellarId, kind: 'job', batch: job.batchId }, transaction);
    return jobBody(actor.cellarId, id, transaction);
  });
}

/** An own job, or any for a brewer. The program's jobs keep its words. */
function mayChange(actor: Actor, job: Job): void {
  if (job.source !== 'person') throw new ConflictError('The program made this job. Put it off, or overrule the call it comes from.');
  if (job.createdBy !== actor.personId && !may(actor.role, 'jobs.manage')) throw new ForbiddenError('You can change only the jobs that you made.');
}

export async function updateJob(actor: Actor, id: string, input: UpdateJob): Promise<JobBody> {
  authorize(actor, 'jobs.do');
  return change(actor, id, 'job.updated', async (job, transaction) => {
    mayChange(actor, job);
    await job.update(
      {
        ...(input.title !== undefined && { title: input.title }),
        ...(input.note !== undefined && { note: input.note }),
        ...(input.due_at !== undefined && { dueAt: new Date(input.due_at), snoozedUntil: null }),
        ...(input.exact !== undefined && { exact: input.exact }),
        ...(input.repeat_days !== undefined && { repeatDays: input.repeat_days }),
      },
      { transaction },
    );
    return { ...input };
  });
}

/** Takes a job off the rounds: an own one, or any for a brewer, the program's too (it comes back with its next occasion). */
export async function dropJob(actor: Actor, id: string, clock: Clock = systemClock): Promise<void> {
  authorize(actor, 'jobs.do');
  await change(actor, id, 'job.dropped', async (job, transaction) => {
    if (job.createdBy !== actor.personId && !may(actor.role, 'jobs.manage')) throw new ForbiddenError('You can take off only the jobs that you made.');
    await job.update({ droppedAt: new Date(clock.now()) }, { transaction });
    const run = await runOf(job, transaction);
    if (run) await silenceSecond(run, transaction);
    return { title: job.title };
  });
}

export async function snoozeJob(actor: Actor, id: string, until: string, clock: Clock = systemClock): Promise<JobBody> {
  authorize(actor, 'jobs.do');
  const to = new Date(until);
  if (to.getTime() <= clock.now()) throw new InvalidError('That time is past.', { until: ['must lie ahead'] });
  if (to.getTime() > clock.now() + LONGEST_SNOOZE_MS) throw new InvalidError('That is too far off.', { until: ['must be within a year'] });
  return change(actor, id, 'job.snoozed', async (job, transaction) => {
    if (job.kind === 'fining_b' && to.getTime() > job.dueAt.getTime() + LONGEST_FINING_WAIT_MS) throw new InvalidError('The second dose cannot wait that long.', { until: ['must be within a day of when it was due'] });
    await job.update({ snoozedUntil: to }, { transaction });
    const run = await runOf(job, transaction);
    if (run) await ringLater(run, to, transaction);
    return { until };
  });
}

/** The second dose of a fining works best in its time; a day late is late enough. */
const LONGEST_FINING_WAIT_MS = 86_400_000;

/** The fining whose second dose the job is about. */
const runOf = (job: Job, transaction: Transaction): Promise<FiningRun | null> => (job.kind === 'fining_b' && job.finingId ? FiningRun.findByPk(job.finingId, { transaction }) : Promise.resolve(null));
