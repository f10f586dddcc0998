import type { Transaction } from 'sequelize';
import type { z } from 'zod';
import { inTransaction } from '@/db/client';
import { saveAlertState } from '@/db/queries/alert-states';
import { dropHeld } from '@/db/queries/outbox';
import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import { systemClock, type Clock } from '@/lib/clock';
import type { AlertBody, resolveAlert as resolveInput } from '@/lib/contracts/alerts';
import { step } from '@/lib/core/alerts/machine';
import { ruleNamed } from '@/lib/core/alerts/rules';
import { ConflictError } from '@/lib/errors';
import { auditBy } from '../audit/write';
import { notifyChange } from '../changes';
import { alertBody, lockAlert } from './load';

/**
 * A person says that it was no fault, or that it is done. The rule then stays
 * quiet until the condition has really gone and come back.
 * @throws ConflictError where it has passed already.
 */
export async function resolveAlert(actor: Actor, id: string, { note }: z.infer<typeof resolveInput>, { clock = systemClock }: { clock?: Clock } = {}): Promise<AlertBody> {
  authorize(actor, 'alerts.resolve');
  return inTransaction(async (transaction) => {
    if (!(await clearAlert(actor, id, note, clock.now(), transaction))) throw new ConflictError('This alert has passed already.');
    return alertBody(actor.cellarId, id, transaction);
  });
}

/** The same inside another use case. False where it has passed already. */
export async function clearAlert(actor: Actor, id: string, note: string | null, now: number, transaction: Transaction): Promise<boolean> {
  const { alert, standing } = await lockAlert(actor.cellarId, id, transaction);
  if (alert.state === 'resolved') return false;
  if (standing) {
    const { state } = step(ruleNamed(standing.rule), standing.state, { type: 'clear' }, now);
    await saveAlertState(alert.batchId, { ...standing, state }, transaction);
  }
  await alert.update({ state: 'resolved', resolvedAt: new Date(now), resolvedBy: actor.personId, ...(note === null ? {} : { note }) }, { transaction });
  await dropHeld(id, new Date(now), 'it was cleared before its time came', transaction);
  await auditBy(actor, 'alert.resolve', id, { note }, transaction);
  await notifyChange({ cellar: actor.cellarId, kind: 'alert', batch: alert.batchId }, transaction);
  return true;
}
