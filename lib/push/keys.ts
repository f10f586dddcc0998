import { mkdirSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import webpush from 'web-push';
import { env } from '../config/env';

/** The pair by which push services know this house (RFC 8292). */
export interface PushKeys {
  publicKey: string;
  privateKey: string;
}

const FILE = 'push.keys';
let cached: PushKeys | undefined;

function kept(path: string): PushKeys | undefined {
  try {
    const { publicKey, privateKey } = JSON.parse(readFileSync(path, 'utf8')) as Partial<PushKeys>;
    return publicKey && privateKey ? { publicKey, privateKey } : undefined;
  } catch {
    return undefined;
  }
}

/**
 * The keys from the environment, else those in the data folder, made at their
 * first use: with other keys every device would have to be registered anew.
 */
export function pushKeys(): PushKeys {
  if (cached) return cached;
  const { VAPID_PUBLIC_KEY: publicKey, VAPID_PRIVATE_KEY: privateKey, DATA_DIR } = env();
  if (publicKey && privateKey) return (cached = { publicKey, privateKey });
  const path = join(DATA_DIR, FILE);
  const found = kept(path);
  if (found) return (cached = found);
  const made = webpush.generateVAPIDKeys();
  try {
    mkdirSync(DATA_DIR, { recursive: true });
    writeFileSync(path, `${JSON.stringify(made)}\n`, { mode: 0o600, flag: 'wx' });
    return (cached = made);
  } catch {
    // Web and worker start together: whoever came second takes what the first one made.
    const theirs = kept(path);
    if (!theirs) throw new Error(`The keys for push messages cannot be kept in ${path}. Make DATA_DIR writable, or set VAPID_PUBLIC_KEY and VAPID_PRIVATE_KEY.`);
    return (cached = theirs);
  }
}
