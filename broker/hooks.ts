import type { AedesOptions, AuthenticateError, Client, ConnectPacket } from 'aedes';
import type { Socket } from 'node:net';
import { RateLimiterMemory } from 'rate-limiter-flexible';
import { hashSensorSecret, revokedSensors, type SensorDirectory, type SensorIdentity } from '@/lib/auth/sensors';
import { systemClock, type Clock } from '@/lib/clock';
import { readingsTopic, settingsTopic } from '@/lib/contracts/topics';
import { logFor } from '@/lib/log';
import { RETAINED, type Ingest } from './ingest';
import { addressOf, type Door } from './limits';

const log = logFor('broker');

/** Return codes of CONNACK (MQTT 3.1.1, table 3.1). */
const IDENTIFIER_REJECTED = 2;
const SERVER_UNAVAILABLE = 3;
const BAD_USER_NAME_OR_PASSWORD = 4;
const NOT_AUTHORIZED = 5;

/** Wrong secrets in a minute, for one name from one address, and from one address in all. */
const WRONG_FOR_A_NAME = 10;
const WRONG_FROM_AN_ADDRESS = 300;
/** A sensor has one connection; a second or third may be a dead one that has not timed out. */
const CONNECTIONS_PER_SENSOR = 8;

interface SignedIn {
  identity: SensorIdentity;
  secretHash: Buffer;
}

export interface HookParts {
  directory: SensorDirectory;
  ingest: Pick<Ingest, 'accept'>;
  door: Door;
}

/** Who may come in, and what they may do: the broker's rules in one place. */
export class Hooks {
  /** Connections that are open. */
  private readonly signedIn = new Map<Client, SignedIn>();
  /** Who a client was, for as long as the library knows it: its will is published when its connection is gone. */
  private readonly senders = new WeakMap<Client, SensorIdentity>();
  private readonly connects = new WeakMap<Client, ConnectPacket>();
  private readonly wrongForName = new RateLimiterMemory({ points: WRONG_FOR_A_NAME, duration: 60 });
  private readonly wrongFromAddress = new RateLimiterMemory({ points: WRONG_FROM_AN_ADDRESS, duration: 60 });
  private readonly strayKept = new RateLimiterMemory({ points: 1, duration: 60 });

  constructor(
    private readonly parts: HookParts,
    private readonly clock: Clock = systemClock,
  ) {}

  get sensorsConnected(): number {
    return new Set([...this.signedIn.values()].map((entry) => entry.identity.id)).size;
  }

  options(): Pick<AedesOptions, 'preConnect' | 'authenticate' | 'authorizePublish' | 'authorizeSubscribe' | 'authorizeForward'> {
    return {
      preConnect: (client, packet, callback) => {
        this.connects.set(client, { ...packet });
        // No session outlives its connection: readings need none, and sessions that nobody comes back to would pile up.
        packet.clean = true;
        callback(null, true);
      },
      authenticate: (client, username, password, callback) => {
        this.signIn(client, username, password).then(
          () => callback(null, true),
          (error: unknown) => callback(refusalOf(error), null),
        );
      },
      authorizePublish: (client, packet, callback) => {
        const sensor = client && this.senders.get(client);
        if (!sensor) return callback(new Error('nobody is signed in here'));
        const body = typeof packet.payload === 'string' ? Buffer.from(packet.payload) : packet.payload;
        if (packet.topic !== readingsTopic(sensor.identifier)) {
          this.parts.door.count('published to a topic that is not its own');
          this.keepStray(sensor, body);
          return callback(new Error('a sensor publishes to its own topic only'));
        }
        // A retained reading would be handed out as new for ever; the flag goes, and the sensor's page says why.
        const refusedBecause = packet.retain ? RETAINED : undefined;
        packet.retain = false;
        // The library acknowledges when this is called back: after COMMIT.
        this.parts.ingest.accept({ sensor, road: 'mqtt', body, arrivedAt: this.clock.now(), refusedBecause }, () => callback(null));
      },
      authorizeSubscribe: (client, subscription, callback) => {
        const known = this.signedIn.get(client);
        if (known && subscription.topic === settingsTopic(known.identity.identifier)) return callback(null, subscription);
        this.parts.door.count('asked for a topic that is not its own');
        callback(null, null);
      },
      authorizeForward: (client, packet) => {
        const known = this.signedIn.get(client);
        return known && packet.topic === settingsTopic(known.identity.identifier) ? packet : null;
      },
    };
  }

