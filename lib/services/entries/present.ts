import type { Entry } from '@/db/models';
import { may, type Actor } from '@/lib/auth/policies';
import type { EntryBody } from '@/lib/contracts/batches';
import { ENTRY_KINDS } from '@/lib/contracts/batches';

/** The asker may take this entry back: any one, or an own one. */
export function mayRemove(actor: Actor, entry: Pick<Entry, 'personId'>): boolean {
  return may(actor.role, 'entries.remove') || (may(actor.role, 'entries.remove-own') && entry.personId === actor.personId);
}

export function presentEntry(entry: Entry, actor: Actor, names: ReadonlyMap<string, string>): EntryBody {
  const name = entry.personId === null ? undefined : names.get(entry.personId);
  return {
    id: entry.id,
    batch_id: entry.batchId,
    kind: ENTRY_KINDS.find((kind) => kind === entry.kind) ?? 'note',
    at: entry.at.toISOString(),
    text: entry.text,
    gravity: entry.gravity,
    gravity_read: entry.gravityRead,
    temperature_c: entry.temperatureC,
    calibrated_at_c: entry.calibratedAtC,
    neck: entry.neck,
    volume_l: entry.volumeL,
    sugar_g: entry.sugarG,
    fruit_g: entry.fruitG,
    detail: (entry.detail ?? null) as EntryBody['detail'],
    revised: (entry.revisedAt ?? null) !== null,
    person: entry.personId !== null && name !== undefined ? { id: entry.personId, name } : null,
    created_at: entry.createdAt.toISOString(),
    mine: mayRemove(actor, entry),
  };
}
