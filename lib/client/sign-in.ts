'use client';

import { signIn, signOut as endSession } from 'next-auth/react';

export type SignInResult = { ok: true } | { ok: false; reason: 'wrong' | 'throttled' | 'unavailable'; retryAfterS: number | null };

/** The codes that the sign-in answers with, from `lib/auth/options.ts`. */
const THROTTLED = /^throttled:(\d+)$/;

/** Signs in with a mail address and a password; `stay` keeps it for 30 days, else 12 hours. */
export async function signInWithPassword(form: { email: string; password: string; stay: boolean }): Promise<SignInResult> {
  const answer = await signIn('credentials', { ...form, stay: String(form.stay), redirect: false }).catch(() => undefined);
  if (answer?.ok) return { ok: true };
  const throttled = THROTTLED.exec(answer?.error ?? '');
  if (throttled) return { ok: false, reason: 'throttled', retryAfterS: Number(throttled[1]) };
  return { ok: false, reason: answer?.error === 'CredentialsSignin' ? 'wrong' : 'unavailable', retryAfterS: null };
}

/** Ends this sign-in and goes to the sign-in page. */
export const signOut = () => endSession({ callbackUrl: '/sign-in' });
