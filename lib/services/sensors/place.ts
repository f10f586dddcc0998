import { Op, type Transaction } from 'sequelize';
import { Assignment, Sensor } from '@/db/models';
import { ConflictError, NotFoundError } from '@/lib/errors';

/** @throws NotFoundError for another cellar's sensor as for none at all. */
export async function loadSensor(cellarId: string, identifier: string, transaction?: Transaction): Promise<Sensor> {
  const sensor = await Sensor.findOne({ where: { cellarId, identifier }, transaction, ...(transaction && { lock: transaction.LOCK.UPDATE }) });
  if (!sensor) throw new NotFoundError('sensor');
  return sensor;
}

/** Ends where the sensor is; an assignment that would have no length goes. */
export async function takeOut(where: { sensorId?: number; batchId?: string }, at: Date, transaction: Transaction): Promise<string[]> {
  const open = await Assignment.findAll({ where: { ...where, toAt: { [Op.is]: null } }, transaction, lock: transaction.LOCK.UPDATE });
  for (const assignment of open) {
    if (assignment.fromAt >= at) await assignment.destroy({ transaction });
    else await assignment.update({ toAt: at }, { transaction });
  }
  return open.map((assignment) => assignment.batchId);
}

/**
 * Puts a sensor into a batch from `at` on: it leaves the batch it was in, and the
 * sensor that was in this one leaves it, since a batch follows one sensor.
 * @returns the batches that lost or gained a sensor.
 */
export async function placeSensor(sensor: Sensor, batchId: string, at: Date, transaction: Transaction): Promise<string[]> {
  if (sensor.disabledAt) throw new ConflictError('This sensor is switched off. Switch it on first.');
  const left = await takeOut({ sensorId: sensor.id }, at, transaction);
  await takeOut({ batchId }, at, transaction);
  // It may have been elsewhere after `at` and have come out since: what it measured then stays there.
  const last = await Assignment.findOne({ where: { sensorId: sensor.id, toAt: { [Op.gt]: at } }, order: [['toAt', 'DESC']], transaction });
  await Assignment.create({ cellarId: sensor.cellarId, sensorId: sensor.id, batchId, fromAt: last?.toAt ?? at }, { transaction });
  return [...new Set([...left, batchId])];
}
