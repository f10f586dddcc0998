import type { Transaction } from 'sequelize';
import { database } from '@/db/client';
import { Assignment, Sensor } from '@/db/models';
import { insertImported, type ArchiveReading } from '@/db/queries/archive';
import { ensurePartitions, monthOf } from '@/db/queries/partitions';
import { hashSensorSecret, makeSensorIdentifier, makeSensorSecret } from '@/lib/auth/sensors';
import { InvalidError } from '@/lib/errors';

const AT_ONCE = 5_000;

type Silent = Pick<Sensor, 'cellarId' | 'name'> & Partial<Pick<Sensor, 'kind' | 'place' | 'intervalS' | 'createdAt' | 'disabledAt' | 'removedAt' | 'settingsVersion' | 'wantedIntervalS' | 'settingsAt' | 'confirmedVersion' | 'confirmedAt'>>;

/** A sensor whose secret nobody was told: it carries what a file brought, and stays silent until a keeper gives it a new one, or for ever where it is a `file`. */
export const silentSensor = (sensor: Silent, transaction: Transaction): Promise<Sensor> => Sensor.create({ kind: 'file', ...sensor, identifier: makeSensorIdentifier(), secretHash: hashSensorSecret(makeSensorSecret()) }, { transaction });

/** Returns how many were new. */
export async function keepRows(sensorId: number, rows: readonly ArchiveReading[], transaction: Transaction): Promise<number> {
  let stored = 0;
  for (let from = 0; from < rows.length; from += AT_ONCE) stored += await insertImported(sensorId, rows.slice(from, from + AT_ONCE), transaction);
  return stored;
}

/** What a log file brought, in its batch. */
export async function importedFloat(batch: { id: string; cellarId: string }, float: { name: string; from: Date; to: Date }, rows: readonly ArchiveReading[], transaction: Transaction): Promise<{ sensorId: number; stored: number }> {
  const sensor = await silentSensor({ cellarId: batch.cellarId, name: float.name }, transaction);
  await Assignment.create({ cellarId: batch.cellarId, sensorId: sensor.id, batchId: batch.id, fromAt: float.from, toAt: float.to }, { transaction });
  return { sensorId: sensor.id, stored: await keepRows(sensor.id, rows, transaction) };
}

/** No reading is older than this; what claims to be would make tables for months that never were. */
const EARLIEST = Date.UTC(2000, 0, 1);

/** The months that rows fall into, made before the transaction that writes them. */
export async function ensureMonths(times: Iterable<string | number>, now: number): Promise<void> {
  const months = new Set<number>();
  for (const time of times) {
    const at = typeof time === 'number' ? time : Date.parse(time);
    if (!(at >= EARLIEST && at <= now + 86_400_000)) throw new InvalidError('The file cannot be kept.', { text: ['holds a reading from before 2000 or from the future'] });
    months.add(monthOf(at));
  }
  if (months.size > 0) await ensurePartitions(database(), months);
}
