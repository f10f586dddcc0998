import { randomBytes } from 'node:crypto';
import { NextResponse, type NextRequest } from 'next/server';
import { sessionCookie } from './lib/auth/cookies';
import { env } from './lib/config/env';
import { securityHeaders } from './lib/http/headers';

/** Pages that people see before they have signed in. */
const OPEN = /^\/(sign-in|share|take|invitation|mail-address)(\/|$)/;

/** OWASP ASVS 5.0 3.4.3: only scripts that this answer names run, and what they load. */
function contentSecurityPolicy(nonce: string): string {
  // React's development build evaluates strings for its error overlay.
  const development = env().NODE_ENV === 'development' ? " 'unsafe-eval'" : '';
  return [
    "default-src 'self'",
    `script-src 'self' 'nonce-${nonce}' 'strict-dynamic'${development}`,
    // uPlot and React set style attributes.
    "style-src 'self' 'unsafe-inline'",
    "img-src 'self' data: blob:",
    "font-src 'self'",
    "connect-src 'self'",
    // The service worker, which 'strict-dynamic' would leave out.
    "worker-src 'self'",
    "object-src 'none'",
    "base-uri 'none'",
    "form-action 'self'",
    "frame-ancestors 'none'",
  ].join('; ');
}

function secured<R extends Response>(response: R): R {
  for (const [name, value] of Object.entries(securityHeaders())) response.headers.set(name, value);
  return response;
}

/** Headers for every page, and the way to the sign-in page for those without a session. Whether the session holds, each page and route asks the database. The API has a door of its own: `lib/http/api-door.ts`. */
export function proxy(request: NextRequest): Response {
  const { pathname, search } = request.nextUrl;
  if (!OPEN.test(pathname) && !request.cookies.has(sessionCookie())) {
    const target = new URL('/sign-in', request.url);
    if (pathname !== '/') target.searchParams.set('next', pathname + search);
    return secured(NextResponse.redirect(target));
  }
  const policy = contentSecurityPolicy(randomBytes(16).toString('base64'));
  // Next.js finds the nonce in the request's policy and marks its own scripts with it.
  const headers = new Headers(request.headers);
  headers.set('content-security-policy', policy);
  const response = secured(NextResponse.next({ request: { headers } }));
  response.headers.set('content-security-policy', policy);
  return response;
}

export const config = {
  matcher: ['/((?!api/|_next/static|_next/image|favicon.ico|icon.svg|manifest.webmanifest|sw.js|.*\\.(?:png|svg|woff2?)$).*)'],
};
