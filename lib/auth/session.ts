import 'server-only';
import { decode } from 'next-auth/jwt';
import { cookies } from 'next/headers';
import { markTokenUsed, openToken, openTokens, type OpenToken } from '@/db/queries/api-tokens';
import { markSeen, openSession, openSessions, type SessionRow } from '@/db/queries/sessions';
import { authSecret } from '../config/env';
import { logFor } from '../log';
import { apiTokenOf, hashApiToken, lesserRole } from './api-tokens';
import { cellarCookie, sessionCookie } from './cookies';
import type { Actor } from './policies';

/** Who asks, by which sign-in or token, and as whom they act. */
export interface Session {
  /** Null: by a token. */
  signInId: string | null;
  /** Null: by a sign-in in a browser. */
  token: { id: string; lastFour: string } | null;
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
  if (first.seenS > SEEN_EVERY_S) markSeen(signInId, SEEN_EVERY_S).catch((error: unknown) => logFor('auth').warn({ err: error }, 'could not note when a person was last seen'));
  return { signInId, token: null, personId: first.personId, actor: actorOf(rows, jar.get(cellarCookie())?.value) };
}

const actorOfToken = (row: OpenToken): Actor => ({ personId: row.personId, cellarId: row.cellarId, role: lesserRole(row.tokenRole, row.personRole) });

/** The session behind an `Authorization: Bearer fbt_…` header, or null: revoked, expired, its person gone, or never made. */
export async function sessionOfBearer(header: string): Promise<Session | null> {
  const token = apiTokenOf(header);
  const row = token && (await openToken(hashApiToken(token)));
  if (!row) return null;
  if (row.usedS === null || row.usedS > SEEN_EVERY_S) markTokenUsed(row.id, SEEN_EVERY_S).catch((error: unknown) => logFor('auth').warn({ err: error }, 'could not note when a token was last used'));
  return { signInId: null, token: { id: row.id, lastFour: row.lastFour }, personId: row.personId, actor: actorOfToken(row) };
}

/** Somebody who was let in for longer than one request. */
export interface LetIn {
  session: Pick<Session, 'signInId' | 'token'>;
  actor: Actor;
}

const key = (by: string, { personId, cellarId, role }: Actor) => `${by} ${personId} ${cellarId} ${role}`;

/** Of those let in, the ones whose sign-in or token is still open and who still act in that cellar in that role. */
export async function stillIn<T extends LetIn>(all: readonly T[]): Promise<Set<T>> {
  const signIns = all.flatMap(({ session }) => (session.token || session.signInId === null ? [] : [session.signInId]));
  const tokens = all.flatMap(({ session }) => (session.token ? [session.token.id] : []));
  const open = new Set([
    ...(signIns.length ? await openSessions(signIns) : []).map((row) => key(row.signInId, row)),
    ...(tokens.length ? await openTokens(tokens) : []).map((row) => key(row.id, actorOfToken(row))),
  ]);
  return new Set(all.filter(({ session, actor }) => open.has(key(session.token?.id ?? session.signInId ?? '', actor))));
}

/** The session of the page being rendered, or null. */
export async function currentSession(): Promise<Session | null> {
  return sessionOf(await cookies());
}
