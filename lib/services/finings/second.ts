import { inTransaction } from '@/db/client';
import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import { systemClock, type Clock } from '@/lib/clock';
import type { FiningBody, SecondDoseForm } from '@/lib/contracts/family';
import { auditBy } from '../audit/write';
import { notAhead } from '../not-ahead';
import { giveSecond } from './dose';
import { presentFining } from './present';

/** The second dose of a fining went in. */
export async function secondDose(actor: Actor, finingId: string, input: SecondDoseForm, clock: Clock = systemClock): Promise<FiningBody> {
  authorize(actor, 'jobs.do');
  const at = notAhead(input.at, clock.now());
  return inTransaction(async (transaction) => {
    const run = await giveSecond(actor, finingId, { at, text: input.text, dose: input.dose, clientId: input.client_id }, transaction);
    await auditBy(actor, 'fining.second', finingId, { batch: run.batchId }, transaction);
    return presentFining(run, clock.now());
  });
}
