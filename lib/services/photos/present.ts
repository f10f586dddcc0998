import type { Transaction } from 'sequelize';
import type { Photo } from '@/db/models';
import type { Actor } from '@/lib/auth/policies';
import type { PhotoBody } from '@/lib/contracts/photos';
import { namesOf } from '../entries/names';
import { iso } from '../iso';
import { photoAddress } from './address';

/** Photos as they go over the wire, with addresses that end by themselves. `now` in ms. */
export async function presentPhotos(photos: readonly Photo[], actor: Actor, now: number, transaction?: Transaction): Promise<PhotoBody[]> {
  const names = await namesOf(photos.map((photo) => photo.createdBy), transaction);
  return photos.map((photo) => ({
    id: photo.id,
    entry: photo.entryId,
    lot: photo.lotId,
    tasting: photo.tastingId,
    caption: photo.caption,
    width: photo.width,
    height: photo.height,
    by: photo.createdBy === null ? null : (names.get(photo.createdBy) ?? null),
    mine: photo.createdBy === actor.personId,
    created_at: iso(photo.createdAt),
    small: photoAddress(photo.id, 'small', now),
    large: photoAddress(photo.id, 'large', now),
  }));
}
