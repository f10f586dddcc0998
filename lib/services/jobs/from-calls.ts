import { Op, type Transaction } from 'sequelize';
import { Alert, BatchLink, FiningRun, Job, type Batch, type Entry } from '@/db/models';
import { finingState } from '@/lib/core/additions/fining';
import { CALL_OF_KIND, wantedJobs, type Wanted } from '@/lib/core/rounds/wanted';
import type { Assessment, Instant } from '@/lib/core/types';
import { notifyChange } from '../changes';
import { silenceSecond } from '../finings/ring';
import { feedOf } from './feed';

/** A call that flickers does not drop its job before it was gone this long, ms. */
const KEPT_MS = 3 * 3_600_000;
/** What somebody found or did with their own hands is no flicker. */
const SETTLES: readonly string[] = ['reading', 'neck', 'rack'];
/** How often it is written down that the reason still stands, ms. */
const SEEN_EVERY_MS = 30 * 60_000;

const keyOf = (batchId: string, wanted: Pick<Wanted, 'kind' | 'source' | 'occasion'>) => [wanted.source, batchId, wanted.kind, ...(wanted.occasion === undefined ? [] : [wanted.occasion])].join(':');

const lastAt = (dates: readonly (Date | null | undefined)[]): Instant | null => {
  const times = dates.flatMap((date) => (date ? [date.getTime()] : []));
  return times.length > 0 ? Math.max(...times) : null;
};

/**
 * Brings the program's jobs of a batch in line with its calls and its log: one
 * job an occasion, however often it is judged. What was ticked is not asked again
 * until its reason was gone; what nobody wants any more leaves the rounds.
 * @param assessment null: the batch is over
 */
export async function jobsFromCalls(batch: Batch, assessment: Assessment | null, entries: readonly Pick<Entry, 'kind' | 'at' | 'neck' | 'createdAt'>[], at: Instant, transaction: Transaction): Promise<void> {
  const rows = await Job.findAll({ where: { batchId: batch.id, source: { [Op.in]: ['call', 'schedule'] }, overAt: null }, transaction });
  const ticked = (kind: string) => Job.max<Date | null, Job>('doneAt', { where: { batchId: batch.id, kind, doneAt: { [Op.not]: null } }, transaction });
  const wanted =
    assessment === null
      ? []
      : wantedJobs({
          name: batch.name,
          neck: batch.neck,
          stage: assessment.stage,
          calls: assessment.calls,
          pitchedAt: batch.pitchedAt?.getTime() ?? null,
          parted: lastAt([await BatchLink.max<Date | null, BatchLink>('at', { where: { toBatch: batch.id, kind: { [Op.in]: ['split', 'blend'] } }, transaction })]),
          floatAt: assessment.lastReadingAt,
          readAt: lastAt([...entries.filter((entry) => entry.kind === 'reading').map((entry) => entry.at), await ticked('reading')]),
          airlockAt: lastAt([...entries.filter((entry) => entry.neck === 'airlock').map((entry) => entry.at), await ticked('airlock')]),
          feed: await feedOf(batch, assessment, at, transaction),
          clearing: await isClearing(batch.id, at, transaction),
          at,
        });
  const now = new Date(at);
  let changed = false;
  for (const job of wanted) changed = (await keep(batch, job, rows, now, transaction)) || changed;
  const keys = new Set(wanted.map((job) => keyOf(batch.id, job)));
  if (assessment === null) changed = (await dropTimers(batch.id, now, transaction)) || changed;
  const settled = lastAt(entries.filter((entry) => SETTLES.includes(entry.kind)).map((entry) => entry.createdAt)) ?? 0;
  for (const row of rows) {
    if (keys.has(row.dedupeKey ?? '')) continue;
    const seen = row.seenAt ?? row.createdAt;
    if (assessment !== null && row.source === 'call' && at - seen.getTime() < KEPT_MS && settled <= seen.getTime() && row.doneAt === null) continue;
    changed ||= row.doneAt === null && row.droppedAt === null;
    await row.update({ overAt: now, droppedAt: row.droppedAt ?? (row.doneAt === null ? now : null) }, { transaction });
  }
  if (changed) await notifyChange({ cellar: batch.cellarId, kind: 'job', batch: batch.id }, transaction);
}

/** What is over is not fined any further: its clocks leave the rounds, and do not ring. */
async function dropTimers(batchId: string, now: Date, transaction: Transaction): Promise<boolean> {
  const timers = await Job.findAll({ where: { batchId, source: 'timer', finingId: { [Op.not]: null }, doneAt: null, droppedAt: null }, transaction });
  for (const timer of timers) {
    await timer.update({ droppedAt: now }, { transaction });
    const run = await FiningRun.findByPk(timer.finingId!, { transaction });
    if (run) await silenceSecond(run, transaction);
  }
  return timers.length > 0;
}

async function isClearing(batchId: string, at: Instant, transaction: Transaction): Promise<boolean> {
  const runs = await FiningRun.findAll({ where: { batchId }, transaction });
  return runs.some(({ intervalMin, settleDays, firstAt, secondAt }) => firstAt.getTime() <= at && finingState({ intervalMin, settleDays, firstAt: firstAt.getTime(), secondAt: secondAt?.getTime() ?? null }, at).state !== 'settled');
}

/** @returns whether a person sees a difference. */
async function keep(batch: Batch, wanted: Wanted, rows: readonly Job[], now: Date, transaction: Transaction): Promise<boolean> {
  const dedupeKey = keyOf(batch.id, wanted);
  const row = rows.find((item) => item.dedupeKey === dedupeKey);
  const facts = { title: wanted.title, note: wanted.note, dueAt: wanted.dueAt === null ? (row?.dueAt ?? now) : new Date(wanted.dueAt), exact: wanted.exact };
  if (!row) {
    await Job.create({ cellarId: batch.cellarId, batchId: batch.id, kind: wanted.kind, source: wanted.source, dedupeKey, seenAt: now, ...facts }, { transaction });
    return true;
  }
  const stale = !row.seenAt || now.getTime() - row.seenAt.getTime() >= SEEN_EVERY_MS;
  if (row.doneAt !== null || row.droppedAt !== null) {
    if (stale) await row.update({ seenAt: now }, { transaction });
    return false;
  }
  const taker = row.takenBy ?? (await alertTaker(batch.id, wanted.kind, transaction));
  // The words and the hour follow the judgement; figures in the note alone are not worth a write each minute.
  const moved = row.title !== facts.title || Math.abs(row.dueAt.getTime() - facts.dueAt.getTime()) >= SEEN_EVERY_MS || taker !== row.takenBy;
  if (!moved && !stale) return false;
  await row.update({ ...facts, seenAt: now, takenBy: taker, takenAt: taker === row.takenBy ? row.takenAt : now }, { transaction });
  return moved;
}

/** Whoever took the alert has its job too. */
async function alertTaker(batchId: string, kind: string, transaction: Transaction): Promise<string | null> {
  const call = CALL_OF_KIND[kind];
  if (!call) return null;
  const alert = await Alert.findOne({ where: { batchId, call, state: 'acknowledged' }, transaction });
  return alert?.acknowledgedBy ?? null;
}
