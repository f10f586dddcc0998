import { inTransaction } from '@/db/client';
import { Membership } from '@/db/models';
import { forgetCellar, soleKeptBy } from '@/db/queries/cellars';
import { forgetAddress, forgetLettersTo } from '@/db/queries/letters';
import { systemClock, type Clock } from '@/lib/clock';
import { ConflictError, InvalidError } from '@/lib/errors';
import { audit } from '../audit/write';
import { notifyAccess, notifyChange } from '../changes';
import { endMembership } from '../cellars/end-membership';
import { lockCellar } from '../cellars/keepers';
import { oweNotice } from '../letters/owe';
import { confirmedPerson, requireSecondFactor } from './verify';

/**
 * Deletes a person's account. Cellars that nobody else shares go with it; one
 * that others share and nobody else keeps has to be handed over first. What the
 * person logged in a cellar stays in its log, without their name.
 */
export async function deleteAccount(personId: string, form: { passphrase: string; code?: string | undefined; email: string }, clock: Clock = systemClock): Promise<void> {
  const person = await confirmedPerson(personId, form.passphrase);
  if (form.email !== person.email.toLowerCase()) throw new InvalidError('Type the mail address of the account.', { email: ['is not the address of this account'] });
  await requireSecondFactor(personId, form.code, clock.now());
  const now = new Date(clock.now());
  await inTransaction(async (transaction) => {
    const memberships = await Membership.findAll({ where: { personId }, order: [['cellarId', 'ASC']], transaction });
    for (const { cellarId } of memberships) await lockCellar(cellarId, transaction);
    const alone = await soleKeptBy(personId, transaction);
    const shared = alone.filter(({ others }) => others > 0);
    if (shared.length > 0) throw new ConflictError(`Others share ${shared.map(({ name }) => name).join(', ')}, and nobody else keeps it. Hand it over first.`);
    for (const membership of memberships) await endMembership(membership, now, transaction);
    for (const { id, name } of alone) {
      await forgetCellar(id, transaction);
      await audit({ action: 'cellar.deleted', subject: id, personId: null, cellarId: null, detail: { name } }, transaction);
      await notifyChange({ cellar: id, kind: 'member', batch: null }, transaction);
    }
    await forgetLettersTo(personId, transaction);
    await forgetAddress(personId, person.email, transaction);
    await audit({ action: 'account.deleted', subject: personId, personId: null, cellarId: null }, transaction);
    await oweNotice(person, 'account-deleted', personId, now, transaction, null, false);
    await notifyAccess(null, personId, transaction);
    await person.destroy({ transaction });
  });
}
