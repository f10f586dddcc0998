import { Op, type Transaction } from 'sequelize';
import { Assignment, Batch, Cellar, ProbeAssignment, Sensor } from '@/db/models';
import { dayWords } from '@/lib/core/calls/words';
import { wallTime } from '@/lib/core/units/zone';
import { ConflictError, InvalidError, NotFoundError } from '@/lib/errors';

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

/** Times are told by the minute: the one of a stay's beginning or end means it. */
const MINUTE_MS = 60_000;
const liesBefore = (at: Date, mark: Date): boolean => mark.getTime() - at.getTime() >= MINUTE_MS;

/** A time that does not go with where a float was: said at its field, by the cellar's clock. */
async function clash(stay: Stay, mark: Date, says: (batch: string, time: string) => string, transaction: Transaction): Promise<InvalidError> {
  const batch = await Batch.findByPk(stay.batchId, { rejectOnEmpty: true, transaction });
  const { timeZone } = await Cellar.findByPk(stay.cellarId, { rejectOnEmpty: true, transaction });
  const { hour, minute } = wallTime(mark.getTime() / 1000, timeZone);
  const time = `${dayWords(mark.getTime(), timeZone)} ${[hour, minute].map((figure) => String(figure).padStart(2, '0')).join(':')}`;
  return new InvalidError('The time does not go with where the sensors were.', { since: [says(batch.name, time)] });
}

const openOf = async (sensorId: number, transaction: Transaction): Promise<Stay | null> =>
  (await Assignment.findOne(openStays({ sensorId }, transaction))) ?? (await ProbeAssignment.findOne(openStays({ sensorId }, transaction)));

/** @throws InvalidError where it came later than it is said to have left: where it was would be forgotten */
export async function mayLeave(sensor: Sensor, at: Date, transaction: Transaction): Promise<void> {
  const open = await openOf(sensor.id, transaction);
  if (open && liesBefore(at, open.fromAt)) throw await clash(open, open.fromAt, (batch, time) => `came into ${batch} ${time}: choose a later time`, transaction);
}

/** Since when a sensor is somewhere. */
export interface Coming {
  at: Date;
  /** A person said when: where it cannot be then, that is said, and nothing is moved. */
  said: boolean;
  now: Date;
}

/**
 * Puts a sensor into a batch: it leaves the batch it was in, and the float that
 * was in this one leaves it, since a batch follows one float. Probes stand
 * beside it, as many as there are.
 * @returns the batches that lost or gained a sensor.
 * @throws InvalidError at `since` where a stay that is kept would be lost or shifted by it
 */
export async function placeSensor(sensor: Sensor, batchId: string, { at: asked, said, now }: Coming, transaction: Transaction): Promise<string[]> {
  if (sensor.disabledAt) throw new ConflictError('This sensor is switched off. Switch it on first.');
  const open = await openOf(sensor.id, transaction);
  // In the same batch an earlier time only makes its stay longer.
  const elsewhere = open !== null && open.batchId !== batchId;
  if (said && elsewhere) await mayLeave(sensor, asked, transaction);
  // A pitch from before it came to where it is says nothing of when it left there.
  const at = !said && elsewhere && open.fromAt >= asked ? now : asked;
  const left = await takeOut({ sensorId: sensor.id }, at, transaction);
  const stay = { cellarId: sensor.cellarId, sensorId: sensor.id, batchId };
  const after = { where: { sensorId: sensor.id, toAt: { [Op.gt]: at } }, order: [['toAt', 'DESC']] as [string, string][], transaction };
  const probe = sensor.kind === 'room' || sensor.kind === 'foam';
  // It may have been elsewhere after `at` and have come out since: what it measured then stays there.
  const last = probe ? await ProbeAssignment.findOne(after) : await Assignment.findOne(after);
  if (said && last?.toAt && liesBefore(at, last.toAt)) throw await clash(last, last.toAt, (batch, time) => `was in ${batch} until ${time}: choose that or later`, transaction);
  const fromAt = last?.toAt ?? at;
  if (probe) await ProbeAssignment.create({ ...stay, fromAt }, { transaction });
  else {
    const others = await Assignment.findAll(openStays({ batchId }, transaction));
    const later = others.find((other) => other.fromAt >= fromAt);
    if (said && later) {
      const { name } = await Sensor.findByPk(later.sensorId, { rejectOnEmpty: true, transaction });
      throw await clash(later, later.fromAt, (batch, time) => `${name} came into ${batch} ${time}: choose a later time`, transaction);
    }
    // The other float leaves when this one comes: nothing is measured by neither.
    await end(others, fromAt, transaction);
    await Assignment.create({ ...stay, fromAt }, { transaction });
  }
  return [...new Set([...left, batchId])];
}
