import { createHash } from 'node:crypto';
import { claimForOnePerson, markFailed, markForRetry, markSent, type Claimed } from '@/db/queries/outbox';
import { systemClock, type Clock } from '@/lib/clock';
import { logFor } from '@/lib/log';
import { compose } from '@/lib/mail/compose';
import { mailPayload, type MailPayload } from '@/lib/mail/payload';
import { asFailure } from '@/lib/mail/smtp';
import type { MailTransport } from '@/lib/mail/transport';
import { dedupeKey } from '@/lib/services/alerts/tell';
import { nextTry } from './retry';

const log = logFor('outbox');

/** More than this in one mail nobody reads; the rest comes in the next. */
const MOST_IN_ONE_MAIL = 50;

export interface SendDeps {
  transport: MailTransport;
  clock?: Clock;
  /** Where links lead. */
  publicUrl: string;
  /** The part behind the @ of message identifiers. */
  messageHost: string;
  /** How long a mail is taken for: longer than one can take, so that a lease ends only when its sender died, ms. */
  leaseMs: number;
  /** 0 to 1, for spreading the waits. */
  random?: () => number;
  /** True: stop after the mail in hand. */
  stopping?: () => boolean;
}

export interface SendResult {
  mails: number;
  /** The server could not be reached: more would fare no better now. */
  unavailable: boolean;
}

/**
 * Sends what is due, one mail for each person, until nothing is. A mail is
 * marked as sent after the server took it: a crash in between sends it twice
 * with the same message identifier, never not at all.
 */
export async function sendDue(deps: SendDeps): Promise<SendResult> {
  const clock = deps.clock ?? systemClock;
  let mails = 0;
  while (!deps.stopping?.()) {
    const now = clock.now();
    const claimed = await claimForOnePerson(new Date(now), new Date(now + deps.leaseMs), MOST_IN_ONE_MAIL);
    if (claimed.length === 0) break;
    const outcome = await sendToOne(claimed, deps, clock);
    if (outcome === 'sent') mails += 1;
    if (outcome === 'unavailable') return { mails, unavailable: true };
  }
  return { mails, unavailable: false };
}

interface Ready {
  row: Claimed;
  payload: MailPayload;
}

async function sendToOne(claimed: readonly Claimed[], deps: SendDeps, clock: Clock): Promise<'sent' | 'kept' | 'unavailable'> {
  const ready = await sendable(claimed, clock);
  const [first] = ready;
  if (!first) return 'kept';
  const ids = ready.map(({ row }) => row.id);
  const mail = compose(
    ready.map(({ payload }) => payload),
    { publicUrl: deps.publicUrl },
  );
  try {
    await deps.transport.send({
      ...mail,
      to: { name: first.row.name, address: first.row.email },
      messageId: messageId(
        ready.map(({ row }) => row.dedupeKey),
        deps.messageHost,
      ),
      inReplyTo: ready.length === 1 ? followed(first, deps.messageHost) : null,
    });
  } catch (error) {
    const { kind, message } = asFailure(error);
    await giveBack(ready, kind, message, clock.now(), deps.random ?? Math.random);
    return kind === 'unavailable' ? 'unavailable' : 'kept';
  }
  await markSent(ids, new Date(clock.now()));
  return 'sent';
}

/** Those that can still be told; the others are marked as failed with the reason. */
async function sendable(claimed: readonly Claimed[], clock: Clock): Promise<Ready[]> {
  const ready: Ready[] = [];
  for (const row of claimed) {
    const parsed = mailPayload.safeParse(row.payload);
    const reason = !row.stillThere ? 'no longer told of alerts in this cellar' : parsed.success ? null : 'the mail cannot be made';
    if (parsed.success && reason === null) ready.push({ row, payload: parsed.data });
    else {
      await markFailed(row.id, new Date(clock.now()), reason ?? '');
      log.warn({ outbox: row.id, reason }, 'a mail is not sent');
    }
  }
  return ready;
}

async function giveBack(ready: readonly Ready[], kind: ReturnType<typeof asFailure>['kind'], message: string, now: number, random: () => number): Promise<void> {
  for (const { row } of ready) {
    const refusals = row.refusals + (kind === 'refused' ? 1 : 0);
    // A server that was long away and then says no once has said no once.
    const tries = kind === 'refused' ? refusals : row.attempts;
    const at = nextTry(kind, tries, row.createdAt.getTime(), now, random());
    if (at === null) await markFailed(row.id, new Date(now), message);
    else await markForRetry(row.id, { nextAt: new Date(at), refusals, error: message });
    log.warn({ outbox: row.id, attempts: row.attempts, kind, error: message, next: at === null ? null : new Date(at).toISOString() }, at === null ? 'a mail is given up' : 'a mail has to wait');
  }
}

/** Always the same for the same mail, whoever sends it and however often. */
export function messageId(keys: readonly string[], host: string): string {
  return `<${createHash('sha256').update(keys.toSorted().join('\n')).digest('hex').slice(0, 40)}@${host}>`;
}

/** The mail that told the same alert's opening. */
function followed({ row, payload }: Ready, host: string): string | null {
  if (payload.template !== 'alert' || payload.event === 'opened') return null;
  return messageId([dedupeKey(`alert:${payload.alert.id}:opened`, row.personId)], host);
}
