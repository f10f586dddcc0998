import { inTransaction } from '@/db/client';
import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import { hashSensorSecret, makeSensorSecret } from '@/lib/auth/sensors';
import { systemClock, type Clock } from '@/lib/clock';
import { auditBy } from '../audit/write';
import { notifyChange } from '../changes';
import { loadSensor, takeOut } from './place';

/** Removes a sensor: its credential opens nothing any more, and what it measured stays with the batches it was in. */
export async function removeSensor(actor: Actor, identifier: string, clock: Clock = systemClock): Promise<void> {
  authorize(actor, 'sensors.manage');
  const now = new Date(clock.now());
  await inTransaction(async (transaction) => {
    const sensor = await loadSensor(actor.cellarId, identifier, transaction);
    const left = await takeOut({ sensorId: sensor.id }, now, transaction);
    // The hash of a secret that nobody was told: should the row ever come back, the old one does not.
    await sensor.update({ removedAt: now, secretHash: hashSensorSecret(makeSensorSecret()) }, { transaction });
    await auditBy(actor, 'sensor.removed', identifier, { name: sensor.name }, transaction);
    for (const batch of [null, ...left]) await notifyChange({ cellar: actor.cellarId, kind: 'sensor', batch }, transaction);
  });
}
