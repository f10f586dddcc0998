import { randomBytes } from 'node:crypto';
import type { Sequelize } from 'sequelize';
import { afterAll, beforeAll, inject } from 'vitest';
import { closeDatabase, database } from '@/db/client';
import { forgetEnv } from '@/lib/config/env';
import { createDatabase, dropDatabase } from './databases';

/**
 * Gives the test file a migrated, empty database of its own, used by everything
 * in this process that asks `database()`.
 */
export function useDatabase(): { url: string; sequelize: Sequelize } {
  const held = { url: '', sequelize: undefined as unknown as Sequelize };
  const name = `fb_test_${randomBytes(6).toString('hex')}`;
  beforeAll(async () => {
    held.url = await createDatabase(inject('postgresUrl'), name, inject('templateDatabase'));
    process.env.DATABASE_URL = held.url;
    forgetEnv();
    held.sequelize = database();
  });
  afterAll(async () => {
    await closeDatabase();
    await dropDatabase(inject('postgresUrl'), name);
  });
  return held;
}
