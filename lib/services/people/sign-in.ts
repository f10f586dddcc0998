import { Op, fn, col, where } from 'sequelize';
import { inTransaction } from '@/db/client';
import { Person, SignIn } from '@/db/models';
import { passwordFits } from '@/lib/auth/passwords';
import { triesOf } from '@/lib/auth/throttle';
import type { SignInForm } from '@/lib/contracts/people';
import { audit } from '../audit/write';

const HOUR_MS = 3_600_000;
const STAY_MS = 30 * 24 * HOUR_MS;
const SHORT_MS = 12 * HOUR_MS;
const USER_AGENT_KEPT = 300;

export interface SignInFrom {
  address: string;
  userAgent: string;
  /** The sign-in that the browser held until now; it ends with the new one. */
  previous: string | null;
}

/**
 * Opens a sign-in where the password fits, else null: the same answer, after the
 * same work, whether the account is unknown, has no password, or another one.
 * @throws ThrottledError after too many tries.
 */
export async function signIn(form: SignInForm, stay: boolean, from: SignInFrom, now: number): Promise<{ signInId: string; personId: string; name: string; email: string } | null> {
  const tries = triesOf(form.email, from.address);
  await tries.begin();
  const person = await Person.findOne({ where: where(fn('lower', col('email')), form.email) });
  const fits = await passwordFits(person?.passwordHash ?? null, form.password);
  if (!person || !fits) {
    await audit({ action: 'sign-in.refused', subject: 'person', personId: person?.id ?? null, cellarId: null, detail: { address: from.address } });
    return null;
  }
  await tries.right();
  return inTransaction(async (transaction) => {
    if (from.previous) await SignIn.update({ endedAt: new Date(now) }, { where: { id: from.previous, endedAt: { [Op.is]: null } }, transaction });
    const opened = await SignIn.create({ personId: person.id, userAgent: from.userAgent.slice(0, USER_AGENT_KEPT), expiresAt: new Date(now + (stay ? STAY_MS : SHORT_MS)) }, { transaction });
    await audit({ action: 'sign-in.opened', subject: opened.id, personId: person.id, cellarId: null, detail: { address: from.address, stay } }, transaction);
    return { signInId: opened.id, personId: person.id, name: person.name, email: person.email };
  });
}
