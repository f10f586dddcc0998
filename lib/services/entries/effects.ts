import { Op, type Transaction } from 'sequelize';
import { Entry, type Batch } from '@/db/models';
import type { CreateEntry } from '@/lib/contracts/batches';
import { InvalidError } from '@/lib/errors';

const VOLUME_KINDS = ['pitch', 'rack', 'addition', 'top_up'];
/** Rounding of litres typed with three decimals. */
const LITRES_SLACK = 1e-6;

const kept = (batchId: string) => ({ batchId, removedAt: { [Op.is]: null } });

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

/** After an entry was taken back, the batch stands as what is left of its log says; where that says nothing it stays as it is. */
export async function settleBatch(batch: Batch, removed: Entry, transaction: Transaction): Promise<void> {
  const left = await Entry.findAll({
    where: kept(batch.id),
    order: [
      ['at', 'ASC'],
      ['createdAt', 'ASC'],
    ],
    transaction,
  });
  if (removed.kind === 'pitch') batch.set('pitchedAt', left.findLast((entry) => entry.kind === 'pitch')?.at ?? null);
  if (removed.neck !== null) batch.set('neck', left.findLast((entry) => entry.neck !== null)?.neck ?? batch.neck);
  if (removed.volumeL !== null && VOLUME_KINDS.includes(removed.kind)) batch.set('volumeL', volumeAfter(left, batch));
  await batch.save({ transaction });
}

function volumeAfter(entries: readonly Entry[], batch: Batch): number {
  const anchor = entries.findLastIndex((entry) => (entry.kind === 'pitch' || entry.kind === 'rack') && entry.volumeL !== null);
  if (anchor < 0) return batch.volumeL;
  const added = entries.slice(anchor + 1).reduce((sum, entry) => sum + (entry.kind === 'addition' || entry.kind === 'top_up' ? (entry.volumeL ?? 0) : 0), 0);
  return Math.min((entries[anchor]?.volumeL ?? 0) + added, batch.vesselL);
}
