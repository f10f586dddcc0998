import type { SignInResult } from '@/lib/client/sign-in';

export type Refusal = Extract<SignInResult, { ok: false }>;

/** `90 s`, `12 min` */
const wait = (seconds: number) => (seconds < 120 ? `${Math.max(1, Math.ceil(seconds))} s` : `${Math.ceil(seconds / 60)} min`);

/** What a refused sign-in says; null where a code is only asked for. */
export function refusalSentence(refusal: Refusal, by: 'passphrase' | 'link'): string | null {
  switch (refusal.reason) {
    case 'wrong':
      return by === 'link' ? 'This link has been used, or its 10 min are over. Ask for another.' : 'This address and passphrase do not belong together. Nothing was changed; check both and try again.';
    case 'code-needed':
      return null;
    case 'code-wrong':
      return 'The code does not fit, or was used already. Wait for the next one; a recovery code does too.';
    case 'throttled':
      return `Too many tries for this address. The next one counts in ${wait(refusal.retryAfterS ?? 60)}.`;
    case 'unavailable':
      return 'The server does not answer. Nothing was changed; try again in a minute.';
  }
}
