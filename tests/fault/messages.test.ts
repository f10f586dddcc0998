import type { MqttClient } from 'mqtt';
import { QueryTypes } from 'sequelize';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { readingsOfBatch } from '@/db/queries/batch-readings';
import type { Batch } from '@/db/models';
import { readingsTopic } from '@/lib/contracts/topics';
import { assess } from '@/lib/core/assess';
import { setupOf } from '@/lib/services/batches/setup';
import { useDatabase } from '../support/database';
import { connectPacket, lengthOf, rawConnection, signIn } from '../support/devices';
import { buildBatch, buildSensor } from '../support/factories';
import { BEER, healthyBeer } from '../support/ferments';
import { startProcess, until, type Running } from '../support/processes';
import { seeded } from '../support/random';
import { freePort } from '@/scripts/lib/postgres';

const db = useDatabase();
const random = seeded(43);
const MB = 1 << 20;
const HOUR = 3_600_000;
const START = Date.parse('2026-02-01T00:00:00Z');
const good = (index: number) => ({ at: new Date(START + index * 1000).toISOString(), gravity: 1.048, temperature: 19.5, sequence: index });

let broker: Running;
let port: number;
const clients: MqttClient[] = [];
beforeAll(async () => {
  port = await freePort(26_000);
  broker = await startProcess('broker/server.ts', { DATABASE_URL: db.url, MQTT_PORT: String(port) }, 'broker ready');
});
afterAll(async () => {
  await Promise.all(clients.map((client) => client.endAsync(true)));
  broker.kill('SIGTERM');
  expect(await broker.ended).toBe(0);
});

async function device(batch?: Batch) {
  const { sensor, secret } = await buildSensor(batch ? { batch } : {});
  const open = async () => {
    const client = await signIn({ port, sensor: sensor.identifier, secret });
    clients.push(client);
    return client;
  };
  const client = await open();
  return { id: sensor.id, identifier: sensor.identifier, secret, open, publish: (body: unknown, by = client) => by.publishAsync(readingsTopic(sensor.identifier), typeof body === 'string' ? body : JSON.stringify(body), { qos: 1 }) };
}
const count = async (table: 'readings' | 'refusals', id: number) => (await db.sequelize.query<{ n: number }>(`select count(*)::int as n from ${table} where sensor_id = $1`, { bind: [id], type: QueryTypes.SELECT }))[0]!.n;

function shuffled<T>(items: readonly T[]): T[] {
  const mixed = [...items];
  for (let index = mixed.length - 1; index > 0; index -= 1) {
    const other = Math.floor(random() * (index + 1));
    [mixed[index], mixed[other]] = [mixed[other]!, mixed[index]!];
  }
  return mixed;
}

describe('doubled readings', () => {
  it('count once, sent up to a hundred times, alone or in lists, and over again after a reconnect', async () => {
    const own = await device();
    const again = await own.open();
    const sends: Array<Promise<unknown>> = [];
    for (let index = 0; index < 20; index += 1) {
      const times = 1 + Math.floor(random() * 100);
      for (let time = 0; time < times; time += 1) sends.push(own.publish(time % 7 === 0 ? [good(index), good(index)] : good(index), time % 3 === 0 ? again : undefined));
    }
    await Promise.all(sends);
    expect(sends.length).toBeGreaterThan(500);
    expect(await count('readings', own.id)).toBe(20);
  });

  it('count once where the packet itself is marked as doubled', async () => {
    const own = await device();
    const body = Buffer.from(JSON.stringify(good(1)));
    const topic = Buffer.from(readingsTopic(own.identifier));
    const publish = (flags: number) => Buffer.concat([Buffer.from([0x30 | flags]), lengthOf(2 + topic.length + 2 + body.length), Buffer.from([0, topic.length]), topic, Buffer.from([0, 7]), body]);
    const raw = await rawConnection(port);
    raw.socket.write(connectPacket({ clientId: 'raw', username: own.identifier, password: own.secret }));
    await until('the CONNACK', () => raw.received().length === 4);
    raw.socket.write(Buffer.concat([publish(0b0010), publish(0b1010), publish(0b1010)]));
    await until('three acknowledgements', () => raw.received().length === 4 + 3 * 4);
    raw.socket.destroy();
    expect(await count('readings', own.id)).toBe(1);
  });
});

