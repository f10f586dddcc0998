import { QueryTypes, type Transaction } from 'sequelize';
import type { HeldBy, MeansName } from '../../lib/core/alerts/telling';
import type { ChosenUnits } from '../../lib/core/units/chosen';
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
  /** Absent: by mail. */
  means?: MeansName;
  /** It waits for others who may answer first. */
  turn?: boolean;
}

/** Puts messages into the outbox, in the transaction that owes them. */
export async function oweMails(owed: readonly Owed[], transaction: Transaction): Promise<void> {
  if (owed.length === 0) return;
  await database().query(
    `insert into outbox (cellar_id, alert_id, person_id, means, dedupe_key, payload, next_attempt_at, held_by)
     select o.cellar_id, o.alert_id, o.person_id, o.means, o.dedupe_key, o.payload, o.not_before, o.held_by
     from jsonb_to_recordset($owed::jsonb) as o (cellar_id uuid, alert_id uuid, person_id uuid, means text, dedupe_key text, payload jsonb, not_before timestamptz, held_by text)
     on conflict (dedupe_key) do nothing`,
    {
      bind: {
        owed: JSON.stringify(
          owed.map((item) => ({
            cellar_id: item.cellarId,
            alert_id: item.alertId,
            person_id: item.personId,
            means: item.means ?? 'mail',
            dedupe_key: item.dedupeKey,
            payload: item.payload,
            not_before: item.notBefore,
            held_by: item.turn ? 'turn' : null,
          })),
        ),
      },
      transaction,
    },
  );
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
  means: MeansName;
  dedupeKey: string;
  alertId: string | null;
  payload: unknown;
  attempts: number;
  /** How often a server said no to it. */
  refusals: number;
  createdAt: Date;
  heldBy: HeldBy | 'turn' | null;
  personId: string;
  name: string;
  email: string;
  timeZone: string;
  /** The language and the units that the person reads now. */
  locale: string;
  units: ChosenUnits;
  /** The person's quiet hours, minutes after midnight. */
  quietFrom: number | null;
  quietTo: number | null;
  /** The alert's vessel is muted until then. */
  mutedUntil: Date | null;
  /** False: the person left the cellar since, and must not be told. */
  stillThere: boolean;
}

/**
 * Takes all that one person is owed by one means once anything of it is due, so
 * that a mail server's return brings one mail and not one for each; what is held
 * back for quiet hours, a mute or somebody else's turn stays until its own time.
 * Nobody else takes them until the lease ends.
 */
export function claimForOnePerson(now: Date, leaseUntil: Date, most: number): Promise<Claimed[]> {
  return database().query<Claimed>(
    `with person as (
       select person_id, means from outbox
       where sent_at is null and failed_at is null and next_attempt_at <= $now and (leased_until is null or leased_until <= $now)
       order by next_attempt_at, id limit 1 for update skip locked
     ), taken as (
       select o.id from outbox o join person on person.person_id = o.person_id and person.means = o.means
       where o.sent_at is null and o.failed_at is null and (o.leased_until is null or o.leased_until <= $now) and (o.held_by is null or o.next_attempt_at <= $now)
       order by o.id limit $most for update of o skip locked
     )
     update outbox o set leased_until = $leaseUntil, attempts = o.attempts + 1
     from taken, people p left join message_times t on t.person_id = p.id
     where o.id = taken.id and p.id = o.person_id
     returning o.id, o.means, o.dedupe_key as "dedupeKey", o.alert_id as "alertId", o.payload, o.attempts, o.refusals, o.created_at as "createdAt", o.held_by as "heldBy",
       p.id as "personId", p.name, p.email, p.time_zone as "timeZone", p.locale, json_build_object('gravity', p.gravity_unit, 'temperature', p.temperature_unit, 'volume', p.volume_unit) as units, t.quiet_from as "quietFrom", t.quiet_to as "quietTo",
       (select max(m.until_at) from mutes m join alerts a on a.batch_id = m.batch_id where a.id = o.alert_id and m.ended_at is null and m.until_at > $now) as "mutedUntil",
       (o.cellar_id is null or exists (select 1 from memberships m where m.cellar_id = o.cellar_id and m.person_id = o.person_id and m.role <> 'guest')) as "stillThere"`,
    { bind: { now, leaseUntil, most }, type: QueryTypes.SELECT },
  );
}

