import type { Transaction } from 'sequelize';
import { inTransaction } from '@/db/client';
import { Cellar, Invitation, Membership, Person } from '@/db/models';
import { hashLinkToken } from '@/lib/auth/link-tokens';
import { hashPassword } from '@/lib/auth/passwords';
import { systemClock, type Clock } from '@/lib/clock';
import type { InvitationView, JoinByInvitation } from '@/lib/contracts/people';
import { ConflictError, NotFoundError } from '@/lib/errors';
import { audit } from '../audit/write';
import { notifyChange } from '../changes';
import { iso } from '../iso';
import { countSecret } from '../people/links';
import { requireGoodPassphrase } from '../people/passphrase';
import { personByEmail } from '../people/sign-in';

/** The open invitation of this secret. Unknown, revoked, expired, accepted: the same answer. @throws NotFoundError */
async function openInvitation(token: string, now: number, transaction: Transaction): Promise<Invitation> {
  const row = await Invitation.findOne({ where: { tokenHash: hashLinkToken(token), acceptedAt: null, revokedAt: null }, transaction, lock: transaction.LOCK.UPDATE });
  if (!row || row.expiresAt.getTime() <= now) throw new NotFoundError('invitation, or it has been used, taken back, or has expired');
  return row;
}

/** What the invitation offers, to whoever holds its link. */
export async function lookAtInvitation(token: string, clock: Clock = systemClock): Promise<InvitationView> {
  await countSecret();
  return inTransaction(async (transaction) => {
    const row = await openInvitation(token, clock.now(), transaction);
    const cellar = await Cellar.findByPk(row.cellarId, { transaction, rejectOnEmpty: true });
    const by = row.invitedBy === null ? null : await Person.findByPk(row.invitedBy, { transaction });
    return { cellar: cellar.name, by: by?.name ?? 'its keeper', role: row.role, email: row.email, expires_at: iso(row.expiresAt), has_account: (await personByEmail(row.email, transaction)) !== null };
  });
}

/** Accepts with the account that is signed in, whichever address it has: the link is the leave. */
export async function acceptInvitation(personId: string, token: string, clock: Clock = systemClock): Promise<{ id: string }> {
  await countSecret();
  return inTransaction(async (transaction) => {
    const row = await openInvitation(token, clock.now(), transaction);
    await join(row, personId, clock.now(), transaction);
    return { id: row.cellarId };
  });
}

/** Accepts with a new account; that the link arrived proves the address. @returns the address to sign in with */
export async function joinByInvitation(input: JoinByInvitation, clock: Clock = systemClock): Promise<{ email: string }> {
  await countSecret();
  const now = clock.now();
  const { email } = await inTransaction((transaction) => openInvitation(input.token, now, transaction));
  requireGoodPassphrase(input.passphrase, { email, name: input.name });
  const passwordHash = await hashPassword(input.passphrase);
  return inTransaction(async (transaction) => {
    const row = await openInvitation(input.token, now, transaction);
    if (await personByEmail(row.email, transaction)) throw new ConflictError('This address has an account. Sign in with it and open the link again.');
    const person = await Person.create({ name: input.name, email: row.email, passwordHash, timeZone: input.time_zone }, { transaction });
    await audit({ action: 'account.made', subject: person.id, personId: person.id, cellarId: null }, transaction);
    await join(row, person.id, now, transaction);
    return { email: row.email };
  });
}

async function join(row: Invitation, personId: string, now: number, transaction: Transaction): Promise<void> {
  if (await Membership.count({ where: { cellarId: row.cellarId, personId }, transaction })) throw new ConflictError('You share this cellar already. The invitation stays open for whom it was meant.');
  await Membership.create({ cellarId: row.cellarId, personId, role: row.role }, { transaction });
  await row.update({ acceptedAt: new Date(now), acceptedBy: personId }, { transaction });
  await audit({ action: 'member.joined', subject: personId, personId, cellarId: row.cellarId, detail: { role: row.role, invitation: row.id, invited: row.email } }, transaction);
  await notifyChange({ cellar: row.cellarId, kind: 'member', batch: null }, transaction);
}
