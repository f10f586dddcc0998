import type { MqttClient } from 'mqtt';
import { QueryTypes } from 'sequelize';
import { afterAll, afterEach, beforeAll, describe, expect, it } from 'vitest';
import { keepSettings } from '@/broker/settings';
import { OutsideBroker } from '@/broker/subscription';
import { readingsTopic, settingsTopic } from '@/lib/contracts/topics';
import { recordMessages, type Message } from '@/lib/services/readings/record';
import { getSensor } from '@/lib/services/sensors/get';
import { removeSensor } from '@/lib/services/sensors/remove';
import { setSensor } from '@/lib/services/sensors/set';
import { useDatabase } from '../support/database';
import { signIn } from '../support/devices';
import { buildMember, buildSensor } from '../support/factories';
import { startMosquitto, type OutsideMqtt } from '../support/mosquitto';
import { until } from '../support/processes';

const db = useDatabase();
const good = (index = 0) => ({ at: new Date(Date.parse('2026-03-04T05:45:00Z') - index * 1000).toISOString(), gravity: 1.048, temperature: 19.5 });
const storedOf = async (identifier: string) =>
  (await db.sequelize.query<{ n: number }>('select count(*)::int as n from readings r join sensors s on s.id = r.sensor_id where s.identifier = $1', { bind: [identifier], type: QueryTypes.SELECT }))[0]!.n;

let outside: OutsideMqtt;
let publisher: MqttClient;
let open: OutsideBroker[] = [];
let instances = 0;
beforeAll(async () => {
  outside = await startMosquitto();
  publisher = await signIn({ port: outside.port, sensor: 'a-device', secret: 'that mosquitto does not ask for' });
});
afterEach(async () => {
  await Promise.all(open.map((subscription) => subscription.stop(1_000)));
  open = [];
});
afterAll(async () => {
  await publisher.endAsync(true);
  await outside.stop();
});

async function subscribe(record: (messages: readonly Message[]) => ReturnType<typeof recordMessages> = recordMessages, instance = `test-${(instances += 1)}`) {
  const subscription = await OutsideBroker.subscribe({ url: outside.url, instance, record, connections: 4 });
  open.push(subscription);
  return subscription;
}
const newSensor = async () => (await buildSensor()).sensor.identifier;
const publish = (identifier: string, index = 0) => publisher.publishAsync(readingsTopic(identifier), JSON.stringify(good(index)), { qos: 1 });