describe('late and mixed-up readings', () => {
  it('of sixty days make the same rows and the same judgement as in their order', async () => {
    const pitchedAt = START - 60 * 24 * HOUR;
    const readings = healthyBeer(pitchedAt, 60 * 24).map(({ at, gravity, temperature }) => ({ at: new Date(at).toISOString(), gravity, temperature }));
    const batches = [await buildBatch({ ...BEER, pitchedAt: new Date(pitchedAt) }), await buildBatch({ ...BEER, pitchedAt: new Date(pitchedAt) })] as const;
    const [inOrder, mixed] = [await device(batches[0]), await device(batches[1])];
    for (let from = 0; from < readings.length; from += 200) await inOrder.publish(readings.slice(from, from + 200));
    const pieces = shuffled(Array.from({ length: Math.ceil(readings.length / 37) }, (_, index) => shuffled(readings).slice(0, 60).concat(readings.slice(index * 37, index * 37 + 37))));
    await Promise.all(pieces.map((piece) => mixed.publish(shuffled(piece))));

    const [first, second] = await Promise.all(batches.map(async (batch) => (await readingsOfBatch(batch.id)).map((reading) => ({ ...reading, receivedAt: START }))));
    expect(first).toHaveLength(readings.length);
    expect(second).toEqual(first);
    const judgement = (batch: Batch, of: typeof first) => JSON.stringify(assess(setupOf(batch, [], 'UTC'), of!, START));
    expect(judgement(batches[1], second)).toBe(judgement(batches[0], first));
  });

  it('of ten thousand, sent at once after a long silence, are all there', async () => {
    const own = await device();
    const lists = shuffled(Array.from({ length: 20 }, (_, list) => Array.from({ length: 500 }, (_, index) => good(list * 500 + index))));
    const began = Date.now();
    await Promise.all(lists.map((list) => own.publish(list)));
    console.log(`10,000 readings in 20 messages: ${Date.now() - began} ms`);
    expect(await count('readings', own.id)).toBe(10_000);
  });
});

describe('clocks that are wrong', () => {
  it('behind by hours or a day is taken, with the time of arrival kept; ahead, never set, or run over is refused', async () => {
    const own = await device();
    const now = Date.now();
    const at = (ms: number) => ({ ...good(0), at: new Date(ms).toISOString() });
    await own.publish([at(now - HOUR), at(now - 24 * HOUR), at(now + 5 * 60_000)]);
    await own.publish([at(now + HOUR), at(now + 24 * HOUR), at(12_000), { ...good(0), at: '2106-02-07T06:28:16Z' }]);
    expect(await count('readings', own.id)).toBe(3);
    expect(await count('refusals', own.id)).toBe(4);
    const rows = await db.sequelize.query<{ received: Date }>('select received_at as received from readings where sensor_id = $1', { bind: [own.id], type: QueryTypes.SELECT });
    for (const { received } of rows) expect(Math.abs(received.getTime() - now)).toBeLessThan(60_000);
  });
});

describe('a poisoned reading', () => {
  it('among 500, five times, is refused alone and acknowledged; nothing is tried again', async () => {
    const own = await device();
    const poisons = [{ temperature: 'warm' }, { gravity: 1e300 }, { at: '2026-02-30T00:00:00Z' }, { battery: -1 }, { sequence: 2 ** 60 }];
    for (const [round, poison] of poisons.entries()) {
      const place = Math.floor(random() * 500);
      await own.publish(Array.from({ length: 500 }, (_, index) => ({ ...good(round * 500 + index), ...(index === place ? poison : {}) })));
    }
    expect(await count('readings', own.id)).toBe(5 * 499);
    expect(await count('refusals', own.id)).toBe(5);
    expect(broker.lines.filter((line) => String(line.msg).includes('did not take a batch'))).toEqual([]);
  });
});

