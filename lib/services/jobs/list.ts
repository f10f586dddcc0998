import type { z } from 'zod';
import { findJobs } from '@/db/queries/jobs';
import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import { systemClock, type Clock } from '@/lib/clock';
import type { JobList, jobQuery } from '@/lib/contracts/jobs';
import { iso } from '../iso';
import { decodeCursor, pageOf } from '../paging';
import { presentJob } from './present';

/** The rounds: open jobs by time, or in the order of the walk (that one in a single page). */
export async function listJobs(actor: Actor, query: z.infer<typeof jobQuery>, clock: Clock = systemClock): Promise<JobList> {
  authorize(actor, 'jobs.read');
  const walk = query.order === 'walk' && query.state === 'open';
  const rows = await findJobs({
    cellarId: actor.cellarId,
    state: query.state,
    until: query.until === undefined ? undefined : new Date(query.until),
    batchId: query.batch,
    lotId: query.lot,
    order: query.order,
    after: walk ? null : decodeCursor(query.cursor),
    limit: query.limit + 1,
  });
  const page = pageOf(rows, query.limit, (row) => ({ at: row.dueAtText, key: row.id }), presentJob);
  return { now: iso(clock.now()), ...page, next_cursor: walk ? null : page.next_cursor };
}
