import type { Transaction } from 'sequelize';
import { Job, type Batch } from '@/db/models';
import { DEMO_JOBS, type DemoBatch } from '@/db/seed/demo';
import { finish } from '@/lib/services/jobs/done';
import type { Household } from './demo-past';

const DAY = 86_400_000;
const FORTNIGHT = 14 * DAY;

/** The water of an airlock as somebody looked after it every fortnight, back to when it was put on. */
export async function writeWater({ cellarId, hand, brewer }: Household, demo: DemoBatch, batch: Batch, airlockSince: number, now: number, transaction: Transaction): Promise<void> {
  if (demo.waterDaysAgo === undefined || batch.neck !== 'airlock') return;
  const dedupeKey = `schedule:${batch.id}:airlock`;
  for (let doneAt = now - demo.waterDaysAgo * DAY, turn = 0; doneAt > airlockSince + FORTNIGHT / 2; doneAt -= FORTNIGHT, turn += 1) {
    const at = new Date(doneAt);
    const doneBy = turn % 3 === 2 ? brewer.personId : hand.personId;
    const seen = { createdAt: new Date(doneAt - DAY), seenAt: at, overAt: at };
    await Job.create({ cellarId, batchId: batch.id, kind: 'airlock', source: 'schedule', dedupeKey, title: `Look at the water in ${batch.name}’s airlock`, dueAt: at, doneAt: at, doneBy, ...seen }, { transaction });
  }
}

/** What people put on the rounds themselves. */
export async function writeOwnJobs({ cellarId, people }: Household, now: number, transaction: Transaction): Promise<void> {
  for (const { title, note, by, dueInDays, repeatDays, doneBy } of DEMO_JOBS) {
    const dueAt = new Date(now + dueInDays * DAY);
    const createdAt = new Date(Math.min(now, dueAt.getTime()) - 8 * DAY);
    const job = await Job.create({ cellarId, kind: 'other', source: 'person', title, note, dueAt, repeatDays, createdBy: people.get(by) ?? null, createdAt }, { transaction });
    const who = doneBy === null ? undefined : people.get(doneBy);
    if (who) await finish(job, who, dueAt, transaction);
  }
}
