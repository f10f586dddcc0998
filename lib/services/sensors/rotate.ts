import { inTransaction } from '@/db/client';
import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import { hashSensorSecret, makeSensorSecret } from '@/lib/auth/sensors';
import type { CreatedSensorBody } from '@/lib/contracts/sensors';
import { readingsTopic } from '@/lib/contracts/topics';
import { auditBy } from '../audit/write';
import { notifyChange } from '../changes';
import { getSensor } from './get';
import { loadSensor } from './place';

/** A new secret, in this answer and nowhere else; who signed in with the old one is cut off within seconds. */
export async function rotateSensor(actor: Actor, identifier: string): Promise<CreatedSensorBody> {
  authorize(actor, 'sensors.manage');
  const secret = makeSensorSecret();
  return inTransaction(async (transaction) => {
    const sensor = await loadSensor(actor.cellarId, identifier, transaction);
    await sensor.update({ secretHash: hashSensorSecret(secret) }, { transaction });
    await auditBy(actor, 'sensor.rotated', identifier, {}, transaction);
    await notifyChange({ cellar: actor.cellarId, kind: 'sensor', batch: null }, transaction);
    return { ...(await getSensor(actor, identifier, transaction)), secret, topic: readingsTopic(identifier) };
  });
}
