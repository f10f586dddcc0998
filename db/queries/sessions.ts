import { QueryTypes } from 'sequelize';
import type { Role } from '@/lib/core/roles';
import { database } from '../client';

export interface SessionRow {
  personId: string;
  seenS: number;
  cellarId: string | null;
  role: Role | null;
}

/** An open sign-in with the person's memberships, oldest first: one row each, at least one while the sign-in is open, none once it has ended. */
export function openSession(signInId: string): Promise<SessionRow[]> {
  return database().query<SessionRow>(
    `select s.person_id as "personId", extract(epoch from now() - s.last_seen_at)::float8 as "seenS", m.cellar_id as "cellarId", m.role
     from sign_ins s left join memberships m on m.person_id = s.person_id
     where s.id = $signInId and s.ended_at is null and s.expires_at > now()
     order by m.created_at, m.cellar_id`,
    { bind: { signInId }, type: QueryTypes.SELECT },
  );
}

/** Two servers may see the person in the same minute: the second changes nothing. */
export async function markSeen(signInId: string, everyS: number): Promise<void> {
  await database().query(`update sign_ins set last_seen_at = now() where id = $signInId and last_seen_at < now() - make_interval(secs => $everyS)`, { bind: { signInId, everyS } });
}
