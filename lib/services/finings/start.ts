import type { Transaction } from 'sequelize';
import { inTransaction } from '@/db/client';
import { Entry, FiningRun, Job } from '@/db/models';
import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import { systemClock, type Clock } from '@/lib/clock';
import type { FiningBody, FiningForm } from '@/lib/contracts/family';
import { ConflictError } from '@/lib/errors';
import { auditBy } from '../audit/write';
import { loadBatch } from '../batches/load';
import { notifyChange } from '../changes';
import { detailOf } from '../drink/ledger';
import { notAhead } from '../not-ahead';
import { finingNamed, logDose, waitToSettle } from './dose';
import { presentFining } from './present';
import { ringForSecond } from './ring';

const MINUTE_MS = 60_000;

/** Fines a batch. Of two doses the second gets a timer that is on the rounds to the minute; of one the wait begins. */
export function startFining(actor: Actor, batchId: string, input: FiningForm, clock: Clock = systemClock): Promise<FiningBody> {
  return inTransaction((transaction) => finingIn(actor, batchId, input, clock, transaction));
}

/** The same inside somebody's transaction. */
export async function finingIn(actor: Actor, batchId: string, input: FiningForm, clock: Clock, transaction: Transaction): Promise<FiningBody> {
  authorize(actor, 'cellarwork.do');
  const fining = finingNamed(input.fining);
  const at = notAhead(input.at, clock.now());
  const batch = await loadBatch(actor.cellarId, batchId, transaction);
  const known = input.client_id === null ? null : await Entry.findOne({ where: { cellarId: actor.cellarId, clientId: input.client_id }, transaction });
  if (known) {
    const run = await FiningRun.findOne({ where: { id: detailOf(known).fining_id ?? '', cellarId: actor.cellarId }, transaction });
    if (!run || known.batchId !== batchId) throw new ConflictError('This was sent for something else.');
    return presentFining(run, clock.now());
  }
  const two = fining.parts.length > 1;
  const intervalMin = two ? (input.interval_min ?? fining.intervalMin ?? 60) : null;
  const run = await FiningRun.create(
    { cellarId: actor.cellarId, batchId, fining: fining.key, intervalMin, settleDays: input.settle_days ?? fining.settleDays.value, firstAt: at, secondAt: null, personId: actor.personId },
    { transaction },
  );
  await logDose(actor, run, two ? 'a' : 'only', { at, text: input.text, dose: input.dose, clientId: input.client_id }, transaction);
  if (intervalMin !== null) {
    const job = await Job.create(
      { cellarId: actor.cellarId, batchId, finingId: run.id, kind: 'fining_b', source: 'timer', dedupeKey: `fining_b:${run.id}`, title: `Second dose into ${batch.name}: ${fining.parts[1]}`, note: fining.caution, dueAt: new Date(at.getTime() + intervalMin * MINUTE_MS), exact: true, createdBy: actor.personId },
      { transaction },
    );
    await ringForSecond(run, { title: job.title, note: job.note ?? null, dueAt: job.dueAt }, transaction);
  } else await waitToSettle(run, at, transaction);
  await auditBy(actor, 'fining.started', run.id, { batch: batchId, fining: fining.key }, transaction);
  await notifyChange({ cellar: actor.cellarId, kind: 'job', batch: batchId }, transaction);
  return presentFining(run, clock.now());
}
