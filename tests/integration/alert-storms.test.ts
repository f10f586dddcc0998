import { beforeEach, describe, expect, it } from 'vitest';
import { inTransaction } from '@/db/client';
import { Alert, OutboxMail, type Batch } from '@/db/models';
import { ManualClock } from '@/lib/clock';
import { RULE_NAMES, ruleNamed, type RuleName } from '@/lib/core/alerts/rules';
import { evaluateAlerts } from '@/lib/services/alerts/evaluate';
import { watchIngest } from '@/lib/services/alerts/watch-ingest';
import { assessBatch } from '@/lib/services/batches/assess';
import { beatAge } from '@/lib/services/heartbeat';
import { freePort } from '@/scripts/lib/postgres';
import { useDatabase } from '../support/database';
import { buildBatch, buildCellar, buildMember, buildSensor, writeReadings, type ReadingInput } from '../support/factories';
import { BEER, healthyBeer } from '../support/ferments';
import { startProcess, until } from '../support/processes';
import { seeded } from '../support/random';
import { assessmentWith, callWith } from '../unit/alerts/assessments';

const db = useDatabase();
const MINUTE = 60_000;
const HOUR = 60 * MINUTE;
const DAY = 24 * HOUR;
const NOW = Math.floor(Date.now() / HOUR) * HOUR;

beforeEach(() => db.sequelize.query('truncate cellars, people, heartbeats, system_states cascade'));

/** A beer pitched `days` ago in a cellar with one keeper. */
async function beer(days: number, cellarId?: string) {
  const cellar = cellarId ?? (await buildCellar()).id;
  if (!cellarId) await buildMember('keeper', { cellarId: cellar });
  const pitchedAt = NOW - days * DAY;
  const batch = await buildBatch({ ...BEER, cellarId: cellar, pitchedAt: new Date(pitchedAt) });
  const { sensor } = await buildSensor({ batch });
  return { batch, sensor: sensor.id, pitchedAt, cellarId: cellar };
}

/** Judges as the worker does, every `every` from `from` to `to`. */
async function judge(batch: Batch, from: number, to: number, every: number, silenceCounts = true): Promise<void> {
  for (let now = from; now <= to; now += every) await assessBatch(batch.id, { clock: new ManualClock(now), silenceCounts });
}

const story = async (batchId: string) => (await Alert.findAll({ where: { batchId }, order: ['openedAt', 'call'] })).map((alert) => `${alert.call} ${alert.kind} ${alert.state}`);

describe('a value that flaps around its limit', () => {
  it.each<[RuleName, number]>([
    ['temperature', 15 * MINUTE],
    ['temperature', 3 * HOUR],
    ['stalled', 15 * MINUTE],
    ['foam', 2 * HOUR],
    ['bottle', 7 * HOUR],
    ['sensor', 45 * MINUTE],
  ])('opens at most once in each rest and closes at most once for each opening: %s, 1,000 crossings every %i ms', async (name, every) => {
    const rule = ruleNamed(name);
    const { batch, cellarId } = await beer(3);
    const cellar = { id: cellarId, name: 'Low barn', timeZone: 'UTC' };
    for (let crossing = 0; crossing < 1_000; crossing += 1) {
      const at = NOW + crossing * every;
      // Proven for long: the pending time alone holds nothing back.
      const call = callWith(crossing % 2 ? rule.verdicts[0]! : 'no', { kind: rule.kinds?.[0] ?? 'high', since: at - DAY });
      await inTransaction((transaction) =>
        evaluateAlerts({ batch, cellar, assessment: assessmentWith(at, { calls: { [rule.call]: call } }), context: { neck: 'airlock', events: [], silenceCounts: true }, at }, transaction),
      );
    }
    const sent = (await OutboxMail.findAll()).map((mail) => (mail.payload as { event: string }).event);
    const windows = Math.ceil((1_000 * every) / rule.restMs);
    const openings = sent.filter((event) => event === 'opened').length;
    expect(openings).toBeGreaterThanOrEqual(1);
    expect(openings).toBeLessThanOrEqual(windows);
    expect(sent.filter((event) => event === 'resolved').length).toBeLessThanOrEqual(openings);
  });
});

