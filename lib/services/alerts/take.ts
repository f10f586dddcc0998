import type { Transaction } from 'sequelize';
import { saveAlertState } from '@/db/queries/alert-states';
import { dropHeld } from '@/db/queries/outbox';
import type { Actor } from '@/lib/auth/policies';
import { step } from '@/lib/core/alerts/machine';
import { ruleNamed } from '@/lib/core/alerts/rules';
import { ConflictError, InvalidError } from '@/lib/errors';
import { auditBy } from '../audit/write';
import { notifyChange } from '../changes';
import { lockAlert } from './load';

interface Taking {
  note: string | null;
  look_again_at: string | null;
  /** Refuses where somebody has it: a link in a mail takes nothing out of another's hands. */
  onlyOpen?: boolean;
}

/** Puts the alert into the actor's hands; whoever was still to be told is not. @throws ConflictError, and InvalidError for a look again that would be due already */
export async function takeAlert(actor: Actor, id: string, { note, look_again_at, onlyOpen = false }: Taking, now: number, transaction: Transaction): Promise<void> {
  const { alert, standing } = await lockAlert(actor.cellarId, id, transaction);
  if (alert.state === 'resolved') throw new ConflictError('This alert has passed already; nobody needs to take it.');
  if (onlyOpen && alert.state === 'acknowledged') throw new ConflictError('Somebody has it already.');
  const lookAgainAt = look_again_at === null ? null : new Date(look_again_at);
  if (lookAgainAt && lookAgainAt.getTime() <= now) throw new InvalidError('That time is past.', { look_again_at: ['must lie ahead'] });
  if (standing) {
    const { state } = step(ruleNamed(standing.rule), standing.state, { type: 'take', lookAgainAt: lookAgainAt?.getTime() ?? null }, now);
    await saveAlertState(alert.batchId, { ...standing, state }, transaction);
  }
  await alert.update({ state: 'acknowledged', acknowledgedAt: new Date(now), acknowledgedBy: actor.personId, note, lookAgainAt }, { transaction });
  await dropHeld(id, new Date(now), 'somebody had it before its time came', transaction);
  await auditBy(actor, 'alert.acknowledge', id, { note, look_again_at, ...(onlyOpen && { by: 'link' }) }, transaction);
  await notifyChange({ cellar: actor.cellarId, kind: 'alert', batch: alert.batchId }, transaction);
}
