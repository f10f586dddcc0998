import { dictionary } from '@zxcvbn-ts/language-common';

/** Words that say where one is; nobody's passphrase should be one of them alone (OWASP ASVS 5.0 6.2.11). */
const OWN_WORDS = ['fallbright', 'fermentation', 'demijohn', 'cellarkeeper'];

let known: Set<string> | undefined;

/** Whether it stands on the list of common passwords (some 18,000 of 8 characters or more), whatever its case. OWASP ASVS 5.0 6.2.4. */
export function isCommon(passphrase: string): boolean {
  known ??= new Set([...((dictionary as Record<string, readonly (string | number)[]>)['passwords-common'] ?? []), ...OWN_WORDS].map((word) => String(word).toLowerCase()));
  return known.has(passphrase.toLowerCase());
}

/** What is wrong with it as the passphrase of that account, or null. */
export function wrongWith(passphrase: string, account: { email: string; name: string }): string | null {
  if (isCommon(passphrase)) return 'is among the first that a guesser tries; take a few words that do not belong together';
  const typed = passphrase.trim().toLowerCase();
  if (typed === account.email.toLowerCase() || typed === account.name.trim().toLowerCase()) return 'is your own name or address; take something that nobody would think of';
  if (new Set(typed).size < 4) return 'has too few different characters';
  return null;
}
