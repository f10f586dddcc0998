import { inTransaction } from '@/db/client';
import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import { systemClock, type Clock } from '@/lib/clock';
import type { AcknowledgeAlert, AlertBody } from '@/lib/contracts/alerts';
import { alertBody } from './load';
import { takeAlert } from './take';

/**
 * A person has it in hand: it is not said again, except to them when they want
 * to look again. Somebody else may take it over.
 * @throws ConflictError where it has passed already.
 */
export async function acknowledgeAlert(actor: Actor, id: string, input: AcknowledgeAlert, { clock = systemClock }: { clock?: Clock } = {}): Promise<AlertBody> {
  authorize(actor, 'alerts.acknowledge');
  return inTransaction(async (transaction) => {
    await takeAlert(actor, id, input, clock.now(), transaction);
    return alertBody(actor.cellarId, id, transaction);
  });
}
