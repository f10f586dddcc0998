import { QueryTypes } from 'sequelize';
import { database } from '../client';

/** Each kind of thing a person has written or holds, as the export names it. */
const PARTS: ReadonlyArray<readonly [name: string, sql: string]> = [
  ['cellars', `select c.id, c.name, m.role, m.created_at as since from memberships m join cellars c on c.id = m.cellar_id where m.person_id = $personId order by m.created_at`],
  ['sign_ins', `select created_at, last_seen_at, expires_at, ended_at, user_agent from sign_ins where person_id = $personId order by created_at`],
  ['tokens', `select name, role, last_four, cellar_id, created_at, expires_at, last_used_at, revoked_at from api_tokens where person_id = $personId order by created_at`],
  ['invitations_sent', `select cellar_id, email, role, created_at, expires_at, accepted_at, revoked_at from invitations where invited_by = $personId order by created_at`],
  [
    'entries',
    `select e.id, e.cellar_id, b.name as batch, e.kind, e.at, e.text, e.gravity, e.temperature_c, e.volume_l, e.sugar_g, e.created_at, e.removed_at
     from entries e join batches b on b.id = e.batch_id where e.person_id = $personId order by e.at, e.id`,
  ],
  ['tastings', `select t.* from tastings t where t.person_id = $personId order by t.created_at`],
  ['jobs_done', `select cellar_id, title, due_at, done_at from jobs where done_by = $personId order by done_at`],
  ['batches_made', `select id, cellar_id, name, kind, created_at from batches where created_by = $personId order by created_at`],
];

/** All that one person has written or holds, by kind. */
export async function writtenBy(personId: string): Promise<Record<string, unknown[]>> {
  const parts = await Promise.all(PARTS.map(async ([name, sql]) => [name, await database().query(sql, { bind: { personId }, type: QueryTypes.SELECT })] as const));
  return Object.fromEntries(parts);
}
