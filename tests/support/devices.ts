import mqtt, { type IClientOptions, type MqttClient } from 'mqtt';
import { connect, type Socket } from 'node:net';
import { readingsTopic } from '@/lib/contracts/topics';

export interface DeviceOptions extends IClientOptions {
  port: number;
  sensor: string;
  secret: string;
}

/** A client with a sensor's credential; it does not come back by itself unless told. */
export function openClient({ port, sensor, secret, ...options }: DeviceOptions): MqttClient {
  const client = mqtt.connect({ host: '127.0.0.1', port, protocol: 'mqtt', username: sensor, password: secret, reconnectPeriod: 0, ...options });
  // Tests look at what became of the connection; an error nobody listens to would end the process.
  client.on('error', () => undefined);
  return client;
}

/** Resolves when signed in; rejects with the broker's reason, or with "closed". */
export function signIn(options: DeviceOptions): Promise<MqttClient> {
  const client = openClient(options);
  return new Promise((resolve, reject) => {
    client.once('connect', () => resolve(client));
    client.once('error', reject);
    client.once('close', () => reject(new Error('closed')));
  });
}

/**
 * A sensor that keeps what was not acknowledged and sends it again after a
 * reconnect, as the contract expects of one. It counts both sides of the promise.
 */
export class Device {
  readonly client: MqttClient;
  readonly sent: string[] = [];
  readonly acknowledged = new Set<string>();
  reconnects = -1;
  private next: number;
  private inFlight = 0;
  private running = false;
  private closed = false;

  constructor(private readonly options: DeviceOptions & { inFlight?: number; everyMs?: number; from?: number }) {
    this.next = options.from ?? Date.parse('2026-02-01T00:00:00Z');
    const { inFlight: _inFlight, everyMs: _everyMs, from: _from, ...rest } = options;
    this.client = openClient({ reconnectPeriod: 100, connectTimeout: 5_000, reconnectOnConnackError: true, ...rest });
    this.client.on('connect', () => (this.reconnects += 1));
  }

  get sensor(): string {
    return this.options.sensor;
  }

  /** Sends readings one after another until {@link stop}, never more than `inFlight` open. */
  run(): void {
    this.running = true;
    this.pump();
  }

  stop(): void {
    this.running = false;
  }

  /** Waits until all that was sent is acknowledged. */
  async settle(patienceMs: number): Promise<void> {
    const deadline = Date.now() + patienceMs;
    while (this.acknowledged.size < this.sent.length) {
      if (Date.now() > deadline) throw new Error(`${this.options.sensor}: ${this.sent.length - this.acknowledged.size} of ${this.sent.length} readings were not acknowledged in ${patienceMs} ms.`);
      await new Promise((resolve) => setTimeout(resolve, 20));
    }
  }

  close(): Promise<void> {
    this.stop();
    this.closed = true;
    return this.client.endAsync(true);
  }

  private pump(): void {
    while (this.running && this.inFlight < (this.options.inFlight ?? 1)) {
      const at = new Date(this.next).toISOString();
      this.next += 1_000;
      this.sent.push(at);
      this.inFlight += 1;
      this.send(at, this.sent.length);
    }
  }

  private send(at: string, sequence: number): void {
    this.client.publish(readingsTopic(this.options.sensor), JSON.stringify({ at, gravity: 1.05, temperature: 19.5, sequence }), { qos: 1 }, (error) => {
      if (error) {
        // The library gives up on what was open when a connection attempt times out; the reading is still ours to deliver.
        if (!this.closed) setTimeout(() => this.send(at, sequence), 100);
        return;
      }
      this.inFlight -= 1;
      this.acknowledged.add(at);
      setTimeout(() => this.pump(), this.options.everyMs ?? 0);
    });
  }
}

/** A bare connection, for what no library would send. */
export async function rawConnection(port: number): Promise<{ socket: Socket; received: () => Buffer; closed: Promise<void>; isClosed: () => boolean }> {
  const socket = connect(port, '127.0.0.1');
  const parts: Buffer[] = [];
  let gone = false;
  socket.on('data', (part) => parts.push(part)).on('error', () => undefined);
  const closed = new Promise<void>((resolve) =>
    socket.once('close', () => {
      gone = true;
      resolve();
    }),
  );
  await new Promise<void>((resolve, reject) => socket.once('connect', resolve).once('error', reject));
  return { socket, received: () => Buffer.concat(parts), closed, isClosed: () => gone };
}

const text = (value: string) => Buffer.concat([Buffer.from([value.length >> 8, value.length & 255]), Buffer.from(value)]);

/** A CONNECT packet of MQTT 3.1.1, section 3.1. */
export function connectPacket({ clientId = '', clean = true, username = '', password = '' }: { clientId?: string; clean?: boolean; username?: string; password?: string }): Buffer {
  const flags = (clean ? 2 : 0) | (username ? 128 : 0) | (password ? 64 : 0);
  const body = Buffer.concat([text('MQTT'), Buffer.from([4, flags, 0, 60]), text(clientId), ...(username ? [text(username)] : []), ...(password ? [text(password)] : [])]);
  return Buffer.concat([Buffer.from([0x10]), lengthOf(body.length), body]);
}

/** The length field of section 2.2.3. */
export function lengthOf(length: number): Buffer {
  const bytes: number[] = [];
  do {
    const byte = length % 128;
    length = Math.floor(length / 128);
    bytes.push(length > 0 ? byte | 128 : byte);
  } while (length > 0);
  return Buffer.from(bytes);
}
