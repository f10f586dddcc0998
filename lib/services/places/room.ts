import type { Transaction } from 'sequelize';
import { Place } from '@/db/models';
import { findPlaces } from '@/db/queries/lots';
import { ConflictError, NotFoundError } from '@/lib/errors';

/** The place, locked, so that two people cannot both take its last room. @throws NotFoundError for another cellar's. */
export async function loadPlace(cellarId: string, id: string, transaction: Transaction): Promise<Place> {
  const place = await Place.findOne({ where: { id, cellarId, removedAt: null }, transaction, lock: transaction.LOCK.UPDATE });
  if (!place) throw new NotFoundError('place');
  return place;
}

/** @throws ConflictError where the place is too full for so many more. */
export async function roomFor(cellarId: string, id: string, bottles: number, transaction: Transaction): Promise<Place> {
  const place = await loadPlace(cellarId, id, transaction);
  const [row] = await findPlaces(cellarId, id, transaction);
  const standing = row?.bottles ?? 0;
  if (place.capacity !== null && standing + bottles > place.capacity) {
    const room = Math.max(0, place.capacity - standing);
    throw new ConflictError(room === 0 ? `${place.name} is full: ${place.capacity} bottles stand there.` : `${place.name} has room for ${room} more ${room === 1 ? 'bottle' : 'bottles'}, not for ${bottles}.`);
  }
  return place;
}
