import { randomBytes } from 'node:crypto';
import { existsSync } from 'node:fs';
import { mkdtemp, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join, resolve } from 'node:path';
import { encode } from 'next-auth/jwt';
import { Client } from 'pg';
import type { Sequelize } from 'sequelize';
import { connect } from '@/db/client';
import { migrate } from '@/db/migrate';
import { SignIn } from '@/db/models';
import { buildWeb } from '../lib/build';
import { freePort, startCluster } from '../lib/postgres';
import { BENCH_DAYS, BENCH_END, fillCellar, fillReadings, READINGS_PER_BATCH, settle } from './fill';
import { runNext, startNext, type NextServer } from './server';

/**
 * How long the batch page's series and the shelf take over HTTP, beside their
 * floor in the same run: the plain bucket query on the same index, and a route of
 * the same framework that does nothing. Once with 100 batches of 90 days, and
 * again with 5 million rows in the table. All ways take turns, so that a busy
 * moment of the machine falls on all of them.
 */

const ROOT = resolve(import.meta.dirname, '../..');
const EMPTY_APP = join(import.meta.dirname, 'empty-app');
const BATCHES = 100;
const ROWS_LARGE = 5_000_000;
const POINTS = 400;
const ROUNDS = 60;
const SHELF_ROUNDS = 15;
const DAY_MS = 86_400_000;
const SHELF_DAYS = { back: 16, ahead: 8 };

interface Sample {
  median: number;
  p95: number;
}

function summary(times: number[]): Sample {
  const sorted = [...times].sort((a, b) => a - b);
  const at = (share: number) => Number((sorted[Math.min(sorted.length - 1, Math.floor(share * sorted.length))] ?? NaN).toFixed(2));
  return { median: at(0.5), p95: at(0.95) };
}

async function inTurns<K extends string>(rounds: number, ways: Record<K, () => Promise<unknown>>): Promise<Record<K, Sample>> {
  const names = Object.keys(ways) as K[];
  const times = Object.fromEntries(names.map((name) => [name, [] as number[]])) as Record<K, number[]>;
  for (let round = -5; round < rounds; round += 1) {
    for (const name of names) {
      const from = performance.now();
      await ways[name]();
      if (round >= 0) times[name].push(performance.now() - from);
    }
  }
  return Object.fromEntries(names.map((name) => [name, summary(times[name])])) as Record<K, Sample>;
}

const fetched = (url: string, cookie?: string) => async () => {
  const response = await fetch(url, { headers: cookie ? { cookie } : {} });
  if (!response.ok) throw new Error(`${url} answered ${response.status}: ${await response.text()}`);
  return response.json();
};

/** The plain way to a chart, as anybody would write it: mean, lowest and highest of each bucket. */
const PLAIN_SERIES = `
  select date_bin(make_interval(secs => $2::float8), r.measured_at, to_timestamp($3::float8)) as at, avg(r.gravity), min(r.gravity), max(r.gravity), avg(r.temperature)
  from assignments a join readings r on r.sensor_id = a.sensor_id and r.measured_at >= a.from_at and r.measured_at < coalesce(a.to_at, 'infinity')
  where a.batch_id = $1 group by 1 order by 1`;
const PLAIN_SHELF = `
  select a.batch_id, date_bin('1 hour', r.measured_at, 'epoch') as at, avg(r.gravity), avg(r.temperature)
  from assignments a join readings r on r.sensor_id = a.sensor_id and r.measured_at >= $1 and r.measured_at < $2
  where a.cellar_id = $3 group by 1, 2`;

interface Case {
  cellarId: string;
  batchId: string;
  cookie: string;
}

