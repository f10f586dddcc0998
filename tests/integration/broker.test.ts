import { QueryTypes } from 'sequelize';
import { generate } from 'mqtt-packet';
import { afterAll, afterEach, beforeAll, describe, expect, it } from 'vitest';
import type { MqttClient } from 'mqtt';
import type { Limits } from '@/broker/limits';
import { startBroker, type Broker } from '@/broker/mqtt';
import { Sensor } from '@/db/models';
import { hashSensorSecret } from '@/lib/auth/sensors';
import { readingsTopic, settingsTopic } from '@/lib/contracts/topics';
import { recordMessages } from '@/lib/services/readings/record';
import { useDatabase } from '../support/database';
import { connectPacket, lengthOf, openClient, rawConnection, signIn } from '../support/devices';
import { buildSensor } from '../support/factories';
import { until } from '../support/processes';

const db = useDatabase();
const good = { at: '2026-03-04T05:45:00Z', gravity: 1.048, temperature: 19.5 };
const count = async (table: 'readings' | 'refusals') => (await db.sequelize.query<{ n: number }>(`select count(*)::int as n from ${table}`, { type: QueryTypes.SELECT }))[0]!.n;
const start = (limits: Partial<Limits> = {}) => startBroker({ host: '127.0.0.1', port: 0, record: recordMessages, limits });

let broker: Broker;
const clients: MqttClient[] = [];
const keep = (client: MqttClient) => {
  clients.push(client);
  return client;
};
beforeAll(async () => {
  broker = await start();
});
afterEach(async () => {
  await Promise.all(clients.splice(0).map((client) => client.endAsync(true)));
});
afterAll(() => broker.stop(2_000));

async function sensorAndSecret() {
  const { sensor, secret } = await buildSensor();
  return { port: broker.port, sensor: sensor.identifier, secret };
}

describe('while the database keeps everybody waiting', () => {
  it('answers a ping behind readings that came together', async () => {
    const waiting = await startBroker({ host: '127.0.0.1', port: 0, record: () => new Promise(() => undefined) });
    const own = { ...(await sensorAndSecret()), port: waiting.port };
    const raw = await rawConnection(own.port);
    raw.socket.write(connectPacket({ username: own.sensor, password: own.secret }));
    await until('the CONNACK', () => raw.received().length >= 4);
    const reading = generate({ cmd: 'publish', topic: readingsTopic(own.sensor), payload: JSON.stringify(good), qos: 1, messageId: 1, dup: false, retain: false });
    raw.socket.write(Buffer.concat([reading, reading, reading]));
    await until('the readings to wait', () => waiting.figures().waiting === 3);
    raw.socket.write(generate({ cmd: 'pingreq' }));
    await until('the PINGRESP', () => raw.received().subarray(4).equals(generate({ cmd: 'pingresp' })), 3_000);
    await waiting.stop(0);
  });
});

