import type { Client, QueryResult, QueryResultRow } from 'pg';
import type { Sequelize, Transaction } from 'sequelize';

/** A statement that each connection parses and plans once. */
export interface Prepared {
  name: string;
  text: string;
}

/**
 * Runs a prepared statement on a connection of the pool, by itself (it commits
 * alone) unless a transaction is named. Sequelize would send its text anew each time: at the ingest's rate that
 * costs as much as the insert.
 */
export async function runPrepared<R extends QueryResultRow>(sequelize: Sequelize, statement: Prepared, values: unknown[], transaction?: Transaction): Promise<QueryResult<R>> {
  // Sequelize keeps the transaction's connection there; its types do not say so.
  if (transaction) return (transaction as Transaction & { connection: Client }).connection.query<R>({ ...statement, values });
  const connection = (await sequelize.connectionManager.getConnection({ type: 'write' })) as Client;
  try {
    return await connection.query<R>({ ...statement, values });
  } finally {
    sequelize.connectionManager.releaseConnection(connection);
  }
}
