import { Op, type Transaction } from 'sequelize';
import { Entry, type Batch } from '@/db/models';
import { batchState } from '@/db/queries/batch-states';
import type { AssessmentBody } from '@/lib/contracts/assessment';
import type { CreateEntry, EntryDetail } from '@/lib/contracts/batches';
import { InvalidError } from '@/lib/errors';
import { volumeAfter as after } from '../drink/ledger';

const VOLUME_KINDS = ['pitch', 'rack', 'addition', 'top_up', 'split', 'blend', 'bottling'];
/** Rounding of litres typed with three decimals. */
const LITRES_SLACK = 1e-6;

const kept = (batchId: string) => ({ batchId, removedAt: { [Op.is]: null } });

/** For the first entry that tells of the neck: what closed it before, to which the batch goes back where that is taken back. Null for the later ones. */
export async function neckMark(batch: Pick<Batch, 'id' | 'neck'>, transaction: Transaction): Promise<Pick<EntryDetail, 'neck_before'> | null> {
  return (await Entry.count({ where: { ...kept(batch.id), neck: { [Op.not]: null } }, transaction })) === 0 ? { neck_before: batch.neck } : null;
}

/** What closed the neck before the log told of it; null where nobody kept that. */
async function neckBefore(batchId: string, transaction: Transaction): Promise<Batch['neck'] | null> {
  const marked = await Entry.findOne({ where: { batchId, neck: { [Op.not]: null }, detail: { neck_before: { [Op.not]: null } } }, order: [['createdAt', 'ASC']], transaction });
  return (marked?.detail as EntryDetail | null | undefined)?.neck_before ?? null;
}

/** Whether nothing of these kinds was logged for a later time: only the latest says how things stand. */
async function isLatest(batchId: string, at: Date, kinds: string[], transaction: Transaction): Promise<boolean> {
  return (await Entry.count({ where: { ...kept(batchId), kind: kinds, at: { [Op.gt]: at } }, transaction })) === 0;
}

/**
 * What an entry changes in its batch: a pitch its start, a neck change the neck,
 * a racking or an addition its volume. One logged late changes only the past.
 * @throws InvalidError where the vessel cannot hold it.
 */
export async function applyEntry(batch: Batch, entry: CreateEntry, transaction: Transaction): Promise<void> {
  const at = new Date(entry.at);
  if (entry.kind === 'pitch') {
    batch.set('pitchedAt', at);
    if (entry.gravity !== null && batch.originalGravity === null) batch.set('originalGravity', entry.gravity);
  }
  if (entry.neck !== null && (await isLatest(batch.id, at, ['neck', 'pitch'], transaction))) batch.set('neck', entry.neck);
  if (entry.volume_l !== null && VOLUME_KINDS.includes(entry.kind)) {
    const adds = entry.kind === 'addition' || entry.kind === 'top_up';
    const volume = adds ? batch.volumeL + entry.volume_l : entry.volume_l;
    if (volume <= 0) throw new InvalidError('The vessel would be empty.', { volume_l: ['must be more than 0 L'] });
    if (volume > batch.vesselL + LITRES_SLACK) throw new InvalidError('The vessel cannot hold it.', { volume_l: [`the vessel holds ${batch.vesselL} L`] });
    if (await isLatest(batch.id, at, VOLUME_KINDS, transaction)) batch.set('volumeL', Math.min(volume, batch.vesselL));
  }
  await batch.save({ transaction });
}

/** As in the judgement: within this of the pitch a reading still shows the must. */
const BEFORE_THE_FALL_MS = 24 * 3_600_000;

/** A reading of the must stands in for an original gravity that nobody told, unless the fall had begun by then. True where it did. */
export async function takeAsOriginal(batch: Batch, { kind, at, gravity, detail }: Pick<Entry, 'kind' | 'at' | 'gravity'> & { detail: EntryDetail | null }, transaction: Transaction): Promise<boolean> {
  if (kind !== 'reading' || gravity === null || gravity <= 1.005 || batch.originalGravity !== null || batch.pitchedAt === null || detail?.instrument === 'refractometer') return false;
  if (Math.abs(at.getTime() - batch.pitchedAt.getTime()) >= BEFORE_THE_FALL_MS) return false;
  const started = (await batchState<AssessmentBody>(batch.id, transaction))?.assessment.calls.started;
  if (started?.verdict === 'yes' && (started.since === null || Date.parse(started.since) <= at.getTime())) return false;
  batch.set('originalGravity', gravity);
  await batch.save({ transaction });
  return true;
}

/** The original gravity follows the line of the log that it was taken from; `after` is null where that was taken back. */
export async function followOriginal(batch: Batch, before: Pick<Entry, 'kind' | 'gravity' | 'detail'>, after: number | null, transaction: Transaction): Promise<void> {
  const from = before.kind === 'pitch' || (before.detail as EntryDetail | null)?.as_original_gravity === true;
  if (!from || before.gravity === null || batch.originalGravity !== before.gravity) return;
  // A pitch taken back leaves what was told of the must.
  if (after === null && before.kind === 'pitch') return;
  batch.set('originalGravity', after);
  await batch.save({ transaction });
}

/** After an entry was taken back or corrected, the batch stands as its log now says; where that says nothing it stays as it is. */
export async function settleBatch(batch: Batch, changed: Pick<Entry, 'kind' | 'neck' | 'volumeL'>, transaction: Transaction): Promise<void> {
  const left = await Entry.findAll({
    where: kept(batch.id),
    order: [
      ['at', 'ASC'],
      ['createdAt', 'ASC'],
    ],
    transaction,
  });
  if (changed.kind === 'pitch') batch.set('pitchedAt', left.findLast((entry) => entry.kind === 'pitch')?.at ?? null);
  if (changed.neck !== null) batch.set('neck', left.findLast((entry) => entry.neck !== null)?.neck ?? (await neckBefore(batch.id, transaction)) ?? batch.neck);
  if (changed.volumeL !== null && VOLUME_KINDS.includes(changed.kind)) batch.set('volumeL', volumeAfter(left, batch));
  await batch.save({ transaction });
}

function volumeAfter(entries: readonly Entry[], batch: Batch): number {
  const anchor = entries.findLastIndex((entry) => (entry.kind === 'pitch' || entry.kind === 'rack') && entry.volumeL !== null);
  if (anchor < 0) return batch.volumeL;
  const volume = entries.slice(anchor).reduce(after, 0);
  // An emptied vessel keeps its last figure: a batch is never of no volume.
  return volume > 0 ? Math.min(volume, batch.vesselL) : batch.volumeL;
}
