import { mkdtemp, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import type { TestProject } from 'vitest/node';
import { connect } from '@/db/client';
import { migrate } from '@/db/migrate';
import { freePort, startCluster } from '@/scripts/lib/postgres';
import { createDatabase, dropDatabase } from './databases';

declare module 'vitest' {
  interface ProvidedContext {
    postgresUrl: string;
    templateDatabase: string;
  }
}

/**
 * A PostgreSQL of the tests' own (TEST_DATABASE_URL names another one, for a
 * quick run), with a migrated template from which each file copies its database.
 */
export default async function setup(project: TestProject) {
  const given = process.env.TEST_DATABASE_URL;
  const folder = given ? null : await mkdtemp(join(tmpdir(), 'fallbright-tests-'));
  const cluster = folder ? await startCluster(join(folder, 'postgres'), await freePort(), { max_connections: '200', fsync: 'off' }) : null;
  const url = given ?? cluster!.url;

  const template = `fb_template_${process.pid}_${project.name}`;
  const templateUrl = await createDatabase(url, template);
  const sequelize = connect(templateUrl);
  await migrate(sequelize);
  await sequelize.close();
  project.provide('postgresUrl', url);
  project.provide('templateDatabase', template);

  return async () => {
    await dropDatabase(url, template);
    await cluster?.stop('immediate');
    if (folder) await rm(folder, { recursive: true, force: true });
  };
}
