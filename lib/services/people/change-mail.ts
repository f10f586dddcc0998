import { inTransaction } from '@/db/client';
import { AccountLink, Person } from '@/db/models';
import { linkTriesOf } from '@/lib/auth/throttle';
import { systemClock, type Clock } from '@/lib/clock';
import { ConflictError, InvalidError } from '@/lib/errors';
import { currentOrigin } from '@/lib/origin';
import { audit } from '../audit/write';
import { oweNotice } from '../letters/owe';
import { countSecret, endLinks, makeLink, openLink } from './links';
import { personByEmail } from './sign-in';
import { confirmedPerson } from './verify';

const LASTS_MS = 24 * 3_600_000;
const BOTH = ['mail-old', 'mail-new'] as const;

/** Asks for another mail address: a link goes to the old one and to the new one, and both have to be used. */
export async function askForMailChange(personId: string, form: { email: string; passphrase: string }, clock: Clock = systemClock): Promise<void> {
  const person = await confirmedPerson(personId, form.passphrase);
  if (person.email.toLowerCase() === form.email) throw new InvalidError('That is the address it has.', { email: ['is the address you have'] });
  await linkTriesOf(form.email, currentOrigin()?.address ?? 'unknown').begin();
  const expiresAt = new Date(clock.now() + LASTS_MS);
  await inTransaction(async (transaction) => {
    await endLinks(personId, BOTH, clock.now(), transaction);
    await makeLink({ kind: 'mail-old', personId, to: person, expiresAt, newEmail: form.email }, transaction);
    // Whether somebody has that address already is told to nobody but whoever reads its mail.
    await makeLink({ kind: 'mail-new', personId, to: { email: form.email, name: person.name }, expiresAt, newEmail: form.email }, transaction);
    await audit({ action: 'mail-address.asked', subject: personId, personId, cellarId: null }, transaction);
  });
}

/** Takes the asked-for change back. */
export async function dropMailChange(personId: string, clock: Clock = systemClock): Promise<void> {
  await inTransaction(async (transaction) => {
    await endLinks(personId, BOTH, clock.now(), transaction);
    await audit({ action: 'mail-address.kept', subject: personId, personId, cellarId: null }, transaction);
  });
}

/**
 * Confirms one side of a change; with the second side the address changes.
 * @throws NotFoundError for a link that is not open, ConflictError where somebody has the address by now.
 */
export async function confirmMailChange(token: string, clock: Clock = systemClock): Promise<{ changed: boolean; waits_for: 'old' | 'new' | null }> {
  await countSecret();
  const now = clock.now();
  return inTransaction(async (transaction) => {
    const link = await openLink(token, BOTH, now, transaction);
    const other = await AccountLink.findOne({ where: { personId: link.personId, newEmail: link.newEmail, kind: link.kind === 'mail-old' ? 'mail-new' : 'mail-old' }, order: [['createdAt', 'DESC']], transaction, lock: transaction.LOCK.UPDATE });
    const newEmail = link.newEmail ?? '';
    if (await personByEmail(newEmail, transaction)) throw new ConflictError('Another account has this address. The change cannot be made.');
    await link.update({ usedAt: new Date(now) }, { transaction });
    if (other?.usedAt === null) return { changed: false, waits_for: link.kind === 'mail-old' ? ('new' as const) : ('old' as const) };
    const person = await Person.findByPk(link.personId, { transaction, rejectOnEmpty: true });
    const before = person.email;
    await person.update({ email: newEmail }, { transaction });
    await endLinks(person.id, ['sign-in', 'password'], now, transaction);
    await audit({ action: 'mail-address.changed', subject: person.id, personId: person.id, cellarId: null }, transaction);
    await oweNotice({ id: person.id, name: person.name, timeZone: person.timeZone, locale: person.locale, email: before }, 'mail-changed', `${person.id}:${now}`, new Date(now), transaction, newEmail);
    return { changed: true, waits_for: null };
  });
}
