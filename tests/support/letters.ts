import { smtpTransport } from '@/lib/mail/smtp';
import { systemClock, type Clock } from '@/lib/clock';
import { sendLetters } from '@/lib/services/letters/send';
import type { MailServer, Taken } from './mail-server';

export const BARN = 'https://barn.example';

/** Sends the letters that are due and gives those that the server took meanwhile. */
export async function post(server: MailServer, clock: Clock = systemClock): Promise<Taken[]> {
  const before = server.taken.length;
  const transport = smtpTransport({ url: server.url, from: 'Fallbright <watch@barn.example>', connectTimeoutMs: 1_000, sendTimeoutMs: 1_000 });
  await sendLetters({ transport, clock, publicUrl: BARN, messageHost: 'barn.example', leaseMs: 60_000, random: () => 0.5 }).finally(() => transport.close());
  return server.taken.slice(before);
}

/** The secret behind the letter's link. */
export function secretIn(letter: Pick<Taken, 'text'> | undefined): string {
  const secret = /https?:\/\/\S+#([A-Za-z0-9_-]{32})/.exec(letter?.text ?? '')?.[1];
  if (!secret) throw new Error(`no link in: ${letter?.text ?? 'no letter'}`);
  return secret;
}
