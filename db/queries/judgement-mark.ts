import { QueryTypes, type Transaction } from 'sequelize';
import { database } from '../client';

/** Changes whenever the batch `b` could be judged otherwise: by its own row, its log, or where its sensors were. */
const MARK = `md5(concat_ws('|', b,
       (select count(*) || ' ' || coalesce(max(e.created_at)::text, '') || ' ' || coalesce(max(e.removed_at)::text, '') || ' ' || coalesce(max(e.revised_at)::text, '') || ' ' || coalesce(max(e.at)::text, '') from entries e where e.batch_id = b.id),
       (select string_agg(concat_ws(' ', a.id, a.from_at, a.to_at), ',' order by a.id) from assignments a where a.batch_id = b.id)))`;

/**
 * A mark of all that a batch is judged from, save its readings.
 * @returns null where the cellar has no such batch
 */
export async function judgementMark(cellarId: string, batchId: string, transaction?: Transaction): Promise<string | null> {
  const [row] = await database().query<{ mark: string }>(`select ${MARK} as mark from batches b where b.id = $batchId and b.cellar_id = $cellarId`, { bind: { batchId, cellarId }, type: QueryTypes.SELECT, transaction });
  return row?.mark ?? null;
}

export interface KeptJudgement<A, D> {
  /** Of what there is to judge now. */
  mark: string;
  /** When that last changed. */
  changedAt: Date;
  ended: boolean;
  /** The last judgement, with the mark it was made from; null before the first. */
  kept: { at: Date; mark: string | null; assessment: A; drawing: D | null } | null;
}

/**
 * The last judgement of a batch, and whether there is more to judge by now, in one query.
 * @returns null where the cellar has no such batch
 */
export async function keptJudgement<A, D>(cellarId: string, batchId: string): Promise<KeptJudgement<A, D> | null> {
  const [row] = await database().query<{ mark: string; changedAt: Date; ended: boolean; at: Date | null; keptMark: string | null; assessment: A; drawing: D | null }>(
    `select ${MARK} as mark, b.state = 'ended' as ended,
       greatest(b.updated_at, (select max(greatest(e.created_at, e.removed_at, e.revised_at)) from entries e where e.batch_id = b.id)) as "changedAt",
       s.assessed_at as at, s.mark as "keptMark", s.assessment, s.drawing
     from batches b left join batch_states s on s.batch_id = b.id where b.id = $batchId and b.cellar_id = $cellarId`,
    { bind: { batchId, cellarId }, type: QueryTypes.SELECT },
  );
  if (!row) return null;
  const { mark, changedAt, ended, at, keptMark, assessment, drawing } = row;
  return { mark, changedAt, ended, kept: at && { at, mark: keptMark, assessment, drawing } };
}
