import { Op } from 'sequelize';
import type { z } from 'zod';
import { Entry, Lot, Photo, Tasting } from '@/db/models';
import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import { systemClock, type Clock } from '@/lib/clock';
import type { photoList, PhotoSize } from '@/lib/contracts/photos';
import { NotFoundError, UnavailableError } from '@/lib/errors';
import { logFor } from '@/lib/log';
import { objectStore } from '@/lib/storage/objects';
import { loadBatch } from '../batches/load';
import { isPhotoAddress, photoKey } from './address';
import { presentPhotos } from './present';

const log = logFor('photos');
const MOST = 500;
const there = { removedAt: { [Op.is]: null } };

/** The photos in the log of a batch. */
export async function listBatchPhotos(actor: Actor, batchId: string, clock: Clock = systemClock): Promise<z.infer<typeof photoList>> {
  authorize(actor, 'batches.read');
  await loadBatch(actor.cellarId, batchId);
  const entries = await Entry.findAll({ attributes: ['id'], where: { batchId, ...there }, raw: true });
  const photos = await Photo.findAll({ where: { cellarId: actor.cellarId, entryId: entries.map((entry) => entry.id), ...there }, order: [['createdAt', 'ASC']], limit: MOST });
  return { items: await presentPhotos(photos, actor, clock.now()) };
}

/** The photos of a lot and of its tasting notes. */
export async function listLotPhotos(actor: Actor, lotId: string, clock: Clock = systemClock): Promise<z.infer<typeof photoList>> {
  authorize(actor, 'lots.read');
  if (!(await Lot.findOne({ attributes: ['id'], where: { id: lotId, cellarId: actor.cellarId } }))) throw new NotFoundError('lot');
  const tastings = await Tasting.findAll({ attributes: ['id'], where: { lotId, ...there }, raw: true });
  const photos = await Photo.findAll({ where: { cellarId: actor.cellarId, [Op.or]: [{ lotId }, { tastingId: tastings.map((tasting) => tasting.id) }], ...there }, order: [['createdAt', 'ASC']], limit: MOST });
  return { items: await presentPhotos(photos, actor, clock.now()) };
}

/** A photo's file, for an address that we made and that has not ended. */
export async function openPhoto(id: string, size: PhotoSize, address: { until: number; key: string }, clock: Clock = systemClock): Promise<Uint8Array> {
  if (!isPhotoAddress(id, size, address.until, address.key, clock.now())) throw new NotFoundError('photo');
  const photo = await Photo.findOne({ attributes: ['cellarId'], where: { id, ...there } });
  if (!photo) throw new NotFoundError('photo');
  const file = await objectStore()
    .get(photoKey(photo.cellarId, id, size))
    .catch((error: unknown) => {
      log.error({ err: error }, 'the object store did not give a photo');
      throw new UnavailableError('Photos cannot be shown right now.');
    });
  if (!file) throw new NotFoundError('photo');
  return file;
}
