import { QueryTypes, type Transaction } from 'sequelize';
import { database } from '../client';

/** The state kept under that name, locked until the transaction ends; null at the first time. */
export async function lockSystemState<S>(rule: string, transaction: Transaction): Promise<S | null> {
  await database().query(`insert into system_states (rule, state) values ($rule, 'null') on conflict do nothing`, { bind: { rule }, transaction });
  const [row] = await database().query<{ state: S | null }>(`select state from system_states where rule = $rule for update`, { bind: { rule }, type: QueryTypes.SELECT, transaction });
  return row?.state ?? null;
}

export async function saveSystemState(rule: string, state: unknown, transaction: Transaction): Promise<void> {
  await database().query(`update system_states set state = $state, updated_at = now() where rule = $rule`, { bind: { rule, state: JSON.stringify(state) }, transaction });
}
