import { Assignment, CalibrationPointRow, CalibrationRow, ProbeAssignment } from '@/db/models';
import { insertRefusals } from '@/db/queries/archive';
import type { ArchivedSensor } from '@/lib/contracts/archive';
import { keepRows, silentSensor } from './float';
import { refuseFile, type Bringing } from './parts';

const date = (at: string | null) => (at === null ? null : new Date(at));

const settingsOf = (settings: ArchivedSensor['settings']) =>
  settings && { settingsVersion: settings.version, wantedIntervalS: settings.interval_s, settingsAt: date(settings.sent_at), confirmedVersion: settings.confirmed_version, confirmedAt: date(settings.confirmed_at) };

/** A sensor with what it said, where it was and how it was calibrated; its new secret is a keeper's to make. */
export async function bringSensor(sensor: ArchivedSensor, { cellarId, ids, people, transaction }: Bringing): Promise<{ id: number; readings: number }> {
  const { id: sensorId } = await silentSensor(
    {
      cellarId,
      name: sensor.name,
      kind: sensor.kind,
      place: sensor.place,
      intervalS: sensor.interval_s,
      createdAt: new Date(sensor.created_at),
      disabledAt: date(sensor.disabled_at),
      removedAt: date(sensor.removed_at),
      ...settingsOf(sensor.settings),
    },
    transaction,
  );
  const who = (name: string | null) => (name === null ? null : (people.get(name) ?? null));
  for (const stay of sensor.stays) {
    const batchId = ids.of(stay.batch);
    if (!batchId) throw refuseFile('sensors refer to what is not in it');
    const row = { cellarId, sensorId, batchId, fromAt: new Date(stay.from), toAt: date(stay.to) };
    if (row.toAt !== null && row.toAt <= row.fromAt) throw refuseFile('a sensor left a batch before it came');
    await (stay.as === 'float' ? Assignment.create(row, { transaction }) : ProbeAssignment.create(row, { transaction }));
  }
  await insertRefusals(sensorId, sensor.refused, transaction);
  await CalibrationRow.bulkCreate(
    sensor.calibrations.map((version) => ({
      cellarId,
      sensorId,
      version: version.version,
      appliesFrom: new Date(version.applies_from),
      coefficients: version.coefficients,
      lowDeg: version.low_deg,
      highDeg: version.high_deg,
      offsetSg: version.offset_sg,
      correctsTemperature: version.corrects_temperature,
      sigma: version.sigma,
      points: version.points,
      note: version.note,
      createdBy: who(version.by),
      createdAt: new Date(version.created_at),
      removedAt: date(version.removed_at),
      removedBy: who(version.removed_by),
    })),
    { transaction },
  );
  await CalibrationPointRow.bulkCreate(
    sensor.points.map((point) => ({
      id: ids.next(),
      cellarId,
      sensorId,
      at: new Date(point.at),
      inclination: point.inclination,
      gravity: point.gravity,
      temperature: point.temperature,
      source: point.source,
      sugarGPerL: point.sugar_g_per_l,
      entryId: point.entry === null ? null : (ids.of(point.entry) ?? null),
      createdBy: who(point.by),
      createdAt: new Date(point.created_at),
      removedAt: date(point.removed_at),
    })),
    { transaction },
  );
  const rows = sensor.readings.map(([measuredAt, receivedAt, gravity, gravitySent, inclination, temperature, battery, signal, foam, sequence, calibration]) => ({ measuredAt, receivedAt, gravity, gravitySent, inclination, temperature, battery, signal, foam, sequence, calibration }));
  return { id: sensorId, readings: await keepRows(sensorId, rows, transaction) };
}