/** A message as somebody took it. Whoever is late, and finds that another has taken it since, has no more to say of it but that it went. */
export type Taken = Pick<Claimed, 'id' | 'attempts'>;
const STILL_TAKEN = 'id = $id and attempts = $attempts and sent_at is null';

/** Gives one back unsent until its time comes. */
export async function holdBack({ id, attempts }: Taken, until: Date, by: HeldBy): Promise<void> {
  await database().query(`update outbox set next_attempt_at = $until, held_by = $by, leased_until = null, attempts = attempts - 1 where ${STILL_TAKEN}`, { bind: { id, attempts, until, by } });
}

/** Nobody has to hear what was held back about this alert any more; `why` stands beside it. */
export async function dropHeld(alertId: string, at: Date, why: string, transaction: Transaction): Promise<void> {
  await database().query(`update outbox set failed_at = $at, dropped_at = $at, leased_until = null, last_error = $why where alert_id = $alertId and held_by is not null and sent_at is null and failed_at is null`, {
    bind: { alertId, at, why },
    transaction,
  });
}

/** A vessel is muted, or no longer: what waits, for it or for the quiet hours, is looked at again now. */
export async function askMutedAgain(batchId: string, at: Date, transaction: Transaction): Promise<void> {
  await database().query(
    `update outbox o set next_attempt_at = $at from alerts a where a.id = o.alert_id and a.batch_id = $batchId and o.held_by in ('mute', 'quiet') and o.sent_at is null and o.failed_at is null`,
    { bind: { batchId, at }, transaction },
  );
}

/** The person has chosen other quiet hours: what the old ones hold is looked at again now. */
export async function askHeldAgain(personId: string, at: Date, transaction: Transaction): Promise<void> {
  await database().query(`update outbox set next_attempt_at = $at where person_id = $personId and held_by = 'quiet' and sent_at is null and failed_at is null`, { bind: { personId, at }, transaction });
}

/** Which of these are owed already, or were. */
export async function knownKeys(keys: readonly string[]): Promise<Set<string>> {
  const rows = await database().query<{ key: string }>(`select dedupe_key as key from outbox where dedupe_key = any($keys::text[])`, { bind: { keys }, type: QueryTypes.SELECT });
  return new Set(rows.map(({ key }) => key));
}

/** How many test messages the person asked for in the last ten minutes. */
export async function recentTests(personId: string): Promise<number> {
  const [row] = await database().query<{ count: number }>(`select count(*)::int as count from outbox where person_id = $personId and means = 'mail' and dedupe_key like 'test:%' and created_at > now() - interval '10 minutes'`, {
    bind: { personId },
    type: QueryTypes.SELECT,
  });
  return row?.count ?? 0;
}

/** Who was told that this alert opened, or will be with no more to wait for than the server, and by which means. */
export function toldOfOpening(alertId: string, transaction: Transaction): Promise<Array<{ personId: string; means: MeansName }>> {
  return database().query(
    `select person_id as "personId", means from outbox
     where alert_id = $alertId and dedupe_key like 'alert:%:opened:%' and dropped_at is null and (held_by is null or sent_at is not null) order by id`,
    { bind: { alertId }, type: QueryTypes.SELECT, transaction },
  );
}

export async function markSent(ids: readonly number[], at: Date): Promise<void> {
  await database().query(`update outbox set sent_at = $at, leased_until = null, last_error = null where id = any($ids::bigint[])`, { bind: { ids, at } });
}

export async function markForRetry({ id, attempts }: Taken, { nextAt, refusals, error }: { nextAt: Date; refusals: number; error: string }): Promise<void> {
  await database().query(`update outbox set next_attempt_at = $nextAt, refusals = $refusals, leased_until = null, last_error = $error where ${STILL_TAKEN}`, { bind: { id, attempts, nextAt, refusals, error } });
}

export async function markFailed({ id, attempts }: Taken, at: Date, error: string): Promise<void> {
  await database().query(`update outbox set failed_at = $at, leased_until = null, last_error = $error where ${STILL_TAKEN}`, { bind: { id, attempts, at, error } });
}

/** Nothing was sent, and nothing was wrong: nobody is there to send it to. */
export async function markDropped({ id, attempts }: Taken, at: Date, why: string): Promise<void> {
  await database().query(`update outbox set failed_at = $at, dropped_at = $at, leased_until = null, last_error = $why where ${STILL_TAKEN}`, { bind: { id, attempts, at, why } });
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
