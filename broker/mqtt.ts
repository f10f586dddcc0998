import { Aedes } from 'aedes';
import { createServer, type AddressInfo } from 'node:net';
import { SensorDirectory } from '@/lib/auth/sensors';
import { logFor } from '@/lib/log';
import type { Message, Recorded } from '@/lib/services/readings/record';
import { Hooks } from './hooks';
import { Ingest, type IngestCounts } from './ingest';
import { Door, LIMITS, type Limits } from './limits';

const log = logFor('broker');

/** A credential that was taken back is cut off within this and what the directory remembers. */
const LOOK_FOR_REVOKED_MS = 2_000;
/** What a client may have sent behind its CONNECT while that is checked; bytes are limited besides. */
const QUEUED_BEHIND_CONNECT = 500;
const QOS_2_IN_FLIGHT = 20;

export interface BrokerOptions {
  host: string;
  port: number;
  record: (messages: readonly Message[]) => Promise<Recorded>;
  limits?: Partial<Limits>;
}

export interface Broker {
  port: number;
  figures(): Record<keyof IngestCounts | 'connections' | 'sensors', number>;
  /** Lays a message on a topic for whoever subscribes to it later. */
  retain(topic: string, payload: string): Promise<void>;
  /** Takes no more, commits and acknowledges what it has, closes; true where nothing was left over. */
  stop(patienceMs: number): Promise<boolean>;
}

/** The embedded MQTT broker with the ingest behind it: an acknowledgement means "in PostgreSQL". */
export async function startBroker(options: BrokerOptions): Promise<Broker> {
  const limits = { ...LIMITS, ...options.limits };
  const door = new Door(limits);
  const ingest = new Ingest({ record: options.record, onFull: (full) => door.setFull(full) });
  const hooks = new Hooks({ directory: new SensorDirectory(), ingest, door });
  // No fixed id: after a restart the library would take its own old packets for doubles.
  const aedes = await Aedes.createBroker({
    ...hooks.options(),
    connectTimeout: limits.signInMs,
    queueLimit: QUEUED_BEHIND_CONNECT,
    maxInflightInbound: QOS_2_IN_FLIGHT,
  });
  for (const event of ['clientError', 'connectionError'] as const) aedes.on(event, (_client, error) => log.debug({ err: error }, event));
  // Not in the library's types, yet thrown where nobody listens.
  (aedes as NodeJS.EventEmitter).on('error', (error) => log.error({ err: error }, 'the broker reports an error'));

  const server = createServer((socket) => {
    if (door.admit(socket)) aedes.handle(socket);
  });
  await new Promise<void>((resolve, reject) => server.once('error', reject).listen(options.port, options.host, resolve));
  server.on('error', (error) => log.error({ err: error }, 'the listening socket reports an error'));

  let looking = false;
  const revocations = setInterval(() => {
    if (looking) return;
    looking = true;
    hooks
      .cutRevoked()
      .catch((error: unknown) => log.warn({ err: error }, 'could not look for revoked credentials'))
      .finally(() => (looking = false));
  }, LOOK_FOR_REVOKED_MS);

  return {
    port: (server.address() as AddressInfo).port,
    figures: () => ({ ...ingest.counts, connections: door.connections, sensors: hooks.sensorsConnected }),
    retain: (topic, payload) =>
      new Promise((resolve, reject) => {
        aedes.publish({ cmd: 'publish', topic, payload: Buffer.from(payload), qos: 1, retain: true, dup: false }, (error) => (error ? reject(error) : resolve()));
      }),
    stop: async (patienceMs) => {
      clearInterval(revocations);
      server.close();
      door.setFull(true);
      const drained = await ingest.drain(patienceMs);
      // The acknowledgements of the last commit are written in the turns after it.
      await new Promise((resolve) => setTimeout(resolve, 50));
      await new Promise<void>((resolve) => aedes.close(() => resolve()));
      door.close();
      return drained;
    },
  };
}
