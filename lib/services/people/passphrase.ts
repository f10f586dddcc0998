import { Op, type Transaction } from 'sequelize';
import { inTransaction } from '@/db/client';
import { Person, SignIn } from '@/db/models';
import { wrongWith } from '@/lib/auth/common-passphrases';
import { hashPassword } from '@/lib/auth/passwords';
import { systemClock, type Clock } from '@/lib/clock';
import { InvalidError, NotFoundError } from '@/lib/errors';
import { audit } from '../audit/write';
import { notifyAccess } from '../changes';
import { oweNotice } from '../letters/owe';
import { countSecret, endLinks, openLink } from './links';
import { confirmedPerson } from './verify';

/** @throws InvalidError where it is common or the account's own name. */
export function requireGoodPassphrase(passphrase: string, account: { email: string; name: string }): void {
  const wrong = wrongWith(passphrase, account);
  if (wrong) throw new InvalidError('Choose another passphrase.', { passphrase: [wrong] });
}

/** Chooses another passphrase, knowing the old one; every other sign-in ends (OWASP ASVS 5.0 7.4.3). */
export async function changePassphrase(personId: string, signInId: string, form: { current: string; passphrase: string }, clock: Clock = systemClock): Promise<void> {
  const person = await confirmedPerson(personId, form.current, 'current');
  requireGoodPassphrase(form.passphrase, person);
  const passwordHash = await hashPassword(form.passphrase);
  await inTransaction((transaction) => setPassphrase(person, passwordHash, signInId, clock.now(), transaction));
}

/** Chooses a new passphrase by a mailed link, which is used up by it; every sign-in ends. The second factor stays. */
export async function resetPassphrase(form: { token: string; passphrase: string }, clock: Clock = systemClock): Promise<void> {
  await countSecret();
  const now = clock.now();
  const find = (transaction: Transaction) => openLink(form.token, ['password'], now, transaction).then((link) => Person.findByPk(link.personId, { transaction }));
  const person = await inTransaction(find);
  if (!person) throw new NotFoundError('account');
  requireGoodPassphrase(form.passphrase, person);
  const passwordHash = await hashPassword(form.passphrase);
  await inTransaction(async (transaction) => {
    // It may have been used while the hash was made.
    await openLink(form.token, ['password'], now, transaction);
    await setPassphrase(person, passwordHash, null, now, transaction);
  });
}

async function setPassphrase(person: Person, passwordHash: string, keep: string | null, now: number, transaction: Transaction): Promise<void> {
  const at = new Date(now);
  await person.update({ passwordHash }, { transaction });
  await SignIn.update({ endedAt: at }, { where: { personId: person.id, endedAt: { [Op.is]: null }, ...(keep && { id: { [Op.ne]: keep } }) }, transaction });
  // A change of address that somebody else may have asked for ends with it.
  await endLinks(person.id, ['sign-in', 'password', 'mail-old', 'mail-new'], now, transaction);
  await audit({ action: keep ? 'passphrase.changed' : 'passphrase.reset', subject: person.id, personId: person.id, cellarId: null }, transaction);
  await oweNotice(person, 'password-changed', `${person.id}:${now}`, at, transaction);
  await notifyAccess(null, person.id, transaction);
}
