import { Op, type Transaction } from 'sequelize';
import { inTransaction } from '@/db/client';
import { CalibrationPointRow, type Sensor } from '@/db/models';
import { pairCandidates } from '@/db/queries/calibrations';
import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import { systemClock, type Clock } from '@/lib/clock';
import type { CalibrationPointBody, CalibrationPointForm } from '@/lib/contracts/calibration';
import { gravityOfSugarWater } from '@/lib/core/calibration/sugar';
import { ConflictError, InvalidError, NotFoundError } from '@/lib/errors';
import { auditBy } from '../../audit/write';
import { notifyChange } from '../../changes';
import { namesOf } from '../../entries/names';
import { loadSensor } from '../place';
import { presentPoint } from './present';

const MOST_POINTS = 200;

async function loadFloat(actor: Actor, identifier: string, transaction: Transaction): Promise<Sensor> {
  const sensor = await loadSensor(actor.cellarId, identifier, transaction);
  if (sensor.kind !== 'float') throw new ConflictError('Only a float is calibrated; a probe sends no inclination.');
  return sensor;
}

async function keep(actor: Actor, sensor: Sensor, point: Partial<CalibrationPointRow> & Pick<CalibrationPointRow, 'at' | 'inclination' | 'gravity' | 'temperature' | 'source'>, transaction: Transaction): Promise<CalibrationPointBody> {
  if ((await CalibrationPointRow.count({ where: { sensorId: sensor.id, removedAt: { [Op.is]: null } }, transaction })) >= MOST_POINTS) throw new ConflictError(`A sensor keeps at most ${MOST_POINTS} points. Strike some out first.`);
  const row = await CalibrationPointRow.create({ ...point, cellarId: actor.cellarId, sensorId: sensor.id, createdBy: actor.personId }, { transaction });
  await auditBy(actor, 'calibration-point.added', sensor.identifier, { point: row.id }, transaction);
  await notifyChange({ cellar: actor.cellarId, kind: 'sensor', batch: null }, transaction);
  return presentPoint(row, await namesOf([actor.personId], transaction));
}

/** Notes a point made on the bench: water, sugar in water, or any liquid read with a hydrometer. */
export async function addPoint(actor: Actor, identifier: string, input: CalibrationPointForm, clock: Clock = systemClock): Promise<CalibrationPointBody> {
  authorize(actor, 'sensors.calibrate');
  const at = input.at === undefined ? new Date(clock.now()) : new Date(input.at);
  const sugar = input.source === 'sugar' ? input.sugar_g_per_l : null;
  const gravity = input.source === 'water' ? 1 : (input.gravity ?? (sugar === null ? null : gravityOfSugarWater(sugar)));
  if (gravity === null) throw new InvalidError('The point has no gravity.', { gravity: ['is needed: the gravity, or the sugar in a litre'] });
  return inTransaction(async (transaction) => {
    const sensor = await loadFloat(actor, identifier, transaction);
    return keep(actor, sensor, { at, inclination: input.inclination, gravity, temperature: input.temperature, source: input.source, sugarGPerL: sugar }, transaction);
  });
}

/** Takes a hydrometer reading of the log with what the float leaned like then. */
export async function pairPoint(actor: Actor, identifier: string, entryId: string): Promise<CalibrationPointBody> {
  authorize(actor, 'sensors.calibrate');
  return inTransaction(async (transaction) => {
    const sensor = await loadFloat(actor, identifier, transaction);
    const [pair] = await pairCandidates(sensor.id, entryId, transaction);
    if (!pair) throw new NotFoundError('reading by hand beside this float');
    return keep(actor, sensor, { at: pair.at, inclination: pair.inclination, gravity: pair.gravity, temperature: pair.temperature, source: 'hydrometer', entryId }, transaction);
  });
}

/** Strikes a point out; versions made from it keep their own copy. */
export async function removePoint(actor: Actor, identifier: string, pointId: string, clock: Clock = systemClock): Promise<void> {
  authorize(actor, 'sensors.calibrate');
  await inTransaction(async (transaction) => {
    const sensor = await loadFloat(actor, identifier, transaction);
    const [removed] = await CalibrationPointRow.update({ removedAt: new Date(clock.now()) }, { where: { id: pointId, sensorId: sensor.id, removedAt: { [Op.is]: null } }, transaction });
    if (removed === 0) throw new NotFoundError('point');
    await auditBy(actor, 'calibration-point.removed', identifier, { point: pointId }, transaction);
    await notifyChange({ cellar: actor.cellarId, kind: 'sensor', batch: null }, transaction);
  });
}
