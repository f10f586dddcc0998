import 'server-only';
import { decode } from 'next-auth/jwt';
import { cookies } from 'next/headers';
import { markSeen, openSession, type SessionRow } from '@/db/queries/sessions';
import { authSecret } from '../config/env';
import { logFor } from '../log';
import { cellarCookie, sessionCookie } from './cookies';
import type { Actor } from './policies';

/** Who is signed in, by which sign-in, and as whom they act. */
export interface Session {
  signInId: string;
  personId: string;
  /** Null: a person who belongs to no cellar. */
  actor: Actor | null;
}

/** `last_seen_at` is for the eye: to the minute is enough. */
const SEEN_EVERY_S = 60;

interface CookieJar {
  get(name: string): { value: string } | undefined;
}

/** The sign-in that the cookie names, or null; a cookie that was forged, changed or has expired names none. */
export async function signInIdOf(jar: CookieJar): Promise<string | null> {
  const cookie = jar.get(sessionCookie())?.value;
  if (!cookie) return null;
  const token = await decode({ token: cookie, secret: authSecret() }).catch(() => null);
  return typeof token?.signInId === 'string' ? token.signInId : null;
}

function actorOf(rows: SessionRow[], wanted: string | undefined): Actor | null {
  const chosen = rows.find((row) => row.cellarId === wanted) ?? rows[0];
  return chosen?.cellarId && chosen.role ? { personId: chosen.personId, cellarId: chosen.cellarId, role: chosen.role } : null;
}

/** The session behind a request's cookies, checked against the database, or null. */
export async function sessionOf(jar: CookieJar): Promise<Session | null> {
  const signInId = await signInIdOf(jar);
  if (!signInId) return null;
  const rows = await openSession(signInId);
  const [first] = rows;
  if (!first) return null;
  if (first.seenS > SEEN_EVERY_S) markSeen(signInId, SEEN_EVERY_S).catch((error: unknown) => logFor('auth').warn({ error }, 'could not note when a person was last seen'));
  return { signInId, personId: first.personId, actor: actorOf(rows, jar.get(cellarCookie())?.value) };
}

/** Whether the sign-in is still open and the person still acts in that cellar in that role. */
export async function holds(signInId: string, actor: Actor): Promise<boolean> {
  const rows = await openSession(signInId);
  return rows.some((row) => row.personId === actor.personId && row.cellarId === actor.cellarId && row.role === actor.role);
}

/** The session of the page being rendered, or null. */
export async function currentSession(): Promise<Session | null> {
  return sessionOf(await cookies());
}
