import type { Transaction } from 'sequelize';
import { Cellar, Membership } from '@/db/models';
import { ConflictError, NotFoundError } from '@/lib/errors';

/**
 * Locks the cellar for a change of who shares it, so that two keepers who go in
 * the same moment are told one after the other. Always before its memberships.
 */
export async function lockCellar(cellarId: string, transaction: Transaction): Promise<Cellar> {
  const cellar = await Cellar.findByPk(cellarId, { transaction, lock: transaction.LOCK.NO_KEY_UPDATE });
  if (!cellar) throw new NotFoundError('cellar');
  return cellar;
}

/** A member of the locked cellar. @throws NotFoundError */
export async function memberOf(cellarId: string, personId: string, transaction: Transaction): Promise<Membership> {
  const member = await Membership.findOne({ where: { cellarId, personId }, transaction });
  if (!member) throw new NotFoundError('member');
  return member;
}

/** @throws ConflictError where this member is the only keeper there is. */
export async function requireAnotherKeeper(member: Membership, transaction: Transaction): Promise<void> {
  if (member.role !== 'keeper') return;
  if ((await Membership.count({ where: { cellarId: member.cellarId, role: 'keeper' }, transaction })) > 1) return;
  throw new ConflictError('A cellar has at least one keeper. Hand it over, or make somebody else keeper first. One that nobody needs any more can be deleted.');
}