describe('ten thousand malformed packets and messages', () => {
  it('leave the broker alive, its memory flat, and a good sensor served', async () => {
    const own = await device();
    const bad = await device();
    const latencies: number[] = [];
    let index = 100_000;
    let running = true;
    const serve = async () => {
      while (running) {
        const began = performance.now();
        await own.publish(good((index += 1)));
        latencies.push(performance.now() - began);
        await new Promise((resolve) => setTimeout(resolve, 10));
      }
    };
    const noise = (length: number) => Buffer.from(Array.from({ length }, () => Math.floor(random() * 256)));
    /** Connections that send noise: half of it begins as a CONNECT does and goes wrong later. */
    const strangers = async (rounds: number) => {
      for (let round = 0; round < rounds; round += 1) {
        const connections = await Promise.all(Array.from({ length: 100 }, () => rawConnection(port).catch(() => null)));
        for (const raw of connections) raw?.socket.end(random() < 0.5 ? noise(1 + Math.floor(random() * 200)) : Buffer.concat([connectPacket({ clientId: 'x' }).subarray(0, 4 + Math.floor(random() * 10)), noise(40)]));
        await Promise.all(connections.map((raw) => raw?.closed));
      }
    };
    /** A sensor that is let in and then sends packets of every kind, framed as they should be, with nonsense in them. */
    const guests = async (rounds: number) => {
      for (let round = 0; round < rounds; round += 1) {
        const raw = await rawConnection(port);
        raw.socket.write(connectPacket({ clientId: `noise-${round}`, username: bad.identifier, password: bad.secret }));
        await until('the CONNACK', () => raw.received().length >= 4 || raw.isClosed());
        for (let packet = 0; packet < 20; packet += 1) {
          const body = noise(Math.floor(random() * 60));
          raw.socket.write(Buffer.concat([Buffer.from([Math.floor(random() * 256)]), lengthOf(body.length), body]));
        }
        raw.socket.end();
        await raw.closed;
      }
    };
    // The first quarter brings the process to its working size; from then on it must stay there.
    await strangers(20);
    await guests(25);
    const before = await broker.memory();
    const serving = serve();
    await strangers(60);
    await guests(75);
    const refused = await count('refusals', bad.id);
    const bodies = ['', '{', '[]', '{"gravity":"x"}', '\u0000', '[[[[', '"', '{"temperature":1e999}', 'null', '{"at":""}'];
    await Promise.all(Array.from({ length: 2_000 }, (_, message) => bad.publish(bodies[message % bodies.length]!)));
    running = false;
    await serving;

    expect(await count('refusals', bad.id)).toBe(refused + 2_000);
    expect(await count('readings', own.id)).toBe(latencies.length);
    latencies.sort((a, b) => a - b);
    const grown = async () => (await broker.memory()) - before;
    const atOnce = await grown();
    // What is only rubbish goes within seconds of quiet; what is held on to stays.
    await until('the memory to be as it was', async () => (await grown()) < 50 * MB, 30_000);
    console.log(`10,000 malformed: a good sensor's p99 ${latencies[Math.floor(latencies.length * 0.99)]!.toFixed(0)} ms, memory ${(atOnce / MB).toFixed(1)} MB more at once, ${((await grown()) / MB).toFixed(1)} MB at rest`);
    expect(latencies[Math.floor(latencies.length * 0.99)]).toBeLessThan(1_000);
  });
});

describe('connections that never sign in', () => {
  it('hold less than 128 kB each, whatever they send, and are closed in time', async () => {
    const connections = 1_000;
    const before = await broker.memory();
    const opened = await Promise.all(Array.from({ length: connections }, () => rawConnection(port)));
    // As much as a first packet may have, but for its last byte; a larger one is closed at its length.
    const almost = Buffer.concat([Buffer.from([0x10]), lengthOf(4_096), Buffer.alloc(4_095)]);
    for (const [index, raw] of opened.entries()) raw.socket.write(index % 2 === 0 ? almost : Buffer.concat([Buffer.from([0x10]), lengthOf(200_000_000), Buffer.alloc(65_536)]));
    await until('the large ones to be closed', () => opened.every((raw, index) => index % 2 === 0 || raw.isClosed()), 20_000);
    const each = ((await broker.memory()) - before) / connections;
    console.log(`a connection that does not sign in: ${(each / 1024).toFixed(1)} kB`);
    expect(each).toBeLessThan(128 * 1024);
    await until('all to be closed', () => opened.every((raw) => raw.isClosed()), 30_000);
  });
});
