import { Client } from 'pg';
import { QueryTypes } from 'sequelize';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { ensurePartitions, monthOf, monthsAhead, partitionName } from '@/db/queries/partitions';
import { Assignment, Sensor } from '@/db/models';
import type { SensorIdentity } from '@/lib/auth/sensors';
import { ManualClock } from '@/lib/clock';
import { CHANGES_CHANNEL, type Change } from '@/lib/contracts/events';
import { Announcer } from '@/lib/services/readings/announcer';
import { purgeRefusals } from '@/lib/services/readings/purge';
import { receiveReadings } from '@/lib/services/readings/receive';
import { recordMessages, type Message } from '@/lib/services/readings/record';
import { useDatabase } from '../support/database';
import { buildBatch, buildSensor } from '../support/factories';
import { until } from '../support/processes';

const db = useDatabase();
const NOW = Date.parse('2026-03-04T06:00:00Z');
const good = { at: '2026-03-04T05:45:00Z', gravity: 1.048, temperature: 19.5 };

const identityOf = (sensor: Sensor): SensorIdentity => ({ id: sensor.id, cellarId: sensor.cellarId, identifier: sensor.identifier });
const newSensor = async () => identityOf((await buildSensor()).sensor);
const message = (sensor: SensorIdentity | null, body: unknown, more: Partial<Message> = {}): Message => ({
  sensor,
  road: 'mqtt',
  body: Buffer.isBuffer(body) ? body : Buffer.from(typeof body === 'string' ? body : JSON.stringify(body)),
  arrivedAt: NOW,
  ...more,
});
const select = <T extends object>(sql: string, bind: unknown[] = []) => db.sequelize.query<T>(sql, { bind, type: QueryTypes.SELECT });
const readingsOf = (sensor: SensorIdentity) =>
  select<{ at: string; gravity: number | null }>(`select to_char(measured_at at time zone 'utc', 'YYYY-MM-DD"T"HH24:MI:SS') as at, gravity from readings where sensor_id = $1 order by measured_at`, [sensor.id]);
const refusalsOf = (sensor: SensorIdentity) => select<{ reason: string; road: string; body: Buffer }>('select reason, road, body from refusals where sensor_id = $1 order by id', [sensor.id]);

describe('a batch of messages', () => {
  it('is stored reading by reading, whatever month they are from', async () => {
    const sensor = await newSensor();
    const body = [good, { ...good, at: '2015-01-01T00:00:00Z' }, { ...good, at: '2024-02-29T23:59:59Z' }, { ...good, at: '2026-03-01T01:30:00+02:00' }];
    expect(await recordMessages([message(sensor, body)])).toMatchObject({ stored: 4, duplicates: 0, refused: [[]] });
    expect((await readingsOf(sensor)).map((row) => row.at)).toEqual(['2015-01-01T00:00:00', '2024-02-29T23:59:59', '2026-02-28T23:30:00', '2026-03-04T05:45:00']);
  });

  it('counts a reading once, however often it is sent, and leaves the first as it was', async () => {
    const sensor = await newSensor();
    expect(await recordMessages([message(sensor, good), message(sensor, { ...good, gravity: 1.01 }), message(sensor, [good, good])])).toMatchObject({ stored: 1, duplicates: 3 });
    expect(await recordMessages([message(sensor, { ...good, gravity: 1.02 })])).toMatchObject({ stored: 0, duplicates: 1 });
    expect((await readingsOf(sensor)).map((row) => row.gravity)).toEqual([1.048]);
  });

  it('keeps two sensors that measure in the same second apart', async () => {
    const [one, two] = [await newSensor(), await newSensor()];
    expect(await recordMessages([message(one, good), message(two, good)])).toMatchObject({ stored: 2 });
  });

  it('keeps what is wrong with its reason and its first two kilobytes, and stores the rest', async () => {
    const sensor = await newSensor();
    const recorded = await recordMessages([message(sensor, [good, { ...good, temperature: 99 }]), message(sensor, 'x'.repeat(5_000)), message(sensor, { inclination: 40, temperature: 20 })]);
    expect(recorded).toMatchObject({ stored: 2, refused: [[{ index: 1 }], [{ index: 0 }], []] });
    const refusals = await refusalsOf(sensor);
    expect(refusals.map((row) => row.reason)).toEqual(['temperature must be between -10 and 60 °C', 'the message is not JSON']);
    expect(refusals[1]?.body.length).toBe(2048);
  });

  it('keeps bytes that no text column would take', async () => {
    const sensor = await newSensor();
    await recordMessages([message(sensor, Buffer.from([0, 255, 0, 254])), message(sensor, '[{"n":"temperature","u":"\\u0000","v":1}]'), message(sensor, '{"\\u0000":1}')]);
    const refusals = await refusalsOf(sensor);
    expect(refusals).toHaveLength(3);
    expect(refusals[0]?.body).toEqual(Buffer.from([0, 255, 0, 254]));
  });

  it('keeps a message of nobody, without a sensor', async () => {
    await recordMessages([message(null, good)]);
    expect(await select('select reason from refusals where sensor_id is null')).toEqual([{ reason: 'no sensor has this name' }]);
  });

  it('goes on where a sensor was removed after it signed in', async () => {
    const [gone, stays] = [await newSensor(), await newSensor()];
    await Sensor.destroy({ where: { id: gone.id } });
    expect(await recordMessages([message(gone, good), message(stays, good), message(gone, 'nonsense')])).toMatchObject({ stored: 2 });
    expect(await readingsOf(stays)).toHaveLength(1);
  });

  it('sets a message aside that the database cannot take, and stores the others', async () => {
    const sensor = await newSensor();
    await db.sequelize.query(`alter table refusals add constraint no_more check (reason <> 'the message is not JSON') not valid`);
    try {
      const recorded = await recordMessages([message(sensor, good), message(sensor, 'nonsense'), message(sensor, { ...good, at: '2026-03-04T05:30:00Z' })]);
      expect(recorded.stored).toBe(2);
      expect((await refusalsOf(sensor)).map((row) => row.reason)).toEqual(['the database could not store it']);
    } finally {
      await db.sequelize.query('alter table refusals drop constraint no_more');
    }
  });
});

