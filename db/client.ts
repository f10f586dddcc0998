import pg from 'pg';
import { Sequelize, type Transaction } from 'sequelize';
import { databaseUrl } from '@/lib/config/env';
import { initModels } from './models';

// bigint keys are counters far below 2^53: numbers are safe and easier to use.
pg.types.setTypeParser(pg.types.builtins.INT8, Number);

/**
 * Sequelize hears a connection's errors only some way after its sign-in. A server
 * that dies in between says so in the same packet, and an error nobody hears ends
 * the process; the pool finds such a connection dead at its next question.
 */
class HeardClient extends pg.Client {
  constructor(config?: string | pg.ClientConfig) {
    super(config);
    this.on('error', () => undefined);
  }
}

const POOL = { max: 10, acquire: 5_000, idle: 10_000 };
const STATEMENT_TIMEOUT_MS = 30_000;

/** Opens a pool with the models registered. Callers that make their own close it. */
export function connect(url: string, options: { max?: number; applicationName?: string } = {}): Sequelize {
  const sequelize = new Sequelize(url, {
    dialect: 'postgres',
    dialectModule: { ...pg, Client: HeardClient },
    logging: false,
    pool: { ...POOL, max: options.max ?? POOL.max },
    dialectOptions: {
      application_name: options.applicationName ?? 'fallbright',
      statement_timeout: STATEMENT_TIMEOUT_MS,
      idle_in_transaction_session_timeout: STATEMENT_TIMEOUT_MS,
      connectionTimeoutMillis: 5_000,
    },
    define: { underscored: true, timestamps: false },
  });
  initModels(sequelize);
  return sequelize;
}

let shared: Sequelize | undefined;

/** The process's own pool. Models are bound to it, so the first call must come before any query. */
export function database(): Sequelize {
  shared ??= connect(databaseUrl());
  return shared;
}

/** Runs `work` in one transaction; it commits when the promise fulfils and rolls back when it rejects. */
export function inTransaction<T>(work: (transaction: Transaction) => Promise<T>): Promise<T> {
  return database().transaction(work);
}

export async function closeDatabase(): Promise<void> {
  await shared?.close();
  shared = undefined;
}
