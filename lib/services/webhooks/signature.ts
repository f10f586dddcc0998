import { createCipheriv, createDecipheriv, createHmac, hkdfSync, randomBytes, timingSafeEqual } from 'node:crypto';
import { authSecret } from '@/lib/config/env';
import { REPLAY_WINDOW_S } from '@/lib/contracts/webhooks';

const IV = 12;
const TAG = 16;

const sealingKey = () => Buffer.from(hkdfSync('sha256', authSecret(), '', 'fallbright webhooks', 32));

/** 256 random bits that both sides know. */
export const makeWebhookSecret = (): string => `whsec_${randomBytes(32).toString('base64url')}`;

/** A secret as the database keeps it: unreadable to whoever has the rows alone. */
export function seal(secret: string): Buffer {
  const iv = randomBytes(IV);
  const cipher = createCipheriv('aes-256-gcm', sealingKey(), iv);
  const body = Buffer.concat([cipher.update(secret, 'utf8'), cipher.final()]);
  return Buffer.concat([iv, cipher.getAuthTag(), body]);
}

/** @throws where it was sealed with another AUTH_SECRET, or tampered with */
export function unseal(sealed: Buffer): string {
  const decipher = createDecipheriv('aes-256-gcm', sealingKey(), sealed.subarray(0, IV));
  decipher.setAuthTag(sealed.subarray(IV, IV + TAG));
  return Buffer.concat([decipher.update(sealed.subarray(IV + TAG)), decipher.final()]).toString('utf8');
}

const hmac = (secret: string, at: number, body: string) => createHmac('sha256', secret).update(`${at}.${body}`).digest();

/** `t=<seconds since 1970>,v1=<HMAC-SHA256 of "<t>.<body>", hex>` */
export const sign = (secret: string, body: string, nowMs: number): string => {
  const at = Math.floor(nowMs / 1000);
  return `t=${at},v1=${hmac(secret, at, body).toString('hex')}`;
};

/** What a receiver does: the signature is right, and not older or newer than the replay window. */
export function verify(secret: string, body: string, header: string, nowMs: number): boolean {
  const match = /^t=(\d{1,12}),v1=([0-9a-f]{64})$/.exec(header);
  if (!match) return false;
  const at = Number(match[1]);
  const given = Buffer.from(match[2]!, 'hex');
  return timingSafeEqual(given, hmac(secret, at, body)) && Math.abs(nowMs / 1000 - at) <= REPLAY_WINDOW_S;
}
