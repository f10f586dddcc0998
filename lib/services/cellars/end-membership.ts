import type { Transaction } from 'sequelize';
import { ApiToken, CalendarFeed, Job, type Membership } from '@/db/models';
import { releaseAlerts } from '../alerts/release';
import { notifyAccess } from '../changes';

/** Ends a membership with all that hangs on it: tokens, calendar address, jobs and alerts in hand; open streams end at once. What the person logged stays. */
export async function endMembership(member: Membership, now: Date, transaction: Transaction): Promise<void> {
  const { cellarId, personId } = member;
  await member.destroy({ transaction });
  await ApiToken.update({ revokedAt: now }, { where: { cellarId, personId, revokedAt: null }, transaction });
  await CalendarFeed.destroy({ where: { cellarId, personId }, transaction });
  await Job.update({ takenBy: null, takenAt: null }, { where: { cellarId, takenBy: personId, doneAt: null, droppedAt: null }, transaction });
  await releaseAlerts(cellarId, personId, now.getTime(), transaction);
  await notifyAccess(cellarId, personId, transaction);
}
