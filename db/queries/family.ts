import { QueryTypes, type Transaction } from 'sequelize';
import { database } from '../client';

export interface LinkRow {
  from: string;
  to: string;
  kind: 'split' | 'blend' | 'top_up';
  litres: number;
  at: Date;
}

/** Generations that are looked at; nobody blends deeper, and a loop cannot run on. */
const DEEPEST = 12;

/** Every flow of drink that leads to a batch or from it, over generations. */
export function familyLinks(cellarId: string, batchId: string, transaction?: Transaction): Promise<LinkRow[]> {
  return database().query<LinkRow>(
    `with recursive up as (
       select l.*, 1 as depth from batch_links l where l.to_batch = $batchId and l.cellar_id = $cellarId
       union select l.*, up.depth + 1 from batch_links l join up on l.to_batch = up.from_batch where up.depth < ${DEEPEST}
     ), down as (
       select l.*, 1 as depth from batch_links l where l.from_batch = $batchId and l.cellar_id = $cellarId
       union select l.*, down.depth + 1 from batch_links l join down on l.from_batch = down.to_batch where down.depth < ${DEEPEST}
     )
     select distinct id, from_batch as "from", to_batch as "to", kind, litres, at from (select * from up union all select * from down) links order by at, id`,
    { bind: { cellarId, batchId }, type: QueryTypes.SELECT, transaction },
  );
}

/** Flows of drink into a batch, over generations. */
export function linksInto(cellarId: string, batchId: string, transaction?: Transaction): Promise<LinkRow[]> {
  return database().query<LinkRow>(
    `with recursive up as (
       select l.*, 1 as depth from batch_links l where l.to_batch = $batchId and l.cellar_id = $cellarId
       union select l.*, up.depth + 1 from batch_links l join up on l.to_batch = up.from_batch where up.depth < ${DEEPEST}
     )
     select distinct id, from_batch as "from", to_batch as "to", kind, litres, at from up order by at, id`,
    { bind: { cellarId, batchId }, type: QueryTypes.SELECT, transaction },
  );
}

/** The batches that one split made, by the first line that it wrote: all its lines bear the time of its transaction. */
export async function partsOfSplit(firstEntryId: string, transaction: Transaction): Promise<string[]> {
  const rows = await database().query<{ id: string }>(
    `select b.id from entries first
     join entries line on line.batch_id = first.batch_id and line.kind = 'split' and line.created_at = first.created_at
     join batches b on b.id = (line.detail->>'batch_id')::uuid
     where first.id = $firstEntryId order by b.name, b.id`,
    { bind: { firstEntryId }, type: QueryTypes.SELECT, transaction },
  );
  return rows.map((row) => row.id);
}
