import { Lot } from '@/db/models';
import { findBatches, type BatchRow } from '@/db/queries/batches';
import { familyLinks } from '@/db/queries/family';
import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import type { FamilyBody } from '@/lib/contracts/family';
import { ancestry } from '@/lib/core/family/tree';
import { presentBatch } from '../batches/present';
import { loadBatch } from '../batches/load';
import { iso } from '../iso';

/** Rounding of litres typed with three decimals. */
const LITRES_SLACK = 1e-6;

/** Where a batch comes from and what became of it, with the shares of its sources by volume. */
export async function getFamily(actor: Actor, batchId: string): Promise<FamilyBody> {
  authorize(actor, 'batches.read');
  await loadBatch(actor.cellarId, batchId);
  const links = await familyLinks(actor.cellarId, batchId);
  const ids = [...new Set([batchId, ...links.flatMap((link) => [link.from, link.to])])];
  const rows: BatchRow[] = [];
  for (const id of ids) rows.push(...(await findBatches({ cellarId: actor.cellarId, id, limit: 1 })));
  const lots = await Lot.findAll({ where: { batchId: ids, cellarId: actor.cellarId }, order: [['bottledAt', 'ASC']] });
  return {
    batches: rows.map((row) => presentBatch(row, actor)),
    links: links.map((link) => ({ from: link.from, to: link.to, kind: link.kind, litres: link.litres, at: iso(link.at) })),
    ancestry: ancestry(batchId, links, ownLitres(rows, links)),
    lots: lots.map((lot) => ({ id: lot.id, batch_id: lot.batchId, code: lot.code, name: lot.name })),
  };
}

/** What each was made with itself: what it holds and gave away, less what flowed in. */
function ownLitres(rows: readonly BatchRow[], links: ReadonlyArray<{ from: string; to: string; litres: number; kind: string }>): Record<string, number> {
  const flow = (id: string, end: 'from' | 'to') => links.filter((link) => link[end] === id).reduce((sum, link) => sum + link.litres, 0);
  return Object.fromEntries(
    rows.map((row) => {
      const inflow = flow(row.id, 'to');
      // A part of a split or a new blend is nothing of its own; one that was topped up or blended into is.
      const born = links.some((link) => link.to === row.id && link.kind === 'split');
      const outflow = flow(row.id, 'from');
      // An emptied batch keeps its last volume as a figure; it has gone out.
      const own = (row.state === 'ended' && outflow > 0 ? 0 : row.volumeL) + outflow - inflow;
      return [row.id, born || own < LITRES_SLACK ? 0 : own];
    }),
  );
}
