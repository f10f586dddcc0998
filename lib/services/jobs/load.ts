import type { Transaction } from 'sequelize';
import { Job } from '@/db/models';
import { findJobs } from '@/db/queries/jobs';
import type { JobBody } from '@/lib/contracts/jobs';
import { NotFoundError } from '@/lib/errors';
import { presentJob } from './present';

/** The job, locked. @throws NotFoundError for another cellar's as for none at all. */
export async function loadJob(cellarId: string, id: string, transaction: Transaction): Promise<Job> {
  const job = await Job.findOne({ where: { id, cellarId }, transaction, lock: transaction.LOCK.UPDATE });
  if (!job) throw new NotFoundError('job');
  return job;
}

export async function jobBody(cellarId: string, id: string, transaction: Transaction): Promise<JobBody> {
  const [row] = await findJobs({ cellarId, id, limit: 1 }, transaction);
  if (!row) throw new NotFoundError('job');
  return presentJob(row);
}
