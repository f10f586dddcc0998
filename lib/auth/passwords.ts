import { randomBytes } from 'node:crypto';
import { hash, verify } from '@node-rs/argon2';
import { turns } from '../turns';

/** argon2id (the library's default) as the OWASP Password Storage Cheat Sheet has it: 19 MiB, 2 passes, 1 lane. */
const COST = { memoryCost: 19_456, timeCost: 2, parallelism: 1 };

/** Each hash takes a thread of Node's pool and 19 MiB; more than this waiting is an attack or an outage. */
const inTurn = turns({ atOnce: 2, waiting: 40, says: 'Too many people sign in at once. Try again in a moment.' });

export const hashPassword = (password: string): Promise<string> => inTurn(() => hash(password, COST));

let decoy: Promise<string> | undefined;

function decoyHash(): Promise<string> {
  decoy ??= hashPassword(randomBytes(18).toString('base64'));
  // One that was refused in a crowd must not stay refused, nor end the process where nobody waits for it.
  decoy.catch(() => (decoy = undefined));
  return decoy;
}

/**
 * Whether the password fits. Without a hash (no such account, or one without a
 * password) it takes as long and says no, so that time tells nothing.
 */
export async function passwordFits(passwordHash: string | null, password: string): Promise<boolean> {
  const made = decoyHash();
  const against = passwordHash ?? (await made);
  const fits = await inTurn(() => verify(against, password));
  return fits && passwordHash !== null;
}
