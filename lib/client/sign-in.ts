'use client';

import { signIn, signOut as endSession } from 'next-auth/react';
import { useSyncExternalStore } from 'react';
import { dropDevice } from './push';
import { forgetKept } from './worker';

/** `code-needed` and `code-wrong`: the first factor was right, and the account has a second one. */
export type SignInReason = 'wrong' | 'code-needed' | 'code-wrong' | 'throttled' | 'unavailable';
export type SignInResult = { ok: true } | { ok: false; reason: SignInReason; retryAfterS: number | null };

/** The codes that the sign-in answers with, from `lib/auth/options.ts`. */
const THROTTLED = /^throttled:(\d+)$/;

async function attempt(provider: 'credentials' | 'link', form: Record<string, string>): Promise<SignInResult> {
  const answer = await signIn(provider, { ...form, redirect: false }).catch(() => undefined);
  if (answer?.ok) return { ok: true };
  const error = answer?.error ?? '';
  const throttled = THROTTLED.exec(error);
  if (throttled) return { ok: false, reason: 'throttled', retryAfterS: Number(throttled[1]) };
  if (error === 'code-needed' || error === 'code-wrong') return { ok: false, reason: error, retryAfterS: null };
  return { ok: false, reason: error === 'CredentialsSignin' ? 'wrong' : 'unavailable', retryAfterS: null };
}

/** Signs in with a mail address and a passphrase; `stay` keeps it for 30 days, else 12 hours. */
export const signInWithPassword = ({ stay, code = '', ...form }: { email: string; password: string; stay: boolean; code?: string }) => attempt('credentials', { ...form, code, stay: String(stay) });

/** Signs in by the secret of a mailed link, which is used up by it. */
export const signInByLink = (token: string, code = '') => attempt('link', { token, code });

/** On the way out the page takes no other way; `failed`: the server was not reached, and the person is still signed in. */
type WayOut = 'none' | 'going' | 'failed';
let wayOut: WayOut = 'none';
const onlookers = new Set<() => void>();

function setWayOut(next: WayOut): void {
  wayOut = next;
  for (const onlooker of onlookers) onlooker();
}

function watchWayOut(onlooker: () => void): () => void {
  onlookers.add(onlooker);
  return () => onlookers.delete(onlooker);
}

export const useWayOut = (): WayOut => useSyncExternalStore(watchWayOut, () => wayOut, () => 'none');

/** Goes to the sign-in page, once this sign-in is over; what was kept here of the person goes too. */
async function goOut(said?: 'deleted'): Promise<void> {
  await Promise.allSettled([dropDevice(), forgetKept()]);
  window.location.assign(said ? `/sign-in?said=${said}` : '/sign-in');
}

/** What they are told then, after the words that they are still signed in. */
export const SIGN_OUT_AGAIN = 'The server was not reached; sign out again once it is.';

/** Puts the word away that signing out did not come about. */
export const staySignedIn = (): void => setWayOut('none');

/** Ends this sign-in and leaves. Where the server is not reached the person stays, and is told: whoever took the device would be them. Whether they left. */
export async function signOut(): Promise<boolean> {
  setWayOut('going');
  try {
    await endSession({ redirect: false });
  } catch {
    setWayOut('failed');
    return false;
  }
  await goOut();
  return true;
}

/** Leaves by a deed that ends this sign-in itself, as deleting the account does. Where it fails, the person stays, and the failure is thrown on. */
export async function leaveBy(deed: () => Promise<unknown>, said?: 'deleted'): Promise<void> {
  setWayOut('going');
  try {
    await deed();
  } catch (error) {
    setWayOut('none');
    throw error;
  }
  // The server knows this sign-in no more; all that is left of it is a cookie.
  await endSession({ redirect: false }).catch(() => undefined);
  await goOut(said);
}
