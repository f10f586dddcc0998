import { existsSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { Client } from 'pg';
import { AUTH_SECRET_FILE, DATABASE_URL_FILE, databaseUrl, env, forgetEnv, storageUrl } from '@/lib/config/env';
import { objectStore } from '@/lib/storage/objects';
import type { Place } from './backup';
import { makeDataFolder } from './data-folder';
import { startCluster, type Cluster } from './postgres';
import { startLocalStorage, type LocalStorage } from './storage';

/** Files of the data folder that the rows belong with: shared links and devices are signed by them. */
const HOUSE_FILES = [AUTH_SECRET_FILE, 'push.keys'];

export interface House extends Place {
  keepHouseFile(name: string, text: string): Promise<void>;
  close(): Promise<void>;
}

async function answers(url: string): Promise<boolean> {
  const client = new Client({ connectionString: url, connectionTimeoutMillis: 3_000 });
  try {
    await client.connect();
    return true;
  } catch {
    return false;
  } finally {
    await client.end().catch(() => undefined);
  }
}

async function ownDatabase(cluster: Cluster): Promise<string> {
  const client = new Client({ connectionString: cluster.url });
  await client.connect();
  const { rowCount } = await client.query(`select 1 from pg_database where datname = 'fallbright'`);
  if (!rowCount) await client.query('create database fallbright');
  await client.end();
  const url = new URL(cluster.url);
  url.pathname = '/fallbright';
  return url.toString();
}

/** The house's database and storage, running or not: what start would start is started for as long as it is needed. */
export async function openHouse(): Promise<House> {
  const { DATA_DIR, DATABASE_URL, S3_ENDPOINT, S3_BUCKET, PGPORT_LOCAL } = env();
  makeDataFolder(DATA_DIR);
  let cluster: Cluster | null = null;
  let url = DATABASE_URL ?? (existsSync(join(DATA_DIR, DATABASE_URL_FILE)) ? databaseUrl() : null);
  if (DATABASE_URL === undefined && (url === null || !(await answers(url)))) {
    cluster = await startCluster(join(DATA_DIR, 'postgres'), PGPORT_LOCAL);
    url = await ownDatabase(cluster);
    writeFileSync(join(DATA_DIR, DATABASE_URL_FILE), url, { mode: 0o600 });
  }
  let storage: LocalStorage | null = null;
  if (S3_ENDPOINT === undefined && !(await fetch(storageUrl(), { signal: AbortSignal.timeout(3_000) }).catch(() => null))) {
    storage = await startLocalStorage({ directory: join(DATA_DIR, 'uploads'), port: 0, bucket: S3_BUCKET });
    process.env.S3_PORT = String(storage.port);
    forgetEnv();
  }
  return {
    databaseUrl: url!,
    store: objectStore(),
    houseFiles: Object.fromEntries(HOUSE_FILES.filter((name) => existsSync(join(DATA_DIR, name))).map((name) => [name, readFileSync(join(DATA_DIR, name), 'utf8')])),
    keepHouseFile: async (name, text) => {
      if (HOUSE_FILES.includes(name)) writeFileSync(join(DATA_DIR, name), text, { mode: 0o600 });
    },
    close: async () => {
      await storage?.close();
      await cluster?.stop();
    },
  };
}
