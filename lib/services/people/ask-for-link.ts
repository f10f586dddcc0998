import { inTransaction } from '@/db/client';
import { linkTriesOf } from '@/lib/auth/throttle';
import { systemClock, type Clock } from '@/lib/clock';
import { currentOrigin } from '@/lib/origin';
import { audit } from '../audit/write';
import { makeLink } from './links';
import { personByEmail } from './sign-in';

/** OWASP ASVS 5.0 6.5.5: a secret by mail counts for ten minutes. */
const LASTS_MS = 10 * 60_000;

/**
 * Mails a link to sign in with, or to choose a new passphrase with. An address
 * that nobody has gets the same answer after the same work, and no letter.
 * @throws ThrottledError
 */
export async function askForLink(kind: 'sign-in' | 'password', email: string, clock: Clock = systemClock): Promise<void> {
  await linkTriesOf(email, currentOrigin()?.address ?? 'unknown').begin();
  await inTransaction(async (transaction) => {
    const person = await personByEmail(email, transaction);
    await makeLink({ kind, personId: person?.id ?? null, to: { email: person?.email ?? email, name: person?.name ?? '' }, expiresAt: new Date(clock.now() + LASTS_MS) }, transaction);
    await audit({ action: `${kind}-link.asked`, subject: 'person', personId: person?.id ?? null, cellarId: null }, transaction);
  });
}
