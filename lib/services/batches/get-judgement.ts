import type { z } from 'zod';
import { Op } from 'sequelize';
import { Batch, Cellar, Entry } from '@/db/models';
import { readingsOfBatch } from '@/db/queries/batch-readings';
import { judgementMark, keptJudgement, type KeptJudgement } from '@/db/queries/judgement-mark';
import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import { systemClock, type Clock } from '@/lib/clock';
import { presentJudgement, type AssessmentBody, type assessmentQuery, type Drawn, type JudgementBody } from '@/lib/contracts/assessment';
import { assess } from '@/lib/core/assess';
import { InvalidError, NotFoundError } from '@/lib/errors';
import { setupOf } from './setup';
import { surroundingsAt } from './surroundings';

type Query = z.infer<typeof assessmentQuery>;
/** What was kept before there was a footing has none until the next judgement. */
type Drawing = Pick<Drawn, 'curve' | 'expected' | 'gas'> & Partial<Pick<Drawn, 'footing'>>;
type Kept = KeptJudgement<AssessmentBody, Drawing>;

/** Judgements kept in memory: several people look at the same past, and a fit costs more than a query. */
const REMEMBERED = 64;
const remembered = new Map<string, Promise<Drawn>>();

/** The watch judges anew within about a second of an entry; for this long the page is told that it is on its way. */
const ON_ITS_WAY_MS = 5_000;
/** The watch judges every working batch at least every five minutes. Twice that and more: it does not run. */
const WATCH_GONE_MS = 12 * 60_000;

function recall(key: string, make: () => Promise<Drawn>): Promise<Drawn> {
  const known = remembered.get(key);
  if (known) return known;
  const [oldest] = remembered.keys();
  if (remembered.size >= REMEMBERED && oldest !== undefined) remembered.delete(oldest);
  const made = make();
  remembered.set(key, made);
  made.catch(() => remembered.delete(key));
  return made;
}

async function judge(batchId: string, asked: number | null, now: number): Promise<Drawn> {
  const batch = await Batch.findByPk(batchId, { rejectOnEmpty: new NotFoundError('batch') });
  const at = asked ?? batch.endedAt?.getTime() ?? now;
  const [cellar, entries, readings, around] = await Promise.all([
    Cellar.findByPk(batch.cellarId, { rejectOnEmpty: true }),
    // What was taken back later still counted then.
    Entry.findAll({ where: { batchId: batch.id, removedAt: { [Op.or]: [{ [Op.is]: null }, { [Op.gt]: new Date(at) }] } } }),
    readingsOfBatch(batch.id, at),
    surroundingsAt(batch.id, at),
  ]);
  return presentJudgement(assess(setupOf(batch, entries, cellar.timeZone, around), readings, at));
}

/** Whether the judgement kept will do: it knows all that was logged, or what it does not know is just being judged. */
function stateOf({ mark, changedAt, ended, kept }: Kept, now: number): 'known' | 'pending' | 'out of date' {
  if (!kept?.drawing) return 'out of date';
  if (kept.mark !== mark) return now - changedAt.getTime() < ON_ITS_WAY_MS ? 'pending' : 'out of date';
  return ended || now - kept.at.getTime() < WATCH_GONE_MS ? 'known' : 'out of date';
}

/**
 * The judgement of a batch now, or as it was known at `at`: with the readings
 * received and the entries told by then. An ended batch is judged as it ended.
 * The present one is the watch's own, read in one query; only where the watch is
 * not running, or for a past time, is it worked out here.
 */
export async function getJudgement(actor: Actor, batchId: string, query: Query, clock: Clock = systemClock): Promise<JudgementBody> {
  authorize(actor, 'batches.read');
  const now = clock.now();
  if (query.at !== undefined) {
    const mark = await judgementMark(actor.cellarId, batchId);
    if (mark === null) throw new NotFoundError('batch');
    const at = Date.parse(query.at);
    if (at > now) throw new InvalidError('Nothing can be known of a time that lies ahead.', { at: ['lies ahead'] });
    return { ...(await recall(`${batchId} ${mark} at ${at}`, () => judge(batchId, at, now))), pending: false };
  }
  const found = await keptJudgement<AssessmentBody, Drawing>(actor.cellarId, batchId);
  if (!found) throw new NotFoundError('batch');
  const state = stateOf(found, now);
  if (state !== 'out of date') return { footing: null, ...found.kept!.assessment, ...found.kept!.drawing!, pending: state === 'pending' };
  const minute = Math.floor(now / 60_000);
  return { ...(await recall(`${batchId} ${found.mark} now ${minute}`, () => judge(batchId, null, now))), pending: false };
}

/** The same without what a picture needs. */
export async function getAssessment(actor: Actor, batchId: string, query: Query, clock: Clock = systemClock): Promise<AssessmentBody> {
  const { curve: _curve, expected: _expected, gas: _gas, footing: _footing, pending: _pending, ...assessment } = await getJudgement(actor, batchId, query, clock);
  return assessment;
}
