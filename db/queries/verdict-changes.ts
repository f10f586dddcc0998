import { QueryTypes } from 'sequelize';
import { database } from '../client';

export interface VerdictChangeRow {
  id: number;
  at: Date;
  atText: string;
  changed: string[];
  /** The wire form, as it was written. */
  assessment: unknown;
}

/** Judgements of a batch that were kept because a verdict changed, newest first. */
export function verdictChanges(batchId: string, after: { at: string; key: string } | null, limit: number): Promise<VerdictChangeRow[]> {
  return database().query<VerdictChangeRow>(
    `select id, at, at::text as "atText", changed, assessment from assessments
     where batch_id = $batchId ${after ? 'and (at, id) < ($afterAt::timestamptz, $afterKey::bigint)' : ''}
     order by at desc, id desc limit $limit`,
    { bind: { batchId, limit, ...(after && { afterAt: after.at, afterKey: after.key }) }, type: QueryTypes.SELECT },
  );
}
