import 'server-only';
import type { Problem } from '../contracts/common';

/** The one table from error code to status and title. */
const STATUS: Record<string, [status: number, title: string]> = {
  malformed: [400, 'The request cannot be read'],
  unauthenticated: [401, 'Not signed in'],
  forbidden: [403, 'Not allowed'],
  'cross-site': [403, 'Not allowed from another site'],
  'not-found': [404, 'Not found'],
  'method-not-allowed': [405, 'Not a method of this address'],
  conflict: [409, 'Not possible now'],
  'too-large': [413, 'Too large'],
  'unsupported-media-type': [415, 'Not a form of content this takes'],
  invalid: [422, 'Some values are wrong'],
  throttled: [429, 'Too many tries'],
  internal: [500, 'Something went wrong here'],
  unavailable: [503, 'Not available right now'],
};

/** A problem document (RFC 9457). */
export function problemResponse(code: string, detail?: string, more: { errors?: Problem['errors']; headers?: Record<string, string> } = {}): Response {
  const [status, title] = STATUS[code] ?? STATUS.internal!;
  // RFC 9110 15.5.2: a 401 names the way to sign in. Browsers ask nobody for a bearer token.
  const challenge: Record<string, string> = status === 401 ? { 'www-authenticate': 'Bearer' } : {};
  const body: Problem = { type: `urn:fallbright:problem:${code}`, title, status, ...(detail ? { detail } : {}), ...(more.errors && Object.keys(more.errors).length > 0 ? { errors: more.errors } : {}) };
  return new Response(JSON.stringify(body), { status, headers: { 'content-type': 'application/problem+json', 'cache-control': 'no-store', ...challenge, ...more.headers } });
}
