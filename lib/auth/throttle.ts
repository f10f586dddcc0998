import { createHash } from 'node:crypto';
import { countTry, forgetOldTries, takeTryBack, tryWasRight, type TryRule } from '@/db/queries/sign-in-tries';
import { ThrottledError } from '../errors';

/** One account: five guesses, then 30 s, 1 min, 2 min, … up to a quarter of an hour. */
const BY_ACCOUNT: TryRule = { free: 5, firstWaitS: 30, mostWaitS: 900 };
/** One address, which a whole household may share. */
const BY_ADDRESS: TryRule = { free: 40, firstWaitS: 30, mostWaitS: 900 };

/** Kept as a hash: the table need not know who failed to sign in, and a name of any length fits. */
const key = (kind: string, value: string) => `${kind}:${createHash('sha256').update(value).digest('base64url')}`;

export interface Tries {
  /** @throws ThrottledError while the account or the address has to wait. */
  begin(): Promise<void>;
  right(): Promise<void>;
  /** It guessed at nothing, and opened nothing either: it does not count. */
  noGuess(): Promise<void>;
}

/** Known and unknown accounts are counted alike, so that a lock tells nothing. */
export const triesOf = (email: string, address: string): Tries => tries(key('account', email), BY_ACCOUNT, key('address', address), BY_ADDRESS);

/** Mails that somebody asks for, to one account: three, then a minute's pause that doubles. Nobody's mailbox is to be flooded. */
const LINKS_BY_ACCOUNT: TryRule = { free: 3, firstWaitS: 60, mostWaitS: 3_600 };
const LINKS_BY_ADDRESS: TryRule = { free: 20, firstWaitS: 60, mostWaitS: 3_600 };

export const linkTriesOf = (email: string, address: string): Tries => tries(key('links', email), LINKS_BY_ACCOUNT, key('links-address', address), LINKS_BY_ADDRESS);

/** Secrets of mailed links that somebody tries, from one address. They cannot be guessed; this keeps the noise down. */
const SECRETS_BY_ADDRESS: TryRule = { free: 60, firstWaitS: 30, mostWaitS: 900 };

export const secretTriesOf = (address: string): Tries => tries(null, null, key('secrets', address), SECRETS_BY_ADDRESS);

/** The passphrase of somebody who is signed in, asked for again. */
export const ownTriesOf = (personId: string, address: string): Tries => tries(key('own', personId), BY_ACCOUNT, key('address', address), BY_ADDRESS);

/** Invitations that one person sends: twenty, then slower. */
const INVITATIONS: TryRule = { free: 20, firstWaitS: 60, mostWaitS: 3_600 };

export const invitationTriesOf = (personId: string): Tries => tries(key('invitations', personId), INVITATIONS, null, null);

function tries(account: string | null, accountRule: TryRule | null, from: string | null, fromRule: TryRule | null): Tries {
  return {
    async begin() {
      const wait = Math.max(from && fromRule ? await countTry(from, fromRule) : 0, account && accountRule ? await countTry(account, accountRule) : 0);
      if (wait > 0) throw new ThrottledError(wait, `Too many tries. The next one counts in ${wait} s.`);
    },
    async right() {
      await tryWasRight(account ?? '', from ?? '');
      await forgetOldTries();
    },
    noGuess: () => takeTryBack([account, from].filter((item) => item !== null)),
  };
}
