import { QueryTypes, type Sequelize } from 'sequelize';
import { SequelizeStorage, Umzug } from 'umzug';
import * as first from './migrations/0001-first-tables';
import * as outboxRefusals from './migrations/0002-outbox-refusals';
import * as wholeJob from './migrations/0003-the-whole-job';
import * as judgement from './migrations/0004-judgement';
import * as people from './migrations/0006-people';
import * as sensorsAndData from './migrations/0007-sensors-and-data';
import * as messages from './migrations/0008-messages';
import * as rooms from './migrations/0009-rooms';
import * as archiveAndWebhooks from './migrations/0010-archive-and-webhooks';
import * as indexes from './migrations/0011-indexes';
import * as liftedCautions from './migrations/0012-lifted-cautions';
import * as currency from './migrations/0013-currency';
import type { Migration, Run } from './migrations/types';

/** In order. A migration that has landed is never edited; the next one mends it. */
const MIGRATIONS: ReadonlyArray<{ name: string; migration: Migration }> = [
  { name: '0001-first-tables', migration: first },
  { name: '0002-outbox-refusals', migration: outboxRefusals },
  { name: '0003-the-whole-job', migration: wholeJob },
  { name: '0004-judgement', migration: judgement },
  { name: '0006-people', migration: people },
  { name: '0007-sensors-and-data', migration: sensorsAndData },
  { name: '0008-messages', migration: messages },
  { name: '0009-rooms', migration: rooms },
  { name: '0010-archive-and-webhooks', migration: archiveAndWebhooks },
  { name: '0011-indexes', migration: indexes },
  { name: '0012-lifted-cautions', migration: liftedCautions },
  { name: '0013-currency', migration: currency },
];

/** Held while migrating, so that several processes that start together do it once. */
const LOCK = 7_021_984;

export function migrator(sequelize: Sequelize) {
  const inOneTransaction = (step: (run: Run) => Promise<void>) =>
    sequelize.transaction(async (transaction) => {
      await sequelize.query('set local statement_timeout = 0', { transaction });
      await step(async (sql) => {
        await sequelize.query(sql, { transaction, type: QueryTypes.RAW });
      });
    });

  return new Umzug({
    migrations: MIGRATIONS.map(({ name, migration }) => ({
      name,
      up: () => inOneTransaction(migration.up),
      down: () => inOneTransaction(migration.down),
    })),
    storage: new SequelizeStorage({ sequelize, tableName: 'migrations' }),
    logger: undefined,
  });
}

/** Brings the schema up to date. Returns the names of the migrations that ran. */
export async function migrate(sequelize: Sequelize): Promise<string[]> {
  return sequelize.transaction(async (transaction) => {
    await sequelize.query('set local statement_timeout = 0; set local idle_in_transaction_session_timeout = 0', { transaction });
    await sequelize.query('select pg_advisory_xact_lock(:lock)', { replacements: { lock: LOCK }, transaction });
    const done = await migrator(sequelize).up();
    return done.map((item) => item.name);
  });
}
