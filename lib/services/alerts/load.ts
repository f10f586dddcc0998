import type { Transaction } from 'sequelize';
import { Alert } from '@/db/models';
import { findAlerts } from '@/db/queries/alerts';
import { lockAlertStates, type AlertStateRow } from '@/db/queries/alert-states';
import type { AlertBody } from '@/lib/contracts/alerts';
import { NotFoundError } from '@/lib/errors';
import { presentAlert } from './present';

/**
 * The alert, where it is the cellar's, with the state of its rule, both locked.
 * The states are locked before the alert, as the worker does it, so that the
 * two never wait for each other.
 * @throws NotFoundError for another cellar's alert as for none at all.
 */
export async function lockAlert(cellarId: string, id: string, transaction: Transaction): Promise<{ alert: Alert; standing: AlertStateRow | null }> {
  const found = await Alert.findOne({ where: { id, cellarId }, transaction });
  if (!found) throw new NotFoundError('alert');
  const standing = (await lockAlertStates(found.batchId, transaction)).find((row) => row.alertId === id) ?? null;
  const alert = await Alert.findByPk(id, { transaction, lock: transaction.LOCK.UPDATE, rejectOnEmpty: true });
  return { alert, standing };
}

/** The alert as it goes over the wire. */
export async function alertBody(cellarId: string, id: string, transaction: Transaction): Promise<AlertBody> {
  const [row] = await findAlerts({ cellarId, id, limit: 1 }, transaction);
  if (!row) throw new NotFoundError('alert');
  return presentAlert(row);
}
