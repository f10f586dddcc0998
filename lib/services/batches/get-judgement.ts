import type { z } from 'zod';
import { Op } from 'sequelize';
import { Batch, Cellar, Entry } from '@/db/models';
import { readingsOfBatch } from '@/db/queries/batch-readings';
import { judgementMark } from '@/db/queries/judgement-mark';
import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import { systemClock, type Clock } from '@/lib/clock';
import { presentJudgement, type AssessmentBody, type assessmentQuery, type JudgementBody } from '@/lib/contracts/assessment';
import { assess } from '@/lib/core/assess';
import { InvalidError, NotFoundError } from '@/lib/errors';
import { setupOf } from './setup';

type Query = z.infer<typeof assessmentQuery>;

/** Judgements kept in memory: several people look at the same batch, and a fit costs more than a query. */
const REMEMBERED = 64;
const remembered = new Map<string, Promise<JudgementBody>>();

function recall(key: string, make: () => Promise<JudgementBody>): Promise<JudgementBody> {
  const known = remembered.get(key);
  if (known) return known;
  const [oldest] = remembered.keys();
  if (remembered.size >= REMEMBERED && oldest !== undefined) remembered.delete(oldest);
  const made = make();
  remembered.set(key, made);
  made.catch(() => remembered.delete(key));
  return made;
}

async function judge(batch: Batch, at: number): Promise<JudgementBody> {
  const [cellar, entries, readings] = await Promise.all([
    Cellar.findByPk(batch.cellarId, { rejectOnEmpty: true }),
    // What was taken back later still counted then.
    Entry.findAll({ where: { batchId: batch.id, removedAt: { [Op.or]: [{ [Op.is]: null }, { [Op.gt]: new Date(at) }] } } }),
    readingsOfBatch(batch.id, at),
  ]);
  return presentJudgement(assess(setupOf(batch, entries, cellar.timeZone), readings, at));
}

/**
 * The judgement of a batch now, or as it was known at `at`: with the readings
 * received and the entries told by then. An ended batch is judged as it ended.
 */
export async function getJudgement(actor: Actor, batchId: string, query: Query, clock: Clock = systemClock): Promise<JudgementBody> {
  authorize(actor, 'batches.read');
  const mark = await judgementMark(actor.cellarId, batchId);
  if (!mark) throw new NotFoundError('batch');
  const batch = await Batch.findByPk(batchId, { rejectOnEmpty: new NotFoundError('batch') });
  if (query.at !== undefined) {
    const at = Date.parse(query.at);
    if (at > clock.now()) throw new InvalidError('Nothing can be known of a time that lies ahead.', { at: ['lies ahead'] });
    return recall(`${batchId} ${mark} at ${at}`, () => judge(batch, at));
  }
  // The worker judges at least once a minute while readings come; without it this does.
  const minute = Math.floor(clock.now() / 60_000);
  return recall(`${batchId} ${mark} now ${minute}`, () => judge(batch, batch.endedAt?.getTime() ?? clock.now()));
}

/** The same without what a picture needs. */
export async function getAssessment(actor: Actor, batchId: string, query: Query, clock: Clock = systemClock): Promise<AssessmentBody> {
  const { curve: _curve, expected: _expected, gas: _gas, ...assessment } = await getJudgement(actor, batchId, query, clock);
  return assessment;
}
