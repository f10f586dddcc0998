import { afterAll, afterEach, beforeAll, expect, it } from 'vitest';
import { QueryTypes } from 'sequelize';
import type { Batch } from '@/db/models';
import { CHANGES_CHANNEL } from '@/lib/contracts/events';
import { useDatabase } from '../support/database';
import { buildBatch, buildCellar, buildMember, buildSensor, writeReadings } from '../support/factories';
import { BEER, healthyBeer } from '../support/ferments';
import { startMailServer, type MailServer } from '../support/mail-server';
import { startProcess, until, type Running } from '../support/processes';

const db = useDatabase();
const HOUR = 3_600_000;

let mail: MailServer;
let worker: Running | null = null;
const start = async (...args: string[]) => (worker = await startProcess('broker/worker.ts', { DATABASE_URL: db.url, SMTP_URL: mail.url, PUBLIC_URL: 'https://barn.example' }, 'worker ready', args));

beforeAll(async () => {
  mail = await startMailServer();
});
afterEach(async () => {
  worker?.kill('SIGKILL');
  await worker?.ended;
  worker = null;
});
afterAll(() => mail.stop());

/** A beer two days old that turned too warm some hours ago, and a person to be told. */
async function warmBeer() {
  const cellar = await buildCellar();
  const keeper = await buildMember('keeper', { cellarId: cellar.id });
  const pitchedAt = Math.floor(Date.now() / HOUR) * HOUR - 48 * HOUR;
  const batch = await buildBatch({ ...BEER, cellarId: cellar.id, pitchedAt: new Date(pitchedAt) });
  const { sensor } = await buildSensor({ batch });
  const readings = healthyBeer(pitchedAt, 49, (hour) => (hour > 40 ? 27 : 20));
  return { cellar, keeper, batch, sensor, readings };
}

const tell = (cellar: string, batch: string, kind = 'reading') => db.sequelize.query('select pg_notify($1, $2)', { bind: [CHANGES_CHANNEL, JSON.stringify({ cellar, kind, batch })] });
const assessedAt = async (batch: string) => (await db.sequelize.query<{ at: number }>('select extract(epoch from assessed_at)::float8 as at from batch_states where batch_id = $1', { bind: [batch], type: QueryTypes.SELECT }))[0]?.at ?? null;

it('goes from a reading’s word to a mail that names the vessel and the figure', async () => {
  const { cellar, keeper, batch, sensor, readings } = await warmBeer();
  await start('--spacing-ms', '200', '--tick-ms', '600000');
  await until('the first judgement of all', () => assessedAt(batch.id));
  await writeReadings(sensor.id, readings);
  await tell(cellar.id, batch.id);
  const taken = await until('the mail', () => mail.taken.find((item) => item.to[0] === keeper.person.email), 45_000);
  expect(taken.subject).toBe(`Check: ${batch.name}: Too warm: 27.0 °C`);
  expect(taken.text).toContain(`https://barn.example/batches/${batch.id}`);
  expect(taken.text).toContain('27.0 °C (limit 22.0 °C)');
});

it('judges a batch again and again though nothing is said', async () => {
  const { batch } = await warmBeer();
  await start('--tick-ms', '300', '--idle-ms', '300', '--spacing-ms', '300');
  const first = await until('the first judgement', () => assessedAt(batch.id));
  await until('the next one', async () => (await assessedAt(batch.id)) !== first, 5_000);
});

it('judges a batch only as often as asked after readings', async () => {
  const { cellar, batch, sensor, readings } = await warmBeer();
  await writeReadings(sensor.id, readings);
  await start('--spacing-ms', '8000', '--tick-ms', '600000');
  const first = await until('the tick at the start', () => assessedAt(batch.id));
  for (let index = 0; index < 20; index += 1) await tell(cellar.id, batch.id);
  const second = await until('the judgement after readings', async () => {
    const at = await assessedAt(batch.id);
    return at === first ? null : at;
  }, 30_000);
  // Counted from the beginning of a judgement, which itself takes a while on a busy machine.
  expect(second - first).toBeGreaterThanOrEqual(3);
});

