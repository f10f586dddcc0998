import { randomUUID } from 'node:crypto';
import { inTransaction } from '@/db/client';
import { Invitation, Membership, Person } from '@/db/models';
import { letterStates, oweLetter } from '@/db/queries/letters';
import { authorize } from '@/lib/auth/authorize';
import { hashLinkToken, linkTokenOf } from '@/lib/auth/link-tokens';
import type { Actor } from '@/lib/auth/policies';
import { invitationTriesOf } from '@/lib/auth/throttle';
import { systemClock, type Clock } from '@/lib/clock';
import type { CreateInvitation, InvitationBody } from '@/lib/contracts/people';
import { ConflictError, NotFoundError } from '@/lib/errors';
import type { InvitationLetter } from '@/lib/mail/letters';
import { auditBy } from '../audit/write';
import { lockCellar } from '../cellars/keepers';
import { notifyChange } from '../changes';
import { namesOf } from '../entries/names';
import { iso } from '../iso';
import { personByEmail } from '../people/sign-in';

const DAY_MS = 86_400_000;
const MOST_OPEN = 50;

const letterKey = (id: string) => `invitation:${id}`;

/** Who is invited and has not come yet, and who came by invitation. */
export async function listInvitations(actor: Actor, clock: Clock = systemClock): Promise<{ items: InvitationBody[] }> {
  authorize(actor, 'members.manage');
  const rows = await Invitation.findAll({ where: { cellarId: actor.cellarId, revokedAt: null }, order: [['createdAt', 'DESC']], limit: 200 });
  const names = await namesOf(rows.flatMap((row) => [row.invitedBy, row.acceptedBy]));
  const mails = await letterStates(rows.map((row) => letterKey(row.id)));
  return { items: rows.map((row) => present(row, names, mails.get(letterKey(row.id)) ?? 'waiting', clock.now())) };
}

function present(row: Invitation, names: ReadonlyMap<string, string>, mail: InvitationBody['mail'], now: number): InvitationBody {
  const name = (id: string | null) => (id === null ? null : (names.get(id) ?? null));
  return {
    id: row.id,
    email: row.email,
    role: row.role,
    invited_by: name(row.invitedBy),
    created_at: iso(row.createdAt),
    expires_at: iso(row.expiresAt),
    state: row.acceptedAt ? 'accepted' : row.expiresAt.getTime() <= now ? 'expired' : 'open',
    accepted_by: name(row.acceptedBy),
    mail,
  };
}

/** Invites somebody by mail. An older invitation to the same address stops. */
export async function createInvitation(actor: Actor, input: CreateInvitation, clock: Clock = systemClock): Promise<InvitationBody> {
  authorize(actor, 'members.manage');
  await invitationTriesOf(actor.personId).begin();
  const now = new Date(clock.now());
  return inTransaction(async (transaction) => {
    const cellar = await lockCellar(actor.cellarId, transaction);
    const there = await personByEmail(input.email, transaction);
    if (there && (await Membership.count({ where: { cellarId: cellar.id, personId: there.id }, transaction }))) throw new ConflictError('They share the cellar already. Change their role in the list.');
    if ((await Invitation.count({ where: { cellarId: cellar.id, acceptedAt: null, revokedAt: null }, transaction })) >= MOST_OPEN) throw new ConflictError(`At most ${MOST_OPEN} invitations can wait. Take one back first.`);
    await Invitation.update({ revokedAt: now }, { where: { cellarId: cellar.id, acceptedAt: null, revokedAt: null, email: input.email }, transaction });
    const id = randomUUID();
    const expiresAt = new Date(now.getTime() + input.expires_in_days * DAY_MS);
    const row = await Invitation.create({ id, cellarId: cellar.id, email: input.email, role: input.role, tokenHash: hashLinkToken(linkTokenOf('invitation', id)), invitedBy: actor.personId, createdAt: now, expiresAt }, { transaction });
    await row.reload({ transaction });
    const inviter = await Person.findByPk(actor.personId, { transaction, rejectOnEmpty: true });
    const payload: InvitationLetter = { template: 'invitation', invitation: id, cellar: cellar.name, by: inviter.name, role: input.role, expires_at: expiresAt.toISOString(), time_zone: cellar.timeZone };
    await oweLetter({ cellarId: cellar.id, personId: null, to: { email: input.email, name: there?.name ?? '' }, dedupeKey: letterKey(id), payload }, transaction);
    await auditBy(actor, 'invitation.sent', id, { email: input.email, role: input.role, days: input.expires_in_days }, transaction);
    await notifyChange({ cellar: cellar.id, kind: 'member', batch: null }, transaction);
    return present(row, new Map([[inviter.id, inviter.name]]), 'waiting', now.getTime());
  });
}

/** Takes an invitation back: its link opens nothing from now on. */
export async function revokeInvitation(actor: Actor, id: string, clock: Clock = systemClock): Promise<void> {
  authorize(actor, 'members.manage');
  await inTransaction(async (transaction) => {
    const row = await Invitation.findOne({ where: { id, cellarId: actor.cellarId, acceptedAt: null, revokedAt: null }, transaction, lock: transaction.LOCK.UPDATE });
    if (!row) throw new NotFoundError('invitation');
    await row.update({ revokedAt: new Date(clock.now()) }, { transaction });
    await auditBy(actor, 'invitation.revoked', id, { email: row.email }, transaction);
    await notifyChange({ cellar: actor.cellarId, kind: 'member', batch: null }, transaction);
  });
}