describe('the latest reading of a sensor', () => {
  const latestOf = async (sensor: SensorIdentity) => (await select<{ at: Date; gravity: number }>('select measured_at as at, gravity from sensor_latest where sensor_id = $1', [sensor.id]))[0];

  it('is the one measured last, in whatever order they arrive', async () => {
    const sensor = await newSensor();
    await recordMessages([message(sensor, [{ ...good, at: '2026-03-04T05:30:00Z', gravity: 1.03 }, { ...good, at: '2026-03-04T05:50:00Z', gravity: 1.02 }, good])]);
    await recordMessages([message(sensor, { ...good, at: '2026-01-04T05:40:00Z' })]);
    expect(await latestOf(sensor)).toEqual({ at: new Date('2026-03-04T05:50:00Z'), gravity: 1.02 });
    await recordMessages([message(sensor, { ...good, at: '2026-03-04T05:55:00Z', gravity: 1.01 })]);
    expect((await latestOf(sensor))?.gravity).toBe(1.01);
  });
});

describe('over HTTP', () => {
  it('answers with counts and the reason of each refusal', async () => {
    const sensor = await newSensor();
    const body = Buffer.from(JSON.stringify([good, good, { ...good, gravity: 9 }]));
    expect(await receiveReadings(sensor, body, 'json', { clock: new ManualClock(NOW) })).toEqual({ stored: 1, duplicates: 1, refused: [{ index: 2, reason: 'gravity must be between 0.970 and 1.200' }] });
    expect(await refusalsOf(sensor)).toMatchObject([{ road: 'http' }]);
  });
});

describe('refused messages', () => {
  it('are forgotten after 30 days and not before', async () => {
    const sensor = await newSensor();
    await recordMessages([message(sensor, 'old', { arrivedAt: NOW - 31 * 86_400_000 }), message(sensor, 'young', { arrivedAt: NOW - 29 * 86_400_000 })]);
    expect(await purgeRefusals({ clock: new ManualClock(NOW) })).toBeGreaterThanOrEqual(1);
    expect((await refusalsOf(sensor)).map((row) => row.body.toString())).toEqual(['young']);
  });
});

describe('partitions', () => {
  it('are there for the coming months, whoever asks first, and only once', async () => {
    const months = monthsAhead(Date.parse('2031-11-15T00:00:00Z'));
    await Promise.all([ensurePartitions(db.sequelize, months), ensurePartitions(db.sequelize, months)]);
    const names = await select<{ name: string }>(`select c.relname as name from pg_inherits join pg_class c on c.oid = inhrelid where inhparent = 'readings'::regclass and c.relname like 'readings_203%' order by 1`);
    expect(names.map((row) => row.name)).toEqual(['readings_2031_10', 'readings_2031_11', 'readings_2031_12', 'readings_2032_01']);
  });

  it('carry the covering key and are vacuumed early', async () => {
    await ensurePartitions(db.sequelize, [monthOf(NOW)]);
    const [table] = await select<{ options: string[]; key: string }>(
      `select c.reloptions as options, pg_get_indexdef(i.indexrelid) as key from pg_class c join pg_index i on i.indrelid = c.oid and i.indisprimary where c.relname = $1`,
      [partitionName(monthOf(NOW))],
    );
    expect(table?.options).toContain('autovacuum_vacuum_insert_scale_factor=0.01');
    expect(table?.key).toContain('(sensor_id, measured_at) INCLUDE (gravity, temperature, battery, signal, received_at)');
  });

  it('are made again where one was dropped behind our back', async () => {
    const sensor = await newSensor();
    await recordMessages([message(sensor, { ...good, at: '2019-05-01T00:00:00Z' })]);
    await db.sequelize.query('drop table readings_2019_05');
    expect(await recordMessages([message(sensor, { ...good, at: '2019-05-01T00:00:00Z' })])).toMatchObject({ stored: 1 });
  });

  it('do not lock out readers while they are made', async () => {
    const reader = new Client({ connectionString: db.url });
    await reader.connect();
    try {
      await reader.query('begin; select count(*) from readings');
      await ensurePartitions(db.sequelize, [monthOf(Date.parse('2033-01-01T00:00:00Z'))]);
    } finally {
      await reader.end();
    }
  });
});

