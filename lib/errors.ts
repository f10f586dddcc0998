/**
 * The closed set of things that can go wrong in a use case. `lib/http` turns
 * them into RFC 9457 problem documents, once; anything else is logged whole and
 * shown blank.
 */

/** Messages by field path (`original_gravity`, `events.0.at`), as sentences. */
export type FieldErrors = Record<string, string[]>;

export abstract class AppError extends Error {
  /** Stable last part of the problem's `type`. */
  abstract readonly code: string;
  override get name(): string {
    return this.constructor.name;
  }
}

/** The input has the wrong form or a value outside its span. */
export class InvalidError extends AppError {
  readonly code = 'invalid';
  constructor(message: string, readonly fields: FieldErrors = {}) {
    super(message);
  }
}

/** Nobody is signed in, or the credential is not valid. */
export class UnauthenticatedError extends AppError {
  readonly code = 'unauthenticated';
  constructor(message = 'Sign in first.') {
    super(message);
  }
}

/** The person is known, sees the thing, and may not do this. */
export class ForbiddenError extends AppError {
  readonly code = 'forbidden';
  constructor(message = 'Your role in this cellar does not allow this.') {
    super(message);
  }
}

/** No such thing here; another cellar's thing is "not found" too, so that its existence never leaks. */
export class NotFoundError extends AppError {
  readonly code = 'not-found';
  constructor(what = 'page') {
    // `link, or it has been used`: the reason ends the sentence, not the place.
    super(`There is no such ${what.includes(',') ? what : `${what} here`}.`);
  }
}

/** The state of things does not allow it (already taken, already ended). */
export class ConflictError extends AppError {
  readonly code = 'conflict';
}

/** Too many tries; `retryAfterS` says when the next one counts. */
export class ThrottledError extends AppError {
  readonly code = 'throttled';
  constructor(readonly retryAfterS: number, message = 'Too many tries. Wait a little, then try again.') {
    super(message);
  }
}

/** A part the use case needs does not answer now (database, broker). */
export class UnavailableError extends AppError {
  readonly code = 'unavailable';
}
