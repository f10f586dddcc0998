import { Op, type Transaction } from 'sequelize';
import { Batch, Entry, FiningRun, Job } from '@/db/models';
import type { Actor } from '@/lib/auth/policies';
import { FININGS, type Fining } from '@/lib/core/additions/fining';
import { ConflictError, InvalidError, NotFoundError } from '@/lib/errors';
import { notifyChange } from '../changes';
import { detailOf } from '../drink/ledger';
import { ringForSecond, silenceSecond } from './ring';

const DAY_MS = 86_400_000;

export interface Dose {
  at: Date;
  text: string | null;
  /** As it was measured. */
  dose: string | null;
  clientId: string | null;
}

export function finingNamed(key: string): Fining {
  const found = FININGS.find((fining) => fining.key === key);
  if (!found) throw new InvalidError('There is no such fining.', { fining: ['choose one of the list'] });
  return found;
}

/** Writes a dose into the log. */
export async function logDose(actor: Actor, run: FiningRun, part: 'a' | 'b' | 'only', { at, text, dose, clientId }: Dose, transaction: Transaction): Promise<Entry> {
  const fining = finingNamed(run.fining);
  const name = fining.parts[part === 'b' ? 1 : 0] ?? fining.name;
  const entry = await Entry.create(
    { cellarId: run.cellarId, batchId: run.batchId, kind: 'fining', at, text: text ?? (dose === null ? null : `${name.charAt(0).toUpperCase()}${name.slice(1)}, ${dose.replace(/\.$/, '')}.`), detail: { substance: 'fining', name, dose: part, fining_id: run.id }, personId: actor.personId, clientId },
    { transaction },
  );
  await notifyChange({ cellar: run.cellarId, kind: 'entry', batch: run.batchId }, transaction);
  return entry;
}

/** A wait until it is bright, as a job with its date. */
export async function waitToSettle(run: FiningRun, from: Date, transaction: Transaction): Promise<void> {
  const batch = await Batch.findByPk(run.batchId, { transaction, rejectOnEmpty: true });
  await Job.create(
    { cellarId: run.cellarId, batchId: run.batchId, finingId: run.id, kind: 'settle', source: 'timer', dedupeKey: `settle:${run.id}`, title: `See whether ${batch.name} is bright`, note: 'Rack it off the finings once it is.', dueAt: new Date(from.getTime() + run.settleDays * DAY_MS) },
    { transaction },
  );
}

async function loadRun(cellarId: string, id: string, transaction: Transaction): Promise<FiningRun> {
  const run = await FiningRun.findOne({ where: { id, cellarId }, transaction, lock: transaction.LOCK.UPDATE });
  if (!run) throw new NotFoundError('fining');
  return run;
}

/** The second dose went in: logged, its timer done, the wait begun. Given twice it counts once. */
export async function giveSecond(actor: Actor, finingId: string, dose: Dose, transaction: Transaction): Promise<FiningRun> {
  const run = await loadRun(actor.cellarId, finingId, transaction);
  if (run.intervalMin === null) throw new ConflictError('This fining has one dose.');
  if (run.secondAt !== null) return run;
  if (dose.at < run.firstAt) throw new InvalidError('The second dose cannot come before the first.', { at: ['is before the first dose'] });
  await run.update({ secondAt: dose.at }, { transaction });
  await silenceSecond(run, transaction);
  await logDose(actor, run, 'b', dose, transaction);
  await Job.update({ doneAt: dose.at, doneBy: actor.personId }, { where: { finingId, kind: 'fining_b', doneAt: null, droppedAt: null }, transaction });
  await waitToSettle(run, dose.at, transaction);
  await notifyChange({ cellar: actor.cellarId, kind: 'job', batch: run.batchId }, transaction);
  return run;
}

/** The tick of the second dose was taken back: as if it had not gone in. */
export async function takeSecondBack(actor: Actor, finingId: string, now: Date, transaction: Transaction): Promise<void> {
  const run = await loadRun(actor.cellarId, finingId, transaction);
  await run.update({ secondAt: null }, { transaction });
  const entries = await Entry.findAll({ where: { batchId: run.batchId, kind: 'fining', removedAt: { [Op.is]: null } }, transaction });
  for (const entry of entries) {
    const { fining_id: id, dose } = detailOf(entry);
    if (id === finingId && dose === 'b') await entry.update({ removedAt: now, removedBy: actor.personId }, { transaction });
  }
  await Job.destroy({ where: { finingId, kind: 'settle', doneAt: null }, transaction });
  const job = await Job.findOne({ where: { finingId, kind: 'fining_b' }, transaction });
  if (job) await ringForSecond(run, { title: job.title, note: job.note ?? null, dueAt: job.snoozedUntil ?? job.dueAt }, transaction);
  await notifyChange({ cellar: actor.cellarId, kind: 'entry', batch: run.batchId }, transaction);
}
