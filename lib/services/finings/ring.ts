import { Op, type Transaction } from 'sequelize';
import { Batch, Cellar, OutboxMail, type FiningRun } from '@/db/models';
import { hearersOf } from '@/db/queries/messages';
import { oweMails } from '@/db/queries/outbox';
import type { MailPayload } from '@/lib/mail/payload';
import { iso } from '../iso';

const keyOf = (run: FiningRun) => `fining:${run.id}:second`;
const unsent = (run: FiningRun) => ({ dedupeKey: { [Op.startsWith]: `${keyOf(run)}:` }, sentAt: null, failedAt: null });

/**
 * Owes whoever put the first dose in word of the second, at the minute it is due:
 * on the phone where one is registered, else by mail.
 */
export async function ringForSecond(run: FiningRun, job: { title: string; note: string | null; dueAt: Date }, transaction: Transaction): Promise<void> {
  const hearer = run.personId === null ? undefined : (await hearersOf(run.cellarId, transaction)).find((item) => item.personId === run.personId);
  if (!hearer) return;
  const batch = await Batch.findByPk(run.batchId, { transaction, rejectOnEmpty: true });
  const cellar = await Cellar.findByPk(run.cellarId, { transaction, rejectOnEmpty: true });
  const payload: MailPayload = {
    template: 'timer',
    due: iso(job.dueAt),
    title: job.title,
    note: job.note,
    batch: { id: batch.id, name: batch.name, tag: batch.tag, place: batch.place },
    cellar: { name: cellar.name, time_zone: cellar.timeZone },
  };
  const means = hearer.hasDevice ? 'push' : 'mail';
  // Held until its own time: another message that is due sooner must not take it along.
  await oweMails([{ cellarId: run.cellarId, alertId: null, personId: hearer.personId, means, dedupeKey: `${keyOf(run)}:${hearer.personId}:${job.dueAt.getTime()}`, payload, notBefore: job.dueAt, turn: true }], transaction);
}

/** The second dose is in, or its clock was moved: what is not sent yet is not owed any more. */
export async function silenceSecond(run: FiningRun, transaction: Transaction): Promise<void> {
  await OutboxMail.destroy({ where: unsent(run), transaction });
}

/** It was put off: the clock rings then. */
export async function ringLater(run: FiningRun, until: Date, transaction: Transaction): Promise<void> {
  await OutboxMail.update({ nextAttemptAt: until }, { where: unsent(run), transaction });
}
