import { request as overHttp } from 'node:http';
import { request as overHttps } from 'node:https';
import { isIP } from 'node:net';
import { isPublicAddress, PrivateAddressError, publicLookup } from '@/lib/push/public-address';

const TIMEOUT_MS = 10_000;

/** The host's name without the brackets of IPv6. */
const hostOf = (url: URL) => url.hostname.replace(/^\[|\]$/g, '');

/** Names that stand for the house itself, wherever they are looked up. */
const INNER_NAME = /(^|\.)(localhost|local|internal|home\.arpa)$/i;

/** Why this address is not one that deliveries may go to; null: it may be. A name is looked at again when it is resolved, at each delivery. */
export function refusedTarget(address: string, allowPrivate: boolean): string | null {
  if (!URL.canParse(address)) return 'is no web address';
  const url = new URL(address);
  if (allowPrivate) return null;
  if (url.protocol !== 'https:') return 'must begin with https://';
  const host = hostOf(url);
  if (isIP(host) ? !isPublicAddress(host) : INNER_NAME.test(host) || !host.includes('.')) return 'leads into this network; the operator has to allow that';
  return null;
}

/**
 * Posts a body and answers the status. The address that was checked is the one
 * connected to; redirects are not followed, and what comes back is not read.
 */
export function post(address: string, headers: Record<string, string>, body: string, allowPrivate: boolean, timeoutMs = TIMEOUT_MS): Promise<number> {
  const refused = refusedTarget(address, allowPrivate);
  if (refused) return Promise.reject(new PrivateAddressError(new URL(address).hostname));
  const url = new URL(address);
  return new Promise((resolve, reject) => {
    const request = (url.protocol === 'http:' ? overHttp : overHttps)(
      url,
      { method: 'POST', headers: { ...headers, 'content-length': Buffer.byteLength(body) }, signal: AbortSignal.timeout(timeoutMs), agent: false, ...(allowPrivate ? {} : { lookup: publicLookup }) },
      (response) => {
        resolve(response.statusCode ?? 0);
        response.destroy();
      },
    );
    request.on('error', reject);
    request.end(body);
  });
}
