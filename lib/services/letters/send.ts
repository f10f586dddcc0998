import { claimLetter, markLetter, type ClaimedLetter } from '@/db/queries/letters';
import { systemClock } from '@/lib/clock';
import { logFor } from '@/lib/log';
import { composeLetter } from '@/lib/mail/compose-letter';
import { letterPayload, type LetterPayload } from '@/lib/mail/letters';
import { asFailure } from '@/lib/mail/smtp';
import { USUAL_UNITS } from '@/lib/core/units/chosen';
import { textsFor } from '@/lib/texts/texts';
import { messageId } from '../outbox/by-mail';
import { nextTry } from '../outbox/retry';
import type { SendDeps, SendResult } from '../outbox/send';
import { letterWanted, tokenOfLetter } from './owe';

const log = logFor('letters');

/** Sends the letters that are due, one by one, until none is. One is marked as sent after the server took it. */
export async function sendLetters(deps: Pick<SendDeps, 'transport' | 'clock' | 'publicUrl' | 'messageHost' | 'leaseMs' | 'random' | 'stopping'>): Promise<SendResult> {
  const clock = deps.clock ?? systemClock;
  let mails = 0;
  while (!deps.stopping?.()) {
    const now = clock.now();
    const row = await claimLetter(new Date(now), new Date(now + deps.leaseMs));
    if (!row) break;
    const letter = await stillOfUse(row, now);
    if (!letter) continue;
    try {
      await deps.transport.send({
        ...composeLetter(letter, { publicUrl: deps.publicUrl, token: tokenOfLetter(letter), timeZone: row.timeZone, texts: await textsFor({ locale: row.locale, units: USUAL_UNITS }) }),
        to: { name: row.name, address: row.email },
        messageId: messageId([row.dedupeKey], deps.messageHost),
        inReplyTo: null,
      });
    } catch (error) {
      const { kind, message } = asFailure(error);
      const refusals = row.refusals + (kind === 'refused' ? 1 : 0);
      const at = nextTry(kind, kind === 'refused' ? refusals : row.attempts, row.createdAt.getTime(), clock.now(), (deps.random ?? Math.random)());
      await markLetter(row, at === null ? { failedAt: new Date(clock.now()), error: message } : { nextAt: new Date(at), refusals, error: message });
      log.warn({ letter: row.id, attempts: row.attempts, kind, error: message }, at === null ? 'a letter is given up' : 'a letter has to wait');
      if (kind === 'unavailable') return { mails, unavailable: true };
      continue;
    }
    await markLetter(row, { sentAt: new Date(clock.now()) });
    mails += 1;
  }
  return { mails, unavailable: false };
}

/** The letter, unless what it offers has been used, revoked or has expired since; or nobody has the address, which is nobody's business. */
async function stillOfUse(row: ClaimedLetter, now: number): Promise<LetterPayload | null> {
  const parsed = letterPayload.safeParse(row.payload);
  if (parsed.success && (await letterWanted(parsed.data, now))) return parsed.data;
  await markLetter(row, { failedAt: new Date(now), error: parsed.success ? 'no longer of use' : 'the letter cannot be made' });
  return null;
}
