import { createDecipheriv, createECDH, createPublicKey, hkdfSync, randomBytes, verify, type ECDH } from 'node:crypto';
import { once } from 'node:events';
import { createServer, type IncomingHttpHeaders } from 'node:http';
import type { AddressInfo } from 'node:net';

/** A browser's side of web push: its address and the keys that read what comes there. */
export interface FakeBrowser {
  endpoint: string;
  keys: { p256dh: string; auth: string };
  /** What came, read as the browser reads it. */
  read(): string[];
}

export interface Pushed {
  path: string;
  headers: IncomingHttpHeaders;
  body: Buffer;
}

export interface PushService {
  url: string;
  taken: Pushed[];
  /** The status it answers; 201 takes the message. */
  answer: (path: string) => number;
  browser(): FakeBrowser;
  stop(): Promise<void>;
}

const hkdf = (key: Buffer, salt: Buffer, info: Buffer, length: number) => Buffer.from(hkdfSync('sha256', key, salt, info, length));
const text = (value: string) => Buffer.from(`${value}\0`);

/** RFC 8291 section 3.4 with RFC 8188's single record, written from the standards and not from the library under test. */
function decrypt(body: Buffer, own: ECDH, auth: Buffer): string {
  const salt = body.subarray(0, 16);
  const idLength = body[20]!;
  const sender = body.subarray(21, 21 + idLength);
  const shared = own.computeSecret(sender);
  const ikm = hkdf(shared, auth, Buffer.concat([text('WebPush: info'), own.getPublicKey(), sender]), 32);
  const key = hkdf(ikm, salt, text('Content-Encoding: aes128gcm'), 16);
  const nonce = hkdf(ikm, salt, text('Content-Encoding: nonce'), 12);
  const sealed = body.subarray(21 + idLength);
  const decipher = createDecipheriv('aes-128-gcm', key, nonce).setAuthTag(sealed.subarray(-16));
  const padded = Buffer.concat([decipher.update(sealed.subarray(0, -16)), decipher.final()]);
  // The last record ends with 2 and zeros.
  return padded.subarray(0, padded.lastIndexOf(2)).toString('utf8');
}

/** What the `vapid` header claims, once its signature is checked against the key it names (RFC 8292). */
export function vapidClaims(header: string): { aud: string; exp: number; sub: string; key: string } {
  const [, token, key] = /^vapid t=([^,]+), ?k=(.+)$/.exec(header) ?? [];
  if (!token || !key) throw new Error(`no vapid header: ${header}`);
  const [head, claims, signature] = token.split('.') as [string, string, string];
  const raw = Buffer.from(key, 'base64url');
  const publicKey = createPublicKey({ format: 'jwk', key: { kty: 'EC', crv: 'P-256', x: raw.subarray(1, 33).toString('base64url'), y: raw.subarray(33).toString('base64url') } });
  if (!verify('sha256', Buffer.from(`${head}.${claims}`), { key: publicKey, dsaEncoding: 'ieee-p1363' }, Buffer.from(signature, 'base64url'))) throw new Error('the signature does not fit');
  return { ...(JSON.parse(Buffer.from(claims, 'base64url').toString()) as { aud: string; exp: number; sub: string }), key };
}

/** A push service of this machine: it takes messages, and its browsers can read them. */
export async function startPushService(): Promise<PushService> {
  const held: PushService = { url: '', taken: [], answer: () => 201, browser: () => newBrowser(), stop: async () => undefined };
  const server = createServer((request, response) => {
    const chunks: Buffer[] = [];
    request.on('data', (chunk: Buffer) => chunks.push(chunk));
    request.on('end', () => {
      const path = request.url ?? '';
      const status = held.answer(path);
      if (status >= 200 && status < 300) held.taken.push({ path, headers: request.headers, body: Buffer.concat(chunks) });
      response.writeHead(status).end();
    });
  });
  server.listen(0, '127.0.0.1');
  await once(server, 'listening');
  held.url = `http://127.0.0.1:${(server.address() as AddressInfo).port}`;
  held.stop = async () => {
    server.closeAllConnections();
    await new Promise((resolve) => server.close(resolve));
  };
  function newBrowser(): FakeBrowser {
    const own = createECDH('prime256v1');
    own.generateKeys();
    const auth = randomBytes(16);
    const path = `/push/${randomBytes(8).toString('hex')}`;
    return {
      endpoint: `${held.url}${path}`,
      keys: { p256dh: own.getPublicKey('base64url'), auth: auth.toString('base64url') },
      read: () => held.taken.filter((pushed) => pushed.path === path).map(({ body }) => decrypt(body, own, auth)),
    };
  }
  return held;
}
