import { randomUUID } from 'node:crypto';
import { Op, type Transaction } from 'sequelize';
import { inTransaction } from '@/db/client';
import { Entry, Lot, Photo, Tasting } from '@/db/models';
import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import { systemClock, type Clock } from '@/lib/clock';
import type { PhotoBody, PhotoTarget } from '@/lib/contracts/photos';
import { ConflictError, ForbiddenError, NotFoundError, UnavailableError } from '@/lib/errors';
import { logFor } from '@/lib/log';
import { objectStore } from '@/lib/storage/objects';
import { auditBy } from '../audit/write';
import { notifyChange } from '../changes';
import { photoKey } from './address';
import { developPicture } from './picture';
import { presentPhotos } from './present';

const log = logFor('photos');
const MOST_ON_ONE = 12;

type Owner = { batchId: string | null; kind: 'entry' | 'lot' };

/** What it hangs on, where the actor may hang something on it. */
async function ownerOf(actor: Actor, target: Pick<PhotoTarget, 'entry' | 'lot' | 'tasting'>, transaction?: Transaction): Promise<Owner> {
  if (target.entry !== undefined) {
    authorize(actor, 'entries.create');
    const entry = await Entry.findOne({ where: { id: target.entry, cellarId: actor.cellarId, removedAt: { [Op.is]: null } }, transaction });
    if (!entry) throw new NotFoundError('entry');
    return { batchId: entry.batchId, kind: 'entry' };
  }
  if (target.lot !== undefined) {
    authorize(actor, 'lots.serve');
    const lot = await Lot.findOne({ where: { id: target.lot, cellarId: actor.cellarId }, transaction });
    if (!lot) throw new NotFoundError('lot');
    return { batchId: null, kind: 'lot' };
  }
  authorize(actor, 'tastings.write');
  const tasting = await Tasting.findOne({ where: { id: target.tasting ?? '', cellarId: actor.cellarId, removedAt: { [Op.is]: null } }, transaction });
  if (!tasting) throw new NotFoundError('tasting note');
  if (tasting.personId !== actor.personId) throw new ForbiddenError('A photo goes on a tasting note of one’s own.');
  return { batchId: null, kind: 'lot' };
}

/** Keeps a photo. The files are there before the row is: a failure in between leaves a file that the sweep takes away, never a row without one. */
export async function keepPhoto(actor: Actor, target: PhotoTarget, bytes: Buffer, clock: Clock = systemClock): Promise<PhotoBody> {
  const hangsOn = { entryId: target.entry ?? null, lotId: target.lot ?? null, tastingId: target.tasting ?? null };
  // Who may and whether it exists comes before any work with the picture.
  await ownerOf(actor, target);
  if ((await Photo.count({ where: { ...hangsOn, removedAt: { [Op.is]: null } } })) >= MOST_ON_ONE) throw new ConflictError(`At most ${MOST_ON_ONE} photos go on one. Take one off first.`);
  const picture = await developPicture(bytes);
  const id = randomUUID();
  try {
    await objectStore().put(photoKey(actor.cellarId, id, 'large'), picture.large, 'image/jpeg');
    await objectStore().put(photoKey(actor.cellarId, id, 'small'), picture.small, 'image/jpeg');
  } catch (error) {
    log.error({ err: error }, 'the object store did not take a photo');
    throw new UnavailableError('Photos cannot be kept right now. The note itself is safe; add the photo later.');
  }
  return inTransaction(async (transaction) => {
    const owner = await ownerOf(actor, target, transaction);
    const photo = await Photo.create(
      { id, cellarId: actor.cellarId, ...hangsOn, bytes: picture.large.length, width: picture.width, height: picture.height, caption: target.caption ?? null, createdBy: actor.personId, createdAt: new Date(clock.now()) },
      { transaction },
    );
    await auditBy(actor, 'photo.added', id, { ...target }, transaction);
    await notifyChange({ cellar: actor.cellarId, kind: owner.kind, batch: owner.batchId }, transaction);
    const [body] = await presentPhotos([photo], actor, clock.now(), transaction);
    return body!;
  });
}

/** Takes a photo off: one's own, or any as a brewer. The file goes with the next sweep, so that taking it off never waits for the store. */
export async function removePhoto(actor: Actor, id: string, clock: Clock = systemClock): Promise<void> {
  await inTransaction(async (transaction) => {
    const photo = await Photo.findOne({ where: { id, cellarId: actor.cellarId, removedAt: { [Op.is]: null } }, transaction, lock: transaction.LOCK.UPDATE });
    if (!photo) throw new NotFoundError('photo');
    if (photo.createdBy !== actor.personId) authorize(actor, 'entries.remove');
    await photo.update({ removedAt: new Date(clock.now()) }, { transaction });
    const entry = photo.entryId && (await Entry.findByPk(photo.entryId, { attributes: ['batchId'], transaction }));
    await auditBy(actor, 'photo.removed', id, {}, transaction);
    await notifyChange({ cellar: actor.cellarId, kind: entry ? 'entry' : 'lot', batch: entry ? entry.batchId : null }, transaction);
  });
}