describe('the word that something changed', () => {
  let listener: Client;
  const heard: Change[] = [];
  beforeEach(async () => {
    heard.length = 0;
    listener = new Client({ connectionString: db.url });
    await listener.connect();
    listener.on('notification', ({ payload }) => heard.push(JSON.parse(payload!) as Change));
    await listener.query(`listen ${CHANGES_CHANNEL}`);
  });
  afterEach(() => listener.end());

  it('names the batch that the sensor was in when it measured', async () => {
    const { sensor } = await buildSensor();
    const { cellarId, id: sensorId } = sensor;
    const [first, second] = [await buildBatch({ cellarId }), await buildBatch({ cellarId })];
    await Assignment.create({ cellarId, sensorId, batchId: first.id, fromAt: new Date('2026-01-01T00:00:00Z'), toAt: new Date('2026-02-01T00:00:00Z') });
    await Assignment.create({ cellarId, sensorId, batchId: second.id, fromAt: new Date('2026-02-01T00:00:00Z') });
    await recordMessages([message(identityOf(sensor), { ...good, at: '2026-01-15T00:00:00Z' })]);
    await until('the first word', () => heard.length >= 1);
    await recordMessages([message(identityOf(sensor), good)]);
    await until('the second word', () => heard.length >= 2);
    expect(heard).toEqual([
      { cellar: sensor.cellarId, kind: 'reading', batch: first.id },
      { cellar: sensor.cellarId, kind: 'reading', batch: second.id },
    ]);
  });

  it('is not said for readings that were there already', async () => {
    const { sensor } = await buildSensor({ batch: await buildBatch() });
    await recordMessages([message(identityOf(sensor), good)]);
    await recordMessages([message(identityOf(sensor), good)]);
    await recordMessages([message(identityOf(sensor), { ...good, at: '2026-03-04T05:50:00Z' })]);
    await until('both words', () => heard.length >= 2);
    expect(heard).toHaveLength(2);
  });

  it('is said once a second at most for one vessel, and the last one is not swallowed', async () => {
    const batch = await buildBatch();
    const sensor = identityOf((await buildSensor({ batch })).sensor);
    const announcer = new Announcer();
    for (let index = 0; index < 50; index += 1) await recordMessages([message(sensor, { ...good, at: new Date(NOW - 60_000 + index).toISOString() })], announcer);
    await announcer.flush(NOW + 500);
    await until('the word for the rest', () => heard.length >= 2);
    expect(heard).toEqual(Array.from({ length: 2 }, () => ({ cellar: sensor.cellarId, kind: 'reading', batch: batch.id })));
  });

  it('is never said before the reading can be seen', async () => {
    const sensor = identityOf((await buildSensor({ batch: await buildBatch() })).sensor);
    const announcer = new Announcer();
    await recordMessages([message(sensor, good)], announcer);
    await until('the first word', () => heard.length === 1);
    const stall = await db.sequelize.transaction();
    await db.sequelize.query('lock table sensor_latest in exclusive mode', { transaction: stall });
    const late = recordMessages([message(sensor, { ...good, at: '2026-03-04T05:50:00Z' })], announcer);
    await until('the wait', async () => (await select(`select 1 from pg_locks l join pg_stat_activity a on a.pid = l.pid where not l.granted and a.datname = current_database()`)).length > 0);
    await announcer.flush(NOW + 500);
    // Words come in their order: once this one is heard, so would be what was said before it.
    const mark = { cellar: sensor.cellarId, kind: 'batch', batch: null } satisfies Change;
    await select('select pg_notify($1, $2)', [CHANGES_CHANNEL, JSON.stringify(mark)]);
    await until('the mark', () => heard.some((change) => change.kind === 'batch'));
    expect(heard.filter((change) => change.kind === 'reading')).toHaveLength(1);
    await stall.commit();
    await late;
    await announcer.flush(NOW + 1_000);
    await until('the second word', () => heard.filter((change) => change.kind === 'reading').length === 2);
  });

  it('goes to the cellar where the sensor is in no batch', async () => {
    const sensor = await newSensor();
    await recordMessages([message(sensor, good)]);
    await until('the word', () => heard.length >= 1);
    expect(heard).toEqual([{ cellar: sensor.cellarId, kind: 'reading', batch: null }]);
  });
});
