import { inTransaction } from '@/db/client';
import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import { systemClock, type Clock } from '@/lib/clock';
import type { MustBody, MustSheetBody } from '@/lib/contracts/musts';
import { auditBy } from '../audit/write';
import { getMust } from './get';
import { writeMust } from './write';

/** Writes a new must sheet, in its first version. */
export async function createMust(actor: Actor, sheet: MustSheetBody, clock: Clock = systemClock): Promise<MustBody> {
  authorize(actor, 'musts.write');
  return inTransaction(async (transaction) => {
    const must = await writeMust(actor, { sheet, changeNote: null }, new Date(clock.now()), transaction);
    await auditBy(actor, 'must.created', must.id, { name: sheet.name }, transaction);
    return getMust(actor, must.id, {}, transaction);
  });
}
