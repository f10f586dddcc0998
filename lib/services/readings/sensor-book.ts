import { sensorNotes, type CalibrationLine, type SensorNotes } from '@/db/queries/sensor-book';
import { gravityBy, type Sent } from '@/lib/core/calibration/apply';

/** How long a note is believed. A new calibration's recalculation looks again after longer than this. */
export const BELIEVED_MS = 2_000;
/** More sensors than this at once and the memory starts anew. */
const REMEMBERED_MAX = 20_000;

const remembered = new Map<number, { notes: SensorNotes | null; until: number }>();

/** What is known of these sensors; those of which nothing is known are left out. `now` in ms, of the clock that counts. */
export async function notesOf(ids: readonly number[], now: number): Promise<Map<number, SensorNotes>> {
  const missing = [...new Set(ids)].filter((id) => {
    const held = remembered.get(id);
    // A clock set back must not keep a note for hours.
    return !held || held.until <= now || held.until > now + BELIEVED_MS;
  });
  if (missing.length > 0) {
    if (remembered.size > REMEMBERED_MAX) remembered.clear();
    const found = new Map((await sensorNotes(missing)).map((notes) => [notes.id, notes]));
    for (const id of missing) remembered.set(id, { notes: found.get(id) ?? null, until: now + BELIEVED_MS });
  }
  const result = new Map<number, SensorNotes>();
  for (const id of ids) {
    const notes = remembered.get(id)?.notes;
    if (notes) result.set(id, notes);
  }
  return result;
}

/** Asks anew at the next message: after a change made in this process. */
export function forgetNotes(sensorId: number): void {
  remembered.delete(sensorId);
}

/** The calibration in force when something was measured; null: none yet. */
export function calibrationAt(calibrations: readonly CalibrationLine[], measuredAt: number): CalibrationLine | null {
  return calibrations.find((calibration) => calibration.appliesFrom <= measuredAt) ?? null;
}

/** The gravity to keep of what was sent, with the calibration that made it and what it stands in place of. */
export function calibrated(calibrations: readonly CalibrationLine[], measuredAt: number, sent: Sent): { gravity: number | null; calibrationId: number | null; gravitySent: number | null } {
  const calibration = calibrationAt(calibrations, measuredAt);
  if (!calibration) return { gravity: sent.gravity, calibrationId: null, gravitySent: null };
  return { gravity: gravityBy(calibration, sent), calibrationId: calibration.id, gravitySent: sent.gravity };
}