describe('signing in', () => {
  it('takes a sensor with its secret and stores what it publishes before it acknowledges', async () => {
    const own = await sensorAndSecret();
    const client = keep(await signIn(own));
    const before = await count('readings');
    await client.publishAsync(readingsTopic(own.sensor), JSON.stringify(good), { qos: 1 });
    expect(await count('readings')).toBe(before + 1);
  });

  it('takes readings with QoS 2 once and with QoS 0 without a promise', async () => {
    const own = await sensorAndSecret();
    const client = keep(await signIn(own));
    const before = await count('readings');
    await client.publishAsync(readingsTopic(own.sensor), JSON.stringify(good), { qos: 2 });
    expect(await count('readings')).toBe(before + 1);
    await client.publishAsync(readingsTopic(own.sensor), JSON.stringify({ ...good, at: '2026-03-04T05:50:00Z' }), { qos: 0 });
    await until('the reading of QoS 0', async () => (await count('readings')) === before + 2);
  });

  it('refuses a wrong secret, an unknown name, no name, and a sensor that is switched off', async () => {
    const own = await sensorAndSecret();
    const { sensor: off, secret } = await buildSensor({ disabledAt: new Date() });
    await expect(signIn({ ...own, secret: 'wrong' })).rejects.toThrow(/Bad username or password/);
    await expect(signIn({ ...own, sensor: 'fs-nobody' })).rejects.toThrow(/Bad username or password/);
    await expect(signIn({ ...own, username: undefined, password: undefined })).rejects.toThrow(/Bad username or password/);
    await expect(signIn({ port: own.port, sensor: off.identifier, secret })).rejects.toThrow(/Bad username or password/);
  });

  it('refuses even the right secret after many wrong ones, for that name only', async () => {
    const own = await sensorAndSecret();
    for (let attempt = 0; attempt < 10; attempt += 1) await expect(signIn({ ...own, secret: `guess ${attempt}` })).rejects.toThrow();
    await expect(signIn(own)).rejects.toThrow(/Not authorized/);
    keep(await signIn(await sensorAndSecret()));
  });

  it('answers an empty client name that wants its session kept with "identifier rejected" [MQTT-3.1.3-8]', async () => {
    const own = await sensorAndSecret();
    const raw = await rawConnection(own.port);
    raw.socket.write(connectPacket({ clean: false, username: own.sensor, password: own.secret }));
    await raw.closed;
    expect([...raw.received()]).toEqual([0x20, 2, 0, 2]);
  });

  it('takes an empty client name with a clean session', async () => {
    const own = await sensorAndSecret();
    const raw = await rawConnection(own.port);
    raw.socket.write(connectPacket({ clean: true, username: own.sensor, password: own.secret }));
    await until('the CONNACK', () => raw.received().length >= 4);
    expect([...raw.received()]).toEqual([0x20, 2, 0, 0]);
    raw.socket.destroy();
  });

  it('hands a client name over within one sensor and never to another [MQTT-3.1.4-2]', async () => {
    const [own, other] = [await sensorAndSecret(), await sensorAndSecret()];
    const first = keep(await signIn({ ...own, clientId: 'float' }));
    keep(await signIn({ ...other, clientId: 'float' }));
    expect(first.connected).toBe(true);
    const second = keep(await signIn({ ...own, clientId: 'float' }));
    await until('the first connection to be closed', () => !first.connected);
    expect(second.connected).toBe(true);
  });

  it('cuts a sensor off within five seconds of its being switched off, removed, or given a new secret', async () => {
    const sensors = [await sensorAndSecret(), await sensorAndSecret(), await sensorAndSecret(), await sensorAndSecret()];
    const [off, removed, renewed, untouched] = await Promise.all(sensors.map(async (own) => keep(await signIn(own))));
    await Sensor.update({ disabledAt: new Date() }, { where: { identifier: sensors[0]!.sensor } });
    await Sensor.destroy({ where: { identifier: sensors[1]!.sensor } });
    await Sensor.update({ secretHash: hashSensorSecret('a new one') }, { where: { identifier: sensors[2]!.sensor } });
    await until('all three to be cut off', () => [off, removed, renewed].every((client) => !client!.connected), 5_000);
    expect(untouched!.connected).toBe(true);
    await expect(signIn(sensors[0]!).then((client) => client.connected)).rejects.toThrow(/Bad username or password/);
  });
});