  /** Cuts off sensors that were switched off, removed, or given a new secret since they signed in. */
  async cutRevoked(): Promise<void> {
    const hashes = new Map<number, Buffer>();
    for (const { identity, secretHash } of this.signedIn.values()) hashes.set(identity.id, secretHash);
    const revoked = new Set(await revokedSensors(hashes));
    if (revoked.size === 0) return;
    for (const [client, { identity }] of this.signedIn) {
      if (!revoked.has(identity.id)) continue;
      this.parts.directory.forget(identity.identifier);
      log.info({ sensor: identity.identifier }, 'cut off: its credential is no longer valid');
      this.signedIn.delete(client);
      this.senders.delete(client);
      client.close();
    }
  }

  private async signIn(client: Client, username: string | undefined, password: Buffer | undefined): Promise<void> {
    const connect = this.connects.get(client);
    // [MQTT-3.1.3-8]: a session to be kept needs a name.
    if (connect && !connect.clientId && !connect.clean) throw new SignInRefused(IDENTIFIER_REJECTED);
    if (!username || !password) throw new SignInRefused(BAD_USER_NAME_OR_PASSWORD);

    const socket = client.conn as Socket;
    const address = addressOf(socket);
    const name = `${address} ${username}`;
    const [forName, fromAddress] = await Promise.all([this.wrongForName.get(name), this.wrongFromAddress.get(address)]);
    if ((forName?.remainingPoints ?? 1) <= 0 || (fromAddress?.remainingPoints ?? 1) <= 0) {
      this.parts.door.count('tried too many wrong secrets');
      throw new SignInRefused(NOT_AUTHORIZED);
    }
    const identity = await this.parts.directory.authenticate(username, password);
    if (!identity) {
      this.parts.door.count('signed in with a wrong secret');
      await Promise.all([this.wrongForName.penalty(name), this.wrongFromAddress.penalty(address)]);
      throw new SignInRefused(BAD_USER_NAME_OR_PASSWORD);
    }
    const will = connect?.will;
    if (will && (will.topic !== readingsTopic(identity.identifier) || will.retain)) {
      this.parts.door.count('left a will for a topic that is not its own');
      throw new SignInRefused(NOT_AUTHORIZED);
    }
    if (client.closed || socket.destroyed) return;

    // The name of a client belongs to its sensor: no other one can take the connection over, or block the name.
    (client as { id: string }).id = `${identity.identifier}/${client.id}`;
    this.closeOldest(identity);
    this.signedIn.set(client, { identity, secretHash: hashSensorSecret(password) });
    this.senders.set(client, identity);
    socket.once('close', () => this.signedIn.delete(client));
    this.parts.door.signedIn(socket);
  }

  private closeOldest(identity: SensorIdentity): void {
    const own = [...this.signedIn].filter(([, entry]) => entry.identity.id === identity.id).map(([client]) => client);
    if (own.length < CONNECTIONS_PER_SENSOR) return;
    this.parts.door.count('had too many connections; the oldest was closed');
    own[0]?.close();
  }

  /** Once a minute for each sensor: enough for its page to say what is wrong. */
  private keepStray(sensor: SensorIdentity, body: Buffer): void {
    this.strayKept.consume(sensor.id).then(
      () => this.parts.ingest.accept({ sensor, road: 'mqtt', body, arrivedAt: this.clock.now(), refusedBecause: `it was sent to another topic than ${readingsTopic(sensor.identifier)}` }, () => undefined),
      () => undefined,
    );
  }
}

class SignInRefused extends Error {
  constructor(readonly returnCode: number) {
    super(`sign-in refused (${returnCode})`);
  }
}

function refusalOf(error: unknown): AuthenticateError {
  if (error instanceof SignInRefused) return error;
  log.warn({ err: error }, 'a sign-in could not be checked');
  return new SignInRefused(SERVER_UNAVAILABLE);
}
