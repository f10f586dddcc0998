import { QueryTypes, type Transaction } from 'sequelize';
import { database } from '../client';

export interface TakeLinkAsked {
  id: string;
  alertId: string;
  personId: string;
  tokenHash: Buffer;
}

/** Keeps one link for each alert that is still open and each person; answers those that were not used, the older one where there is one. */
export function keepTakeLinks(asked: readonly TakeLinkAsked[], expiresAt: Date): Promise<Array<{ id: string; alertId: string }>> {
  return database().query(
    `with kept as (
       insert into take_links (id, cellar_id, alert_id, person_id, token_hash, expires_at)
       select i.id, a.cellar_id, a.id, i.person_id, decode(i.token_hash, 'hex'), $expiresAt
       from jsonb_to_recordset($asked::jsonb) as i (id uuid, alert_id uuid, person_id uuid, token_hash text) join alerts a on a.id = i.alert_id and a.state = 'open'
       on conflict (alert_id, person_id) do update set expires_at = excluded.expires_at
       returning id, alert_id, used_at
     ) select id, alert_id as "alertId" from kept where used_at is null`,
    {
      bind: { expiresAt, asked: JSON.stringify(asked.map((item) => ({ id: item.id, alert_id: item.alertId, person_id: item.personId, token_hash: item.tokenHash.toString('hex') }))) },
      type: QueryTypes.SELECT,
    },
  );
}

export interface TakeLinkRow {
  id: string;
  cellarId: string;
  alertId: string;
  personId: string;
  personName: string;
  role: string;
  usedAt: Date | null;
  expiresAt: Date;
}

/** The link behind a token, where its person still belongs to the cellar; locked when `transaction` will use it. */
export async function takeLinkOf(tokenHash: Buffer, transaction?: Transaction): Promise<TakeLinkRow | null> {
  const [row] = await database().query<TakeLinkRow>(
    `select l.id, l.cellar_id as "cellarId", l.alert_id as "alertId", l.person_id as "personId", p.name as "personName", m.role, l.used_at as "usedAt", l.expires_at as "expiresAt"
     from take_links l join people p on p.id = l.person_id join memberships m on m.cellar_id = l.cellar_id and m.person_id = l.person_id
     where l.token_hash = $tokenHash ${transaction ? 'for update of l' : ''}`,
    { bind: { tokenHash }, type: QueryTypes.SELECT, transaction },
  );
  return row ?? null;
}

export async function markTakeLinkUsed(id: string, at: Date, transaction: Transaction): Promise<void> {
  await database().query(`update take_links set used_at = $at where id = $id`, { bind: { id, at }, transaction });
}

export async function forgetOldTakeLinks(): Promise<void> {
  await database().query(`delete from take_links where expires_at < now() - interval '30 days'`);
}
