import { Op } from 'sequelize';
import { Entry, Lot, Photo, Tasting } from '@/db/models';
import { objectStore } from '@/lib/storage/objects';
import { namesOf } from '../entries/names';
import { iso } from '../iso';
import { photoKey } from '../photos/address';

const there = { removedAt: { [Op.is]: null } };
const idsOf = (rows: readonly { id: string }[]) => rows.map(({ id }) => id);

/** What photos hang on, of a cellar or of one batch: notes that were taken back take theirs along. */
async function ownersOf(cellarId: string, batchId: string | null) {
  const of = batchId === null ? { cellarId } : { cellarId, batchId };
  const entries = idsOf(await Entry.findAll({ attributes: ['id'], where: { ...of, ...there }, raw: true }));
  const lots = idsOf(await Lot.findAll({ attributes: ['id'], where: of, raw: true }));
  const tastings = idsOf(await Tasting.findAll({ attributes: ['id'], where: { cellarId, lotId: lots, ...there }, raw: true }));
  return { [Op.or]: [{ entryId: entries }, { lotId: lots }, { tastingId: tastings }] };
}

/** The photos of the archive as `,"photos":[…]`, one file in memory at a time. */
export async function* photosPieces(cellarId: string, batchId: string | null): AsyncGenerator<string> {
  const photos = await Photo.findAll({ where: { cellarId, ...there, ...(await ownersOf(cellarId, batchId)) }, order: [['createdAt', 'ASC'], ['id', 'ASC']] });
  const names = await namesOf(photos.map((photo) => photo.createdBy));
  yield ',\n"photos":[';
  for (const [index, photo] of photos.entries()) {
    const file = await objectStore().get(photoKey(cellarId, photo.id, 'large'));
    const row = {
      id: photo.id,
      entry: photo.entryId,
      lot: photo.lotId,
      tasting: photo.tastingId,
      caption: photo.caption,
      by: photo.createdBy === null ? null : (names.get(photo.createdBy) ?? null),
      created_at: iso(photo.createdAt),
      jpeg: file && Buffer.from(file).toString('base64'),
    };
    yield `${index === 0 ? '' : ','}\n${JSON.stringify(row)}`;
  }
  yield ']';
}