describe('what a sensor may not do', () => {
  it.each([
    ['the topic of another sensor', async () => readingsTopic((await sensorAndSecret()).sensor)],
    ['the broker’s own topics', async () => '$SYS/broker/uptime'],
    ['a topic of its own making', async () => 'fallbright/v1/readings'],
    ['its settings', async (own: string) => settingsTopic(own)],
  ])('it publishes to %s: nothing is stored, and the connection is closed [MQTT-3.3.5-2]', async (_name, topicFor) => {
    const own = await sensorAndSecret();
    const client = keep(await signIn(own));
    const before = await count('readings');
    client.publish(await topicFor(own.sensor), JSON.stringify(good), { qos: 1 });
    await until('the connection to be closed', () => !client.connected);
    expect(await count('readings')).toBe(before);
    const kept = await until('the refusal', async () => (await db.sequelize.query<{ reason: string }>('select r.reason from refusals r join sensors s on s.id = r.sensor_id where s.identifier = $1', { bind: [own.sensor], type: QueryTypes.SELECT }))[0]);
    expect(kept.reason).toMatch(/^it was sent to another topic/);
  });

  it('it subscribes to what is not its own: every such filter is refused, its settings are granted', async () => {
    const [own, other] = [await sensorAndSecret(), await sensorAndSecret()];
    const listener = keep(await signIn(own));
    const heard: string[] = [];
    listener.on('message', (topic) => heard.push(topic));
    const filters = ['#', '+/#', 'fallbright/v1/+/readings', readingsTopic(own.sensor), readingsTopic(other.sensor), settingsTopic(other.sensor), '$SYS/#', '$share/x/#'];
    for (const filter of filters) await expect(listener.subscribeAsync(filter, { qos: 1 }), filter).rejects.toThrow();
    expect(await listener.subscribeAsync(settingsTopic(own.sensor), { qos: 1 })).toMatchObject([{ qos: 1 }]);
    const speaker = keep(await signIn(other));
    await speaker.publishAsync(readingsTopic(other.sensor), JSON.stringify(good), { qos: 1 });
    await listener.subscribeAsync(settingsTopic(own.sensor), { qos: 1 });
    expect(heard).toEqual([]);
  });

  it('it leaves a retained reading: it is acknowledged, refused with a hint, and handed to nobody', async () => {
    const own = await sensorAndSecret();
    const client = keep(await signIn(own));
    const [readings, refusals] = [await count('readings'), await count('refusals')];
    await client.publishAsync(readingsTopic(own.sensor), JSON.stringify(good), { qos: 1, retain: true });
    expect([await count('readings'), await count('refusals')]).toEqual([readings, refusals + 1]);
  });

  it('it leaves a will for another topic, or a retained one: it is not let in', async () => {
    const [own, other] = [await sensorAndSecret(), await sensorAndSecret()];
    const will = { topic: readingsTopic(other.sensor), payload: Buffer.from(JSON.stringify(good)), qos: 1 as const, retain: false };
    await expect(signIn({ ...own, will })).rejects.toThrow(/Not authorized/);
    await expect(signIn({ ...own, will: { ...will, topic: readingsTopic(own.sensor), retain: true } })).rejects.toThrow(/Not authorized/);
  });

  it('a will for its own topic is a reading when the connection breaks', async () => {
    const own = await sensorAndSecret();
    const will = { topic: readingsTopic(own.sensor), payload: Buffer.from(JSON.stringify(good)), qos: 1 as const, retain: false };
    const client = await signIn({ ...own, will });
    const before = await count('readings');
    client.stream.destroy();
    await until('the reading', async () => (await count('readings')) === before + 1);
  });
});

