import 'server-only';
import { env } from '../config/env';

const YEAR_S = 31_536_000;

/** What every answer says, page and API alike (OWASP ASVS 5.0, 3.4). */
export function securityHeaders(): Record<string, string> {
  return {
    'x-content-type-options': 'nosniff',
    'referrer-policy': 'strict-origin-when-cross-origin',
    'x-frame-options': 'DENY',
    'cross-origin-opener-policy': 'same-origin',
    'cross-origin-resource-policy': 'same-origin',
    'permissions-policy': 'camera=(self), microphone=(), geolocation=(), payment=(), usb=()',
    ...(env().PUBLIC_URL.startsWith('https:') && { 'strict-transport-security': `max-age=${YEAR_S}; includeSubDomains` }),
  };
}

/** What an answer of the API says besides: no script of it runs. A printed sheet is shown inside our own page; nothing else of the API is ever framed. */
export function apiHeaders(pathname: string): Record<string, string> {
  if (pathname.endsWith('.pdf')) return { ...securityHeaders(), 'x-frame-options': 'SAMEORIGIN', 'content-security-policy': "default-src 'none'; object-src 'self'; style-src 'unsafe-inline'; frame-ancestors 'self'" };
  return { ...securityHeaders(), 'content-security-policy': "default-src 'none'; frame-ancestors 'none'" };
}
