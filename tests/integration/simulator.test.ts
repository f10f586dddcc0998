import { spawn } from 'node:child_process';
import { once } from 'node:events';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { createServer, type AddressInfo, type Server, type Socket } from 'node:net';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { Aedes } from 'aedes';
import { afterEach, describe, expect, test, vi } from 'vitest';
import { generate } from '@/devices/simulator/generate';
import { scenarioNamed } from '@/devices/simulator/scenarios';
import { SensorLink, type LinkState } from '@/devices/simulator/sensor-link';
import type { TelemetryReading } from '@/lib/contracts/telemetry';

const SECRETS: Record<string, string> = { 'float-1': 'one', 'float-2': 'two' };

interface Message {
  client: string;
  topic: string;
  qos: number;
  readings: TelemetryReading[];
}

/** A broker that checks sign-ins and acknowledges when it is told to. */
class TestBroker {
  readonly messages: Message[] = [];
  acknowledging = true;
  port = 0;
  private server: Server | undefined;
  private aedes: Aedes | undefined;
  private sockets = new Set<Socket>();

  async start(): Promise<void> {
    const aedes = await Aedes.createBroker({
      authenticate: (client, username, password, done) => done(null, username !== undefined && SECRETS[username] === password?.toString()),
      authorizePublish: (client, packet, done) => {
        if (!this.acknowledging) return;
        const body: unknown = JSON.parse(packet.payload.toString());
        // The publisher is under test here, not the contract's parser.
        const readings = (Array.isArray(body) ? body : [body]) as TelemetryReading[];
        this.messages.push({ client: client?.id ?? '', topic: packet.topic, qos: packet.qos, readings });
        done(null);
      },
    });
    const server = createServer((socket) => {
      this.sockets.add(socket);
      socket.on('close', () => this.sockets.delete(socket));
      aedes.handle(socket);
    });
    server.listen(this.port, '127.0.0.1');
    await once(server, 'listening');
    this.port = (server.address() as AddressInfo).port;
    this.server = server;
    this.aedes = aedes;
  }

  /** Goes away without a word, as with a pulled plug. */
  async kill(): Promise<void> {
    const { server, aedes } = this;
    if (!server || !aedes) return;
    this.server = this.aedes = undefined;
    for (const socket of this.sockets) socket.destroy();
    server.close();
    await new Promise<void>((resolve) => aedes.close(() => resolve()));
  }

  get url(): string {
    return `mqtt://127.0.0.1:${this.port}`;
  }

  get readings(): TelemetryReading[] {
    return this.messages.flatMap(({ readings }) => readings);
  }
}

const open: (() => unknown)[] = [];
afterEach(async () => {
  for (const close of open.splice(0).reverse()) await close();
});

async function broker(): Promise<TestBroker> {
  const made = new TestBroker();
  await made.start();
  open.push(() => made.kill());
  return made;
}

function linkTo(target: TestBroker, secret = 'one', onState?: (state: LinkState, detail?: string) => void): SensorLink {
  const link = new SensorLink({ url: target.url, sensor: 'float-1', secret, reconnectMs: 50, onState });
  open.push(() => link.close(0));
  return link;
}

const start = Date.UTC(2026, 1, 1);
const bodies = generate(scenarioNamed('healthy-cider'), { seed: 1, start, end: start + 6 * 86_400_000 }).readings.map(({ body }) => body);

const [first = { temperature: 18, gravity: 1.05 }] = bodies;

const settled = (link: SensorLink) => vi.waitFor(() => expect(link.waiting).toBe(0), { timeout: 10_000 });

describe('a float’s link to the broker', () => {
  test('signs in as the sensor and publishes to its own topic with QoS 1, in order, many to a message', async () => {
    const target = await broker();
    const link = linkTo(target);
    for (const body of bodies) link.send(body);
    link.pump();
    await settled(link);
    expect(target.readings).toEqual(bodies);
    expect(target.messages).toHaveLength(Math.ceil(bodies.length / 200));
    expect(new Set(target.messages.map(({ topic, qos }) => `${topic} ${qos}`))).toEqual(new Set(['fallbright/v1/float-1/readings 1']));
    expect(link.acknowledged).toBe(bodies.length);
  });

  test('sends again what was not acknowledged when the broker is back, and what came meanwhile after it', async () => {
    const target = await broker();
    const link = linkTo(target);
    link.send(first);
    link.pump();
    await settled(link);
    target.acknowledging = false;
    for (const body of bodies.slice(1, 11)) link.send(body);
    link.pump();
    await vi.waitFor(() => expect(link.waiting).toBe(10));
    await target.kill();
    for (const body of bodies.slice(11, 21)) link.send(body);
    link.pump();
    expect(link.acknowledged).toBe(1);
    target.acknowledging = true;
    await target.start();
    await settled(link);
    expect(target.readings).toEqual(bodies.slice(0, 21));
  });

  test('loses nothing over ten times that the broker dies', async () => {
    const target = await broker();
    const link = linkTo(target);
    for (let round = 0; round < 10; round += 1) {
      for (const body of bodies.slice(round * 20, round * 20 + 20)) {
        link.send(body);
        link.pump();
      }
      // At another point of the exchange each time.
      await new Promise((resolve) => setTimeout(resolve, round * 3));
      await target.kill();
      await target.start();
    }
    await settled(link);
    const times = new Set(target.readings.map(({ at }) => at));
    expect([...times]).toEqual(bodies.slice(0, 200).map(({ at }) => at));
  });

  test('keeps trying with a wrong secret, and says so once', async () => {
    const target = await broker();
    const states: string[] = [];
    const link = linkTo(target, 'wrong', (state) => states.push(state));
    link.send(first);
    await vi.waitFor(() => expect(states).toEqual(['refused']));
    SECRETS['float-1'] = 'wrong';
    open.push(() => (SECRETS['float-1'] = 'one'));
    await settled(link);
    expect(states).toEqual(['refused', 'connected']);
  });
});

