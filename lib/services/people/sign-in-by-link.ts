import { inTransaction } from '@/db/client';
import { Person } from '@/db/models';
import { triesOf } from '@/lib/auth/throttle';
import { NotFoundError } from '@/lib/errors';
import { audit } from '../audit/write';
import { countSecret, endLinks, openLink } from './links';
import { openSignIn, type SignInFrom, type SignInOutcome } from './sign-in';
import { secondFactorOf } from './verify';

/**
 * Opens a sign-in by a mailed link, which is used up by it; where the account
 * has a second factor the link stays good until the code is right.
 * @throws ThrottledError after too many wrong codes.
 */
export async function signInByLink(form: { token: string; code?: string | undefined }, from: SignInFrom, now: number): Promise<SignInOutcome> {
  await countSecret();
  const person = await personOfLink(form.token, now);
  if (!person) return 'refused';
  const tries = triesOf(person.email.toLowerCase(), from.address);
  if (form.code !== undefined) await tries.begin();
  const shown = await secondFactorOf(person.id, form.code, now);
  if (shown !== 'right') {
    if (shown === 'wrong') await audit({ action: 'sign-in.refused', subject: 'code', personId: person.id, cellarId: null });
    return shown === 'needed' ? 'code-needed' : 'code-wrong';
  }
  if (form.code !== undefined) await tries.right();
  return orRefused(() =>
    inTransaction(async (transaction) => {
      const link = await openLink(form.token, ['sign-in'], now, transaction);
      await endLinks(link.personId, ['sign-in'], now, transaction);
      return openSignIn(person, true, from, now, transaction);
    }),
  );
}

const personOfLink = (token: string, now: number) => orRefused(() => inTransaction(async (transaction) => Person.findByPk((await openLink(token, ['sign-in'], now, transaction)).personId, { transaction }))).then((found) => (found === 'refused' ? null : found));

/** A link that is no longer good refuses, whatever the reason. */
async function orRefused<T>(work: () => Promise<T>): Promise<T | 'refused'> {
  try {
    return await work();
  } catch (error) {
    if (error instanceof NotFoundError) return 'refused';
    throw error;
  }
}
