import type { Transaction } from 'sequelize';
import { oweLetter } from '@/db/queries/letters';
import { AccountLink, Invitation, type Person } from '@/db/models';
import { linkTokenOf } from '@/lib/auth/link-tokens';
import type { LetterPayload, NoticeLetter } from '@/lib/mail/letters';

/** Whether what the letter offers can still be used. */
export async function letterWanted(letter: LetterPayload, now: number): Promise<boolean> {
  if (letter.template === 'notice') return true;
  if (letter.template === 'invitation') {
    const row = await Invitation.findByPk(letter.invitation);
    return row !== null && row.acceptedAt === null && row.revokedAt === null && row.expiresAt.getTime() > now;
  }
  const row = await AccountLink.findByPk(letter.link);
  return row !== null && row.personId !== null && row.usedAt === null && row.expiresAt.getTime() > now;
}

/** The token behind the letter's link: made anew from the row and the server's secret, kept nowhere. */
export function tokenOfLetter(letter: LetterPayload): string {
  if (letter.template === 'invitation') return linkTokenOf('invitation', letter.invitation);
  return letter.template === 'link' ? linkTokenOf(letter.kind, letter.link) : '';
}

/** Tells a person that something about the account has changed, at the address given (usually theirs). */
export async function oweNotice(person: Pick<Person, 'id' | 'name' | 'email' | 'timeZone' | 'locale'>, what: NoticeLetter['what'], key: string, at: Date, transaction: Transaction, about: string | null = null, keepsAccount = true): Promise<void> {
  const payload: NoticeLetter = { template: 'notice', what, at: at.toISOString(), time_zone: person.timeZone, about, locale: person.locale };
  await oweLetter({ cellarId: null, personId: keepsAccount ? person.id : null, to: { email: person.email, name: person.name }, dedupeKey: `notice:${what}:${key}`, payload }, transaction);
}