/** Runs the command as `npm run simulate` does. */
function simulate(target: TestBroker, args: string[], dataDir: string) {
  const child = spawn(process.execPath, ['--import', 'tsx', 'devices/simulator/main.ts', ...args], {
    env: { ...process.env, MQTT_URL: target.url, DATA_DIR: dataDir, LOG_LEVEL: 'info' },
    stdio: ['ignore', 'pipe', 'pipe'],
  });
  open.push(() => child.kill('SIGKILL'));
  const output = { text: '' };
  child.stdout.on('data', (chunk: Buffer) => (output.text += chunk.toString()));
  child.stderr.on('data', (chunk: Buffer) => (output.text += chunk.toString()));
  return { child, output, ended: once(child, 'exit') as Promise<[number | null, string | null]> };
}

describe('the simulate command', () => {
  const folder = () => {
    const path = mkdtempSync(join(tmpdir(), 'floats-'));
    open.push(() => rmSync(path, { recursive: true }));
    return path;
  };

  test('plays a scenario on a fast clock until now, never ahead of it, and stops cleanly', async () => {
    const target = await broker();
    const { child, output, ended } = simulate(target, ['--scenario', 'stuck-cold', '--sensor', 'float-1', '--secret', 'one', '--from', '5d', '--speed', '100000'], folder());
    // Five days at 15 minutes, less what is lost on the way.
    await vi.waitFor(() => expect(target.readings.length).toBeGreaterThan(460), { timeout: 30_000, interval: 100 });
    const times = target.readings.map(({ at = '' }) => Date.parse(at));
    expect(Math.max(...times)).toBeLessThanOrEqual(Date.now());
    expect(times).toEqual([...times].sort((one, other) => one - other));
    expect(target.messages.length).toBeGreaterThan(3);
    child.kill('SIGTERM');
    expect(await ended).toEqual([0, null]);
    expect(output.text).toContain('simulated floats stopped');
    expect(output.text).not.toContain('"secret"');
  });

  test('runs the listed sensors, and sends the same again after a restart', async () => {
    const target = await broker();
    const dataDir = folder();
    const startedAt = new Date(Date.now() - 2 * 86_400_000).toISOString();
    const listed = [
      { sensor: 'float-1', secret: 'one', scenario: 'foaming', seed: 5, startedAt, interval_s: 900 },
      { sensor: 'float-2', secret: 'two', scenario: 'never-started', seed: 6, startedAt, interval_s: 1800 },
    ];
    writeFileSync(join(dataDir, 'simulators.json'), JSON.stringify(listed));
    const runs: Record<string, TelemetryReading[]>[] = [];
    for (let run = 0; run < 2; run += 1) {
      target.messages.length = 0;
      const { child, ended } = simulate(target, [], dataDir);
      await vi.waitFor(() => expect(target.readings.length).toBeGreaterThan(275), { timeout: 30_000, interval: 100 });
      child.kill('SIGINT');
      await ended;
      const of = (sensor: string) => target.messages.filter(({ topic }) => topic.includes(sensor)).flatMap(({ readings }) => readings);
      runs.push({ 'float-1': of('float-1'), 'float-2': of('float-2') });
    }
    const [earlier, later] = runs;
    for (const sensor of ['float-1', 'float-2']) {
      const before = earlier?.[sensor] ?? [];
      expect(before.length).toBeGreaterThan(80);
      expect(later?.[sensor]?.slice(0, before.length)).toEqual(before);
    }
  });

  test('lists its scenarios, and answers a wrong name with status 2', async () => {
    const target = await broker();
    const list = simulate(target, ['--list'], folder());
    expect(await list.ended).toEqual([0, null]);
    expect(list.output.text).toMatch(/^healthy-beer +A 1\.048 bitter/);
    const wrong = simulate(target, ['--scenario', 'boiling'], folder());
    expect(await wrong.ended).toEqual([2, null]);
    expect(wrong.output.text).toContain('There is no scenario "boiling"');
  });
});
