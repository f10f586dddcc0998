import { QueryTypes } from 'sequelize';
import { database } from '../client';

/**
 * A mark that changes whenever a batch could be judged otherwise: by its own
 * row, its log, where its sensors were, or a newer judgement of the worker.
 * @returns null where the cellar has no such batch
 */
export async function judgementMark(cellarId: string, batchId: string): Promise<string | null> {
  const [row] = await database().query<{ mark: string }>(
    `select md5(concat_ws('|', b, (select assessed_at from batch_states s where s.batch_id = b.id),
       (select count(*) || ' ' || coalesce(max(e.created_at)::text, '') || ' ' || coalesce(max(e.removed_at)::text, '') || ' ' || coalesce(max(e.revised_at)::text, '') || ' ' || coalesce(max(e.at)::text, '') from entries e where e.batch_id = b.id),
       (select string_agg(concat_ws(' ', a.id, a.from_at, a.to_at), ',' order by a.id) from assignments a where a.batch_id = b.id))) as mark
     from batches b where b.id = $batchId and b.cellar_id = $cellarId`,
    { bind: { batchId, cellarId }, type: QueryTypes.SELECT },
  );
  return row?.mark ?? null;
}
