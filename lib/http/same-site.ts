import 'server-only';
import { env } from '../config/env';
import { RequestError } from './problem';

/**
 * A cookie goes along with requests that other sites make, so a request that
 * changes something must come from our own pages (OWASP ASVS 5.0 3.5.1). All
 * current browsers send `Sec-Fetch-Site` (W3C Fetch Metadata); else `Origin` decides.
 * @throws RequestError where neither says "from here".
 */
export function requireSameSite(request: Request): void {
  const site = request.headers.get('sec-fetch-site');
  if (site !== null) {
    if (site === 'same-origin') return;
  } else {
    const origin = request.headers.get('origin');
    if (origin !== null && (origin === new URL(env().PUBLIC_URL).origin || origin === ownOrigin(request))) return;
  }
  throw new RequestError('cross-site', 'This can only be done from Fallbright’s own pages.');
}

/** The address that the browser itself called, for people who reach the server by another name. */
function ownOrigin(request: Request): string | null {
  const host = request.headers.get('host');
  return host === null ? null : `${new URL(env().PUBLIC_URL).protocol}//${host}`;
}