describe('readings that come late', () => {
  it('raise no alarm about last month: 10,000 points back-filled in any order', async () => {
    const { batch, sensor, pitchedAt } = await beer(60);
    // A month of it, with three days far too warm and a stall, that ended a month ago.
    const old: ReadingInput[] = Array.from({ length: 10_000 }, (_, index) => {
      const day = (index * 4.32 * MINUTE) / DAY;
      return { at: pitchedAt + day * DAY, gravity: Math.max(1.03, 1.05 - 0.005 * day), temperature: day > 10 && day < 13 ? 31 : 20, receivedAt: NOW - 1 };
    });
    const random = seeded(7);
    await writeReadings(sensor, old.map((reading) => ({ reading, key: random() })).toSorted((a, b) => a.key - b.key).map(({ reading }) => reading));
    await judge(batch, NOW, NOW + 3 * HOUR, 15 * MINUTE);
    expect((await story(batch.id)).filter((line) => !line.startsWith('sensor silent'))).toEqual([]);
  });

  it('open an alert at once where they prove that it is so, and still is', async () => {
    const { batch, sensor, pitchedAt } = await beer(2);
    const all = healthyBeer(pitchedAt, 49, (hour) => (hour > 40 ? 27 : 20));
    await writeReadings(sensor, all.slice(0, 39));
    await judge(batch, NOW, NOW, HOUR);
    expect(await story(batch.id)).not.toContain('temperature high open');
    await writeReadings(sensor, all.slice(39).map((reading) => ({ ...reading, receivedAt: NOW })));
    await judge(batch, NOW + MINUTE, NOW + MINUTE, MINUTE);
    const [alert] = await Alert.findAll({ where: { batchId: batch.id, call: 'temperature' } });
    expect(alert).toMatchObject({ state: 'open', kind: 'high', openedAt: new Date(NOW + MINUTE) });
    expect(alert!.since.getTime()).toBeLessThan(NOW - 4 * HOUR);
  });

  it('do not open what they show to be over', async () => {
    const { batch, sensor, pitchedAt } = await beer(2);
    const all = healthyBeer(pitchedAt, 49, (hour) => (hour > 34 && hour < 42 ? 27 : 20));
    await writeReadings(sensor, all.slice(0, 33));
    await judge(batch, NOW, NOW, HOUR);
    await writeReadings(sensor, all.slice(33).map((reading) => ({ ...reading, receivedAt: NOW })));
    await judge(batch, NOW + MINUTE, NOW + 2 * HOUR, 15 * MINUTE);
    expect((await story(batch.id)).filter((line) => line.startsWith('temperature'))).toEqual([]);
  });

  it('are told once however often they are sent', async () => {
    const { batch, sensor, pitchedAt } = await beer(2);
    const all = healthyBeer(pitchedAt, 49, (hour) => (hour > 40 ? 27 : 20));
    for (let time = 0; time < 20; time += 1) {
      await writeReadings(sensor, all);
      await assessBatch(batch.id, { clock: new ManualClock(NOW + time * MINUTE) });
    }
    expect((await story(batch.id)).filter((line) => line.startsWith('temperature'))).toEqual(['temperature high open']);
    expect(await OutboxMail.count()).toBe(await Alert.count());
  });
});

describe('a clock that jumps', () => {
  it('makes no alert flap when the server’s clock goes an hour or a day back and forth', async () => {
    const { batch, sensor, pitchedAt } = await beer(2);
    await writeReadings(sensor, healthyBeer(pitchedAt, 49, (hour) => (hour > 40 ? 27 : 20)));
    for (const jump of [0, MINUTE, -HOUR, 2 * MINUTE, HOUR, 3 * MINUTE, -DAY, 4 * MINUTE, -HOUR, 5 * MINUTE]) await assessBatch(batch.id, { clock: new ManualClock(NOW + jump) });
    expect((await story(batch.id)).filter((line) => line.startsWith('temperature'))).toEqual(['temperature high open']);
    const told = (await OutboxMail.findAll()).map((mail) => (mail.payload as { alert: { rule: string }; event: string })).filter((payload) => payload.alert.rule === 'temperature');
    expect(told.map((payload) => payload.event)).toEqual(['opened']);
  });
});

