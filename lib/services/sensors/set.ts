import type { z } from 'zod';
import { inTransaction } from '@/db/client';
import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import { systemClock, type Clock } from '@/lib/clock';
import type { SensorBody, sensorSettingsForm } from '@/lib/contracts/sensors';
import { auditBy } from '../audit/write';
import { notifyChange } from '../changes';
import { getSensor } from './get';
import { loadSensor } from './place';

/** Sends settings down: the broker keeps them for the sensor until it confirms them with its readings. */
export async function setSensor(actor: Actor, identifier: string, input: z.infer<typeof sensorSettingsForm>, clock: Clock = systemClock): Promise<SensorBody> {
  authorize(actor, 'sensors.manage');
  return inTransaction(async (transaction) => {
    const sensor = await loadSensor(actor.cellarId, identifier, transaction);
    await sensor.update({ wantedIntervalS: input.interval_s, settingsVersion: sensor.settingsVersion + 1, settingsAt: new Date(clock.now()) }, { transaction });
    await auditBy(actor, 'sensor.set', identifier, { ...input }, transaction);
    await notifyChange({ cellar: actor.cellarId, kind: 'sensor', batch: null }, transaction);
    return getSensor(actor, identifier, transaction);
  });
}
