import { afterAll, afterEach, beforeAll, describe, expect, it } from 'vitest';
import { QueryTypes } from 'sequelize';
import { Alert, OutboxMail, type Batch } from '@/db/models';
import { CHANGES_CHANNEL } from '@/lib/contracts/events';
import { useDatabase } from '../support/database';
import { buildBatch, buildCellar, buildMember, buildSensor, writeReadings } from '../support/factories';
import { BEER, healthyBeer } from '../support/ferments';
import { startMailServer, type MailServer } from '../support/mail-server';
import { startProcess, until, type Running } from '../support/processes';
import { seeded } from '../support/random';

const db = useDatabase();
const HOUR = 3_600_000;
const BATCHES = 36;
const KILLS = 6;
const SEED = 20260301;

let mail: MailServer;
let worker: Running | null = null;
beforeAll(async () => {
  mail = await startMailServer();
});
afterEach(async () => {
  worker?.kill('SIGKILL');
  await worker?.ended;
});
afterAll(() => mail.stop());

const startWorker = () =>
  startProcess('broker/worker.ts', { DATABASE_URL: db.url, SMTP_URL: mail.url, PUBLIC_URL: 'https://barn.example', LOG_LEVEL: 'info' }, 'worker ready', ['--spacing-ms', '300', '--tick-ms', '1000', '--idle-ms', '1500', '--send-timeout-ms', '2000']);

/** Any batch has been judged after that moment. */
const judgedAfter = async (moment: number) => ((await db.sequelize.query<{ at: number | null }>('select extract(epoch from max(assessed_at))::float8 * 1000 as at from batch_states', { type: QueryTypes.SELECT }))[0]?.at ?? 0) > moment;

describe('kill -9 of the worker while batches turn bad', () => {
  it(`owes every opened alert exactly one mail to each person, and sends each at least once, over ${KILLS} kills at random moments`, async () => {
    const random = seeded(SEED);
    // Slow enough that kills fall between the server's "taken" and our note of it.
    mail.slowMs = 150;
    const pitchedAt = Math.floor(Date.now() / HOUR) * HOUR - 30 * HOUR;
    const batches: Array<{ batch: Batch; sensor: number; people: string[] }> = [];
    for (let index = 0; index < BATCHES; index += 1) {
      // Each in a cellar of its own, so that nobody's mails go together.
      const cellar = await buildCellar();
      const people = await Promise.all((['keeper', 'brewer', 'hand'] as const).map(async (role) => (await buildMember(role, { cellarId: cellar.id })).person.email));
      const batch = await buildBatch({ ...BEER, cellarId: cellar.id, pitchedAt: new Date(pitchedAt) });
      batches.push({ batch, sensor: (await buildSensor({ batch })).sensor.id, people });
    }

    worker = await startWorker();
    const recoveries: number[] = [];
    let loading = true;
    // One batch after another turns too warm hours ago, and the worker is told.
    const load = (async () => {
      for (const { batch, sensor } of batches) {
        await writeReadings(sensor, healthyBeer(pitchedAt, 31, (hour) => (hour > 22 ? 27 : 20)));
        await db.sequelize.query('select pg_notify($1, $2)', { bind: [CHANGES_CHANNEL, JSON.stringify({ cellar: batch.cellarId, kind: 'reading', batch: batch.id })] });
        await new Promise((next) => setTimeout(next, 200 + random() * 800));
      }
      loading = false;
    })();
    for (let kill = 0; kill < KILLS; kill += 1) {
      await new Promise((next) => setTimeout(next, random() * 5_000));
      worker.kill('SIGKILL');
      await worker.ended;
      const died = Date.now();
      worker = await startWorker();
      await until('a judgement after the restart', () => judgedAfter(died), 60_000);
      recoveries.push(Date.now() - died);
    }
    await load;
    expect(loading).toBe(false);

    await until('every alert and its mails', async () => (await OutboxMail.count({ where: { sentAt: null } })) === 0 && (await Alert.count({ where: { call: 'temperature' } })) === BATCHES, 90_000);
    // Nothing more comes: another tick finds nothing new to tell.
    const owed = await OutboxMail.count();
    const drained = Date.now();
    await until('one more round of judgements', () => judgedAfter(drained + 1_500), 60_000);
    expect(await OutboxMail.count()).toBe(owed);
    worker.kill('SIGTERM');
    expect(await worker.ended).toBe(0);

    const alerts = await Alert.findAll();
    const entries = await OutboxMail.findAll();
    expect(new Set(alerts.map((alert) => `${alert.batchId} ${alert.call}`)).size).toBe(alerts.length);
    expect(entries).toHaveLength(alerts.length * 3);
    expect(new Set(entries.map((entry) => `${entry.alertId} ${entry.personId}`)).size).toBe(entries.length);

    const told = (email: string, batch: string) => mail.taken.filter((item) => item.to[0] === email && item.text.includes(batch)).length;
    const unheard = batches.flatMap(({ batch, people }) => people.filter((email) => told(email, batch.id) === 0));
    expect(unheard).toEqual([]);
    const doubles = mail.taken.length - new Set(mail.taken.map((item) => item.messageId)).size;
    // A kill between the server's "taken" and our note of it sends that one mail again.
    expect(doubles).toBeLessThanOrEqual(KILLS);
    console.info(JSON.stringify({ fault: 'F2', seed: SEED, kills: KILLS, alerts: alerts.length, outbox: entries.length, mails: mail.taken.length, doubles, recovery_ms: recoveries }));
  });
});
