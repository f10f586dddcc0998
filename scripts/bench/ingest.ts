import { execFile, spawn } from 'node:child_process';
import { mkdtemp, readFile, rm } from 'node:fs/promises';
import { cpus, tmpdir } from 'node:os';
import { join, resolve } from 'node:path';
import { promisify } from 'node:util';
import { Client } from 'pg';
import { connect } from '@/db/client';
import { migrate } from '@/db/migrate';
import { Assignment, Batch, Cellar, Sensor } from '@/db/models';
import { hashSensorSecret } from '@/lib/auth/sensors';
import { env } from '@/lib/config/env';
import { freePort, startCluster } from '../lib/postgres';
import type { Outcome, Plan } from './publisher';

/**
 * `npm run bench:ingest`: from a sensor's publish to a committed row, with sign-in,
 * checks, doubles and the latest reading, beside the floor measured in the same
 * run: the bare broker library with acknowledgement after commit, and the plain
 * batched insert. Ratios travel between machines; rows per second do not.
 * The database is the one of DATABASE_URL, else a fresh one with default settings.
 */
const ROOT = resolve(import.meta.dirname, '../..');
const ROUNDS = 5;
const SENSORS = 200;
const MESSAGES = 20_000;
const RATED_MESSAGES = 4_000;
const DOUBLE_EVERY = 20;
const SECRET = 'the same for all: this is a benchmark';
const run = promisify(execFile);

type Side = 'floor' | 'ours';
interface Mode {
  name: string;
  inFlight: number;
  rate: number;
  messages: number;
}
const MODES: Mode[] = [
  { name: 'flat out, 5 in flight', inFlight: 5, rate: 0, messages: MESSAGES },
  { name: 'flat out, 1 in flight', inFlight: 1, rate: 0, messages: MESSAGES },
  { name: '1,000 a second', inFlight: 1, rate: 1_000, messages: RATED_MESSAGES },
];

const median = (values: number[]) => [...values].sort((a, b) => a - b)[Math.floor(values.length / 2)]!;

async function startServer(args: string[], variables: Record<string, string>, ready: string) {
  const child = spawn(process.execPath, ['--import', 'tsx', ...args], { cwd: ROOT, env: { ...process.env, ...variables }, stdio: ['ignore', 'pipe', 'inherit'] });
  await new Promise<void>((done, fail) => {
    child.stdout.on('data', (text: Buffer) => {
      if (text.toString().includes(ready)) done();
    });
    child.once('exit', (code) => fail(new Error(`${args[0]} ended with ${code} before it was ready`)));
  });
  return {
    /** Processor time so far, s: fields 14 and 15 of proc(5), in ticks of 10 ms. It does not depend on what else runs. */
    cpuSeconds: async () => {
      const fields = (await readFile(`/proc/${child.pid}/stat`, 'utf8')).split(') ')[1]!.split(' ');
      return (Number(fields[11]) + Number(fields[12])) / 100;
    },
    memoryMb: async () => Number(/VmRSS:\s+(\d+)/.exec(await readFile(`/proc/${child.pid}/status`, 'utf8'))?.[1] ?? NaN) / 1024,
    stop: () =>
      new Promise<void>((done) => {
        child.removeAllListeners('exit').once('exit', () => done());
        child.kill('SIGTERM');
      }),
  };
}

async function prepare(url: string) {
  const sequelize = connect(url);
  await migrate(sequelize);
  const cellar = await Cellar.create({ name: 'Bench' });
  const sensors = await Sensor.bulkCreate(Array.from({ length: SENSORS }, (_, index) => ({ cellarId: cellar.id, identifier: `fs-bench-${index}-${Date.now().toString(36)}`, secretHash: hashSensorSecret(SECRET), name: `Float ${index}` })));
  for (const sensor of sensors) {
    const batch = await Batch.create({ cellarId: cellar.id, name: sensor.name, kind: 'beer', drinkColour: 'amber', vesselKind: 'carboy', volumeL: 9, vesselL: 10, neck: 'airlock' });
    await Assignment.create({ cellarId: cellar.id, sensorId: sensor.id, batchId: batch.id, fromAt: new Date('2020-01-01T00:00:00Z') });
  }
  await sequelize.query(`drop table if exists floor_readings`);
  await sequelize.query(`create table floor_readings (sensor_id integer not null, measured_at timestamptz not null, received_at timestamptz not null, gravity double precision, temperature real, battery real, signal real, primary key (sensor_id, measured_at))`);
  return { sequelize, cellar, sensors: sensors.map((sensor) => ({ identifier: sensor.identifier, secret: SECRET })) };
}

async function publish(plan: Plan): Promise<Outcome> {
  const { stdout } = await run(process.execPath, ['--import', 'tsx', 'scripts/bench/publisher.ts', JSON.stringify(plan)], { cwd: ROOT, maxBuffer: 1 << 24 });
  return JSON.parse(stdout) as Outcome;
}

