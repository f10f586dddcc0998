import mqtt, { type IClientOptions, type MqttClient } from 'mqtt';
import { setTimeout as pause } from 'node:timers/promises';
import { SensorDirectory } from '@/lib/auth/sensors';
import { systemClock } from '@/lib/clock';
import { ALL_READINGS, sensorOfTopic } from '@/lib/contracts/topics';
import { logFor } from '@/lib/log';
import type { Message, Recorded } from '@/lib/services/readings/record';
import { Ingest, RETAINED, type IngestCounts } from './ingest';

const log = logFor('subscriber');

/**
 * The client library reads the next message only when the one before is
 * acknowledged, so a batch is as large as there are connections. They share the
 * subscription: each message goes to one of them.
 */
const CONNECTIONS = 16;
const REFUSED = 128;
/** Longer than the longest stall of the database: while a message waits, no ping is answered. */
const KEEPALIVE_S = 300;
const RECONNECT_MS = 1_000;
const RETRY_MS = 1_000;

export interface SubscriptionOptions {
  url: string;
  /** Names this process at the broker across restarts, so that it finds the messages kept for it. */
  instance: string;
  record: (messages: readonly Message[]) => Promise<Recorded>;
  connections?: number;
  /** The broker is back after it was away: it may have forgotten what was laid on its topics. */
  onBack?: () => void;
}

export interface Subscription {
  figures(): Record<keyof IngestCounts | 'connections', number>;
  stop(patienceMs: number): Promise<boolean>;
}

/**
 * The ingest's second door: an existing MQTT broker holds the readings for us
 * (persistent sessions, QoS 1) until they are committed. Who may publish to a
 * sensor's topic is that broker's to check; a topic of no sensor of ours is refused.
 */
export class OutsideBroker implements Subscription {
  private readonly clients: MqttClient[] = [];
  private readonly ingest: Ingest;
  private readonly directory = new SensorDirectory();
  private readonly connections: number;
  /**
   * A broker hands messages to members of a share that are away, too, and keeps
   * them for their return. So the share is this process's alone: one that never
   * comes back must not hold what others wait for. Two processes both take every
   * message, and the table keeps one.
   */
  private readonly shared: string;
  private stopped = false;

  private constructor(private readonly options: SubscriptionOptions) {
    this.connections = options.connections ?? CONNECTIONS;
    this.shared = `$share/fallbright-${options.instance}-of-${this.connections}/${ALL_READINGS}`;
    this.ingest = new Ingest({ record: options.record });
  }

  /** Resolves when the first connection is subscribed; the broker may come up later than we do. */
  static async subscribe(options: SubscriptionOptions): Promise<OutsideBroker> {
    const outside = new OutsideBroker(options);
    await outside.open(0);
    await Promise.all(Array.from({ length: outside.connections - 1 }, (_, index) => outside.open(index + 1)));
    return outside;
  }

  figures(): Record<keyof IngestCounts | 'connections', number> {
    return { ...this.ingest.counts, connections: this.clients.filter((client) => client.connected).length };
  }

  /** Lays a sensor's settings on its topic; fails where that broker does not let us. */
  async retain(topic: string, payload: string): Promise<void> {
    const client = this.clients.find((one) => one.connected);
    if (!client) throw new Error('the outside broker is away');
    await client.publishAsync(topic, payload, { qos: 1, retain: true });
  }

  /** Stops reading, commits and acknowledges what it holds; the broker keeps the rest. */
  async stop(patienceMs: number): Promise<boolean> {
    this.stopped = true;
    const drained = await this.ingest.drain(patienceMs);
    await pause(50);
    await Promise.all(this.clients.map((client) => client.endAsync(true)));
    return drained;
  }

  private open(index: number): Promise<void> {
    const settings: IClientOptions = {
      clientId: `fallbright-${this.options.instance}-${index}-of-${this.connections}`,
      protocolVersion: 4,
      clean: false,
      keepalive: KEEPALIVE_S,
      reconnectPeriod: RECONNECT_MS,
      reconnectOnConnackError: true,
      // Asked for on every connection instead: a broker that lost its sessions must hear it again.
      resubscribe: false,
    };
    const client = mqtt.connect(this.options.url, settings);
    this.clients.push(client);
    let connection = 0;
    client.handleMessage = (packet, callback) => {
      if (this.stopped) return; // No acknowledgement: the broker keeps it.
      const body = typeof packet.payload === 'string' ? Buffer.from(packet.payload) : packet.payload;
      const cameOver = connection;
      void this.take(packet.topic, body, packet.retain, () => {
        // On a new connection the broker sends it again, and its old number may by then name another message.
        if (cameOver === connection) callback();
      });
    };
    client.on('close', () => (connection += 1));
    client.on('error', (error) => log.warn({ err: error, index }, 'the outside broker reports an error'));
    client.on('offline', () => log.warn({ index }, 'the outside broker is away'));
    return new Promise((resolve) => {
      client.on('connect', () => {
        if (index === 0 && connection > 0) this.options.onBack?.();
        this.ask(client, index).then(resolve, (error: unknown) => {
          log.error({ err: error, index }, 'the outside broker refused the subscription; asked again');
          // It may be allowed by and by; until then it is not to be stormed.
          void pause(RETRY_MS).then(() => this.stopped || client.reconnect());
        });
      });
    });
  }

  private async ask(client: MqttClient, index: number): Promise<void> {
    const shared = await client.subscribeAsync(this.shared, { qos: 1 }).catch(() => null);
    if (shared?.every((grant) => grant.qos !== REFUSED)) return;
    if (index > 0) {
      // Without shared subscriptions each connection would get every message: the first does it alone.
      client.end();
      return;
    }
    await client.subscribeAsync(ALL_READINGS, { qos: 1 });
    log.warn('the outside broker knows no shared subscriptions; one connection takes all');
  }

  private async take(topic: string, body: Buffer, retained: boolean, committed: () => void): Promise<void> {
    const identifier = sensorOfTopic(topic);
    for (;;) {
      try {
        const known = identifier ? await this.directory.byIdentifier(identifier) : null;
        const refusedBecause = known?.disabled ? 'the sensor is switched off' : retained ? RETAINED : undefined;
        this.ingest.accept({ sensor: known?.identity ?? null, road: 'mqtt', body, arrivedAt: systemClock.now(), refusedBecause }, committed);
        return;
      } catch (error) {
        if (this.stopped) return;
        log.warn({ err: error }, 'the sensor of a message could not be looked up; tried again');
        await pause(RETRY_MS);
      }
    }
  }
}
