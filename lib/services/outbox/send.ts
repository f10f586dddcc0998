import { claimForOnePerson, holdBack, markDropped, markFailed, markForRetry, markSent, type Claimed } from '@/db/queries/outbox';
import { systemClock, type Clock } from '@/lib/clock';
import { holdOf, type MeansName } from '@/lib/core/alerts/telling';
import { logFor } from '@/lib/log';
import { mailPayload, type MailPayload } from '@/lib/mail/payload';
import { asFailure } from '@/lib/mail/smtp';
import type { MailTransport } from '@/lib/mail/transport';
import { byMail } from './by-mail';
import { NobodyThere, type Means, type Ready } from './means';
import { nextTry } from './retry';

export { messageId } from './by-mail';

const log = logFor('outbox');

/** More than this in one message nobody reads; the rest comes in the next. */
const MOST_IN_ONE = 50;

export interface SendDeps {
  transport: MailTransport;
  clock?: Clock;
  /** Where links lead. */
  publicUrl: string;
  /** The part behind the @ of message identifiers. */
  messageHost: string;
  /** How long a message is taken for: longer than one can take, so that a lease ends only when its sender died, ms. */
  leaseMs: number;
  /** The ways out besides mail. */
  means?: readonly Means[];
  /** 0 to 1, for spreading the waits. */
  random?: () => number;
  /** True: stop after the message in hand. */
  stopping?: () => boolean;
}

export interface SendResult {
  mails: number;
  /** The mail server could not be reached: more would fare no better now. */
  unavailable: boolean;
}

/**
 * Sends what is due, one message for each person and means, until nothing is. It
 * is marked as sent after the other side took it: a crash in between sends it
 * twice with the same message identifier, never not at all.
 */
export async function sendDue(deps: SendDeps): Promise<SendResult> {
  const clock = deps.clock ?? systemClock;
  const ways = new Map<MeansName, Means>([byMail({ ...deps, now: () => clock.now() }), ...(deps.means ?? [])].map((means) => [means.name, means]));
  let mails = 0;
  while (!deps.stopping?.()) {
    const now = clock.now();
    const claimed = await claimForOnePerson(new Date(now), new Date(now + deps.leaseMs), MOST_IN_ONE);
    if (claimed.length === 0) break;
    const ready = await sendable(claimed, clock);
    const [first] = ready;
    if (!first) continue;
    const outcome = await sendToOne(ready, ways.get(first.row.means), deps, clock);
    if (outcome === 'sent') mails += 1;
    if (outcome === 'unavailable') return { mails, unavailable: true };
  }
  return { mails, unavailable: false };
}

async function sendToOne(ready: readonly Ready[], means: Means | undefined, deps: SendDeps, clock: Clock): Promise<'sent' | 'kept' | 'unavailable'> {
  const ids = ready.map(({ row }) => row.id);
  try {
    if (!means) throw new NobodyThere('this means is not set up here');
    await means.send(ready);
  } catch (error) {
    if (error instanceof NobodyThere) {
      for (const { row } of ready) await markDropped(row, new Date(clock.now()), error.message);
      return 'kept';
    }
    const { kind, message } = asFailure(error);
    await giveBack(ready, kind, message, clock.now(), deps.random ?? Math.random);
    return kind === 'unavailable' && means?.name === 'mail' ? 'unavailable' : 'kept';
  }
  await markSent(ids, new Date(clock.now()));
  return 'sent';
}

/** Those that can go now; the others wait for their time, or are marked as failed with the reason. */
async function sendable(claimed: readonly Claimed[], clock: Clock): Promise<Ready[]> {
  const ready: Ready[] = [];
  for (const row of claimed) {
    const parsed = mailPayload.safeParse(row.payload);
    const reason = !row.stillThere ? 'no longer told of alerts in this cellar' : parsed.success ? null : 'the mail cannot be made';
    if (!parsed.success || reason !== null) {
      await markFailed(row, new Date(clock.now()), reason ?? '');
      log.warn({ outbox: row.id, reason }, 'a message is not sent');
      continue;
    }
    const hold = heldBack(row, parsed.data, clock.now());
    if (hold) await holdBack(row, new Date(hold.until), hold.by);
    else ready.push({ row, payload: parsed.data });
  }
  return ready;
}

/** Alerts, and word of the house itself, keep to quiet hours; what a person asked for at this hour does not. */
function heldBack(row: Claimed, payload: MailPayload, now: number): ReturnType<typeof holdOf> {
  if (payload.template !== 'alert' && payload.template !== 'ingest') return null;
  const quiet = row.quietFrom === null || row.quietTo === null ? null : { fromMin: row.quietFrom, toMin: row.quietTo };
  const level = payload.template === 'alert' ? payload.alert.level : 'check';
  return holdOf({ level, asked: payload.event === 'look_again', quiet, timeZone: row.timeZone, mutedUntil: row.mutedUntil?.getTime() ?? null }, now);
}

async function giveBack(ready: readonly Ready[], kind: ReturnType<typeof asFailure>['kind'], message: string, now: number, random: () => number): Promise<void> {
  for (const { row } of ready) {
    const refusals = row.refusals + (kind === 'refused' ? 1 : 0);
    // A server that was long away and then says no once has said no once.
    const tries = kind === 'refused' ? refusals : row.attempts;
    const at = nextTry(kind, tries, row.createdAt.getTime(), now, random());
    if (at === null) await markFailed(row, new Date(now), message);
    else await markForRetry(row, { nextAt: new Date(at), refusals, error: message });
    log.warn({ outbox: row.id, means: row.means, attempts: row.attempts, kind, error: message, next: at === null ? null : new Date(at).toISOString() }, at === null ? 'a message is given up' : 'a message has to wait');
  }
}
