import { Op, type Transaction } from 'sequelize';
import { inTransaction } from '@/db/client';
import { CalibrationPointRow, CalibrationRow, type Sensor } from '@/db/models';
import { askRecalculation } from '@/db/queries/recalculations';
import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import { systemClock, type Clock } from '@/lib/clock';
import type { CalibrationForm, CalibrationVersionBody, OffsetForm } from '@/lib/contracts/calibration';
import { fitCalibration } from '@/lib/core/calibration/calibrate';
import { ConflictError, InvalidError, NotFoundError } from '@/lib/errors';
import { auditBy } from '../../audit/write';
import { notifyChange } from '../../changes';
import { namesOf } from '../../entries/names';
import { forgetNotes } from '../../readings/sensor-book';
import { loadSensor } from '../place';
import { presentVersion, type FrozenPoint } from './present';

type NewVersion = Pick<CalibrationRow, 'appliesFrom'> & Partial<Pick<CalibrationRow, 'coefficients' | 'lowDeg' | 'highDeg' | 'offsetSg' | 'correctsTemperature' | 'sigma' | 'note'>> & { points?: FrozenPoint[] };

/** A version is added, never changed; the readings it touches are turned by the worker. */
async function addVersion(actor: Actor, sensor: Sensor, version: NewVersion, transaction: Transaction): Promise<CalibrationVersionBody> {
  const last = (await CalibrationRow.max('version', { where: { sensorId: sensor.id }, transaction })) as number | null;
  const row = await CalibrationRow.create({ ...version, cellarId: actor.cellarId, sensorId: sensor.id, version: (last ?? 0) + 1, createdBy: actor.personId }, { transaction });
  await row.reload({ transaction });
  await askRecalculation(actor.cellarId, sensor.id, row.appliesFrom, transaction);
  await auditBy(actor, 'calibration.added', sensor.identifier, { version: row.version, applies_from: row.appliesFrom.toISOString(), offset: row.offsetSg }, transaction);
  await notifyChange({ cellar: actor.cellarId, kind: 'sensor', batch: null }, transaction);
  transaction.afterCommit(() => forgetNotes(sensor.id));
  return presentVersion(row, await namesOf([actor.personId], transaction));
}

async function loadFloat(actor: Actor, identifier: string, transaction: Transaction): Promise<Sensor> {
  const sensor = await loadSensor(actor.cellarId, identifier, transaction);
  if (sensor.kind !== 'float') throw new ConflictError('Only a float is calibrated; a probe tells no gravity.');
  return sensor;
}

function fromOf(appliesFrom: string, now: number): Date {
  const from = new Date(appliesFrom);
  if (from.getTime() > now + 10 * 60_000) throw new InvalidError('The time lies ahead.', { applies_from: ['lies ahead: a calibration counts from now or from a past time'] });
  return from;
}

/**
 * Fits a curve to the chosen points and puts it in force from a time on.
 * @throws InvalidError with the reason where the fit is refused
 */
export async function calibrate(actor: Actor, identifier: string, input: CalibrationForm, clock: Clock = systemClock): Promise<CalibrationVersionBody> {
  authorize(actor, 'sensors.calibrate');
  const appliesFrom = fromOf(input.applies_from, clock.now());
  return inTransaction(async (transaction) => {
    const sensor = await loadFloat(actor, identifier, transaction);
    const rows = await CalibrationPointRow.findAll({ where: { id: input.points, sensorId: sensor.id, removedAt: { [Op.is]: null } }, order: [['inclination', 'ASC']], transaction });
    if (rows.length !== new Set(input.points).size) throw new InvalidError('A point is gone.', { points: ['one of them was struck out; look at the points again'] });
    const points: FrozenPoint[] = rows.map(({ inclination, gravity, temperature }) => ({ inclination, gravity, temperature }));
    const outcome = fitCalibration(points, input.degree, input.corrects_temperature);
    if (!outcome.ok) throw new InvalidError(outcome.reason, { points: [outcome.reason] });
    const { fit } = outcome;
    return addVersion(actor, sensor, { appliesFrom, coefficients: fit.coefficients, lowDeg: fit.low, highDeg: fit.high, correctsTemperature: fit.correctsTemperature, sigma: fit.sigma, points, note: input.note }, transaction);
  });
}

/** Moves what the float shows from a time on; the curve in force then stays. */
export async function offsetSensor(actor: Actor, identifier: string, input: OffsetForm, clock: Clock = systemClock): Promise<CalibrationVersionBody> {
  authorize(actor, 'sensors.calibrate');
  const appliesFrom = fromOf(input.applies_from, clock.now());
  return inTransaction(async (transaction) => {
    const sensor = await loadFloat(actor, identifier, transaction);
    const before = await CalibrationRow.findOne({ where: { sensorId: sensor.id, removedAt: { [Op.is]: null }, appliesFrom: { [Op.lte]: appliesFrom } }, order: [['appliesFrom', 'DESC'], ['id', 'DESC']], transaction });
    return addVersion(
      actor,
      sensor,
      {
        appliesFrom,
        coefficients: before?.coefficients ?? null,
        lowDeg: before?.lowDeg ?? null,
        highDeg: before?.highDeg ?? null,
        correctsTemperature: before?.correctsTemperature ?? false,
        sigma: before?.sigma ?? null,
        points: (before?.points ?? []) as FrozenPoint[],
        // On top of the one that was in force: the float was compared as it showed then.
        offsetSg: (before?.offsetSg ?? 0) + input.offset,
        note: input.note,
      },
      transaction,
    );
  });
}

/** Takes a version back: its readings go to the one before it, or to what was sent. */
export async function removeVersion(actor: Actor, identifier: string, version: number, clock: Clock = systemClock): Promise<void> {
  authorize(actor, 'sensors.calibrate');
  await inTransaction(async (transaction) => {
    const sensor = await loadFloat(actor, identifier, transaction);
    const row = await CalibrationRow.findOne({ where: { sensorId: sensor.id, version, removedAt: { [Op.is]: null } }, transaction });
    if (!row) throw new NotFoundError('calibration');
    await row.update({ removedAt: new Date(clock.now()), removedBy: actor.personId }, { transaction });
    await askRecalculation(actor.cellarId, sensor.id, row.appliesFrom, transaction);
    await auditBy(actor, 'calibration.removed', identifier, { version }, transaction);
    await notifyChange({ cellar: actor.cellarId, kind: 'sensor', batch: null }, transaction);
    transaction.afterCommit(() => forgetNotes(sensor.id));
  });
}
