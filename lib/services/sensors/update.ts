import { inTransaction } from '@/db/client';
import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import { systemClock, type Clock } from '@/lib/clock';
import type { SensorBody, UpdateSensor } from '@/lib/contracts/sensors';
import { ConflictError, InvalidError } from '@/lib/errors';
import { auditBy } from '../audit/write';
import { loadBatch } from '../batches/load';
import { notifyChange } from '../changes';
import { notAhead } from '../not-ahead';
import { getSensor } from './get';
import { loadSensor, mayLeave, placeSensor, takeOut } from './place';

/** Puts a sensor in a batch or takes it out (a brewer's work); renames it or switches it off (the keeper's). */
export async function updateSensor(actor: Actor, identifier: string, input: UpdateSensor, clock: Clock = systemClock): Promise<SensorBody> {
  authorize(actor, 'sensors.assign');
  if (input.name !== undefined || input.interval_s !== undefined || input.disabled !== undefined) authorize(actor, 'sensors.manage');
  const now = new Date(clock.now());
  const since = input.since === undefined ? now : new Date(Math.min(now.getTime(), notAhead(input.since, now.getTime(), 'since').getTime()));
  return inTransaction(async (transaction) => {
    const sensor = await loadSensor(actor.cellarId, identifier, transaction);
    if (input.name !== undefined) sensor.set('name', input.name);
    if (input.interval_s !== undefined) sensor.set('intervalS', input.interval_s);
    if (input.disabled !== undefined) sensor.set('disabledAt', input.disabled ? (sensor.disabledAt ?? now) : null);
    if (input.place !== undefined) {
      if (input.place !== null && sensor.kind !== 'room') throw new InvalidError('Only a room probe hangs in a place.', { place: ['only a room probe hangs in a place'] });
      sensor.set('place', input.place);
    }
    await sensor.save({ transaction });

    const touched = new Set<string | null>([null]);
    if (input.batch_id === null) {
      if (input.since !== undefined) await mayLeave(sensor, since, transaction);
      for (const id of await takeOut({ sensorId: sensor.id }, since, transaction)) touched.add(id);
    } else if (input.batch_id !== undefined) {
      const batch = await loadBatch(actor.cellarId, input.batch_id, transaction);
      if (batch.state === 'ended') throw new ConflictError('This batch has ended. Open it again first.');
      for (const id of await placeSensor(sensor, batch.id, { at: since, said: input.since !== undefined, now }, transaction)) touched.add(id);
    }
    await auditBy(actor, 'sensor.updated', identifier, { ...input }, transaction);
    for (const batch of touched) await notifyChange({ cellar: actor.cellarId, kind: 'sensor', batch }, transaction);
    return getSensor(actor, identifier, transaction);
  });
}
