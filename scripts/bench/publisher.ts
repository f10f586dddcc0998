import { connect, type Socket } from 'node:net';
import { readingsTopic } from '@/lib/contracts/topics';

/**
 * Sensors as bare sockets, so that the publishing side costs as little as can be:
 * it shares two cores with what is measured. Run as a process of its own; the
 * plan comes as JSON in the last argument, the result goes to stdout as JSON.
 */
export interface Plan {
  port: number;
  sensors: Array<{ identifier: string; secret: string }>;
  messages: number;
  inFlight: number;
  /** Messages a second in all; 0: as fast as they are acknowledged. */
  rate: number;
  /** Every so many messages one is sent a second time. */
  doubleEvery: number;
  /** ms since 1970 of the first reading; each next of a sensor is a second later. */
  from: number;
}

export interface Outcome {
  seconds: number;
  perSecond: number;
  p50: number;
  p99: number;
  distinct: number;
}

const textField = (value: string) => Buffer.concat([Buffer.from([value.length >> 8, value.length & 255]), Buffer.from(value)]);

function lengthField(length: number): Buffer {
  const bytes: number[] = [];
  do {
    const byte = length % 128;
    length = Math.floor(length / 128);
    bytes.push(length > 0 ? byte | 128 : byte);
  } while (length > 0);
  return Buffer.from(bytes);
}

function packet(type: number, ...parts: Buffer[]): Buffer {
  const body = Buffer.concat(parts);
  return Buffer.concat([Buffer.from([type]), lengthField(body.length), body]);
}

class Publisher {
  private socket!: Socket;
  private nextId = 1;
  private readonly sentAt = new Map<number, number>();
  private pending: Buffer = Buffer.alloc(0);
  open = 0;
  sent = 0;

  constructor(
    private readonly plan: Plan,
    private readonly identifier: string,
    private readonly secret: string,
    private readonly onAcknowledged: (publisher: Publisher, latencyMs: number) => void,
  ) {}

  connect(): Promise<void> {
    return new Promise((resolve, reject) => {
      this.socket = connect({ port: this.plan.port, host: '127.0.0.1', noDelay: true });
      this.socket.once('error', reject);
      this.socket.on('data', (chunk) => this.read(chunk, resolve));
      this.socket.write(packet(0x10, textField('MQTT'), Buffer.from([4, 0b11000010, 0, 60]), textField(this.identifier), textField(this.identifier), textField(this.secret)));
    });
  }

  publish(): void {
    const double = this.sent > 0 && this.sent % this.plan.doubleEvery === 0;
    const at = new Date(this.plan.from + (this.sent - (double ? 1 : 0)) * 1000).toISOString();
    this.sent += 1;
    this.open += 1;
    const id = this.nextId;
    this.nextId = (this.nextId % 65_535) + 1;
    this.sentAt.set(id, performance.now());
    const body = `{"at":"${at}","gravity":${(1.05 - (this.sent % 50) / 1000).toFixed(4)},"temperature":19.62,"battery":3.91,"signal":-67,"sequence":${this.sent}}`;
    this.socket.write(packet(0x32, textField(readingsTopic(this.identifier)), Buffer.from([id >> 8, id & 255]), Buffer.from(body)));
  }

  end(): void {
    this.socket.destroy();
  }

  private read(chunk: Buffer, connected: () => void): void {
    this.pending = this.pending.length > 0 ? Buffer.concat([this.pending, chunk]) : chunk;
    let at = 0;
    // CONNACK and PUBACK are both four bytes long.
    for (; at + 4 <= this.pending.length; at += 4) {
      if (this.pending[at] === 0x20) {
        if (this.pending[at + 3] !== 0) throw new Error(`${this.identifier} was not let in (${this.pending[at + 3]})`);
        connected();
        continue;
      }
      const id = this.pending.readUInt16BE(at + 2);
      const began = this.sentAt.get(id);
      if (began === undefined) throw new Error(`an acknowledgement of nothing (${id})`);
      this.sentAt.delete(id);
      this.open -= 1;
      this.onAcknowledged(this, performance.now() - began);
    }
    this.pending = this.pending.subarray(at);
  }
}

async function publish(plan: Plan): Promise<Outcome> {
  const latencies = new Float64Array(plan.messages);
  let acknowledged = 0;
  let sent = 0;
  let done!: () => void;
  const finished = new Promise<void>((resolve) => (done = resolve));
  const flatOut = plan.rate === 0;

  const publishers = plan.sensors.map(
    ({ identifier, secret }) =>
      new Publisher(plan, identifier, secret, (publisher, latency) => {
        latencies[acknowledged] = latency;
        acknowledged += 1;
        if (acknowledged === plan.messages) done();
        else if (flatOut && sent < plan.messages) {
          sent += 1;
          publisher.publish();
        }
      }),
  );
  await Promise.all(publishers.map((publisher) => publisher.connect()));

  const began = performance.now();
  if (flatOut) {
    for (const publisher of publishers)
      for (let index = 0; index < plan.inFlight && sent < plan.messages; index += 1) {
        sent += 1;
        publisher.publish();
      }
  } else {
    const timer = setInterval(() => {
      const due = Math.min(plan.messages, Math.floor(((performance.now() - began) / 1000) * plan.rate));
      for (; sent < due; sent += 1) publishers[sent % publishers.length]!.publish();
      if (sent === plan.messages) clearInterval(timer);
    }, 1);
  }
  await finished;
  const seconds = (performance.now() - began) / 1000;
  for (const publisher of publishers) publisher.end();
  latencies.sort();
  const doubles = publishers.reduce((sum, publisher) => sum + Math.max(0, Math.ceil(publisher.sent / plan.doubleEvery) - 1), 0);
  return { seconds, perSecond: plan.messages / seconds, p50: latencies[Math.floor(plan.messages * 0.5)]!, p99: latencies[Math.floor(plan.messages * 0.99)]!, distinct: plan.messages - doubles };
}

console.log(JSON.stringify(await publish(JSON.parse(process.argv.at(-1)!) as Plan)));
