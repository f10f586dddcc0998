import { col, fn, Op, where, type Transaction } from 'sequelize';
import { inTransaction } from '@/db/client';
import { Person, SignIn } from '@/db/models';
import { passwordFits } from '@/lib/auth/passwords';
import { triesOf } from '@/lib/auth/throttle';
import type { SignInForm } from '@/lib/contracts/people';
import { audit } from '../audit/write';
import { secondFactorOf } from './verify';

const HOUR_MS = 3_600_000;
/** The longest a sign-in lasts, and how long it lasts unused (OWASP ASVS 5.0 7.3.1, 7.3.2): on a device of one's own, and on another's. */
const STAY = { lastsMs: 30 * 24 * HOUR_MS, idleS: 14 * 86_400 };
const SHORT = { lastsMs: 12 * HOUR_MS, idleS: 4 * 3_600 };
const USER_AGENT_KEPT = 300;

export interface SignInFrom {
  address: string;
  userAgent: string;
  /** The sign-in that the browser held until now; it ends with the new one. */
  previous: string | null;
}

export interface OpenedSignIn {
  signInId: string;
  personId: string;
  name: string;
  email: string;
}

/** `refused` tells nothing of why; the others are told only to somebody who has shown the first factor. */
export type SignInRefusal = 'refused' | 'code-needed' | 'code-wrong';
export type SignInOutcome = OpenedSignIn | SignInRefusal;

export const personByEmail = (email: string, transaction?: Transaction) => Person.findOne({ where: where(fn('lower', col('email')), email.toLowerCase()), transaction });

/**
 * Opens a sign-in where the passphrase fits, and the code where the account has
 * a second factor. The answer is the same, after the same work, whether the
 * account is unknown, has no passphrase, or another one.
 * @throws ThrottledError after too many tries.
 */
export async function signIn(form: SignInForm, stay: boolean, from: SignInFrom, now: number): Promise<SignInOutcome> {
  const tries = triesOf(form.email, from.address);
  await tries.begin();
  const person = await personByEmail(form.email);
  const fits = await passwordFits(person?.passwordHash ?? null, form.password);
  if (!person || !fits) {
    await audit({ action: 'sign-in.refused', subject: 'person', personId: person?.id ?? null, cellarId: null });
    return 'refused';
  }
  const shown = await secondFactorOf(person.id, form.code, now);
  if (shown !== 'right') {
    if (shown === 'wrong') await audit({ action: 'sign-in.refused', subject: 'code', personId: person.id, cellarId: null });
    // The code comes with a second try: a household of careful people must not lock itself out.
    else await tries.noGuess();
    return shown === 'needed' ? 'code-needed' : 'code-wrong';
  }
  await tries.right();
  return inTransaction((transaction) => openSignIn(person, stay, from, now, transaction));
}

/** A new sign-in of the person; the one that the browser held ends (OWASP ASVS 5.0 7.2.4). */
export async function openSignIn(person: Person, stay: boolean, from: SignInFrom, now: number, transaction: Transaction): Promise<OpenedSignIn> {
  if (from.previous) await SignIn.update({ endedAt: new Date(now) }, { where: { id: from.previous, endedAt: { [Op.is]: null } }, transaction });
  const { lastsMs, idleS } = stay ? STAY : SHORT;
  const opened = await SignIn.create({ personId: person.id, userAgent: from.userAgent.slice(0, USER_AGENT_KEPT), expiresAt: new Date(now + lastsMs), idleS }, { transaction });
  await audit({ action: 'sign-in.opened', subject: opened.id, personId: person.id, cellarId: null, detail: { stay } }, transaction);
  return { signInId: opened.id, personId: person.id, name: person.name, email: person.email };
}
