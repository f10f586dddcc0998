import { CalibrationPointRow, CalibrationRow } from '@/db/models';
import { archiveSensors, readingsOfStay, staysOf, type ArchiveReading, type ArchiveSensor, type SensorStay } from '@/db/queries/archive';
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
export function spansOf(stays: readonly { from: Date; to: Date }[]): { from: Date; to: Date }[] {
  const spans: { from: Date; to: Date }[] = [];
  for (const { from, to } of [...stays].sort((a, b) => a.from.getTime() - b.from.getTime())) {
    const last = spans.at(-1);
    if (last && from <= last.to) last.to = to > last.to ? to : last.to;
    else spans.push({ from, to });
  }
  return spans;
}

async function* sensorPieces(sensor: ArchiveSensor, stays: readonly SensorStay[], wholeCellar: boolean, now: number): AsyncGenerator<string> {
  // A stay that goes on ends where it leaves: nothing speaks into the copy.
  const ended = stays.map((stay) => ({ ...stay, to: stay.to ?? new Date(Math.max(now, stay.from.getTime() + 1)) }));
  const head = JSON.stringify({
    name: sensor.name,
    created_at: iso(sensor.createdAt),
    stays: ended.map(({ batch, as, from, to }) => ({ batch, as, from: iso(from), to: iso(to) })),
    calibrations: await calibrationsOf(sensor.id),
    points: await pointsOf(sensor.id),
    columns: READING_COLUMNS,
  });
  yield `${head.slice(0, -1)},"readings":[`;
  let first = true;
  for (const span of wholeCellar ? [{ from: '-infinity' as const, to: null }] : spansOf(ended)) {
    for await (const page of readingsOfStay({ sensorId: sensor.id, ...span })) {
      yield (first ? '\n' : ',\n') + page.map((reading) => JSON.stringify(rowOf(reading))).join(',\n');
      first = false;
    }
  }
  yield ']}';
}

/** The sensors of the archive as `,"sensors":[…]`, with every reading, or those that were taken in one batch. */
export async function* sensorsPieces(cellarId: string, batchId: string | null, now: number): AsyncGenerator<string> {
  yield ',\n"sensors":[';
  for (const [index, sensor] of (await archiveSensors(cellarId, batchId)).entries()) {
    if (index > 0) yield ',';
    yield* sensorPieces(sensor, await staysOf(sensor.id, batchId), batchId === null, now);
  }
  yield ']';
}
