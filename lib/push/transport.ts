import { request as overHttp } from 'node:http';
import { request as overHttps } from 'node:https';
import { isIP } from 'node:net';
import webpush from 'web-push';
import { MailFailure } from '../mail/transport';
import type { PushKeys } from './keys';
import { isPublicAddress, PrivateAddressError, publicLookup } from './public-address';

/** A browser's address for push messages, with the keys that only it can read with (RFC 8291). */
export interface PushTarget {
  endpoint: string;
  p256dh: string;
  auth: string;
}

export interface PushMessage {
  /** JSON of at most some 3 kB. */
  body: string;
  /** RFC 8030: a message of the same topic that was not delivered yet is replaced. */
  topic: string;
  urgent: boolean;
  /** How long the push service may keep it for a device that is off, s. */
  ttlS: number;
}

/** `gone`: the browser has given the address up; nothing will ever take it again. */
export type PushOutcome = 'taken' | 'gone';

export interface PushTransport {
  /** @throws MailFailure where the service does not answer or says no */
  send(target: PushTarget, message: PushMessage): Promise<PushOutcome>;
}

export interface PushOptions {
  /** Asked for when the first message goes. */
  keys: () => PushKeys;
  /** Whom a push service can ask about these messages: `mailto:` or `https:`. */
  contact: string;
  /** Plain http and addresses inside the network, for development and tests. */
  allowPrivate: boolean;
  timeoutMs?: number;
}

/** Whether messages may be sent to that address at all: https, to a name or a public address. */
export function mayPushTo(endpoint: string, allowPrivate: boolean): boolean {
  if (!URL.canParse(endpoint)) return false;
  const { protocol, hostname, username, password } = new URL(endpoint);
  if (username || password) return false;
  if (allowPrivate) return protocol === 'https:' || protocol === 'http:';
  const host = hostname.replace(/^\[|\]$/g, '');
  return protocol === 'https:' && (isIP(host) ? isPublicAddress(host) : host.includes('.') && !/\.(localhost|local|internal|home\.arpa)$/i.test(host));
}

/** Web push (RFC 8030) with encrypted bodies; the answer's body is never read. */
export function webPushTransport({ keys, contact, allowPrivate, timeoutMs = 15_000 }: PushOptions): PushTransport {
  return {
    async send({ endpoint, p256dh, auth }, { body, topic, urgent, ttlS }) {
      if (!mayPushTo(endpoint, allowPrivate)) return 'gone';
      const details = webpush.generateRequestDetails({ endpoint, keys: { p256dh, auth } }, body, {
        vapidDetails: { subject: contact, ...keys() },
        TTL: ttlS,
        urgency: urgent ? 'high' : 'normal',
        topic,
        contentEncoding: 'aes128gcm',
      });
      const status = await post(new URL(details.endpoint), details.headers, details.body, allowPrivate, timeoutMs);
      if (status >= 200 && status < 300) return 'taken';
      if (status === 404 || status === 410) return 'gone';
      throw new MailFailure(status === 429 || status >= 500 ? 'deferred' : 'refused', `the push service answered ${status}`);
    },
  };
}

function post(url: URL, headers: Record<string, string | number>, body: Buffer | null, allowPrivate: boolean, timeoutMs: number): Promise<number> {
  return new Promise((resolve, reject) => {
    const request = (url.protocol === 'http:' ? overHttp : overHttps)(url, {
      method: 'POST',
      headers,
      signal: AbortSignal.timeout(timeoutMs),
      ...(allowPrivate ? {} : { lookup: publicLookup }),
    });
    request.on('response', (response) => {
      resolve(response.statusCode ?? 0);
      response.destroy();
    });
    request.on('error', (error) => {
      const refused = error instanceof PrivateAddressError;
      // People read it beside their device; what the network said is in the cause.
      reject(new MailFailure(refused ? 'refused' : 'unavailable', refused ? error.message : 'the push service did not answer', { cause: error }));
    });
    request.end(body ?? undefined);
  });
}
