import { Photo } from '@/db/models';
import type { Archive, ArchivedPhoto } from '@/lib/contracts/archive';
import { InvalidError, UnavailableError } from '@/lib/errors';
import { logFor } from '@/lib/log';
import { objectStore } from '@/lib/storage/objects';
import { photoKey } from '../photos/address';
import { developAgain, type Picture } from '../photos/picture';
import type { NewIds } from './ids';
import { refuseFile, type Bringing } from './parts';

const log = logFor('photos');

type Size = Pick<Picture, 'width' | 'height'> & { bytes: number };
export type StoredPhotos = ReadonlyMap<string, Size>;

/**
 * Puts the files of an archive's photos into the store, before their rows: what
 * fails after this leaves files that the sweep takes away. Those without a file
 * stay out.
 * @returns what was stored, by the archive's id
 */
export async function storePhotos(cellarId: string, photos: Archive['photos'], ids: NewIds): Promise<StoredPhotos> {
  const stored = new Map<string, Size>();
  for (const photo of photos) {
    if (photo.jpeg === null) continue;
    const picture = await developAgain(Buffer.from(photo.jpeg, 'base64')).catch((error: unknown) => {
      throw error instanceof InvalidError ? refuseFile('holds a photo that is no picture') : error;
    });
    const id = ids.make(photo.id);
    try {
      await objectStore().put(photoKey(cellarId, id, 'large'), picture.large, 'image/jpeg');
      await objectStore().put(photoKey(cellarId, id, 'small'), picture.small, 'image/jpeg');
    } catch (error) {
      log.error({ err: error }, 'the object store did not take a photo');
      throw new UnavailableError('Photos cannot be kept right now, so nothing of the file was. Try again later.');
    }
    stored.set(photo.id, { width: picture.width, height: picture.height, bytes: picture.large.length });
  }
  return stored;
}

export async function bringPhotos(photos: readonly ArchivedPhoto[], stored: StoredPhotos, { cellarId, ids, people, transaction }: Bringing): Promise<number> {
  const on = (old: string | null) => {
    if (old === null) return null;
    const now = ids.of(old);
    if (!now) throw refuseFile('photos refer to what is not in it');
    return now;
  };
  const rows = photos.flatMap((photo) => {
    const size = stored.get(photo.id);
    if (!size) return [];
    return [{ id: ids.make(photo.id), cellarId, entryId: on(photo.entry), lotId: on(photo.lot), tastingId: on(photo.tasting), ...size, caption: photo.caption, createdBy: photo.by === null ? null : (people.get(photo.by) ?? null), createdAt: new Date(photo.created_at) }];
  });
  await Photo.bulkCreate(rows, { transaction });
  return rows.length;
}
