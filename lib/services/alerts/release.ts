import type { Transaction } from 'sequelize';
import { Alert, Batch, Cellar } from '@/db/models';
import { saveAlertState } from '@/db/queries/alert-states';
import { step } from '@/lib/core/alerts/machine';
import { ruleNamed } from '@/lib/core/alerts/rules';
import { notifyChange } from '../changes';
import { lockAlert } from './load';
import { alertPayload } from './payload';
import { tell, toldFirst } from './tell';

/**
 * Gives back what somebody had in hand who can no longer look after it: the
 * alerts are open again, and those who tend the cellar now are told once more.
 */
export async function releaseAlerts(cellarId: string, personId: string, at: number, transaction: Transaction): Promise<void> {
  const held = await Alert.findAll({ attributes: ['id'], where: { cellarId, acknowledgedBy: personId, state: 'acknowledged' }, order: [['batchId', 'ASC'], ['id', 'ASC']], transaction });
  for (const { id } of held) await releaseAlert(cellarId, id, personId, at, transaction);
}

async function releaseAlert(cellarId: string, id: string, personId: string, at: number, transaction: Transaction): Promise<void> {
  const { alert, standing } = await lockAlert(cellarId, id, transaction);
  // The worker may have resolved it, or somebody taken it over, before the lock was ours.
  if (alert.state !== 'acknowledged' || alert.acknowledgedBy !== personId) return;
  await alert.update({ state: 'open', acknowledgedAt: null, acknowledgedBy: null, lookAgainAt: null }, { transaction });
  await notifyChange({ cellar: cellarId, kind: 'alert', batch: alert.batchId }, transaction);
  if (!standing) return;
  const rule = ruleNamed(standing.rule);
  await saveAlertState(alert.batchId, { ...standing, state: step(rule, standing.state, { type: 'release' }, at).state }, transaction);
  const batch = await Batch.findByPk(alert.batchId, { transaction, rejectOnEmpty: true });
  const cellar = await Cellar.findByPk(cellarId, { transaction, rejectOnEmpty: true });
  const payload = alertPayload({ alertId: id, rule, event: 'repeated', call: alert.evidence, since: alert.since.getTime(), at, batch, cellar });
  await tell({ cellarId, alertId: id, key: `alert:${id}:released-${at}`, payload, level: rule.level, at }, await toldFirst(cellarId, rule, transaction), transaction);
}
