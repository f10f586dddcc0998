import { mkdtemp, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { QueryTypes } from 'sequelize';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { useDatabase } from '../support/database';
import { Device } from '../support/devices';
import { buildSensor } from '../support/factories';
import { startMosquitto, type OutsideMqtt } from '../support/mosquitto';
import { startProcess, until, type Running } from '../support/processes';
import { seeded } from '../support/random';

const db = useDatabase();
const DEVICES = 10;
const KILLS = 5;
const STOPS = 2;
const random = seeded(44);
const pause = (ms: number) => new Promise((resolve) => setTimeout(resolve, ms));

let outside: OutsideMqtt;
let folder: string;
let subscriber: Running;
let devices: Device[];
const start = () => startProcess('broker/subscriber.ts', { DATABASE_URL: db.url, MQTT_URL: outside.url, DATA_DIR: folder }, 'subscriber ready');
const rows = async () => (await db.sequelize.query<{ n: number }>('select count(*)::int as n from readings', { type: QueryTypes.SELECT }))[0]!.n;

beforeAll(async () => {
  outside = await startMosquitto();
  folder = await mkdtemp(join(tmpdir(), 'fallbright-subscriber-'));
  subscriber = await start();
  const sensors = await Promise.all(Array.from({ length: DEVICES }, () => buildSensor()));
  devices = sensors.map(({ sensor, secret }) => new Device({ port: outside.port, sensor: sensor.identifier, secret, inFlight: 3, everyMs: 50 }));
  for (const device of devices) device.run();
});
afterAll(async () => {
  await Promise.all(devices.map((device) => device.close()));
  subscriber.kill('SIGTERM');
  expect(await subscriber.ended).toBe(0);
  await outside.stop();
  await rm(folder, { recursive: true, force: true });
});

describe('the ingest at an existing broker, under load', () => {
  it(`killed ${KILLS} times and stopped ${STOPS} times, gets every reading that the broker acknowledged`, async () => {
    for (let time = 0; time < KILLS + STOPS; time += 1) {
      const before = await rows();
      await until('readings to come in', async () => (await rows()) > before);
      await pause(random() * 700);
      subscriber.kill(time < KILLS ? 'SIGKILL' : 'SIGTERM');
      await subscriber.ended;
      subscriber = await start();
    }
    for (const device of devices) device.stop();
    await Promise.all(devices.map((device) => device.settle(20_000)));
    const sent = devices.reduce((sum, device) => sum + device.sent.length, 0);
    await until('every reading', async () => (await rows()) === sent, 30_000);
    console.log(`sent ${sent}, rows ${await rows()}`);
  });
});
