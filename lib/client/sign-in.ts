'use client';

import { signIn, signOut as endSession } from 'next-auth/react';
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

let leaving = false;
/** Whether the person is on the way out: that the server knows nobody then is no news to them. */
export const isSigningOut = (): boolean => leaving;

/** Ends this sign-in and goes to the sign-in page; what was kept here of the person goes too. */
export async function signOut(said?: 'deleted'): Promise<void> {
  leaving = true;
  await Promise.allSettled([dropDevice(), forgetKept()]);
  try {
    await endSession({ callbackUrl: said ? `/sign-in?said=${said}` : '/sign-in' });
  } catch (error) {
    leaving = false;
    throw error;
  }
}
