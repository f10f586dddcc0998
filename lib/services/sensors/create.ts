import { inTransaction } from '@/db/client';
import { Sensor } from '@/db/models';
import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import { hashSensorSecret, makeSensorIdentifier, makeSensorSecret } from '@/lib/auth/sensors';
import type { CreatedSensorBody, CreateSensor } from '@/lib/contracts/sensors';
import { readingsTopic } from '@/lib/contracts/topics';
import { auditBy } from '../audit/write';
import { notifyChange } from '../changes';
import { getSensor } from './get';

/** Makes a sensor. Its secret is in this answer and nowhere else: only a hash is kept. */
export async function createSensor(actor: Actor, input: CreateSensor): Promise<CreatedSensorBody> {
  authorize(actor, 'sensors.manage');
  const identifier = makeSensorIdentifier();
  const secret = makeSensorSecret();
  return inTransaction(async (transaction) => {
    await Sensor.create({ cellarId: actor.cellarId, identifier, secretHash: hashSensorSecret(secret), name: input.name, kind: input.kind, intervalS: input.interval_s }, { transaction });
    await auditBy(actor, 'sensor.created', identifier, { name: input.name }, transaction);
    await notifyChange({ cellar: actor.cellarId, kind: 'sensor', batch: null }, transaction);
    return { ...(await getSensor(actor, identifier, transaction)), secret, topic: readingsTopic(identifier) };
  });
}
