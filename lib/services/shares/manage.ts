import { randomUUID } from 'node:crypto';
import type { Transaction } from 'sequelize';
import { Batch, Share } from '@/db/models';
import { inTransaction } from '@/db/client';
import { authorize } from '@/lib/auth/authorize';
import { hashLinkToken, linkTokenOf } from '@/lib/auth/link-tokens';
import type { Actor } from '@/lib/auth/policies';
import { systemClock, type Clock } from '@/lib/clock';
import type { CreateShare, ShareBody } from '@/lib/contracts/shares';
import { ConflictError, NotFoundError } from '@/lib/errors';
import { auditBy } from '../audit/write';
import { loadBatch } from '../batches/load';
import { notifyChange } from '../changes';
import { namesOf } from '../entries/names';
import { iso, isoOrNull } from '../iso';
import { shareUrl } from './open';

const DAY_MS = 86_400_000;
const MOST_OPEN = 50;

function present(share: Share, batch: Pick<Batch, 'id' | 'name'>, names: ReadonlyMap<string, string>, now: number): ShareBody {
  const open = share.revokedAt === null && share.expiresAt.getTime() > now;
  const name = share.createdBy === null ? undefined : names.get(share.createdBy);
  return {
    id: share.id,
    batch: { id: batch.id, name: batch.name },
    url: open ? shareUrl(share) : null,
    created_at: iso(share.createdAt),
    created_by: share.createdBy !== null && name !== undefined ? { id: share.createdBy, name } : null,
    expires_at: iso(share.expiresAt),
    revoked_at: isoOrNull(share.revokedAt),
    open,
    show_people: share.showPeople,
    takes_tastings: share.takesTastings,
    looked_at: share.lookedAt,
    last_looked_at: isoOrNull(share.lastLookedAt),
  };
}

/** Makes a link to one batch, read only, until it expires or is revoked. */
export function createShare(actor: Actor, batchId: string, input: CreateShare, clock: Clock = systemClock): Promise<ShareBody> {
  return inTransaction((transaction) => shareIn(actor, batchId, input, clock, transaction));
}

/** The same inside somebody's transaction. */
export async function shareIn(actor: Actor, batchId: string, input: CreateShare, clock: Clock, transaction: Transaction): Promise<ShareBody> {
  authorize(actor, 'shares.manage');
  const now = clock.now();
  const batch = await loadBatch(actor.cellarId, batchId, transaction);
  if ((await Share.count({ where: { batchId, revokedAt: null }, transaction })) >= MOST_OPEN) throw new ConflictError(`A batch has at most ${MOST_OPEN} links. Revoke one first.`);
  const id = randomUUID();
  const share = await Share.create(
    { id, cellarId: actor.cellarId, batchId, tokenHash: hashLinkToken(linkTokenOf('share', id)), expiresAt: new Date(now + input.expires_in_days * DAY_MS), showPeople: input.show_people, takesTastings: input.takes_tastings, createdBy: actor.personId, createdAt: new Date(now) },
    { transaction },
  );
  await share.reload({ transaction });
  await auditBy(actor, 'share.created', id, { batch: batchId, days: input.expires_in_days, people: input.show_people }, transaction);
  await notifyChange({ cellar: actor.cellarId, kind: 'share', batch: batchId }, transaction);
  return present(share, batch, await namesOf([share.createdBy], transaction), now);
}

/** The cellar's links, newest first, or those of one batch. */
export async function listShares(actor: Actor, batchId: string | null, clock: Clock = systemClock): Promise<{ items: ShareBody[] }> {
  authorize(actor, 'shares.manage');
  if (batchId !== null) await loadBatch(actor.cellarId, batchId);
  const shares = await Share.findAll({ where: { cellarId: actor.cellarId, ...(batchId !== null && { batchId }) }, order: [['createdAt', 'DESC']], limit: 200 });
  const batches = await Batch.findAll({ where: { id: [...new Set(shares.map((share) => share.batchId))], cellarId: actor.cellarId } });
  const names = await namesOf(shares.map((share) => share.createdBy));
  const nameOf = new Map(batches.map((batch) => [batch.id, batch]));
  return { items: shares.flatMap((share) => (nameOf.has(share.batchId) ? [present(share, nameOf.get(share.batchId)!, names, clock.now())] : [])) };
}

/** Revokes a link: from now on it opens nothing, as if it had never been. */
export async function revokeShare(actor: Actor, id: string, clock: Clock = systemClock): Promise<void> {
  authorize(actor, 'shares.manage');
  await inTransaction(async (transaction) => {
    const share = await Share.findOne({ where: { id, cellarId: actor.cellarId }, transaction, lock: transaction.LOCK.UPDATE });
    if (!share) throw new NotFoundError('share link');
    await share.update({ revokedAt: share.revokedAt ?? new Date(clock.now()) }, { transaction });
    await auditBy(actor, 'share.revoked', id, { batch: share.batchId }, transaction);
    await notifyChange({ cellar: actor.cellarId, kind: 'share', batch: share.batchId }, transaction);
  });
}
