import type { z } from 'zod';
import { findMusts, type MustRow } from '@/db/queries/musts';
import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import type { MustList, mustQuery } from '@/lib/contracts/musts';
import { iso } from '../iso';
import { decodeCursor, pageOf } from '../paging';
import { keptSheet, type Sketch } from './sheet';

/** The cellar's must sheets, last changed first. */
export async function listMusts(actor: Actor, query: z.infer<typeof mustQuery>): Promise<MustList> {
  authorize(actor, 'musts.read');
  const rows = await findMusts({ cellarId: actor.cellarId, q: query.q, archived: query.archived === 'yes', after: decodeCursor(query.cursor), limit: query.limit + 1 });
  return pageOf(rows, query.limit, (row) => ({ at: row.changedAtText, key: row.id }), present);
}

function present(row: MustRow): MustList['items'][number] {
  // Written with the version, in this form.
  const sketch = row.sketch as Partial<Sketch>;
  const sheet = keptSheet(row.body);
  return {
    id: row.id,
    version_id: row.versionId,
    version: row.version,
    name: row.name,
    kind: row.kind,
    changed_at: iso(row.changedAt),
    change_note: row.changeNote,
    copied_from: row.copiedFrom,
    original_gravity: sketch.originalGravity ?? null,
    abv_percent: sketch.abv ?? null,
    volume_l: sketch.volume ?? null,
    vessel_l: sheet.vessel_l,
    lines: sheet.lines.length,
    yeast: sheet.yeast?.name ?? null,
    batches: row.batches,
    archived: row.archivedAt !== null,
  };
}
