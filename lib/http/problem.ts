import 'server-only';
import { BaseError, ConnectionError, DatabaseError, ForeignKeyConstraintError, UniqueConstraintError } from 'sequelize';
import { AppError, InvalidError, ThrottledError } from '../errors';
import { logFor } from '../log';
import { problemResponse } from './problem-response';

/** A request that is wrong before anybody reads what it asks for. */
export class RequestError extends AppError {
  constructor(
    readonly code: 'malformed' | 'too-large' | 'unsupported-media-type' | 'cross-site',
    message: string,
  ) {
    super(message);
  }
}

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

/** What was there when a service looked has gone since, or what was not there has come. */
const isAnothersDoing = (error: unknown): boolean => error instanceof ForeignKeyConstraintError || error instanceof UniqueConstraintError;

/** Turns whatever was thrown into an answer: ours as they are, a missing database as 503, the rest logged whole and shown blank. */
export function problemOf(error: unknown, request: { method: string; path: string }): Response {
  if (error instanceof InvalidError) return problemResponse(error.code, error.message, { errors: error.fields });
  if (error instanceof ThrottledError) return problemResponse(error.code, error.message, { headers: { 'retry-after': String(error.retryAfterS) } });
  if (error instanceof AppError) return problemResponse(error.code, error.message, error.code === 'unavailable' ? { headers: { 'retry-after': String(RETRY_AFTER_UNAVAILABLE_S) } } : {});
  if (databaseIsAway(error)) {
    log.warn({ err: error, ...request }, 'the database did not answer');
    return problemResponse('unavailable', 'The database does not answer right now. What was kept is safe; try again in a moment.', { headers: { 'retry-after': String(RETRY_AFTER_UNAVAILABLE_S) } });
  }
  if (isAnothersDoing(error)) {
    log.warn({ err: error, ...request }, 'two requests were in each other’s way');
    return problemResponse('conflict', 'Somebody changed the same at the same moment. Look at it again before you try once more.');
  }
  log.error({ err: error, ...request }, 'an unexpected error');
  return problemResponse('internal', 'It has been written down. Try again; if it stays, look at the log of the server.');
}