async function measure(name: string, bench: Case, sql: Client, web: NextServer, empty: NextServer) {
  const width = (BENCH_DAYS * 86_400) / POINTS;
  const shelf = { from: new Date(BENCH_END - SHELF_DAYS.back * DAY_MS), to: new Date(BENCH_END + SHELF_DAYS.ahead * DAY_MS) };
  const series = await inTurns(ROUNDS, {
    plainSql: () => sql.query({ name: 'plain-series', text: PLAIN_SERIES, values: [bench.batchId, width, (BENCH_END - BENCH_DAYS * DAY_MS) / 1000] }),
    emptyRoute: fetched(`${empty.url}/empty`),
    route: fetched(`${web.url}/api/v1/batches/${bench.batchId}/series?points=${POINTS}`, bench.cookie),
  });
  const lanes = await inTurns(SHELF_ROUNDS, {
    plainSql: () => sql.query({ name: 'plain-shelf', text: PLAIN_SHELF, values: [shelf.from, shelf.to, bench.cellarId] }),
    route: fetched(`${web.url}/api/v1/shelf?from=${shelf.from.toISOString()}&to=${shelf.to.toISOString()}`, bench.cookie),
  });
  const floor = series.plainSql.median + series.emptyRoute.median;
  const figures = {
    series_ms: series.route,
    series_floor_ms: { plain_sql: series.plainSql, empty_route: series.emptyRoute, sum_of_medians: Number(floor.toFixed(2)) },
    series_to_floor: Number((series.route.median / floor).toFixed(2)),
    shelf_ms: lanes.route,
    shelf_plain_sql_ms: lanes.plainSql,
    web_memory_mb: Math.round((await web.memory()) / 2 ** 20),
  };
  console.log(`${name}\n  series of ${BENCH_DAYS} days in ${POINTS} points: ${series.route.median} ms (p95 ${series.route.p95}); floor ${floor.toFixed(2)} ms = plain SQL ${series.plainSql.median} + empty route ${series.emptyRoute.median}; ${figures.series_to_floor} of it`);
  console.log(`  shelf with ${BATCHES} batches: ${lanes.route.median} ms (p95 ${lanes.route.p95}); its plain SQL ${lanes.plainSql.median} ms; web server ${figures.web_memory_mb} MB`);
  return figures;
}

async function signedIn(personId: string, secret: string): Promise<string> {
  const row = await SignIn.create({ personId, expiresAt: new Date(Date.now() + DAY_MS) });
  return `fallbright-session=${await encode({ token: { sub: personId, signInId: row.id }, secret })}`;
}

function finished(child: ReturnType<typeof runNext>): Promise<void> {
  return new Promise((done, fail) => child.once('exit', (code) => (code === 0 ? done() : fail(new Error(`next build ended with ${code}`)))));
}

async function grow(sequelize: Sequelize): Promise<number> {
  const others = Math.ceil(ROWS_LARGE / READINGS_PER_BATCH) - BATCHES;
  // Keys far from the cellar's own; a few sensors at a time keep each transaction small.
  for (let first = 1_000_000; first < 1_000_000 + others; first += 60) await fillReadings(sequelize, first, Math.min(first + 59, 1_000_000 + others - 1));
  return (BATCHES + others) * READINGS_PER_BATCH;
}

async function main(): Promise<void> {
  const folder = await mkdtemp(join(tmpdir(), 'fallbright-bench-'));
  const secret = randomBytes(32).toString('base64url');
  const cluster = await startCluster(join(folder, 'postgres'), await freePort());
  const sequelize = connect(cluster.url);
  const sql = new Client({ connectionString: cluster.url });
  const servers: NextServer[] = [];
  try {
    console.log('Building the web part and the empty route ...');
    await buildWeb(ROOT, '.next');
    // Turbopack would take the instrumentation of the project around it.
    if (!existsSync(join(EMPTY_APP, '.next-empty/BUILD_ID'))) await finished(runNext('build', EMPTY_APP, ['--webpack'], {}));
    await migrate(sequelize);
    await sql.connect();
    console.log(`Writing ${BATCHES} batches of ${BENCH_DAYS} days ...`);
    const made = await fillCellar(sequelize, BATCHES);
    await settle(sql);
    const bench = { ...made, cookie: await signedIn(made.personId, secret) };

    const empty = await startNext(EMPTY_APP, '/empty', () => ({}));
    servers.push(empty);
    const web = await startNext(ROOT, '/api/health', (port, url) => ({ PORT: String(port), PUBLIC_URL: url, HOST: '127.0.0.1', DATABASE_URL: cluster.url, AUTH_SECRET: secret, DATA_DIR: folder, LOG_LEVEL: 'warn', NEXT_DIST_DIR: '.next' }));
    servers.push(web);

    const small = await measure(`With ${(BATCHES * READINGS_PER_BATCH).toLocaleString('en')} rows`, bench, sql, web, empty);
    console.log('Writing more sensors, to 5 million rows ...');
    const rows = await grow(sequelize);
    await settle(sql);
    const large = await measure(`With ${rows.toLocaleString('en')} rows`, bench, sql, web, empty);
    const growth = { series: Number((large.series_ms.median / small.series_ms.median).toFixed(2)), shelf: Number((large.shelf_ms.median / small.shelf_ms.median).toFixed(2)) };
    console.log(JSON.stringify({ small, large, large_to_small: growth }));
  } finally {
    for (const server of servers) await server.stop();
    await sql.end().catch(() => undefined);
    await sequelize.close();
    await cluster.stop('immediate');
    await rm(folder, { recursive: true, force: true });
  }
}

await main();
