import { Op } from 'sequelize';
import { Share } from '@/db/models';
import { linkTokenOf } from '@/lib/auth/link-tokens';
import type { Actor } from '@/lib/auth/policies';
import { may } from '@/lib/auth/policies';
import { systemClock, type Clock } from '@/lib/clock';
import { env } from '@/lib/config/env';
import { NotFoundError } from '@/lib/errors';

/** The public page of a share. */
export const shareUrl = (share: Pick<Share, 'id'>): string => `${env().PUBLIC_URL}/share/${linkTokenOf('share', share.id)}`;

/** The batch's newest link that still opens, for those who may hand it out. */
export async function openShareOf(actor: Actor, batchId: string, shareId?: string, clock: Clock = systemClock): Promise<{ id: string; url: string } | null> {
  if (!may(actor.role, 'shares.manage')) return null;
  const share = await Share.findOne({ where: { cellarId: actor.cellarId, batchId, revokedAt: null, expiresAt: { [Op.gt]: new Date(clock.now()) }, ...(shareId !== undefined && { id: shareId }) }, order: [['expiresAt', 'DESC']] });
  if (!share && shareId !== undefined) throw new NotFoundError('open share link');
  return share && { id: share.id, url: shareUrl(share) };
}
