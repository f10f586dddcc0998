import { createCipheriv, createDecipheriv, createHmac, hkdfSync, randomBytes, randomInt } from 'node:crypto';
import { Secret, TOTP } from 'otpauth';
import { authSecret } from '../config/env';

const PERIOD_S = 30;
/** A code of the period before or after counts too: clocks differ, and people type slowly (RFC 6238 5.2). */
const WINDOW = 1;
const SECRET_BYTES = 20;
const IV_BYTES = 12;
const TAG_BYTES = 16;

const keyFor = (use: string) => Buffer.from(hkdfSync('sha256', authSecret(), '', `fallbright ${use}`, 32));

const totpOf = (secret: Buffer, label: string) =>
  new TOTP({ issuer: 'Fallbright', label, algorithm: 'SHA1', digits: 6, period: PERIOD_S, secret: new Secret({ buffer: new Uint8Array(secret).buffer }) });

export const makeTotpSecret = (): Buffer => randomBytes(SECRET_BYTES);

/** The secret as people type it and as an authenticator reads it from a picture. */
export function totpWords(secret: Buffer, label: string): { secret: string; uri: string } {
  const totp = totpOf(secret, label);
  return { secret: totp.secret.base32, uri: totp.toString() };
}

/** The period whose code this is, or null. It has to come after `lastStep`: no code is taken twice. */
export function totpStep(secret: Buffer, code: string, now: number, lastStep: number | null): number | null {
  if (!/^\d{6}$/.test(code)) return null;
  const delta = totpOf(secret, '').validate({ token: code, timestamp: now, window: WINDOW });
  if (delta === null) return null;
  const step = Math.floor(now / 1000 / PERIOD_S) + delta;
  return lastStep !== null && step <= lastStep ? null : step;
}

/** AES-256-GCM with a key made from the server's secret; bound to the person, so that it cannot be moved to another row. */
export function sealTotp(secret: Buffer, personId: string): Buffer {
  const iv = randomBytes(IV_BYTES);
  const cipher = createCipheriv('aes-256-gcm', keyFor('totp'), iv).setAAD(Buffer.from(personId));
  return Buffer.concat([iv, cipher.update(secret), cipher.final(), cipher.getAuthTag()]);
}

/** @throws where the server's secret is another one by now, or the row was tampered with. */
export function openTotp(sealed: Buffer, personId: string): Buffer {
  const decipher = createDecipheriv('aes-256-gcm', keyFor('totp'), sealed.subarray(0, IV_BYTES)).setAAD(Buffer.from(personId));
  decipher.setAuthTag(sealed.subarray(-TAG_BYTES));
  return Buffer.concat([decipher.update(sealed.subarray(IV_BYTES, -TAG_BYTES)), decipher.final()]);
}

/** Without the letters and digits that are taken for one another on paper. */
const ALPHABET = '23456789abcdefghjkmnpqrstuvwxyz';
const CODE_LENGTH = 10;
export const RECOVERY_CODES = 10;

/** 49 random bits each, shown once as `abcde-fghjk`. */
export const makeRecoveryCodes = (): string[] => Array.from({ length: RECOVERY_CODES }, () => Array.from({ length: CODE_LENGTH }, () => ALPHABET[randomInt(ALPHABET.length)]).join(''));
export const recoveryCodeWords = (code: string) => `${code.slice(0, 5)}-${code.slice(5)}`;

/** Keyed with the server's secret: short codes cannot be guessed from a copy of the database. */
export const hashRecoveryCode = (code: string): Buffer => createHmac('sha256', keyFor('recovery')).update(code).digest();
