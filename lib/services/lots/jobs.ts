import type { Transaction } from 'sequelize';
import { Job, type Lot } from '@/db/models';
import { TEST_AFTER_DAYS } from '@/lib/core/bottling/conditioning';
import { notifyChange } from '../changes';

const DAY_MS = 86_400_000;

const job = (lot: Lot, kind: string, title: string, note: string, dueAt: Date, more: Partial<Job> = {}) =>
  ({ cellarId: lot.cellarId, lotId: lot.id, kind, title, note, source: 'timer', dedupeKey: `${kind}:${lot.id}`, dueAt, ...more }) as const;

/** What a new lot puts on the rounds: a test bottle where there is gas to come, and the day it is ready. */
export async function lotJobs({ lot, primed, overridden, now }: { lot: Lot; primed: boolean; overridden: boolean; now: Date }, transaction: Transaction): Promise<void> {
  const test = new Date(Math.max(now.getTime(), lot.bottledAt.getTime() + TEST_AFTER_DAYS * DAY_MS));
  if (primed || overridden) await Job.create(job(lot, 'test_bottle', `Open a test bottle of ${lot.name}`, 'Chill it well, open it outdoors or over a sink, away from faces. If it gushes, say so here.', test, overridden ? { repeatDays: TEST_AFTER_DAYS } : {}), { transaction });
  await Job.create(job(lot, 'condition', `${lot.name} is ready to open`, `Lot ${lot.code}.`, lot.readyFrom), { transaction });
  await notifyChange({ cellar: lot.cellarId, kind: 'job', batch: null }, transaction);
}

/** A bottle gushed: the whole lot is seen to within the hour. */
export async function gushedJob(lot: Lot, now: Date, transaction: Transaction): Promise<void> {
  const known = await Job.count({ where: { lotId: lot.id, kind: 'pressure', doneAt: null, droppedAt: null }, transaction });
  if (known > 0) return;
  await Job.create(
    { cellarId: lot.cellarId, lotId: lot.id, kind: 'pressure', title: `See to the pressure in ${lot.name}`, note: 'A bottle gushed. Eye protection and gloves. Move the whole lot somewhere cold, and let the gas out of every bottle outdoors.', source: 'timer', dueAt: now, exact: true },
    { transaction },
  );
  await notifyChange({ cellar: lot.cellarId, kind: 'job', batch: null }, transaction);
}
