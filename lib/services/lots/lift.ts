import { inTransaction } from '@/db/client';
import { writeLift } from '@/db/queries/lots';
import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import { systemClock, type Clock } from '@/lib/clock';
import type { LiftCaution, LotBody } from '@/lib/contracts/lots';
import { ConflictError } from '@/lib/errors';
import { auditBy } from '../audit/write';
import { notifyChange } from '../changes';
import { getLot } from './get';
import { loadLot } from './load';
import { writtenReason } from './reason';

/**
 * Takes the caution off a lot, with a brewer's written reason. The caution, the
 * reason and the name stay in the lot's history; a stop that was put aside when
 * it was bottled stays on the lot, and a bottle that gushes sets a caution anew.
 */
export async function liftCaution(actor: Actor, lotId: string, input: LiftCaution, clock: Clock = systemClock): Promise<LotBody> {
  authorize(actor, 'lots.override');
  const reason = writtenReason('reason', input.reason);
  return inTransaction(async (transaction) => {
    const lot = await loadLot(actor.cellarId, lotId, transaction);
    if (lot.caution === null) throw new ConflictError('There is no caution on this lot.');
    await writeLift({ cellarId: actor.cellarId, lotId, caution: lot.caution, reason, personId: actor.personId, at: new Date(clock.now()) }, transaction);
    await auditBy(actor, 'lot.caution-lifted', lotId, { code: lot.code, caution: lot.caution, reason }, transaction);
    await lot.update({ caution: null }, { transaction });
    await notifyChange({ cellar: actor.cellarId, kind: 'lot', batch: null }, transaction);
    return getLot(actor, lotId, clock, transaction);
  });
}
