import { createHash, randomBytes, randomInt, timingSafeEqual } from 'node:crypto';
import { Op } from 'sequelize';
import { Sensor } from '@/db/models';
import { database } from '@/db/client';
import { systemClock, type Clock } from '../clock';
import { isSensorIdentifier } from '../contracts/topics';

/** A sensor that showed who it is. */
export interface SensorIdentity {
  /** Key in the database. */
  id: number;
  cellarId: string;
  /** MQTT user name and part of the topic. */
  identifier: string;
}

/** Without the letters and digits that are taken for one another when typed into a device. */
const ALPHABET = '23456789abcdefghjkmnpqrstuvwxyz';

export function makeSensorIdentifier(): string {
  return `fs-${Array.from({ length: 10 }, () => ALPHABET[randomInt(ALPHABET.length)]).join('')}`;
}

/** 192 random bits; shown once, kept only as a hash. */
export function makeSensorSecret(): string {
  return randomBytes(24).toString('base64url');
}

/** A random secret cannot be guessed from a dictionary, so a fast hash is enough. */
export function hashSensorSecret(secret: string | Buffer): Buffer {
  return createHash('sha256').update(secret).digest();
}

interface Known {
  identity: SensorIdentity;
  secretHash: Buffer;
  disabled: boolean;
}

/** How long an answer of the database is believed; a revoked sensor is cut within twice this. */
const REMEMBERED_MS = 2_000;
/** More sensors than this at once and the memory starts anew. */
const REMEMBERED_MAX = 20_000;
/** Compared against where there is no such sensor, so that both answers take as long. */
const NOBODY = Buffer.alloc(32);

/** Who the sensors are, remembered for a moment so that a storm of sign-ins does not become a storm of queries. */
export class SensorDirectory {
  private readonly remembered = new Map<string, { known: Promise<Known | null>; until: number }>();

  constructor(private readonly clock: Clock = systemClock) {}

  /** The sensor, where the secret is right and nobody switched it off; else null. */
  async authenticate(identifier: string, secret: string | Buffer): Promise<SensorIdentity | null> {
    const known = await this.find(identifier);
    const right = timingSafeEqual(hashSensorSecret(secret), known?.secretHash ?? NOBODY);
    return right && known && !known.disabled ? known.identity : null;
  }

  /** The sensor by its name alone, where another broker has already checked its secret. */
  async byIdentifier(identifier: string): Promise<{ identity: SensorIdentity; disabled: boolean } | null> {
    return this.find(identifier);
  }

  /** Asks the database again at the next sign-in of this sensor. */
  forget(identifier: string): void {
    this.remembered.delete(identifier);
  }

  private find(identifier: string): Promise<Known | null> {
    if (!isSensorIdentifier(identifier)) return Promise.resolve(null);
    const now = this.clock.now();
    const found = this.remembered.get(identifier);
    if (found && found.until > now) return found.known;
    if (this.remembered.size >= REMEMBERED_MAX) this.remembered.clear();
    const known = load(identifier);
    this.remembered.set(identifier, { known, until: now + REMEMBERED_MS });
    // A failure to ask is not an answer.
    known.catch(() => this.remembered.delete(identifier));
    return known;
  }
}

async function load(identifier: string): Promise<Known | null> {
  database();
  const row = await Sensor.findOne({ where: { identifier, removedAt: null, kind: { [Op.ne]: 'file' } }, raw: true });
  return row && { identity: { id: row.id, cellarId: row.cellarId, identifier: row.identifier }, secretHash: row.secretHash, disabled: row.disabledAt !== null };
}

/** Of these sensors (key to the hash they signed in with), those that may not stay: gone, switched off, or given a new secret. */
export async function revokedSensors(signedIn: ReadonlyMap<number, Buffer>): Promise<number[]> {
  if (signedIn.size === 0) return [];
  database();
  const rows = await Sensor.findAll({ attributes: ['id', 'secretHash'], where: { id: { [Op.in]: [...signedIn.keys()] }, disabledAt: null, removedAt: null }, raw: true });
  const valid = new Map(rows.map((row) => [row.id, row.secretHash]));
  return [...signedIn].filter(([id, hash]) => !valid.get(id)?.equals(hash)).map(([id]) => id);
}
