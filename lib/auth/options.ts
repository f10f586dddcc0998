import 'server-only';
import type { NextAuthOptions, User } from 'next-auth';
import Credentials from 'next-auth/providers/credentials';
import type { z } from 'zod';
import { systemClock } from '../clock';
import { linkSignInForm, signInForm } from '../contracts/people';
import { authSecret, env } from '../config/env';
import { ThrottledError } from '../errors';
import { logFor } from '../log';
import { openSession } from '@/db/queries/sessions';
import { signIn, type SignInFrom, type SignInOutcome } from '../services/people/sign-in';
import { signInByLink } from '../services/people/sign-in-by-link';
import { endSignIn } from '../services/people/end-sign-in';
import { nextAuthCookies } from './cookies';

declare module 'next-auth' {
  interface User {
    signInId: string;
  }
}
declare module 'next-auth/jwt' {
  interface JWT {
    /** The row in `sign_ins` that this cookie names. */
    signInId?: string;
  }
}

/** The cookie may live this long; the row ends earlier where the person did not ask to stay signed in. */
const COOKIE_MAX_AGE_S = 30 * 86_400;
const log = logFor('auth');

/** A code that cannot be one is a wrong code, not a wrong passphrase. */
const refusedForm = (error: z.ZodError): SignInOutcome => (error.issues.every(({ path }) => path[0] === 'code') ? 'code-wrong' : 'refused');

/** What next-auth makes a session of. It hands an error's message to the browser: only codes leave here. `lib/client/sign-in.ts` reads them. */
async function userOf(attempt: () => Promise<SignInOutcome>): Promise<User | null> {
  let outcome: SignInOutcome;
  try {
    outcome = await attempt();
  } catch (error) {
    if (error instanceof ThrottledError) throw new Error(`throttled:${error.retryAfterS}`);
    log.error({ err: error }, 'sign-in could not be checked');
    throw new Error('unavailable');
  }
  if (outcome === 'refused') return null;
  if (typeof outcome === 'string') throw new Error(outcome);
  return { id: outcome.personId, name: outcome.name, email: outcome.email, signInId: outcome.signInId };
}

/** The options for one request: whose browser it is decides the throttle and which earlier sign-in ends. */
export function authOptions(from: SignInFrom): NextAuthOptions {
  return {
    secret: authSecret(),
    session: { strategy: 'jwt', maxAge: COOKIE_MAX_AGE_S },
    cookies: nextAuthCookies(),
    useSecureCookies: env().PUBLIC_URL.startsWith('https:'),
    pages: { signIn: '/sign-in', error: '/sign-in', signOut: '/sign-in' },
    logger: {
      error: (code, detail) => log.error({ code, err: detail instanceof Error ? detail : (detail as { error?: unknown }).error }, 'sign-in failed'),
      warn: (code) => log.warn({ code }, 'sign-in warning'),
      debug: () => undefined,
    },
    providers: [
      Credentials({
        name: 'Password',
        credentials: { email: { type: 'email' }, password: { type: 'password' }, code: { type: 'text' }, stay: { type: 'text' } },
        authorize: (credentials) =>
          userOf(async () => {
            const form = signInForm.safeParse({ ...credentials, code: credentials?.code || undefined });
            return form.success ? signIn(form.data, credentials?.stay === 'true', from, systemClock.now()) : refusedForm(form.error);
          }),
      }),
      Credentials({
        id: 'link',
        name: 'A link by mail',
        credentials: { token: { type: 'text' }, code: { type: 'text' } },
        authorize: (credentials) =>
          userOf(async () => {
            const form = linkSignInForm.safeParse({ ...credentials, code: credentials?.code || undefined });
            return form.success ? signInByLink(form.data, from, systemClock.now()) : refusedForm(form.error);
          }),
      }),
    ],
    callbacks: {
      async jwt({ token, user }) {
        if (user) return { sub: user.id, signInId: user.signInId };
        // A thrown error makes next-auth answer an empty session and clear the cookie.
        if (!token.signInId || (await openSession(token.signInId)).length === 0) throw new Error('This sign-in has ended.');
        return token;
      },
      // The browser learns who it is from /api/v1/me; the session itself tells nothing.
      session: ({ session }) => ({ expires: session.expires }),
    },
    events: {
      async signOut({ token }) {
        if (token?.signInId && token.sub) await endSignIn(token.sub, token.signInId);
      },
    },
  };
}
