import 'server-only';

/**
 * The address that the request came from: the last one of `X-Forwarded-For`,
 * which is what the nearest proxy saw, or what Next.js puts there itself where
 * there is none. A server that the world reaches without a proxy can be told a
 * false one; the count by account holds then.
 */
export function addressOf(request: Request): string {
  return request.headers.get('x-forwarded-for')?.split(',').at(-1)?.trim() || 'unknown';
}
