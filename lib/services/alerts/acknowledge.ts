import { inTransaction } from '@/db/client';
import { saveAlertState } from '@/db/queries/alert-states';
import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import { systemClock, type Clock } from '@/lib/clock';
import type { AcknowledgeAlert, AlertBody } from '@/lib/contracts/alerts';
import { step } from '@/lib/core/alerts/machine';
import { ruleNamed } from '@/lib/core/alerts/rules';
import { ConflictError } from '@/lib/errors';
import { auditBy } from '../audit/write';
import { notifyChange } from '../changes';
import { alertBody, lockAlert } from './load';

/**
 * A person has it in hand: it is not said again, except to them when they want
 * to look again. Somebody else may take it over.
 * @throws ConflictError where it has passed already.
 */
export async function acknowledgeAlert(actor: Actor, id: string, { note, look_again_at }: AcknowledgeAlert, { clock = systemClock }: { clock?: Clock } = {}): Promise<AlertBody> {
  authorize(actor, 'alerts.acknowledge');
  return inTransaction(async (transaction) => {
    const { alert, standing } = await lockAlert(actor.cellarId, id, transaction);
    if (alert.state === 'resolved') throw new ConflictError('This alert has passed already; nobody needs to take it.');
    const now = clock.now();
    const lookAgainAt = look_again_at === null ? null : new Date(look_again_at);
    if (standing) {
      const { state } = step(ruleNamed(standing.rule), standing.state, { type: 'take', lookAgainAt: lookAgainAt?.getTime() ?? null }, now);
      await saveAlertState(alert.batchId, { ...standing, state }, transaction);
    }
    await alert.update({ state: 'acknowledged', acknowledgedAt: new Date(now), acknowledgedBy: actor.personId, note, lookAgainAt }, { transaction });
    await auditBy(actor, 'alert.acknowledge', id, { note, look_again_at }, transaction);
    await notifyChange({ cellar: actor.cellarId, kind: 'alert', batch: alert.batchId }, transaction);
    return alertBody(actor.cellarId, id, transaction);
  });
}
