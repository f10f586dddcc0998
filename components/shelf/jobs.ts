import { when } from '@/components/charts/zone';
import { rowOf, tonight, type RoundRow } from '@/components/rounds/rows';
import type { JobBody } from '@/lib/contracts/jobs';

/** A job of the day on its strip. */
export type TodayJob = RoundRow;

const dueOf = (job: JobBody) => Date.parse(job.due_at) / 1000;
/** What may be done any day waits on the rounds; it is no matter of today's. */
const waits = (row: RoundRow) => row.time === 'any day';

/**
 * Today's part of the rounds: late ones first, then what nobody has, then by time.
 * `kept` are those just ticked, which stay in their place while the tick can be
 * taken back. `now` in seconds since 1970.
 */
export function todaysJobs(jobs: readonly JobBody[], kept: ReadonlyMap<string, JobBody>, now: number, timeZone: string): TodayJob[] {
  const until = tonight(now, timeZone);
  const all = [...jobs.filter((job) => !kept.has(job.id)), ...kept.values()];
  const rows = all.filter((job) => dueOf(job) < until).map((job) => rowOf(job, now, timeZone));
  return rows
    .filter((row) => !waits(row))
    .sort((a, b) => Number(b.late) - Number(a.late) || Number(a.job.taken_by !== null) - Number(b.job.taken_by !== null) || dueOf(a.job) - dueOf(b.job) || a.job.id.localeCompare(b.job.id));
}

/** The first time at which anything falls due after today, as a sentence for an empty day. */
export function nothingDue(jobs: readonly JobBody[], now: number, timeZone: string): string {
  const times = jobs.map(dueOf).filter((due) => due >= tonight(now, timeZone));
  return times.length > 0 ? `Nothing due today. Next: ${when(Math.min(...times), now, timeZone)}.` : 'Nothing due today.';
}
