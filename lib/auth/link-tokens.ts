import { createHash, createHmac } from 'node:crypto';
import { authSecret } from '../config/env';

export type AccountLinkKind = 'sign-in' | 'password' | 'mail-old' | 'mail-new';

/** Bytes of a token: 192 bits, which nobody guesses. */
const TOKEN_BYTES = 24;

/**
 * The token of an address that opens by itself (a share link, a calendar, a mailed link). It
 * follows from the row's identifier and the server's secret, so that the address
 * can be shown and printed again while the database keeps only its hash.
 */
export function linkTokenOf(kind: 'share' | 'calendar' | 'take' | 'invitation' | AccountLinkKind, id: string): string {
  return createHmac('sha256', authSecret()).update(`${kind}:${id}`).digest().subarray(0, TOKEN_BYTES).toString('base64url');
}

export const hashLinkToken = (token: string): Buffer => createHash('sha256').update(token).digest();
