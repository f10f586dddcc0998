import { database } from '@/db/client';
import { tellOfReadings } from '@/db/queries/record-readings';
import { finishRecalculation, putBackRecalculation, readingsFrom, takeRecalculation, turnReadings, type StoredReading, type Turned } from '@/db/queries/recalculations';
import { sensorNotes, type CalibrationLine } from '@/db/queries/sensor-book';
import { BELIEVED_MS, calibrated } from './sensor-book';

/** Readings looked at in one go: a fraction of a second, so that the ingest is never held up. */
const AT_ONCE = 5_000;
const LEASE_MS = 120_000;
/**
 * An ingest that did not know of the calibration yet may write for as long as it
 * believes its notes, and its statement may run as long as statements may: what is
 * asked for is done only when a pass after that finds nothing to turn.
 */
const SETTLED_MS = 2 * BELIEVED_MS + 30_000;
const AGAIN_MS = 10_000;

/** What a stored reading has to become, or null where it already is. */
export function turned(reading: StoredReading, calibrations: readonly CalibrationLine[]): Turned | null {
  const sent = { gravity: reading.calibrationId === null ? reading.gravity : reading.gravitySent, inclination: reading.inclination, temperature: reading.temperature };
  const { gravity, calibrationId, gravitySent } = calibrated(calibrations, reading.ms, sent);
  return calibrationId === reading.calibrationId ? null : { at: reading.at, gravity, gravitySent, calibrationId };
}

/** Turns every reading of a sensor from `from` on that stands by another calibration than it should; tells of those it turned. */
export async function recalculate(sensorId: number, from: Date): Promise<number> {
  const [notes] = await sensorNotes([sensorId]);
  if (!notes) return 0;
  let next: string | Date = from;
  let changed = 0;
  const turnedAt: string[] = [];
  for (;;) {
    const readings: StoredReading[] = await readingsFrom(sensorId, next, AT_ONCE);
    const due = readings.flatMap((reading) => turned(reading, notes.calibrations) ?? []);
    if (due.length > 0) {
      await turnReadings(sensorId, due);
      changed += due.length;
      turnedAt.push(due[0]!.at, due.at(-1)!.at);
    }
    const last = readings.at(-1);
    if (readings.length < AT_ONCE || !last) break;
    next = last.at;
  }
  if (changed > 0) await tellOfReadings(database(), [{ sensorId, first: Date.parse(turnedAt[0]!), last: Date.parse(turnedAt.at(-1)!) }]);
  return changed;
}

/** Does the next recalculation that is due. @returns false where none is */
export async function recalculateNext(now: number): Promise<boolean> {
  const job = await takeRecalculation(LEASE_MS);
  if (!job) return false;
  const changed = await recalculate(job.sensorId, job.from);
  if (changed === 0 && now - job.askedAt.getTime() > SETTLED_MS) await finishRecalculation(job.id, 0);
  else await putBackRecalculation(job.id, changed, AGAIN_MS);
  return true;
}
