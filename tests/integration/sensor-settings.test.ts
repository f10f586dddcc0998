import { afterAll, afterEach, beforeAll, describe, expect, it } from 'vitest';
import type { MqttClient } from 'mqtt';
import { startBroker, type Broker } from '@/broker/mqtt';
import { keepSettings } from '@/broker/settings';
import { RunningFloat } from '@/devices/simulator/running-float';
import { SensorLink } from '@/devices/simulator/sensor-link';
import { ManualClock } from '@/lib/clock';
import { settingsTopic } from '@/lib/contracts/topics';
import { recordMessages } from '@/lib/services/readings/record';
import { getSensor } from '@/lib/services/sensors/get';
import { removeSensor } from '@/lib/services/sensors/remove';
import { setSensor } from '@/lib/services/sensors/set';
import { useDatabase } from '../support/database';
import { signIn } from '../support/devices';
import { buildMember, buildSensor } from '../support/factories';
import { until } from '../support/processes';

useDatabase();
let broker: Broker;
let settings: { stop(): Promise<void> };
const clients: MqttClient[] = [];

beforeAll(async () => {
  broker = await startBroker({ host: '127.0.0.1', port: 0, record: recordMessages });
  settings = keepSettings((topic, payload) => broker.retain(topic, payload));
});
afterEach(async () => {
  await Promise.all(clients.splice(0).map((client) => client.endAsync(true)));
});
afterAll(async () => {
  await settings.stop();
  await broker.stop(2_000);
});

/** What a client hears on its own settings topic. */
async function listening(identifier: string, secret: string) {
  const client = await signIn({ port: broker.port, sensor: identifier, secret });
  clients.push(client);
  const heard: string[] = [];
  client.on('message', (_topic, payload) => heard.push(payload.toString()));
  await client.subscribeAsync(settingsTopic(identifier), { qos: 1 });
  return { client, heard };
}

describe('settings on a sensor’s topic', () => {
  it('wait there for a sensor that comes later, and reach one that listens', async () => {
    const keeper = await buildMember('keeper');
    const { sensor, secret } = await buildSensor({ cellarId: keeper.cellarId });
    const early = await listening(sensor.identifier, secret);
    await setSensor(keeper, sensor.identifier, { interval_s: 600 });
    await until('the settings', () => early.heard.length === 1);
    expect(JSON.parse(early.heard[0]!)).toEqual({ version: 1, interval_s: 600 });
    const late = await listening(sensor.identifier, secret);
    await until('the retained settings', () => late.heard.length === 1);
    expect(late.heard[0]).toBe(early.heard[0]);
  });

  it('reach no other sensor, not of the same cellar either', async () => {
    const keeper = await buildMember('keeper');
    const { sensor } = await buildSensor({ cellarId: keeper.cellarId });
    const other = await buildSensor({ cellarId: keeper.cellarId });
    const { client, heard } = await listening(other.sensor.identifier, other.secret);
    const grants = await client.subscribeAsync(settingsTopic(sensor.identifier), { qos: 1 }).catch(() => null);
    if (grants) expect(grants.every((grant) => grant.qos === 128)).toBe(true);
    await setSensor(keeper, sensor.identifier, { interval_s: 600 });
    await setSensor(keeper, other.sensor.identifier, { interval_s: 1_200 });
    await until('its own settings', () => heard.length > 0);
    expect(heard.map((text) => (JSON.parse(text) as { interval_s: number }).interval_s)).toEqual([1_200]);
  });

  it('are obeyed and confirmed by a simulated float', async () => {
    const keeper = await buildMember('keeper');
    const { sensor, secret } = await buildSensor({ cellarId: keeper.cellarId });
    const start = Date.parse('2026-03-01T00:00:00Z');
    const clock = new ManualClock(start);
    const held: { float?: RunningFloat } = {};
    const link = new SensorLink({ url: `mqtt://127.0.0.1:${broker.port}`, sensor: sensor.identifier, secret, onSettings: (told) => held.float?.obey(told) });
    const float = (held.float = new RunningFloat({ sensor: sensor.identifier, secret, scenario: 'healthy-cider', seed: 3, startedAt: new Date(start).toISOString(), interval_s: 900 }, link, clock, start));
    const run = async (hours: number) => {
      await until('what was sent before', () => link.waiting === 0);
      clock.advance(hours * 3_600_000);
      const before = link.acknowledged;
      float.tick();
      await until('the readings to be taken', () => link.waiting === 0 && link.acknowledged > before);
      return link.acknowledged - before;
    };
    expect(await run(4)).toBeGreaterThan(12);
    await setSensor(keeper, sensor.identifier, { interval_s: 3_600 });
    // The float says which settings it has with its next reading.
    await until('the confirmation', async () => {
      clock.advance(3_600_000);
      float.tick();
      return (await getSensor(keeper, sensor.identifier)).settings?.confirmed_at !== null;
    });
    expect(await getSensor(keeper, sensor.identifier)).toMatchObject({ interval_s: 3_600 });
    expect(await run(8)).toBeLessThanOrEqual(9);
    await link.close(1_000);
  });

  it('are taken away with the sensor', async () => {
    const keeper = await buildMember('keeper');
    const { sensor, secret } = await buildSensor({ cellarId: keeper.cellarId });
    const { heard } = await listening(sensor.identifier, secret);
    await setSensor(keeper, sensor.identifier, { interval_s: 600 });
    await until('the settings', () => heard.length === 1);
    await removeSensor(keeper, sensor.identifier);
    await until('the empty message', () => heard.at(-1) === '' || heard.length > 1);
    expect(heard.at(-1)).toBe('');
  });
});
