import type { z } from 'zod';
import { Op } from 'sequelize';
import { SignIn } from '@/db/models';
import { systemClock, type Clock } from '@/lib/clock';
import type { signInList } from '@/lib/contracts/people';

/** The person's open sign-ins, the one seen last first. */
export async function listSignIns(personId: string, current: string, clock: Clock = systemClock): Promise<z.infer<typeof signInList>> {
  const rows = await SignIn.findAll({ where: { personId, endedAt: { [Op.is]: null }, expiresAt: { [Op.gt]: new Date(clock.now()) } }, order: [['lastSeenAt', 'DESC']], limit: 200 });
  return {
    items: rows.map((row) => ({
      id: row.id,
      created_at: row.createdAt.toISOString(),
      last_seen_at: row.lastSeenAt.toISOString(),
      user_agent: row.userAgent,
      current: row.id === current,
    })),
  };
}
