import { randomBytes } from 'node:crypto';
import { hash, verify } from '@node-rs/argon2';
import { UnavailableError } from '../errors';

/** argon2id (the library's default) as the OWASP Password Storage Cheat Sheet has it: 19 MiB, 2 passes, 1 lane. */
const COST = { memoryCost: 19_456, timeCost: 2, parallelism: 1 };

/** Hashes at once: each takes a thread of Node's pool and 19 MiB. */
const AT_ONCE = 2;
/** More than this waiting is an attack or an outage; better to say so than to answer in a minute. */
const MOST_WAITING = 40;

let running = 0;
const waiting: Array<() => void> = [];

async function inTurn<T>(work: () => Promise<T>): Promise<T> {
  if (running >= AT_ONCE) {
    if (waiting.length >= MOST_WAITING) throw new UnavailableError('Too many people sign in at once. Try again in a moment.');
    await new Promise<void>((resolve) => waiting.push(resolve));
  } else {
    running += 1;
  }
  try {
    return await work();
  } finally {
    // The turn passes on; only when nobody waits is it given back.
    const next = waiting.shift();
    if (next) next();
    else running -= 1;
  }
}

export const hashPassword = (password: string): Promise<string> => inTurn(() => hash(password, COST));

let decoy: Promise<string> | undefined;

/**
 * Whether the password fits. Without a hash (no such account, or one without a
 * password) it takes as long and says no, so that time tells nothing.
 */
export async function passwordFits(passwordHash: string | null, password: string): Promise<boolean> {
  decoy ??= hashPassword(randomBytes(18).toString('base64'));
  const against = passwordHash ?? (await decoy);
  const fits = await inTurn(() => verify(against, password));
  return fits && passwordHash !== null;
}