describe('limits', () => {
  it.each([
    ['a first packet that is no CONNECT', Buffer.concat([Buffer.from([0x30]), lengthOf(10), Buffer.alloc(10)])],
    ['a CONNECT of 256 MB', Buffer.concat([Buffer.from([0x10]), lengthOf(268_435_455)])],
    ['a CONNECT of 5 kB', connectPacket({ clientId: 'x'.repeat(5_000) })],
    ['a length of five bytes', Buffer.from([0x10, 0xff, 0xff, 0xff, 0xff, 0x01])],
    ['text', Buffer.from('GET / HTTP/1.1\r\n\r\n')],
    ['MQTT 5', Buffer.from('101000044d5154540502003c032100140000', 'hex')],
  ])('close a connection that begins with %s', async (_name, bytes) => {
    const raw = await rawConnection(broker.port);
    raw.socket.write(bytes);
    await until('the connection to be closed', raw.isClosed, 3_000);
  });

  it('close a connection that signs in and sends too large a packet, while a large one passes', async () => {
    const own = await sensorAndSecret();
    const client = keep(await signIn(own));
    const before = await count('readings');
    const many = Array.from({ length: 500 }, (_, index) => ({ ...good, at: new Date(Date.parse(good.at) - index * 1000).toISOString(), battery: 3.9, signal: -60, sequence: index, padding: 'x'.repeat(300) }));
    await client.publishAsync(readingsTopic(own.sensor), JSON.stringify(many), { qos: 1 });
    expect(await count('readings')).toBe(before + 500);
    client.publish(readingsTopic(own.sensor), Buffer.alloc(262_145), { qos: 1 });
    await until('the connection to be closed', () => !client.connected);
  });

  it('close a connection that does not sign in, or dribbles, in time', async () => {
    const hasty = await start({ signInMs: 300, packetMs: 300 });
    try {
      const idle = await rawConnection(hasty.port);
      const half = await rawConnection(hasty.port);
      half.socket.write(Buffer.from([0x10, 60, 0, 4]));
      const own = { ...(await sensorAndSecret()), port: hasty.port };
      const dribbling = await signIn(own);
      dribbling.stream.write(Buffer.concat([Buffer.from([0x32]), lengthOf(200), Buffer.from([0])]));
      await until('all three to be closed', () => idle.isClosed() && half.isClosed() && !dribbling.connected, 4_000);
      const patient = keep(await signIn(own));
      await patient.publishAsync(readingsTopic(own.sensor), JSON.stringify(good), { qos: 1 });
      expect(patient.connected).toBe(true);
    } finally {
      await hasty.stop(1_000);
    }
  });

  it('turn away connections beyond the number from one address, and take new ones when those are gone', async () => {
    const small = await start({ connectionsPerAddress: 3 });
    try {
      const own = { ...(await sensorAndSecret()), port: small.port };
      const idle = await Promise.all([1, 2, 3].map(() => rawConnection(small.port)));
      await expect(signIn(own)).rejects.toThrow();
      for (const raw of idle) raw.socket.destroy();
      await until('room', () => small.figures().connections === 0);
      keep(await signIn(own));
    } finally {
      await small.stop(1_000);
    }
  });

  it('close the oldest connection of a sensor that opens too many', async () => {
    const own = await sensorAndSecret();
    const opened: MqttClient[] = [];
    for (let index = 0; index < 9; index += 1) opened.push(keep(await signIn({ ...own, clientId: `c${index}` })));
    await until('the first to be closed', () => !opened[0]!.connected);
    expect(opened.slice(1).every((client) => client.connected)).toBe(true);
  });

  it('slow a flood down without losing any of it, while another sensor is served', async () => {
    const strict = await start({ burst: 50, perSecond: 100 });
    try {
      const [flood, calm] = [{ ...(await sensorAndSecret()), port: strict.port }, { ...(await sensorAndSecret()), port: strict.port }];
      const [loud, quiet] = [keep(await signIn(flood)), keep(await signIn(calm))];
      const before = await count('readings');
      const at = (index: number) => JSON.stringify({ ...good, at: new Date(Date.parse(good.at) - index * 1000).toISOString() });
      await Promise.all(Array.from({ length: 150 }, (_, index) => loud.publishAsync(readingsTopic(flood.sensor), at(index), { qos: 1 })));
      // 150 of 50 allowed at once: at 100 a second the next one is read after a second.
      const began = performance.now();
      const next = loud.publishAsync(readingsTopic(flood.sensor), at(150), { qos: 1 });
      await quiet.publishAsync(readingsTopic(calm.sensor), JSON.stringify(good), { qos: 1 });
      expect(performance.now() - began).toBeLessThan(400);
      await next;
      expect(performance.now() - began).toBeGreaterThan(500);
      expect(await count('readings')).toBe(before + 152);
    } finally {
      await strict.stop(1_000);
    }
  });
});

describe('stopping', () => {
  it('commits and acknowledges what was taken in, and closes', async () => {
    const other = await start();
    const own = { ...(await sensorAndSecret()), port: other.port };
    const client = keep(openClient(own));
    await new Promise<void>((resolve) => client.once('connect', () => resolve()));
    let acknowledged = 0;
    for (let index = 0; index < 50; index += 1) client.publish(readingsTopic(own.sensor), JSON.stringify({ ...good, at: new Date(Date.parse(good.at) - index * 1000).toISOString() }), { qos: 1 }, (error) => (acknowledged += error ? 0 : 1));
    await until('the messages to arrive', () => other.figures().messages + other.figures().waiting > 0);
    expect(await other.stop(3_000)).toBe(true);
    await until('the connection to be closed', () => !client.connected);
    const stored = await db.sequelize.query<{ n: number }>('select count(*)::int as n from readings r join sensors s on s.id = r.sensor_id where s.identifier = $1', { bind: [own.sensor], type: QueryTypes.SELECT });
    expect(acknowledged).toBe(stored[0]!.n);
  });
});
