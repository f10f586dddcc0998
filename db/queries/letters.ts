import { QueryTypes, type Transaction } from 'sequelize';
import { database } from '../client';

export interface OwedLetter {
  /** The letter goes with it when it is deleted. */
  cellarId: string | null;
  personId: string | null;
  to: { email: string; name: string };
  /** Names what is owed: the same is never owed twice. */
  dedupeKey: string;
  payload: unknown;
}

/** Owes a letter, in the transaction that has the reason for it. */
export async function oweLetter({ cellarId, personId, to, dedupeKey, payload }: OwedLetter, transaction: Transaction): Promise<void> {
  await database().query(
    `insert into letters (cellar_id, person_id, to_email, to_name, dedupe_key, payload) values ($cellarId, $personId, $email, $name, $dedupeKey, $payload)
     on conflict (dedupe_key) do nothing`,
    { bind: { cellarId, personId, email: to.email, name: to.name, dedupeKey, payload: JSON.stringify(payload) }, transaction },
  );
}

export interface ClaimedLetter {
  id: number;
  dedupeKey: string;
  email: string;
  name: string;
  /** What the reader of the address reads now; where nobody has it, what whoever invites them reads. */
  locale: string | null;
  /** Null: no account has the address. */
  timeZone: string | null;
  payload: unknown;
  attempts: number;
  refusals: number;
  createdAt: Date;
}

/** Takes the letter that is due first; nobody else takes it until the lease ends. */
export async function claimLetter(now: Date, leaseUntil: Date): Promise<ClaimedLetter | null> {
  const [row] = await database().query<ClaimedLetter>(
    `with due as (
       select id from letters
       where sent_at is null and failed_at is null and next_attempt_at <= $now and (leased_until is null or leased_until <= $now)
       order by next_attempt_at, id limit 1 for update skip locked
     ), taken as (
       update letters l set leased_until = $leaseUntil, attempts = attempts + 1 from due where l.id = due.id returning l.*
     )
     select l.id, l.dedupe_key as "dedupeKey", l.to_email as email, l.to_name as name, l.payload, l.attempts, l.refusals, l.created_at as "createdAt",
       p.time_zone as "timeZone", coalesce(p.locale, host.locale, l.payload->>'locale') as locale
     from taken l
     left join people p on p.id = l.person_id or (l.person_id is null and lower(p.email) = lower(l.to_email))
     left join invitations i on i.id::text = l.payload->>'invitation'
     left join people host on host.id = i.invited_by`,
    { bind: { now, leaseUntil }, type: QueryTypes.SELECT },
  );
  return row ?? null;
}

/** What became of a try: it went, it failed for good, or it waits. */
export type LetterOutcome = { sentAt: Date } | { failedAt: Date; error: string } | { nextAt: Date; refusals: number; error: string };

/** Whoever is late, and finds that another has taken the letter since, has no more to say of it but that it went. */
export async function markLetter({ id, attempts }: Pick<ClaimedLetter, 'id' | 'attempts'>, outcome: LetterOutcome): Promise<void> {
  const { sentAt = null, failedAt = null, nextAt = null, refusals = null, error = null } = outcome as { sentAt?: Date; failedAt?: Date; nextAt?: Date; refusals?: number; error?: string };
  await database().query(
    `update letters set sent_at = $sentAt, failed_at = $failedAt, next_attempt_at = coalesce($nextAt, next_attempt_at), refusals = coalesce($refusals, refusals), last_error = $error, leased_until = null
     where id = $id and ($sentAt::timestamptz is not null or (attempts = $attempts and sent_at is null))`,
    { bind: { id, attempts, sentAt, failedAt, nextAt, refusals, error } },
  );
}

/** Drops letters that went or failed, links that can no longer be used, and invitations that came to nothing: after that nobody's address is kept that has no account. */
export async function forgetOldLetters(days: number): Promise<void> {
  await database().query(`delete from letters where coalesce(sent_at, failed_at) < now() - make_interval(days => $days)`, { bind: { days } });
  await database().query(`delete from account_links where expires_at < now() - make_interval(days => $days)`, { bind: { days } });
  await database().query(`delete from invitations where accepted_at is null and least(expires_at, coalesce(revoked_at, expires_at)) < now() - make_interval(days => $days)`, { bind: { days } });
}

/** How far each of these letters got, by its key. */
export async function letterStates(keys: readonly string[]): Promise<Map<string, 'waiting' | 'sent' | 'failed'>> {
  const rows = await database().query<{ key: string; state: 'waiting' | 'sent' | 'failed' }>(
    `select dedupe_key as key, case when sent_at is not null then 'sent' when failed_at is not null then 'failed' else 'waiting' end as state from letters where dedupe_key = any($keys::text[])`,
    { bind: { keys }, type: QueryTypes.SELECT },
  );
  return new Map(rows.map(({ key, state }) => [key, state]));
}

/** Nothing more is written to somebody who is gone. */
export async function forgetLettersTo(personId: string, transaction: Transaction): Promise<void> {
  await database().query(`delete from letters where person_id = $personId`, { bind: { personId }, transaction });
}

/** Forgets the address of somebody whose account goes: the invitation they came by, and what the trail says of it. */
export async function forgetAddress(personId: string, email: string, transaction: Transaction): Promise<void> {
  const bind = { personId, email };
  await database().query(
    `update audit set detail = detail - '{email,invited}'::text[]
     where (action = 'member.joined' and person_id = $personId) or (action in ('invitation.sent', 'invitation.revoked') and lower(detail->>'email') = lower($email))`,
    { bind, transaction },
  );
  await database().query(`delete from invitations where accepted_by = $personId`, { bind: { personId }, transaction });
}
