import type { Transaction } from 'sequelize';
import { database } from '@/db/client';
import { CHANGES_CHANNEL, type Change } from '../contracts/events';

/** Says that something changed, once `transaction` commits; with a rollback nothing is said. It carries no data. */
export async function notifyChange(change: Change, transaction: Transaction): Promise<void> {
  await database().query('select pg_notify($channel, $payload)', { bind: { channel: CHANGES_CHANNEL, payload: JSON.stringify(change) }, transaction });
}
