import { createHash } from 'node:crypto';
import { countTry, forgetOldTries, tryWasRight, type TryRule } from '@/db/queries/sign-in-tries';
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
}

/** Known and unknown accounts are counted alike, so that a lock tells nothing. */
export function triesOf(email: string, address: string): Tries {
  const account = key('account', email);
  const from = key('address', address);
  return {
    async begin() {
      const wait = Math.max(await countTry(from, BY_ADDRESS), await countTry(account, BY_ACCOUNT));
      if (wait > 0) throw new ThrottledError(wait, `Too many tries. The next one counts in ${wait} s.`);
    },
    async right() {
      await tryWasRight(account, from);
      await forgetOldTries();
    },
  };
}
