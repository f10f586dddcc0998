import { randomUUID } from 'node:crypto';
import { database } from '@/db/client';
import { Assignment, Batch, Cellar, Entry, Membership, Person, Sensor } from '@/db/models';
import { ensurePartitions, monthOf } from '@/db/queries/partitions';
import { hashSensorSecret, makeSensorIdentifier, makeSensorSecret } from '@/lib/auth/sensors';
import type { Actor } from '@/lib/auth/policies';
import type { Role } from '@/lib/core/roles';

/** Each builder makes the parents that are missing, so that a test states only what matters. */

const short = () => randomUUID().slice(0, 8);

export const buildCellar = (overrides: Partial<Cellar> = {}) => Cellar.create({ name: `Cellar ${short()}`, ...overrides });

export const buildPerson = (overrides: Partial<Person> = {}) => {
  const tag = short();
  return Person.create({ name: `Person ${tag}`, email: `${tag}@cellar.example`, ...overrides });
};

/** A person with a role in a cellar, and the actor that services ask for. */
export async function buildMember(role: Role = 'keeper', overrides: { cellarId?: string; name?: string; email?: string } = {}): Promise<Actor & { person: Person }> {
  const { cellarId = (await buildCellar()).id, ...person } = overrides;
  const made = await buildPerson(person);
  await Membership.create({ cellarId, personId: made.id, role });
  return { personId: made.id, cellarId, role, person: made };
}

export async function buildBatch(overrides: Partial<Batch> = {}): Promise<Batch> {
  const cellarId = overrides.cellarId ?? (await buildCellar()).id;
  return Batch.create({ name: `Batch ${short()}`, kind: 'beer', drinkColour: 'amber', vesselKind: 'demijohn', volumeL: 4.5, vesselL: 5, neck: 'airlock', ...overrides, cellarId });
}

export async function buildEntry(batch: Batch, overrides: Partial<Entry> = {}): Promise<Entry> {
  return Entry.create({ cellarId: batch.cellarId, batchId: batch.id, kind: 'note', at: new Date(), ...overrides });
}

/** A sensor with its secret; with a batch it is in it from `fromAt` (the batch's pitch, or long ago) on. */
export async function buildSensor(overrides: Partial<Sensor> & { batch?: Batch; fromAt?: Date } = {}): Promise<{ sensor: Sensor; secret: string }> {
  const { batch, fromAt, ...fields } = overrides;
  const cellarId = fields.cellarId ?? batch?.cellarId ?? (await buildCellar()).id;
  const secret = makeSensorSecret();
  const sensor = await Sensor.create({ identifier: makeSensorIdentifier(), secretHash: hashSensorSecret(secret), name: `Float ${short()}`, ...fields, cellarId });
  if (batch) await Assignment.create({ cellarId, sensorId: sensor.id, batchId: batch.id, fromAt: fromAt ?? batch.pitchedAt ?? new Date(Date.UTC(2020, 0, 1)) });
  return { sensor, secret };
}

export interface ReadingInput {
  /** ms since 1970. */
  at: number;
  gravity: number | null;
  temperature?: number;
  /** ms since 1970; absent: when it was measured. */
  receivedAt?: number;
}

/** Writes readings past the ingest, as if they had been taken. */
export async function writeReadings(sensorId: number, readings: readonly ReadingInput[]): Promise<void> {
  await ensurePartitions(
    database(),
    readings.map((reading) => monthOf(reading.at)),
  );
  await database().query(
    `insert into readings (sensor_id, measured_at, received_at, gravity, temperature)
     select $sensorId, to_timestamp(r.at / 1000), to_timestamp(coalesce(r."receivedAt", r.at) / 1000), r.gravity, coalesce(r.temperature, 20)
     from jsonb_to_recordset($readings::jsonb) as r (at float8, "receivedAt" float8, gravity float8, temperature float8)
     on conflict do nothing`,
    { bind: { sensorId, readings: JSON.stringify(readings) } },
  );
}
