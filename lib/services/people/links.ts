import { randomUUID } from 'node:crypto';
import type { Transaction } from 'sequelize';
import { oweLetter } from '@/db/queries/letters';
import { AccountLink } from '@/db/models';
import { hashLinkToken, linkTokenOf, type AccountLinkKind } from '@/lib/auth/link-tokens';
import { secretTriesOf } from '@/lib/auth/throttle';
import { NotFoundError } from '@/lib/errors';
import type { LinkLetter } from '@/lib/mail/letters';
import { currentOrigin } from '@/lib/origin';

interface NewLink {
  kind: AccountLinkKind;
  /** Null: nobody has the address. The row is written all the same, and no letter goes. */
  personId: string | null;
  to: { email: string; name: string };
  expiresAt: Date;
  newEmail?: string;
}

/** Makes a link and owes the letter that carries it. */
export async function makeLink({ kind, personId, to, expiresAt, newEmail }: NewLink, transaction: Transaction): Promise<AccountLink> {
  const id = randomUUID();
  const link = await AccountLink.create({ id, kind, personId, tokenHash: hashLinkToken(linkTokenOf(kind, id)), newEmail: newEmail ?? null, expiresAt }, { transaction });
  const payload: LinkLetter = { template: 'link', kind, link: id, expires_at: expiresAt.toISOString(), new_email: newEmail ?? null };
  await oweLetter({ cellarId: null, personId, to, dedupeKey: `link:${id}`, payload }, transaction);
  return link;
}

/** Counts a try at a link's secret, wherever one is taken. */
export async function countSecret(): Promise<void> {
  await secretTriesOf(currentOrigin()?.address ?? 'unknown').begin();
}

/**
 * The open link of this secret, locked. Unknown, used, expired: the same answer.
 * @throws NotFoundError
 */
export async function openLink(token: string, kinds: readonly AccountLinkKind[], now: number, transaction: Transaction): Promise<AccountLink & { personId: string }> {
  const link = await AccountLink.findOne({ where: { tokenHash: hashLinkToken(token), kind: [...kinds] }, transaction, lock: transaction.LOCK.UPDATE });
  if (!link || link.personId === null || link.usedAt !== null || link.expiresAt.getTime() <= now) throw new NotFoundError('link, or it has been used or has expired');
  return link as AccountLink & { personId: string };
}

/** Whatever was mailed before no longer counts: the person has acted since. */
export async function endLinks(personId: string, kinds: readonly AccountLinkKind[], now: number, transaction: Transaction): Promise<void> {
  await AccountLink.update({ usedAt: new Date(now) }, { where: { personId, kind: [...kinds], usedAt: null }, transaction });
}
