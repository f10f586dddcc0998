import { UniqueConstraintError } from 'sequelize';
import { inTransaction } from '@/db/client';
import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import { systemClock, type Clock } from '@/lib/clock';
import type { LotBody, UpdateLot } from '@/lib/contracts/lots';
import { InvalidError } from '@/lib/errors';
import { auditBy } from '../audit/write';
import { notifyChange } from '../changes';
import { getLot } from './get';
import { loadLot } from './load';

/** Changes what is written of a lot. What was judged, and an override, cannot be changed. */
export async function updateLot(actor: Actor, id: string, input: UpdateLot, clock: Clock = systemClock): Promise<LotBody> {
  authorize(actor, 'lots.update');
  try {
    return await inTransaction(async (transaction) => {
      const lot = await loadLot(actor.cellarId, id, transaction);
      if (input.ready_from !== undefined && Date.parse(input.ready_from) < lot.bottledAt.getTime()) throw new InvalidError('It cannot be ready before it was bottled.', { ready_from: ['is before the day it was bottled'] });
      await lot.update(
        {
          ...(input.name !== undefined && { name: input.name }),
          ...(input.code !== undefined && { code: input.code }),
          ...(input.note !== undefined && { note: input.note }),
          ...(input.ready_from !== undefined && { readyFrom: new Date(input.ready_from) }),
          ...(input.next_time !== undefined && { nextTime: input.next_time, nextTimeBy: actor.personId, nextTimeAt: new Date(clock.now()) }),
        },
        { transaction },
      );
      await auditBy(actor, 'lot.updated', id, { fields: Object.keys(input) }, transaction);
      await notifyChange({ cellar: actor.cellarId, kind: 'lot', batch: lot.batchId }, transaction);
      return getLot(actor, id, clock, transaction);
    });
  } catch (error) {
    if (error instanceof UniqueConstraintError) throw new InvalidError('This code is taken.', { code: ['another lot has it'] });
    throw error;
  }
}