describe('silence', () => {
  const BATCHES = 40;
  const setBeat = (ageMs: number) => db.sequelize.query(`insert into heartbeats (part, instance, at) values ('broker', 'test', now() - $1 * interval '1 millisecond') on conflict (part, instance) do update set at = excluded.at`, { bind: [ageMs] });
  let beatMs = 1_000;
  const look = async (batches: Batch[], now: number) => {
    // How old the beat is goes by the database's own clock, and a look at so many takes its time.
    await setBeat(beatMs);
    const { silenceCounts } = await watchIngest({ clock: new ManualClock(now) });
    for (const batch of batches) await assessBatch(batch.id, { clock: new ManualClock(now), silenceCounts });
  };
  const silent = () => Alert.count({ where: { call: 'sensor', kind: 'silent' } });
  const houseMails = async () => (await OutboxMail.findAll()).map((mail) => mail.payload as { template: string; event: string }).filter((payload) => payload.template === 'ingest').map((payload) => payload.event);

  it('of one sensor is one alert; of the ingest it is one word about the house and none about sensors; the dead are found after it is back', async () => {
    const first = await beer(1);
    const made = [first];
    while (made.length < BATCHES) made.push(await beer(1, first.cellarId));
    const batches = made.map((item) => item.batch);
    const hear = async (who: typeof made, from: number, to: number) => {
      for (const { sensor, pitchedAt } of who) {
        const readings = healthyBeer(pitchedAt, 60).filter((reading) => reading.at > from && reading.at <= to);
        await writeReadings(sensor, readings.map((reading) => ({ ...reading, receivedAt: Math.max(reading.at, from) })));
      }
    };

    // The first sensor falls silent ten hours ago; the others speak.
    await hear(made.slice(0, 1), 0, NOW - 10 * HOUR);
    await hear(made.slice(1), 0, NOW);
    await look(batches, NOW);
    await look(batches, NOW + MINUTE);
    expect(await silent()).toBe(1);
    expect(await houseMails()).toEqual([]);

    // Then the ingest is down for eight hours.
    for (const hours of [0.2, 1, 3, 6.5, 8]) {
      beatMs = hours * HOUR;
      await look(batches, NOW + hours * HOUR);
    }
    expect(await silent()).toBe(1);
    expect(await houseMails()).toEqual(['opened']);

    // It is back. All but three deliver what they kept within ten minutes.
    const back = NOW + 8 * HOUR;
    beatMs = 1_000;
    await look(batches, back + MINUTE);
    await look(batches, back + 3 * MINUTE);
    expect(await silent()).toBe(1);
    await hear(made.slice(3), NOW, back);
    for (let minute = 4; minute <= 60; minute += 4) await look(batches, back + minute * MINUTE);
    expect(await silent()).toBe(3);
    expect(await houseMails()).toEqual(['opened', 'resolved']);
  });

  it('of the broker’s process is seen by the name under which it says that it lives', async () => {
    expect(await beatAge('broker')).toBeNull();
    const broker = await startProcess('broker/server.ts', { DATABASE_URL: db.url, MQTT_PORT: String(await freePort()) }, 'broker ready');
    try {
      await until('its sign of life', async () => (await beatAge('broker')) !== null);
      expect((await watchIngest()).silenceCounts).toBe(true);
    } finally {
      broker.kill('SIGKILL');
      await broker.ended;
    }
    await db.sequelize.query(`update heartbeats set at = at - interval '40 seconds'`);
    expect((await watchIngest()).silenceCounts).toBe(false);
  });
});

it('knows every rule by the name that the database keeps', () => {
  for (const name of RULE_NAMES) expect(ruleNamed(name).name).toBe(name);
});
