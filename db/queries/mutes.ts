import { QueryTypes, type Transaction } from 'sequelize';
import { database } from '../client';

export interface MuteRow {
  id: string;
  batch: { id: string; name: string };
  by: { id: string; name: string } | null;
  fromAt: Date;
  untilAt: Date;
}

const SELECT = `select m.id, json_build_object('id', b.id, 'name', b.name) as batch, case when p.id is not null then json_build_object('id', p.id, 'name', p.name) end as by, m.from_at as "fromAt", m.until_at as "untilAt"
     from mutes m join batches b on b.id = m.batch_id left join people p on p.id = m.muted_by`;

/** The mutes of a cellar that hold at `now`, the one that ends last first. */
export function mutesOf(cellarId: string, now: Date, transaction?: Transaction): Promise<MuteRow[]> {
  return database().query(`${SELECT} where m.cellar_id = $cellarId and m.ended_at is null and m.until_at > $now order by m.until_at desc, m.id`, { bind: { cellarId, now }, type: QueryTypes.SELECT, transaction });
}

/** Mutes a batch; what held before ends with it, so that one mute says all. */
export async function muteBatch({ cellarId, batchId, personId, at, until }: { cellarId: string; batchId: string; personId: string; at: Date; until: Date }, transaction: Transaction): Promise<MuteRow> {
  await database().query(`update mutes set ended_at = $at, ended_by = $personId where batch_id = $batchId and ended_at is null and until_at > $at`, { bind: { batchId, personId, at }, transaction });
  const [made] = await database().query<{ id: string }>(`insert into mutes (cellar_id, batch_id, muted_by, from_at, until_at) values ($cellarId, $batchId, $personId, $at, $until) returning id`, {
    bind: { cellarId, batchId, personId, at, until },
    type: QueryTypes.SELECT,
    transaction,
  });
  const [row] = await database().query<MuteRow>(`${SELECT} where m.id = $id`, { bind: { id: made!.id }, type: QueryTypes.SELECT, transaction });
  return row!;
}

/** Ends a mute that holds; answers its batch, null where there is none such in the cellar. */
export async function endMute(cellarId: string, id: string, personId: string, at: Date, transaction: Transaction): Promise<string | null> {
  const [row] = await database().query<{ batchId: string }>(`update mutes set ended_at = $at, ended_by = $personId where id = $id and cellar_id = $cellarId and ended_at is null and until_at > $at returning batch_id as "batchId"`, {
    bind: { cellarId, id, personId, at },
    type: QueryTypes.SELECT,
    transaction,
  });
  return row?.batchId ?? null;
}
