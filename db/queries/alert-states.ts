import { QueryTypes, type Transaction } from 'sequelize';
import type { AlertState } from '../../lib/core/alerts/machine';
import { database } from '../client';

export interface AlertStateRow {
  rule: string;
  state: AlertState;
  alertId: string | null;
}

/** The states of all rules of a batch, locked: who acts on them waits for who is at it. */
export function lockAlertStates(batchId: string, transaction: Transaction): Promise<AlertStateRow[]> {
  return database().query<AlertStateRow>(`select rule, state, alert_id as "alertId" from alert_states where batch_id = $batchId order by rule for update`, {
    bind: { batchId },
    type: QueryTypes.SELECT,
    transaction,
  });
}

export async function saveAlertState(batchId: string, { rule, state, alertId }: AlertStateRow, transaction: Transaction): Promise<void> {
  await database().query(
    `insert into alert_states (batch_id, rule, state, alert_id, updated_at) values ($batchId, $rule, $state, $alertId, now())
     on conflict (batch_id, rule) do update set state = excluded.state, alert_id = excluded.alert_id, updated_at = now()`,
    { bind: { batchId, rule, state: JSON.stringify(state), alertId }, transaction },
  );
}

/**
 * Tries to be the only one that judges this batch until the transaction ends,
 * so that several workers can run beside each other.
 */
export async function tryLockBatch(batchId: string, transaction: Transaction): Promise<boolean> {
  const [row] = await database().query<{ locked: boolean }>(`select pg_try_advisory_xact_lock(hashtextextended($key, 0)) as locked`, {
    bind: { key: `assess:${batchId}` },
    type: QueryTypes.SELECT,
    transaction,
  });
  return row?.locked ?? false;
}
