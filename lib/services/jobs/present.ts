import type { JobRow } from '@/db/queries/jobs';
import { JOB_KINDS, type JobBody } from '@/lib/contracts/jobs';
import { iso, isoOrNull } from '../iso';

export function presentJob(row: JobRow): JobBody {
  return {
    id: row.id,
    kind: JOB_KINDS.find((kind) => kind === row.kind) ?? 'other',
    title: row.title,
    note: row.note,
    source: row.source,
    evidence: row.evidence,
    state: row.doneAt !== null ? 'done' : row.droppedAt !== null ? 'dropped' : 'open',
    due_at: iso(row.dueAt),
    exact: row.exact,
    batch: row.batch && { id: row.batch.id, name: row.batch.name, tag: row.batch.tag, place: row.batch.place, vessel_kind: row.batch.vesselKind, drink_colour: row.batch.drinkColour, neck: row.batch.neck, volume_l: row.batch.volumeL, vessel_l: row.batch.vesselL },
    lot: row.lot,
    taken_by: row.takenBy,
    snoozed_until: isoOrNull(row.snoozedUntil),
    done_at: isoOrNull(row.doneAt),
    done_by: row.doneBy,
    repeat_days: row.repeatDays,
    created_by: row.createdBy,
  };
}
