import { inTransaction } from '@/db/client';
import { Opening } from '@/db/models';
import { addBottles, takeBottles } from '@/db/queries/lots';
import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import { systemClock, type Clock } from '@/lib/clock';
import type { LotBody, OpenBottles } from '@/lib/contracts/lots';
import { ConflictError, InvalidError, NotFoundError } from '@/lib/errors';
import { auditBy } from '../audit/write';
import { notifyChange } from '../changes';
import { notAhead } from '../not-ahead';
import { getLot } from './get';
import { markGushed } from './gushed';
import { loadBottle, loadLot } from './load';

/** Opened, given away, broken or gushed. A gush is a caution on the whole lot, and a job for now. */
export async function openBottles(actor: Actor, lotId: string, input: OpenBottles, clock: Clock = systemClock): Promise<LotBody> {
  authorize(actor, 'lots.serve');
  const at = notAhead(input.at, clock.now());
  return inTransaction(async (transaction) => {
    const lot = await loadLot(actor.cellarId, lotId, transaction);
    const known = input.client_id === null ? null : await Opening.findOne({ where: { cellarId: actor.cellarId, clientId: input.client_id }, transaction });
    if (known && known.lotId !== lotId) throw new ConflictError('This was sent for another lot.');
    if (known) return getLot(actor, lotId, clock, transaction);
    const bottle = await loadBottle(lot, input.bottle_id, transaction);
    if (!(await takeBottles({ lotBottleId: bottle.id, placeId: input.place_id }, input.count, transaction))) throw new InvalidError('There are not so many.', { count: ['not so many stand there'] });
    const opening = await Opening.create(
      { cellarId: actor.cellarId, lotId, lotBottleId: bottle.id, placeId: input.place_id, kind: input.kind, count: input.count, at, givenTo: input.to, note: input.note, personId: actor.personId, clientId: input.client_id },
      { transaction },
    );
    if (input.kind === 'gushed') await markGushed(lot, new Date(clock.now()), transaction);
    await auditBy(actor, `lot.${input.kind}`, lotId, { opening: opening.id, count: input.count }, transaction);
    await notifyChange({ cellar: actor.cellarId, kind: 'lot', batch: null }, transaction);
    return getLot(actor, lotId, clock, transaction);
  });
}

/** Puts bottles back that were not opened after all. A caution stays: it costs nothing, and may be right. */
export async function undoOpening(actor: Actor, lotId: string, openingId: string, clock: Clock = systemClock): Promise<void> {
  authorize(actor, 'lots.serve');
  await inTransaction(async (transaction) => {
    await loadLot(actor.cellarId, lotId, transaction);
    const opening = await Opening.findOne({ where: { id: openingId, lotId, removedAt: null }, transaction, lock: transaction.LOCK.UPDATE });
    if (!opening) throw new NotFoundError('opening');
    await opening.update({ removedAt: new Date(clock.now()) }, { transaction });
    await addBottles({ cellarId: actor.cellarId, lotBottleId: opening.lotBottleId, placeId: opening.placeId }, opening.count, transaction);
    await auditBy(actor, 'lot.opening-undone', lotId, { opening: openingId, kind: opening.kind, count: opening.count }, transaction);
    await notifyChange({ cellar: actor.cellarId, kind: 'lot', batch: null }, transaction);
  });
}
