import type { z } from 'zod';
import { QueryTypes } from 'sequelize';
import { database } from '@/db/client';
import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import type { memberList } from '@/lib/contracts/people';
import type { Role } from '@/lib/core/roles';

/** Who shares the cellar, by name. */
export async function listMembers(actor: Actor): Promise<z.infer<typeof memberList>> {
  authorize(actor, 'members.read');
  const rows = await database().query<{ id: string; name: string; email: string; role: Role; since: Date }>(
    `select p.id, p.name, p.email, m.role, m.created_at as since
     from memberships m join people p on p.id = m.person_id where m.cellar_id = $cellarId order by p.name, p.id`,
    { bind: { cellarId: actor.cellarId }, type: QueryTypes.SELECT },
  );
  return { items: rows.map((row) => ({ person: { id: row.id, name: row.name, email: row.email }, role: row.role, since: row.since.toISOString() })) };
}