/** Rows a second of the insert alone, over one connection: what no broker in front can beat. */
async function plainInsert(url: string, from: number): Promise<number> {
  const client = new Client({ connectionString: url });
  await client.connect();
  const batches = 100;
  const began = performance.now();
  for (let batch = 0; batch < batches; batch += 1) {
    const list = (of: (index: number) => unknown) => `{${Array.from({ length: 500 }, (_, index) => of(index)).join(',')}}`;
    await client.query({
      name: 'plain',
      text: `insert into floor_readings select * from unnest($1::int[], $2::timestamptz[], $3::timestamptz[], $4::float8[], $5::real[], $6::real[], $7::real[]) on conflict do nothing`,
      values: [list((index) => index % SENSORS), list((index) => new Date(from + (batch * 500 + index) * 1000).toISOString()), list(() => new Date(from).toISOString()), list(() => 1.048), list(() => 19.62), list(() => 3.91), list(() => -67)],
    });
  }
  const rate = (batches * 500) / ((performance.now() - began) / 1000);
  await client.end();
  return rate;
}

async function main(): Promise<void> {
  const given = env().DATABASE_URL;
  const folder = given ? null : await mkdtemp(join(tmpdir(), 'fallbright-bench-'));
  const cluster = folder ? await startCluster(join(folder, 'postgres'), await freePort()) : null;
  const url = given ?? cluster!.url;
  const servers: Array<{ stop: () => Promise<void> }> = [];
  try {
    const { sequelize, sensors } = await prepare(url);
    const ports = { floor: await freePort(20_000), ours: await freePort(26_000) };
    const floor = await startServer(['scripts/bench/floor-broker.ts', String(ports.floor), url], {}, 'floor ready');
    servers.push(floor);
    const ours = await startServer(['broker/server.ts'], { DATABASE_URL: url, MQTT_PORT: String(ports.ours), LOG_LEVEL: 'info', NODE_ENV: 'production' }, 'broker ready');
    servers.push(ours);

    const processes = { floor, ours };

    // Every run has a stretch of time of its own, so that only the doubles meant to be are doubles.
    let from = Date.parse('2020-01-01T00:00:00Z');
    const one = async (side: Side, mode: Mode) => {
      const cpuBefore = await processes[side].cpuSeconds();
      const outcome = await publish({ port: ports[side], sensors, messages: mode.messages, inFlight: mode.inFlight, rate: mode.rate, doubleEvery: DOUBLE_EVERY, from });
      const { rows } = await sequelize.query(`select count(*)::int as n from ${side === 'ours' ? 'readings' : 'floor_readings'} where measured_at >= '${new Date(from).toISOString()}'`).then(([list]) => ({ rows: (list as Array<{ n: number }>)[0]!.n }));
      if (rows !== outcome.distinct) throw new Error(`${side}, ${mode.name}: ${outcome.distinct} distinct readings were acknowledged and ${rows} are in the table.`);
      return { ...outcome, cpuMicros: (((await processes[side].cpuSeconds()) - cpuBefore) * 1e6) / mode.messages };
    };

    for (const side of ['floor', 'ours'] as const) await one(side, { name: 'warm-up', inFlight: 5, rate: 0, messages: MESSAGES });
    const result: Record<string, unknown> = {};
    for (const mode of MODES) {
      const outcomes: Record<Side, Array<Awaited<ReturnType<typeof one>>>> = { floor: [], ours: [] };
      for (let round = 0; round < ROUNDS; round += 1) {
        from += 30 * 86_400_000;
        for (const side of round % 2 === 0 ? (['floor', 'ours'] as const) : (['ours', 'floor'] as const)) outcomes[side].push(await one(side, mode));
      }
      const figures = (side: Side) => ({ per_second: Math.round(median(outcomes[side].map((item) => item.perSecond))), p50_ms: round2(median(outcomes[side].map((item) => item.p50))), p99_ms: round2(median(outcomes[side].map((item) => item.p99))), cpu_us: Math.round(median(outcomes[side].map((item) => item.cpuMicros))) });
      const [f, o] = [figures('floor'), figures('ours')];
      const ratio = median(outcomes.ours.map((item, index) => item.perSecond / outcomes.floor[index]!.perSecond));
      const p99Ratio = median(outcomes.ours.map((item, index) => item.p99 / outcomes.floor[index]!.p99));
      result[mode.name] = { floor: f, ours: o, ratio: round2(ratio), p99_ratio: round2(p99Ratio) };
      console.log(`${mode.name.padEnd(24)} floor ${String(f.per_second).padStart(6)}/s p50 ${f.p50_ms} p99 ${f.p99_ms} ms ${f.cpu_us} µs   ours ${String(o.per_second).padStart(6)}/s p50 ${o.p50_ms} p99 ${o.p99_ms} ms ${o.cpu_us} µs   ratio ${round2(ratio)}`);
    }
    const inserts: number[] = [];
    for (let round = 0; round < 3; round += 1) inserts.push(await plainInsert(url, Date.parse('2019-01-01T00:00:00Z') + round * 30 * 86_400_000));
    result['plain insert, 500 a batch'] = { per_second: Math.round(median(inserts)) };
    console.log(`plain insert, 500 a batch: ${Math.round(median(inserts))} rows/s`);
    const memory = Math.round(await ours.memoryMb());
    await sequelize.query('drop table floor_readings');
    await sequelize.close();
    console.log(JSON.stringify({ bench: 'ingest', cpus: cpus().length, rounds: ROUNDS, sensors: SENSORS, ...result, broker_memory_mb: memory }));
  } finally {
    await Promise.all(servers.map((server) => server.stop()));
    await cluster?.stop('immediate');
    if (folder) await rm(folder, { recursive: true, force: true });
  }
}

const round2 = (value: number) => Math.round(value * 100) / 100;

await main();
