import { CalibrationPointRow, CalibrationRow, type Sensor } from '@/db/models';
import { archiveSensors, readingsOfStay, refusalsOf, staysOf, type ArchiveReading, type SensorStay } from '@/db/queries/archive';
import { READING_COLUMNS } from '@/lib/contracts/archive';
import { namesOf } from '../entries/names';
import { iso, isoOrNull } from '../iso';

export const rowOf = (r: ArchiveReading) => [r.measuredAt, r.receivedAt, r.gravity, r.gravitySent, r.inclination, r.temperature, r.battery, r.signal, r.foam, r.sequence, r.calibration];

async function calibrationsOf(sensorId: number) {
  const rows = await CalibrationRow.findAll({ where: { sensorId }, order: [['version', 'ASC']] });
  const names = await namesOf(rows.flatMap((row) => [row.createdBy, row.removedBy]));
  const who = (id: string | null) => (id === null ? null : (names.get(id) ?? null));
  return rows.map((row) => ({
    version: row.version,
    applies_from: iso(row.appliesFrom),
    coefficients: row.coefficients,
    low_deg: row.lowDeg,
    high_deg: row.highDeg,
    offset_sg: row.offsetSg,
    corrects_temperature: row.correctsTemperature,
    sigma: row.sigma,
    points: row.points,
    note: row.note,
    by: who(row.createdBy),
    created_at: iso(row.createdAt),
    removed_at: isoOrNull(row.removedAt),
    removed_by: who(row.removedBy),
  }));
}

async function pointsOf(sensorId: number) {
  const rows = await CalibrationPointRow.findAll({ where: { sensorId }, order: [['createdAt', 'ASC'], ['id', 'ASC']] });
  const names = await namesOf(rows.map((row) => row.createdBy));
  return rows.map((row) => ({
    at: iso(row.at),
    inclination: row.inclination,
    gravity: row.gravity,
    temperature: row.temperature,
    source: row.source,
    sugar_g_per_l: row.sugarGPerL,
    entry: row.entryId,
    by: row.createdBy === null ? null : (names.get(row.createdBy) ?? null),
    created_at: iso(row.createdAt),
    removed_at: isoOrNull(row.removedAt),
  }));
}

/** Spans that cover the stays, in order, each moment once. */
export function spansOf(stays: readonly { from: Date; to: Date | null }[]): { from: Date; to: Date | null }[] {
  const spans: { from: Date; to: Date | null }[] = [];
  for (const { from, to } of [...stays].sort((a, b) => a.from.getTime() - b.from.getTime())) {
    const last = spans.at(-1);
    if (last && (last.to === null || from <= last.to)) last.to = last.to === null || to === null ? null : to > last.to ? to : last.to;
    else spans.push({ from, to });
  }
  return spans;
}

const settingsOf = (sensor: Sensor) =>
  sensor.settingsVersion === 0 ? null : { version: sensor.settingsVersion, interval_s: sensor.wantedIntervalS, sent_at: isoOrNull(sensor.settingsAt), confirmed_version: sensor.confirmedVersion, confirmed_at: isoOrNull(sensor.confirmedAt) };

async function* sensorPieces(sensor: Sensor, stays: readonly SensorStay[], wholeCellar: boolean): AsyncGenerator<string> {
  const head = JSON.stringify({
    name: sensor.name,
    kind: sensor.kind,
    place: sensor.place,
    interval_s: sensor.intervalS,
    settings: settingsOf(sensor),
    created_at: iso(sensor.createdAt),
    disabled_at: isoOrNull(sensor.disabledAt),
    removed_at: isoOrNull(sensor.removedAt),
    refused: wholeCellar ? await refusalsOf(sensor.id) : [],
    stays: stays.map(({ batch, as, from, to }) => ({ batch, as, from: iso(from), to: isoOrNull(to) })),
    calibrations: await calibrationsOf(sensor.id),
    points: await pointsOf(sensor.id),
    columns: READING_COLUMNS,
  });
  yield `${head.slice(0, -1)},"readings":[`;
  let first = true;
  for (const span of wholeCellar ? [{ from: '-infinity' as const, to: null }] : spansOf(stays)) {
    for await (const page of readingsOfStay({ sensorId: sensor.id, ...span })) {
      yield (first ? '\n' : ',\n') + page.map((reading) => JSON.stringify(rowOf(reading))).join(',\n');
      first = false;
    }
  }
  yield ']}';
}

/** The sensors of the archive as `,"sensors":[…]`, with every reading, or those that were taken in one batch. */
export async function* sensorsPieces(cellarId: string, batchId: string | null): AsyncGenerator<string> {
  yield ',\n"sensors":[';
  for (const [index, sensor] of (await archiveSensors(cellarId, batchId)).entries()) {
    if (index > 0) yield ',';
    yield* sensorPieces(sensor, await staysOf(sensor.id, batchId), batchId === null);
  }
  yield ']';
}
