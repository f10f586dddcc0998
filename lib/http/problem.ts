import 'server-only';
import { BaseError, ConnectionError, DatabaseError } from 'sequelize';
import type { Problem } from '../contracts/common';
import { AppError, InvalidError, ThrottledError } from '../errors';
import { logFor } from '../log';

/** A request that is wrong before anybody reads what it asks for. */
export class RequestError extends AppError {
  constructor(
    readonly code: 'malformed' | 'too-large' | 'unsupported-media-type' | 'cross-site',
    message: string,
  ) {
    super(message);
  }
}

/** The one table from error code to status and title. */
const STATUS: Record<string, [status: number, title: string]> = {
  malformed: [400, 'The request cannot be read'],
  unauthenticated: [401, 'Not signed in'],
  forbidden: [403, 'Not allowed'],
  'cross-site': [403, 'Not allowed from another site'],
  'not-found': [404, 'Not found'],
  conflict: [409, 'Not possible now'],
  'too-large': [413, 'Too large'],
  'unsupported-media-type': [415, 'Not a form of content this takes'],
  invalid: [422, 'Some values are wrong'],
  throttled: [429, 'Too many tries'],
  internal: [500, 'Something went wrong here'],
  unavailable: [503, 'Not available right now'],
};

const RETRY_AFTER_UNAVAILABLE_S = 5;
const log = logFor('http');

/** PostgreSQL that is going down, coming up, full, cancelling what waited too long, or what two have waited for on each other (SQLSTATE). */
const DATABASE_AWAY = /^(08|53|57P|57014|55P03|25P03|40001|40P01)/;

/** The database did not answer, as against answering "no". */
export function databaseIsAway(error: unknown): boolean {
  if (error instanceof ConnectionError) return true;
  const cause = error instanceof DatabaseError || error instanceof BaseError ? (error as DatabaseError).original : error;
  const code = (cause as { code?: unknown } | undefined)?.code;
  if (typeof code === 'string') return DATABASE_AWAY.test(code) || ['ECONNREFUSED', 'ECONNRESET', 'EPIPE', 'ETIMEDOUT'].includes(code);
  return cause instanceof Error && /^Connection terminated/.test(cause.message);
}

export function problemResponse(code: string, detail?: string, more: { errors?: Problem['errors']; headers?: Record<string, string> } = {}): Response {
  const [status, title] = STATUS[code] ?? STATUS.internal!;
  // RFC 9110 15.5.2: a 401 names the way to sign in. Browsers ask nobody for a bearer token.
  const challenge: Record<string, string> = status === 401 ? { 'www-authenticate': 'Bearer' } : {};
  const body: Problem = { type: `urn:fallbright:problem:${code}`, title, status, ...(detail ? { detail } : {}), ...(more.errors && Object.keys(more.errors).length > 0 ? { errors: more.errors } : {}) };
  return new Response(JSON.stringify(body), { status, headers: { 'content-type': 'application/problem+json', 'cache-control': 'no-store', ...challenge, ...more.headers } });
}

/** Turns whatever was thrown into an answer: ours as they are, a missing database as 503, the rest logged whole and shown blank. */
export function problemOf(error: unknown, request: { method: string; path: string }): Response {
  if (error instanceof InvalidError) return problemResponse(error.code, error.message, { errors: error.fields });
  if (error instanceof ThrottledError) return problemResponse(error.code, error.message, { headers: { 'retry-after': String(error.retryAfterS) } });
  if (error instanceof AppError) return problemResponse(error.code, error.message, error.code === 'unavailable' ? { headers: { 'retry-after': String(RETRY_AFTER_UNAVAILABLE_S) } } : {});
  if (databaseIsAway(error)) {
    log.warn({ err: error, ...request }, 'the database did not answer');
    return problemResponse('unavailable', 'The database does not answer right now. What was kept is safe; try again in a moment.', { headers: { 'retry-after': String(RETRY_AFTER_UNAVAILABLE_S) } });
  }
  log.error({ err: error, ...request }, 'an unexpected error');
  return problemResponse('internal', 'It has been written down. Try again; if it stays, look at the log of the server.');
}
