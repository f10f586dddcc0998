import { afterAll, beforeAll, beforeEach } from 'vitest';
import type { Sequelize } from 'sequelize';
import { hashPassword } from '@/lib/auth/passwords';
import type { Actor } from '@/lib/auth/policies';
import { ManualClock } from '@/lib/clock';
import type { signIn } from '@/lib/services/people/sign-in';
import { buildMember } from './factories';
import { startMailServer, type MailServer } from './mail-server';

export const PASS = 'a lantern by the door';
export const OTHER = 'nine wet corks in a row';

/** A mail server for the file, and a clock for each test, well ahead of the database’s own, which stamps when a letter was owed. */
export function useMail(db: { readonly sequelize: Sequelize }): { readonly server: MailServer; readonly clock: ManualClock } {
  let server: MailServer | undefined;
  let clock: ManualClock | undefined;
  beforeAll(async () => {
    server = await startMailServer();
  });
  afterAll(() => server?.stop());
  beforeEach(async () => {
    // What earlier tests owe is not this one's; their counts are not either.
    await db.sequelize.query('delete from letters; delete from sign_in_tries');
    clock = new ManualClock(Date.now() + 300_000);
  });
  return {
    get server() {
      return server!;
    },
    get clock() {
      return clock!;
    },
  };
}

let hash: Promise<string> | undefined;
/** A member who can show the passphrase {@link PASS}. */
export async function member(role: Actor['role'] = 'keeper', cellarId?: string) {
  const made = await buildMember(role, cellarId === undefined ? {} : { cellarId });
  await made.person.update({ passwordHash: await (hash ??= hashPassword(PASS)) });
  return made;
}

/** Where a sign-in comes from. */
export const from = (previous: string | null = null) => ({ address: '192.0.2.7', userAgent: 'test', previous });

export function opened(outcome: Awaited<ReturnType<typeof signIn>>) {
  if (typeof outcome === 'string') throw new Error(`not signed in: ${outcome}`);
  return outcome;
}
