import { UniqueConstraintError, type Transaction } from 'sequelize';
import { inTransaction } from '@/db/client';
import { Lot, LotBottle, Place } from '@/db/models';
import { bottlesAt, findPlaces, type PlaceRow } from '@/db/queries/lots';
import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import { systemClock, type Clock } from '@/lib/clock';
import type { PlaceBody, PlaceForm, UpdatePlaceForm } from '@/lib/contracts/lots';
import { ConflictError, InvalidError, NotFoundError } from '@/lib/errors';
import { auditBy } from '../audit/write';
import { notifyChange } from '../changes';
import { keptBench } from '../lots/kept';
import { tooWarm } from '../lots/warmth';
import { loadPlace } from './room';

const MOST_PLACES = 200;

const present = (row: PlaceRow): PlaceBody => ({ id: row.id, name: row.name, capacity: row.capacity, temperature_c: row.temperatureC, bottles: row.bottles, lots: row.lots });

/** Where bottles stand, and how many fit. */
export async function listPlaces(actor: Actor): Promise<{ items: PlaceBody[] }> {
  authorize(actor, 'lots.read');
  return { items: (await findPlaces(actor.cellarId)).map(present) };
}

async function placeBody(cellarId: string, id: string, transaction: Transaction): Promise<PlaceBody> {
  const [row] = await findPlaces(cellarId, id, transaction);
  if (!row) throw new NotFoundError('place');
  return present(row);
}

/** Runs a change of places; a name that is taken is told at its field. */
async function change<T>(work: (transaction: Transaction) => Promise<T>): Promise<T> {
  try {
    return await inTransaction(work);
  } catch (error) {
    if (error instanceof UniqueConstraintError) throw new InvalidError('This name is taken.', { name: ['another place has it'] });
    throw error;
  }
}

export async function createPlace(actor: Actor, input: PlaceForm): Promise<PlaceBody> {
  authorize(actor, 'places.manage');
  return change(async (transaction) => {
    if ((await Place.count({ where: { cellarId: actor.cellarId, removedAt: null }, transaction })) >= MOST_PLACES) throw new ConflictError(`A cellar has at most ${MOST_PLACES} places.`);
    const place = await Place.create({ cellarId: actor.cellarId, name: input.name, capacity: input.capacity, temperatureC: input.temperature_c }, { transaction });
    await auditBy(actor, 'place.created', place.id, { name: input.name }, transaction);
    await notifyChange({ cellar: actor.cellarId, kind: 'lot', batch: null }, transaction);
    return placeBody(actor.cellarId, place.id, transaction);
  });
}

/** Changes a place. It cannot become warmer than what stands there was judged for, nor smaller than what stands there. */
export async function updatePlace(actor: Actor, id: string, input: UpdatePlaceForm): Promise<PlaceBody> {
  authorize(actor, 'places.manage');
  return change(async (transaction) => {
    const place = await loadPlace(actor.cellarId, id, transaction);
    place.set({
      ...(input.name !== undefined && { name: input.name }),
      ...(input.capacity !== undefined && { capacity: input.capacity }),
      ...(input.temperature_c !== undefined && { temperatureC: input.temperature_c }),
    });
    const before = await placeBody(actor.cellarId, id, transaction);
    if (place.capacity !== null && input.capacity !== undefined && before.bottles > place.capacity) throw new InvalidError('More bottles stand there.', { capacity: [`must be at least ${before.bottles}: so many stand there`] });
    if (warmer(place.previous('temperatureC'), place.temperatureC)) await refuseTooWarm(place, transaction);
    await place.save({ transaction });
    await auditBy(actor, 'place.updated', id, { ...input }, transaction);
    await notifyChange({ cellar: actor.cellarId, kind: 'lot', batch: null }, transaction);
    return placeBody(actor.cellarId, id, transaction);
  });
}

/** Whether a place gets warmer than it was, or warm at all where nobody had said. A place that cools bears what stood there before. */
const warmer = (before: number | null | undefined, after: number | null): boolean => after !== null && (before === null || before === undefined || after > before);

async function refuseTooWarm(place: Place, transaction: Transaction): Promise<void> {
  const ids = await bottlesAt(place.id, transaction);
  const bottles = ids.length ? await LotBottle.findAll({ where: { id: ids }, transaction }) : [];
  for (const bottle of bottles) {
    const lot = await Lot.findByPk(bottle.lotId, { transaction, rejectOnEmpty: true });
    const warm = tooWarm(keptBench(lot.bench), bottle, place);
    if (warm) throw new ConflictError(`Move ${lot.name} (${lot.code}) first. ${warm.sentence}`);
  }
}

/** Takes an empty place away. */
export async function removePlace(actor: Actor, id: string, clock: Clock = systemClock): Promise<void> {
  authorize(actor, 'places.manage');
  await change(async (transaction) => {
    const place = await loadPlace(actor.cellarId, id, transaction);
    const { bottles } = await placeBody(actor.cellarId, id, transaction);
    if (bottles > 0) throw new ConflictError(`${bottles} ${bottles === 1 ? 'bottle stands' : 'bottles stand'} there. Move them first.`);
    await place.update({ removedAt: new Date(clock.now()) }, { transaction });
    await auditBy(actor, 'place.removed', id, { name: place.name }, transaction);
    await notifyChange({ cellar: actor.cellarId, kind: 'lot', batch: null }, transaction);
  });
}
