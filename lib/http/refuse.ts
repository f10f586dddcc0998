import { beforeEachRequest } from './before';

function canBeDecoded(url: string): boolean {
  try {
    decodeURIComponent(url.split(/[?#]/, 1)[0]!);
    return true;
  } catch {
    return false;
  }
}

/**
 * Refuses what Next.js answers with 500 before any code of ours: TRACE, which shows
 * a request back to whoever sent it and which nobody here needs (RFC 9110, 9.3.8),
 * and addresses whose percent signs stand for no UTF-8 (RFC 3986, 2.5). A Range is
 * left unheard, as a server may (RFC 9110, 14.2): nothing here is long enough to want one.
 */
export function refuseUnreadable(): void {
  beforeEachRequest((request, response) => {
    delete request.headers.range;
    const trace = request.method === 'TRACE';
    if (!trace && canBeDecoded(request.url ?? '/')) return false;
    response.writeHead(trace ? 405 : 400, { ...(trace && { allow: 'GET, HEAD, POST, PATCH, DELETE, OPTIONS' }), 'content-length': 0, connection: 'close' }).end();
    return true;
  });
}