it('judges at once what a person logged', async () => {
  const { cellar, batch } = await warmBeer();
  await start('--spacing-ms', '600000', '--tick-ms', '600000');
  const first = await until('the tick at the start', () => assessedAt(batch.id));
  await tell(cellar.id, batch.id, 'entry');
  await until('the judgement after the entry', async () => (await assessedAt(batch.id)) !== first, 5_000);
});

it('hears again after its connection was cut, and finds what was said meanwhile', async () => {
  const { cellar, batch } = await warmBeer();
  await start('--spacing-ms', '200', '--tick-ms', '600000');
  await until('the tick at the start', () => assessedAt(batch.id));
  await db.sequelize.query(`select pg_terminate_backend(pid) from pg_stat_activity where application_name = 'fallbright listen' and datname = current_database()`);
  const other = await buildBatch({ ...BEER, cellarId: cellar.id });
  await until('a batch made while nobody listened', () => assessedAt(other.id));
  const before = await assessedAt(batch.id);
  await until('a change that is heard again', async () => {
    await tell(cellar.id, batch.id);
    return (await assessedAt(batch.id)) !== before;
  });
});

it('says that it lives, drops what is old, and stops within ten seconds when told to', async () => {
  const { batch } = await warmBeer();
  await db.sequelize.query(`insert into refusals (received_at, road, reason, body) values (now() - interval '31 days', 'mqtt', 'old', ''), (now() - interval '29 days', 'mqtt', 'young', '')`);
  const running = await start('--spacing-ms', '200', '--tick-ms', '1000');
  await until('a sign of life', async () => (await db.sequelize.query(`select 1 from heartbeats where part = 'worker' and instance like '%:${running.pid}' and at > now() - interval '6 seconds'`, { type: QueryTypes.SELECT })).length);
  await until('a judgement', () => assessedAt(batch.id));
  const reasons = await db.sequelize.query<{ reason: string }>('select reason from refusals', { type: QueryTypes.SELECT });
  expect(reasons).toEqual([{ reason: 'young' }]);
  const told = Date.now();
  running.kill('SIGTERM');
  expect(await running.ended).toBe(0);
  expect(Date.now() - told).toBeLessThan(10_000);
});

it('is shared by two workers without an alert or a mail coming twice', async () => {
  const cellar = await buildCellar();
  const people = await Promise.all([buildMember('keeper', { cellarId: cellar.id }), buildMember('hand', { cellarId: cellar.id })]);
  const batches: Batch[] = [];
  for (let index = 0; index < 8; index += 1) {
    const pitchedAt = Math.floor(Date.now() / HOUR) * HOUR - 30 * HOUR;
    const batch = await buildBatch({ ...BEER, cellarId: cellar.id, pitchedAt: new Date(pitchedAt) });
    const { sensor } = await buildSensor({ batch });
    await writeReadings(sensor.id, healthyBeer(pitchedAt, 31, (hour) => (hour > 22 ? 27 : 20)));
    batches.push(batch);
  }
  const options = ['--spacing-ms', '100', '--tick-ms', '200', '--idle-ms', '200'];
  const second = await startProcess('broker/worker.ts', { DATABASE_URL: db.url, SMTP_URL: mail.url, PUBLIC_URL: 'https://barn.example' }, 'worker ready', options);
  try {
    await start(...options);
    const told = (email: string) => mail.taken.filter((item) => item.to[0] === email);
    await until('every batch in somebody’s mail', () => people.every(({ person }) => batches.every((batch) => told(person.email).some((item) => item.text.includes(batch.id)))), 40_000);
    const counts = await db.sequelize.query<{ alerts: string; mails: string; attempts: number }>(
      `select (select count(*) from alerts where cellar_id = $1) as alerts, (select count(*) from outbox where cellar_id = $1) as mails, (select max(attempts) from outbox where cellar_id = $1) as attempts`,
      { bind: [cellar.id], type: QueryTypes.SELECT },
    );
    expect(counts.map((row) => [Number(row.alerts), Number(row.mails), row.attempts])).toEqual([[8, 16, 1]]);
  } finally {
    second.kill('SIGKILL');
    await second.ended;
  }
});
