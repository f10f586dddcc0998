import '@/lib/config/dot-env';
import { randomBytes } from 'node:crypto';
import { existsSync, readFileSync, writeFileSync } from 'node:fs';
import { join, resolve } from 'node:path';
import { Client } from 'pg';
import { AUTH_SECRET_FILE, DATABASE_URL_FILE, EnvError, FIRST_S3_PORT, parseEnv, STORAGE_URL_FILE, type Env } from '@/lib/config/env';
import { buildWeb } from './lib/build';
import { takeDataFolder } from './lib/data-folder';
import { portIsFree, startCluster, type Cluster } from './lib/postgres';
import { Processes, waitUntil } from './lib/processes';

const ROOT = resolve(import.meta.dirname, '..');
const dev = process.argv.includes('--dev');
const began = Date.now();

/** A sentence for the person at the terminal; ends the start. */
class StartError extends Error {}

const say = (sentence: string) => console.log(`  ${sentence}`);

async function timed<T>(what: string, work: () => Promise<T>): Promise<T> {
  process.stdout.write(`  ${what} ...`);
  const from = Date.now();
  try {
    const result = await work();
    process.stdout.write(` done in ${((Date.now() - from) / 1000).toFixed(1)} s\n`);
    return result;
  } catch (error) {
    process.stdout.write(' failed\n');
    throw error;
  }
}

async function checkPorts(env: Env, mailbox: boolean, storage: boolean): Promise<void> {
  const wanted: Array<[string, number]> = [['PORT', env.PORT]];
  if (!env.MQTT_URL) wanted.push(['MQTT_PORT', env.MQTT_PORT]);
  if (mailbox) wanted.push(['MAILBOX_SMTP_PORT', env.MAILBOX_SMTP_PORT], ['MAILBOX_PORT', env.MAILBOX_PORT]);
  if (storage && env.S3_PORT !== undefined) wanted.push(['S3_PORT', env.S3_PORT]);
  const seen = new Map<number, string>();
  for (const [name, port] of wanted) {
    const twin = seen.get(port);
    if (twin) throw new StartError(`${twin} and ${name} are both ${port}. Give each a port of its own.`);
    seen.set(port, name);
    if (!(await portIsFree(port, env.HOST))) throw new StartError(`Port ${port} (${name}) is taken by another program. Stop that program, or set ${name} to a free port.`);
  }
}

function keepAuthSecret(env: Env): string {
  if (env.AUTH_SECRET) return env.AUTH_SECRET;
  const file = join(env.DATA_DIR, AUTH_SECRET_FILE);
  if (!existsSync(file)) writeFileSync(file, randomBytes(32).toString('base64url'), { mode: 0o600 });
  return readFileSync(file, 'utf8').trim();
}

/** The local storage's port: the one that was given, else the first free one. */
async function chooseStoragePort(env: Env): Promise<number> {
  if (env.S3_PORT !== undefined) return env.S3_PORT;
  const others = [env.PORT, env.MQTT_PORT, env.MAILBOX_SMTP_PORT, env.MAILBOX_PORT];
  for (let port = FIRST_S3_PORT; port < FIRST_S3_PORT + 200; port += 1) if (!others.includes(port) && (await portIsFree(port, '127.0.0.1'))) return port;
  throw new StartError(`No port is free from ${FIRST_S3_PORT} on. Set S3_PORT to a free one.`);
}

async function createDatabase(adminUrl: string, name: string): Promise<string> {
  const client = new Client({ connectionString: adminUrl });
  await client.connect();
  try {
    const { rowCount } = await client.query('select 1 from pg_database where datname = $1', [name]);
    if (!rowCount) await client.query(`create database ${client.escapeIdentifier(name)}`);
  } finally {
    await client.end();
  }
  const url = new URL(adminUrl);
  url.pathname = `/${name}`;
  return url.toString();
}

async function openDatabase(env: Env): Promise<{ url: string; cluster: Cluster | null }> {
  if (env.DATABASE_URL) return { url: env.DATABASE_URL, cluster: null };
  const cluster = await startCluster(join(env.DATA_DIR, 'postgres'), env.PGPORT_LOCAL);
  const url = await createDatabase(cluster.url, 'fallbright');
  writeFileSync(join(env.DATA_DIR, DATABASE_URL_FILE), url, { mode: 0o600 });
  return { url, cluster };
}

