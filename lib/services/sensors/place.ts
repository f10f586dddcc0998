import { Op, type Transaction } from 'sequelize';
import { Assignment, ProbeAssignment, Sensor } from '@/db/models';
import { ConflictError, NotFoundError } from '@/lib/errors';

/** @throws NotFoundError for another cellar's sensor as for none at all, and for one that was removed. */
export async function loadSensor(cellarId: string, identifier: string, transaction?: Transaction): Promise<Sensor> {
  const sensor = await Sensor.findOne({ where: { cellarId, identifier, removedAt: null, kind: { [Op.ne]: 'file' } }, transaction, ...(transaction && { lock: transaction.LOCK.UPDATE }) });
  if (!sensor) throw new NotFoundError('sensor');
  return sensor;
}

type Stay = Assignment | ProbeAssignment;

async function end(open: Stay[], at: Date, transaction: Transaction): Promise<string[]> {
  for (const stay of open) {
    // One that would have no length goes.
    if (stay.fromAt >= at) await stay.destroy({ transaction });
    else await stay.update({ toAt: at }, { transaction });
  }
  return open.map((stay) => stay.batchId);
}

const openStays = (where: { sensorId?: number; batchId?: string }, transaction: Transaction) => ({ where: { ...where, toAt: { [Op.is]: null } }, transaction, lock: transaction.LOCK.UPDATE });

/** Ends where the sensor is, or what is in the batch: floats and probes. */
export async function takeOut(where: { sensorId?: number; batchId?: string }, at: Date, transaction: Transaction): Promise<string[]> {
  const floats = await Assignment.findAll(openStays(where, transaction));
  const probes = await ProbeAssignment.findAll(openStays(where, transaction));
  return [...(await end(floats, at, transaction)), ...(await end(probes, at, transaction))];
}

/**
 * Puts a sensor into a batch from `at` on: it leaves the batch it was in, and the
 * float that was in this one leaves it, since a batch follows one float. Probes
 * stand beside it, as many as there are.
 * @returns the batches that lost or gained a sensor.
 */
export async function placeSensor(sensor: Sensor, batchId: string, at: Date, transaction: Transaction): Promise<string[]> {
  if (sensor.disabledAt) throw new ConflictError('This sensor is switched off. Switch it on first.');
  const left = await takeOut({ sensorId: sensor.id }, at, transaction);
  const stay = { cellarId: sensor.cellarId, sensorId: sensor.id, batchId };
  const after = { where: { sensorId: sensor.id, toAt: { [Op.gt]: at } }, order: [['toAt', 'DESC']] as [string, string][], transaction };
  // It may have been elsewhere after `at` and have come out since: what it measured then stays there.
  if (sensor.kind === 'room' || sensor.kind === 'foam') {
    const last = await ProbeAssignment.findOne(after);
    await ProbeAssignment.create({ ...stay, fromAt: last?.toAt ?? at }, { transaction });
  } else {
    const fromAt = (await Assignment.findOne(after))?.toAt ?? at;
    // The other float leaves when this one comes: nothing is measured by neither.
    await end(await Assignment.findAll(openStays({ batchId }, transaction)), fromAt, transaction);
    await Assignment.create({ ...stay, fromAt }, { transaction });
  }
  return [...new Set([...left, batchId])];
}
