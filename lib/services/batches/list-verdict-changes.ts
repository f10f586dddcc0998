import { z } from 'zod';
import { verdictChanges } from '@/db/queries/verdict-changes';
import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import type { AssessmentBody, VerdictChangeList } from '@/lib/contracts/assessment';
import type { pageQuery } from '@/lib/contracts/common';
import { CALL_NAMES } from '@/lib/core/types';
import { decodeCursor, pageOf } from '../paging';
import { loadBatch } from './load';

/** The judgements in which a verdict changed, newest first: why the program said what it said. */
export async function listVerdictChanges(actor: Actor, batchId: string, query: z.infer<typeof pageQuery>): Promise<VerdictChangeList> {
  authorize(actor, 'batches.read');
  const after = decodeCursor(query.cursor, z.string().regex(/^\d{1,15}$/));
  await loadBatch(actor.cellarId, batchId);
  const rows = await verdictChanges(batchId, after, query.limit + 1);
  return pageOf(
    rows,
    query.limit,
    (row) => ({ at: row.atText, key: String(row.id) }),
    (row) => ({ at: row.at.toISOString(), changed: CALL_NAMES.filter((name) => row.changed.includes(name)), assessment: row.assessment as AssessmentBody }),
  );
}