describe('the ingest at an existing broker', () => {
  it('stores each message once, whichever of its connections it comes over', async () => {
    await subscribe();
    const identifier = await newSensor();
    await Promise.all(Array.from({ length: 200 }, (_, index) => publish(identifier, index)));
    await until('all readings', async () => (await storedOf(identifier)) === 200);
  });

  it('finds what was published while it was away', async () => {
    const identifier = await newSensor();
    const before = await subscribe(recordMessages, 'comes-back');
    await before.stop(1_000);
    open = [];
    await Promise.all(Array.from({ length: 50 }, (_, index) => publish(identifier, index)));
    expect(await storedOf(identifier)).toBe(0);
    await subscribe(recordMessages, 'comes-back');
    await until('all readings', async () => (await storedOf(identifier)) === 50);
  });

  it('acknowledges nothing that is not committed: another start gets it again', async () => {
    const identifier = await newSensor();
    let asked = 0;
    const stuck = await subscribe(() => {
      asked += 1;
      return Promise.reject(new Error('the database is away'));
    }, 'stuck');
    await publish(identifier);
    await until('the message to be tried', () => asked >= 2);
    expect(stuck.figures()).toMatchObject({ messages: 0, waiting: 1 });
    expect(await stuck.stop(0)).toBe(false);
    open = [];
    await subscribe(recordMessages, 'stuck');
    await until('the reading', async () => (await storedOf(identifier)) === 1);
  });

  it('is not robbed of messages by a process that went away for good', async () => {
    const gone = await subscribe();
    await gone.stop(1_000);
    open = [];
    await subscribe();
    const identifier = await newSensor();
    await Promise.all(Array.from({ length: 50 }, (_, index) => publish(identifier, index)));
    await until('all readings', async () => (await storedOf(identifier)) === 50);
  });

  it('keeps what comes for a topic of no sensor as refused, and goes on', async () => {
    await subscribe();
    const identifier = await newSensor();
    await publish('fs-nobody');
    await publisher.publishAsync('fallbright/v1/NOT AN ID/readings', '{}', { qos: 1 });
    await publish(identifier);
    await until('the reading', async () => (await storedOf(identifier)) === 1);
    await until('both refusals', async () => {
      const [row] = await db.sequelize.query<{ n: number }>(`select count(*)::int as n from refusals where sensor_id is null and reason = 'no sensor has this name'`, { type: QueryTypes.SELECT });
      return row!.n === 2;
    });
  });

  it('lays settings on a sensor’s topic there, where one that comes later finds them, and takes them away with it', async () => {
    const subscription = await subscribe();
    const settings = keepSettings((topic, payload) => subscription.retain(topic, payload));
    try {
      const keeper = await buildMember('keeper');
      const { sensor, secret } = await buildSensor({ cellarId: keeper.cellarId });
      await setSensor(keeper, sensor.identifier, { interval_s: 600 });
      const heard: string[] = [];
      // The topic may be listened to before the word is laid there: the retained one comes either way.
      const device = await signIn({ port: outside.port, sensor: sensor.identifier, secret });
      device.on('message', (_topic, payload) => heard.push(payload.toString()));
      await device.subscribeAsync(settingsTopic(sensor.identifier), { qos: 1 });
      await until('the settings', () => heard.length > 0);
      expect(JSON.parse(heard[0]!)).toEqual({ version: 1, interval_s: 600 });
      await device.publishAsync(readingsTopic(sensor.identifier), JSON.stringify({ ...good(), settings: 1 }), { qos: 1 });
      await until('the confirmation', async () => (await getSensor(keeper, sensor.identifier)).settings?.confirmed_at != null);
      await removeSensor(keeper, sensor.identifier);
      await until('the empty message', () => heard.at(-1) === '');
      const late: string[] = [];
      device.on('message', (_topic, payload) => late.push(payload.toString()));
      await device.unsubscribeAsync(settingsTopic(sensor.identifier));
      await device.subscribeAsync(settingsTopic(sensor.identifier), { qos: 1 });
      // A word published now comes after anything that was kept.
      await publisher.publishAsync(settingsTopic(sensor.identifier), 'probe', { qos: 1 });
      await until('the probe', () => late.length > 0);
      expect(late).toEqual(['probe']);
      await device.endAsync(true);
    } finally {
      await settings.stop();
    }
  });

  it('lays settings anew at a broker that comes back without what lay there', async () => {
    const keeper = await buildMember('keeper');
    const { sensor } = await buildSensor({ cellarId: keeper.cellarId });
    const own = await startMosquitto();
    const subscription = await OutsideBroker.subscribe({ url: own.url, instance: 'settings-back', record: recordMessages, connections: 1, onBack: () => settings.again() });
    open.push(subscription);
    let laid = 0;
    const settings = keepSettings(async (topic, payload) => {
      await subscription.retain(topic, payload);
      if (topic === settingsTopic(sensor.identifier)) laid += 1;
    });
    await setSensor(keeper, sensor.identifier, { interval_s: 1_200 });
    await until('the settings to be laid', () => laid === 1);
    await own.stop();
    const again = await startMosquitto(own.port);
    try {
      const device = await signIn({ port: again.port, sensor: sensor.identifier, secret: 'not asked for' });
      const heard: string[] = [];
      device.on('message', (_topic, payload) => heard.push(payload.toString()));
      await device.subscribeAsync(settingsTopic(sensor.identifier), { qos: 1 });
      await until('the settings', () => heard.length > 0, 20_000);
      expect(JSON.parse(heard[0]!)).toEqual({ version: 1, interval_s: 1_200 });
      await device.endAsync(true);
    } finally {
      await settings.stop();
      await subscription.stop(500);
      open = open.filter((one) => one !== subscription);
      await again.stop();
    }
  });

  it('does not take a sensor that is switched off', async () => {
    await subscribe();
    const { sensor } = await buildSensor({ disabledAt: new Date() });
    await publish(sensor.identifier);
    await until('the refusal', async () => {
      const [row] = await db.sequelize.query<{ n: number }>(`select count(*)::int as n from refusals where reason like '%switched off%'`, { type: QueryTypes.SELECT });
      return row!.n === 1;
    });
    expect(await storedOf(sensor.identifier)).toBe(0);
  });
});
