import type { Role } from '@/lib/core/roles';
import { database } from '../client';
import { runPrepared, type Prepared } from './prepared';

export interface SessionRow {
  personId: string;
  seenS: number;
  cellarId: string | null;
  role: Role | null;
}

/** Whether the sign-in `s` still opens anything: not ended, not run out, and used lately. */
export const OPEN_SIGN_IN = 's.ended_at is null and s.expires_at > now() and s.last_seen_at > now() - make_interval(secs => s.idle_s)';

const OPEN: Prepared = {
  name: 'open-session',
  text: `select s.person_id as "personId", extract(epoch from now() - s.last_seen_at)::float8 as "seenS", m.cellar_id as "cellarId", m.role
     from sign_ins s left join memberships m on m.person_id = s.person_id
     where s.id = $1 and ${OPEN_SIGN_IN}
     order by m.created_at, m.cellar_id`,
};

/** An open sign-in with the person's memberships, oldest first: one row each, at least one while the sign-in is open, none once it has ended. Every request asks. */
export async function openSession(signInId: string): Promise<SessionRow[]> {
  return (await runPrepared<SessionRow>(database(), OPEN, [signInId])).rows;
}

export interface OpenSignIn {
  signInId: string;
  personId: string;
  cellarId: string;
  role: Role;
}

const STILL_OPEN: Prepared = {
  name: 'open-sessions',
  text: `select s.id as "signInId", m.person_id as "personId", m.cellar_id as "cellarId", m.role
     from sign_ins s join memberships m on m.person_id = s.person_id
     where s.id = any($1::uuid[]) and ${OPEN_SIGN_IN}`,
};

/** Of many sign-ins those that are open, with what each opens: one question, however many pages listen. */
export async function openSessions(signInIds: readonly string[]): Promise<OpenSignIn[]> {
  return (await runPrepared<OpenSignIn>(database(), STILL_OPEN, [[...new Set(signInIds)]])).rows;
}

/** Two servers may see the person in the same minute: the second changes nothing. */
export async function markSeen(signInId: string, everyS: number): Promise<void> {
  await database().query(`update sign_ins set last_seen_at = now() where id = $signInId and last_seen_at < now() - make_interval(secs => $everyS)`, { bind: { signInId, everyS } });
}

/** Drops sign-ins that ended, or ran out, so long ago. */
export async function forgetOldSignIns(days: number): Promise<void> {
  await database().query(`delete from sign_ins where least(expires_at, coalesce(ended_at, expires_at)) < now() - make_interval(days => $days)`, { bind: { days } });
}