async function main(): Promise<void> {
  console.log('Fallbright');
  const env = parseEnv(process.env);
  // Asked before SMTP_URL is filled in for the parts.
  const mailbox = !process.env.SMTP_URL;
  const storage = !env.S3_ENDPOINT;
  const releaseFolder = await takeDataFolder(env.DATA_DIR);
  let cluster: Cluster | null = null;
  let stopping: Promise<void> | undefined;
  const building = new AbortController();
  const processes = new Processes(join(env.DATA_DIR, 'log'), say);

  const stop = () =>
    (stopping ??= (async () => {
      building.abort();
      await processes.stop();
      await cluster?.stop();
      await releaseFolder();
    })());
  for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP'] as const)
    process.on(signal, () => {
      if (!stopping) console.log('\n  Stopping ...');
      void stop().then(() => process.exit(0));
    });

  try {
    await checkPorts(env, mailbox, storage);
    const opened = await timed(env.DATABASE_URL ? 'Reaching PostgreSQL' : 'Starting PostgreSQL', () => openDatabase(env));
    cluster = opened.cluster;
    const common = {
      NODE_ENV: dev ? 'development' : 'production',
      NEXT_TELEMETRY_DISABLED: '1',
      DATABASE_URL: opened.url,
      AUTH_SECRET: keepAuthSecret(env),
      DATA_DIR: env.DATA_DIR,
      PUBLIC_URL: env.PUBLIC_URL,
      SMTP_URL: env.SMTP_URL,
    } as const;
    Object.assign(process.env, common);

    // Only now do these see the database's address.
    const { prepareDatabase } = await import('./lib/prepare');
    const prepared = await timed('Bringing the tables up to date', () => prepareDatabase({ demo: process.env.DEMO ? env.DEMO : null }));
    if (prepared.seededBatches > 0) say(`The demo cellar was filled: ${prepared.seededBatches} batches.`);

    if (!dev) await timed('Building the web part (half a minute when something changed)', () => buildWeb(ROOT, '.next', building.signal));

    const tsx = (file: string, ...args: string[]) => ['--import', 'tsx', join(ROOT, file), ...args];
    if (mailbox) processes.start({ name: 'mailbox', args: tsx('scripts/fakes/mailbox.ts') });
    if (storage) {
      const port = await chooseStoragePort(env);
      writeFileSync(join(env.DATA_DIR, STORAGE_URL_FILE), `http://127.0.0.1:${port}`);
      processes.start({ name: 'storage', args: tsx('scripts/fakes/storage.ts'), env: { S3_PORT: String(port) } });
    }
    processes.start(env.MQTT_URL ? { name: 'subscriber', args: tsx('broker/subscriber.ts') } : { name: 'broker', args: tsx('broker/server.ts') });
    processes.start({ name: 'worker', args: tsx('broker/worker.ts') });
    processes.start({ name: 'web', args: [join(ROOT, 'node_modules/next/dist/bin/next'), dev ? 'dev' : 'start', '-H', env.HOST, '-p', String(env.PORT)] });
    if (existsSync(join(env.DATA_DIR, 'simulators.json'))) processes.start({ name: 'simulators', args: tsx('devices/simulator/main.ts') });

    const base = `http://${env.HOST === '0.0.0.0' ? '127.0.0.1' : env.HOST}:${env.PORT}`;
    await timed('Waiting for every part', () =>
      waitUntil(`Fallbright (see ${join(env.DATA_DIR, 'log')})`, async () => (await fetch(`${base}/api/health`, { signal: AbortSignal.timeout(3_000) })).ok, dev ? 120_000 : 60_000),
    );
    console.log(`Ready: ${base}  (${((Date.now() - began) / 1000).toFixed(0)} s)`);
    if (mailbox) console.log(`  Mailbox: http://127.0.0.1:${env.MAILBOX_PORT}`);
    console.log(env.MQTT_URL ? `  Sensors: ${env.MQTT_URL}` : `  Sensors: mqtt://${env.HOST}:${env.MQTT_PORT}`);
    if (prepared.empty) console.log('  Nobody can sign in yet. Run: npm run keeper -- you@your.example "Name of the cellar"');
    if (prepared.demoSignIns.length > 0) {
      console.log('  Demo sign-ins:');
      for (const { role, email, password } of prepared.demoSignIns) console.log(`    ${role.padEnd(7)} ${email.padEnd(28)} ${password}`);
    }
    console.log('  Ctrl-C stops everything; the data stays.');
  } catch (error) {
    if (stopping) return;
    console.error(error instanceof StartError || error instanceof EnvError ? error.message : `Fallbright did not start: ${(error as Error).message}`);
    await stop();
    process.exit(1);
  }
}

main().catch((error: unknown) => {
  console.error(error instanceof Error ? error.message : error);
  process.exit(1);
});
