import { inTransaction } from '@/db/client';
import { Person } from '@/db/models';
import { authorize } from '@/lib/auth/authorize';
import { may, type Actor } from '@/lib/auth/policies';
import { systemClock, type Clock } from '@/lib/clock';
import type { MemberBody } from '@/lib/contracts/people';
import type { Role } from '@/lib/core/roles';
import { ConflictError } from '@/lib/errors';
import { releaseAlerts } from '../alerts/release';
import { auditBy } from '../audit/write';
import { notifyAccess } from '../changes';
import { iso } from '../iso';
import { oweNotice } from '../letters/owe';
import { confirmedPerson } from '../people/verify';
import { endMembership } from './end-membership';
import { lockCellar, memberOf, requireAnotherKeeper } from './keepers';

/** Changes a member's role; open streams of the old one end at once. @throws ConflictError for the last keeper. */
export async function changeRole(actor: Actor, personId: string, role: Role, clock: Clock = systemClock): Promise<MemberBody> {
  authorize(actor, 'members.manage');
  return inTransaction(async (transaction) => {
    await lockCellar(actor.cellarId, transaction);
    const member = await memberOf(actor.cellarId, personId, transaction);
    const before = member.role;
    if (role !== 'keeper') await requireAnotherKeeper(member, transaction);
    await member.update({ role }, { transaction });
    if (!may(role, 'alerts.acknowledge')) await releaseAlerts(actor.cellarId, personId, clock.now(), transaction);
    await auditBy(actor, 'member.role-changed', personId, { from: before, to: role }, transaction);
    await notifyAccess(actor.cellarId, personId, transaction);
    const { id, name, email } = await Person.findByPk(personId, { transaction, rejectOnEmpty: true });
    return { person: { id, name, email }, role, since: iso(member.createdAt) };
  });
}

/** Takes a member out, and tells them. @throws ConflictError for the last keeper. */
export async function removeMember(actor: Actor, personId: string, clock: Clock = systemClock): Promise<void> {
  authorize(actor, 'members.manage');
  const now = new Date(clock.now());
  await inTransaction(async (transaction) => {
    const cellar = await lockCellar(actor.cellarId, transaction);
    const member = await memberOf(actor.cellarId, personId, transaction);
    await requireAnotherKeeper(member, transaction);
    await endMembership(member, now, transaction);
    const person = await Person.findByPk(personId, { transaction, rejectOnEmpty: true });
    await auditBy(actor, 'member.removed', personId, { name: person.name, role: member.role }, transaction);
    if (personId !== actor.personId) await oweNotice(person, 'removed', `${actor.cellarId}:${personId}:${now.getTime()}`, now, transaction, cellar.name);
  });
}

/** Leaves the cellar. @throws ConflictError for the last keeper. */
export async function leaveCellar(actor: Actor, clock: Clock = systemClock): Promise<void> {
  await inTransaction(async (transaction) => {
    await lockCellar(actor.cellarId, transaction);
    const member = await memberOf(actor.cellarId, actor.personId, transaction);
    await requireAnotherKeeper(member, transaction);
    await endMembership(member, new Date(clock.now()), transaction);
    await auditBy(actor, 'member.left', actor.personId, { role: member.role }, transaction);
  });
}

/** Makes another member the keeper in one step, and stays as brewer. */
export async function handOver(actor: Actor, personId: string, passphrase: string, clock: Clock = systemClock): Promise<void> {
  authorize(actor, 'members.manage');
  if (personId === actor.personId) throw new ConflictError('You keep it already. Choose somebody else.');
  // Another cellar's member is not there, whatever the passphrase.
  await inTransaction((transaction) => memberOf(actor.cellarId, personId, transaction));
  await confirmedPerson(actor.personId, passphrase);
  const now = new Date(clock.now());
  await inTransaction(async (transaction) => {
    const cellar = await lockCellar(actor.cellarId, transaction);
    const [heir, keeper] = [await memberOf(actor.cellarId, personId, transaction), await memberOf(actor.cellarId, actor.personId, transaction)];
    await heir.update({ role: 'keeper' }, { transaction });
    await keeper.update({ role: 'brewer' }, { transaction });
    await auditBy(actor, 'cellar.handed-over', actor.cellarId, { to: personId }, transaction);
    for (const id of [personId, actor.personId]) await notifyAccess(actor.cellarId, id, transaction);
    await oweNotice(await Person.findByPk(personId, { transaction, rejectOnEmpty: true }), 'handed-over', `${actor.cellarId}:${personId}:${now.getTime()}`, now, transaction, cellar.name);
  });
}
