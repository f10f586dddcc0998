import { QueryTypes, type Transaction } from 'sequelize';
import { database } from '../client';

export interface Owed {
  cellarId: string | null;
  alertId: string | null;
  personId: string;
  /** Names what is owed to whom: the same is never owed twice. */
  dedupeKey: string;
  payload: unknown;
  /** Not before. */
  notBefore: Date;
}

/** Puts mails into the outbox, in the transaction that owes them. */
export async function oweMails(owed: readonly Owed[], transaction: Transaction): Promise<void> {
  if (owed.length === 0) return;
  await database().query(
    `insert into outbox (cellar_id, alert_id, person_id, means, dedupe_key, payload, next_attempt_at)
     select o.cellar_id, o.alert_id, o.person_id, 'mail', o.dedupe_key, o.payload, o.not_before
     from jsonb_to_recordset($owed::jsonb) as o (cellar_id uuid, alert_id uuid, person_id uuid, dedupe_key text, payload jsonb, not_before timestamptz)
     on conflict (dedupe_key) do nothing`,
    {
      bind: {
        owed: JSON.stringify(
          owed.map((item) => ({ cellar_id: item.cellarId, alert_id: item.alertId, person_id: item.personId, dedupe_key: item.dedupeKey, payload: item.payload, not_before: item.notBefore })),
        ),
      },
      transaction,
    },
  );
}

/** Who of a cellar is told of alerts: all but guests. */
export async function toldOfAlerts(cellarId: string, transaction: Transaction): Promise<string[]> {
  const rows = await database().query<{ personId: string }>(
    `select person_id as "personId" from memberships where cellar_id = $cellarId and role in ('keeper', 'brewer', 'hand') order by created_at, person_id`,
    { bind: { cellarId }, type: QueryTypes.SELECT, transaction },
  );
  return rows.map((row) => row.personId);
}

/** Keepers of cellars where something works, each once, with the time zone of their oldest such cellar. */
export function keepersOfWorkingCellars(transaction: Transaction): Promise<Array<{ personId: string; timeZone: string }>> {
  return database().query(
    `select distinct on (m.person_id) m.person_id as "personId", c.time_zone as "timeZone"
     from memberships m join cellars c on c.id = m.cellar_id
     where m.role = 'keeper' and exists (select 1 from batches b join assignments a on a.batch_id = b.id and a.to_at is null where b.cellar_id = c.id and b.state = 'working')
     order by m.person_id, c.created_at`,
    { type: QueryTypes.SELECT, transaction },
  );
}

export interface Claimed {
  id: number;
  dedupeKey: string;
  alertId: string | null;
  payload: unknown;
  attempts: number;
  /** How often a server said no to it. */
  refusals: number;
  createdAt: Date;
  personId: string;
  name: string;
  email: string;
  /** False: the person left the cellar since, and must not be told. */
  stillThere: boolean;
}

/**
 * Takes all that one person is owed once anything of it is due, so that a mail
 * server's return brings one mail and not one for each. Nobody else takes them
 * until the lease ends.
 */
export function claimForOnePerson(now: Date, leaseUntil: Date, most: number): Promise<Claimed[]> {
  return database().query<Claimed>(
    `with person as (
       select person_id from outbox
       where sent_at is null and failed_at is null and next_attempt_at <= $now and (leased_until is null or leased_until <= $now)
       order by next_attempt_at, id limit 1 for update skip locked
     ), taken as (
       select o.id from outbox o join person on person.person_id = o.person_id
       where o.sent_at is null and o.failed_at is null and (o.leased_until is null or o.leased_until <= $now)
       order by o.id limit $most for update of o skip locked
     )
     update outbox o set leased_until = $leaseUntil, attempts = o.attempts + 1
     from taken, people p
     where o.id = taken.id and p.id = o.person_id
     returning o.id, o.dedupe_key as "dedupeKey", o.alert_id as "alertId", o.payload, o.attempts, o.refusals, o.created_at as "createdAt", p.id as "personId", p.name, p.email,
       (o.cellar_id is null or exists (select 1 from memberships m where m.cellar_id = o.cellar_id and m.person_id = o.person_id and m.role <> 'guest')) as "stillThere"`,
    { bind: { now, leaseUntil, most }, type: QueryTypes.SELECT },
  );
}

export async function markSent(ids: readonly number[], at: Date): Promise<void> {
  await database().query(`update outbox set sent_at = $at, leased_until = null, last_error = null where id = any($ids::bigint[])`, { bind: { ids, at } });
}

export async function markForRetry(id: number, { nextAt, refusals, error }: { nextAt: Date; refusals: number; error: string }): Promise<void> {
  await database().query(`update outbox set next_attempt_at = $nextAt, refusals = $refusals, leased_until = null, last_error = $error where id = $id`, { bind: { id, nextAt, refusals, error } });
}

export async function markFailed(id: number, at: Date, error: string): Promise<void> {
  await database().query(`update outbox set failed_at = $at, leased_until = null, last_error = $error where id = $id`, { bind: { id, at, error } });
}

/** When the next mail is due, ms since 1970; null: none waits. */
export async function nextDue(): Promise<number | null> {
  const [row] = await database().query<{ at: number | null }>(
    `select extract(epoch from min(greatest(next_attempt_at, coalesce(leased_until, next_attempt_at))))::float8 * 1000 as at from outbox where sent_at is null and failed_at is null`,
    { type: QueryTypes.SELECT },
  );
  return row?.at ?? null;
}

/** Drops mails that went or failed long ago. */
export async function forgetOldMails(days: number): Promise<void> {
  await database().query(`delete from outbox where coalesce(sent_at, failed_at) < now() - make_interval(days => $days)`, { bind: { days } });
}
