import type { Transaction } from 'sequelize';
import { inTransaction } from '@/db/client';
import type { Lot } from '@/db/models';
import { addBottles, takeBottles, writeMove } from '@/db/queries/lots';
import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import { systemClock, type Clock } from '@/lib/clock';
import type { LotBody, MoveBottles } from '@/lib/contracts/lots';
import { ConflictError, InvalidError } from '@/lib/errors';
import { auditBy } from '../audit/write';
import { notifyChange } from '../changes';
import { roomFor } from '../places/room';
import { getLot } from './get';
import { keptBench } from './kept';
import { loadBottle, loadLot } from './load';
import { writtenReason } from './reason';
import { tooWarm } from './warmth';

/**
 * Moves bottles to another place, if it has room. A place warmer than the bottles
 * were judged for is a stop as on the bench: where they would pass their rating,
 * only a brewer's written reason moves them there, and it stays on the lot.
 */
export async function moveBottles(actor: Actor, lotId: string, input: MoveBottles, clock: Clock = systemClock): Promise<LotBody> {
  authorize(actor, 'lots.serve');
  if (input.from_place_id === input.to_place_id) throw new InvalidError('They stand there already.', { to_place_id: ['choose another place'] });
  const now = new Date(clock.now());
  return inTransaction(async (transaction) => {
    const lot = await loadLot(actor.cellarId, lotId, transaction);
    const bottle = await loadBottle(lot, input.bottle_id, transaction);
    const to = input.to_place_id === null ? null : await roomFor(actor.cellarId, input.to_place_id, input.count, transaction);
    const warm = to && tooWarm(keptBench(lot.bench), bottle, to);
    if (warm) {
      if (!warm.overridable || input.override_reason === null) throw new ConflictError(`Do not move them there. ${warm.sentence}`);
      authorize(actor, 'lots.override');
      await cautionMoved(lot, `Moved against a stop: ${warm.sentence} Eye protection and gloves; keep it boxed; open outdoors.`, { overrideReason: writtenReason('override_reason', input.override_reason), overrideBy: actor.personId, overrideAt: now }, transaction);
    }
    const reason = warm && input.override_reason !== null ? input.override_reason.trim() : null;
    if (!(await takeBottles({ lotBottleId: bottle.id, placeId: input.from_place_id }, input.count, transaction))) throw new InvalidError('There are not so many.', { count: ['not so many stand there'] });
    await addBottles({ cellarId: actor.cellarId, lotBottleId: bottle.id, placeId: input.to_place_id }, input.count, transaction);
    await writeMove({ cellarId: actor.cellarId, lotId, lotBottleId: bottle.id, fromPlace: input.from_place_id, toPlace: input.to_place_id, count: input.count, at: now, personId: actor.personId, overrideReason: reason }, transaction);
    await auditBy(actor, reason === null ? 'lot.moved' : 'lot.moved-against-a-stop', lotId, { bottle: bottle.id, from: input.from_place_id, to: input.to_place_id, count: input.count, reason }, transaction);
    await notifyChange({ cellar: actor.cellarId, kind: 'lot', batch: null }, transaction);
    return getLot(actor, lotId, clock, transaction);
  });
}

/** What stood on the lot before stays: neither an earlier caution nor the reason for an earlier stop is written over. The move keeps its own reason. */
async function cautionMoved(lot: Lot, caution: string, override: Pick<Lot, 'overrideReason' | 'overrideBy' | 'overrideAt'>, transaction: Transaction): Promise<void> {
  const words = lot.caution === null ? caution : lot.caution.includes(caution) ? lot.caution : `${lot.caution} ${caution}`;
  await lot.update({ caution: words, ...(lot.overrideReason === null && override) }, { transaction });
}
