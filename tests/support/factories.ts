import { randomUUID } from 'node:crypto';
import type { CreationAttributes } from 'sequelize';
import { Assignment, Batch, Cellar, Membership, Person, Sensor } from '@/db/models';
import { hashSensorSecret, makeSensorIdentifier, makeSensorSecret } from '@/lib/auth/sensors';

/**
 * Each makes one row, and whatever it needs above it that was not given: a test
 * states only what matters to it.
 */
export function buildPerson(overrides: Partial<CreationAttributes<Person>> = {}): Promise<Person> {
  return Person.create({ name: 'Ada Reed', email: `ada-${randomUUID()}@barn.example`, ...overrides });
}

export function buildCellar(overrides: Partial<CreationAttributes<Cellar>> = {}): Promise<Cellar> {
  return Cellar.create({ name: 'Low barn', ...overrides });
}

export async function buildMembership(overrides: Partial<CreationAttributes<Membership>> = {}): Promise<Membership> {
  const cellarId = overrides.cellarId ?? (await buildCellar()).id;
  const personId = overrides.personId ?? (await buildPerson()).id;
  return Membership.create({ role: 'keeper', ...overrides, cellarId, personId });
}

export async function buildBatch(overrides: Partial<CreationAttributes<Batch>> = {}): Promise<Batch> {
  const cellarId = overrides.cellarId ?? (await buildCellar()).id;
  return Batch.create({ name: 'Rye beer', kind: 'beer', drinkColour: 'amber', vesselKind: 'carboy', volumeL: 9, vesselL: 10, neck: 'airlock', ...overrides, cellarId });
}

/** A sensor and the secret that only its maker knows. */
export async function buildSensor(overrides: Partial<CreationAttributes<Sensor>> = {}): Promise<{ sensor: Sensor; secret: string }> {
  const secret = makeSensorSecret();
  const cellarId = overrides.cellarId ?? (await buildCellar()).id;
  const sensor = await Sensor.create({ identifier: makeSensorIdentifier(), secretHash: hashSensorSecret(secret), name: 'Float one', ...overrides, cellarId });
  return { sensor, secret };
}

/** Puts a sensor in a batch of its own cellar. */
export async function buildAssignment(overrides: Partial<CreationAttributes<Assignment>> = {}): Promise<Assignment> {
  const sensor = overrides.sensorId === undefined ? (await buildSensor(overrides.cellarId ? { cellarId: overrides.cellarId } : {})).sensor : await Sensor.findByPk(overrides.sensorId, { rejectOnEmpty: true });
  const batchId = overrides.batchId ?? (await buildBatch({ cellarId: sensor.cellarId })).id;
  return Assignment.create({ fromAt: new Date('2026-01-01T00:00:00Z'), ...overrides, cellarId: sensor.cellarId, sensorId: sensor.id, batchId });
}
