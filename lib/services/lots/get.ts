import type { Transaction } from 'sequelize';
import { LotBottle } from '@/db/models';
import { findLots, liftedOfLot, movesOfLot, nextTimeOfLot, openingsOfLot, standsOfLot } from '@/db/queries/lots';
import { authorize } from '@/lib/auth/authorize';
import { may, type Actor } from '@/lib/auth/policies';
import { systemClock, type Clock } from '@/lib/clock';
import type { LotBody } from '@/lib/contracts/lots';
import { NotFoundError } from '@/lib/errors';
import { presentWhole } from './present';

/** One lot: where it stands, what became of it, and how the bench judged it. */
export async function getLot(actor: Actor, id: string, clock: Clock = systemClock, transaction?: Transaction): Promise<LotBody> {
  authorize(actor, 'lots.read');
  const [row] = await findLots({ cellarId: actor.cellarId, id, limit: 1 }, transaction);
  if (!row) throw new NotFoundError('lot');
  const bottles = await LotBottle.findAll({ where: { lotId: id }, order: [['position', 'ASC']], transaction });
  const stands = await standsOfLot(id, transaction);
  const openings = await openingsOfLot(id, transaction);
  const moves = await movesOfLot(id, transaction);
  const lifted = await liftedOfLot(actor.cellarId, id, transaction);
  const body = presentWhole(row, { bottles, stands, openings, moves, lifted, nextTime: await nextTimeOfLot(id, transaction) }, clock.now());
  // Whom a bottle was given to is the household's matter.
  return may(actor.role, 'lots.serve') ? body : { ...body, openings: body.openings.map((opening) => ({ ...opening, to: null, note: null })) };
}
