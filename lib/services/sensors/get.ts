import type { Transaction } from 'sequelize';
import { findSensors } from '@/db/queries/sensors';
import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import type { SensorBody } from '@/lib/contracts/sensors';
import { NotFoundError } from '@/lib/errors';
import { presentSensor } from './present';

/** @throws NotFoundError where the actor's cellar has no such sensor. */
export async function getSensor(actor: Actor, identifier: string, transaction?: Transaction): Promise<SensorBody> {
  authorize(actor, 'sensors.read');
  const [row] = await findSensors({ cellarId: actor.cellarId, identifier, limit: 1 }, transaction);
  if (!row) throw new NotFoundError('sensor');
  return presentSensor(row);
}
