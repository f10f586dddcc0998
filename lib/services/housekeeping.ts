import { forgetOldLetters } from '@/db/queries/letters';
import { forgetEndedDevices } from '@/db/queries/devices';
import { forgetOldMails } from '@/db/queries/outbox';
import { forgetRecalculations } from '@/db/queries/recalculations';
import { forgetOldSignIns } from '@/db/queries/sessions';
import { forgetOldTries } from '@/db/queries/sign-in-tries';
import { forgetOldTakeLinks } from '@/db/queries/take-links';
import { forgetDeliveries } from '@/db/queries/webhooks';
import { logFor } from '@/lib/log';
import { forgetOldBeats } from './heartbeat';
import { sweepPhotos } from './photos/sweep';
import { purgeRefusals } from './readings/purge';

/** Mails that went or were given up stay this long on their alert. */
const MAILS_KEPT_DAYS = 365;
/** Letters, spent links and invitations that came to nothing. */
const LETTERS_KEPT_DAYS = 30;

const RECALCULATIONS_KEPT_DAYS = 7;
const DELIVERIES_KEPT_DAYS = 30;

/** A sign-in that has ended is of use only to whoever looks what happened. */
const SIGN_INS_KEPT_DAYS = 90;

const log = logFor('housekeeping');

const DUTIES: ReadonlyArray<readonly [what: string, drop: () => Promise<unknown>]> = [
  ['refused messages', purgeRefusals],
  ['mails', () => forgetOldMails(MAILS_KEPT_DAYS)],
  ['letters', () => forgetOldLetters(LETTERS_KEPT_DAYS)],
  ['tries at signing in', forgetOldTries],
  ['sign-ins', () => forgetOldSignIns(SIGN_INS_KEPT_DAYS)],
  ['heartbeats', forgetOldBeats],
  ['links that take an alert', forgetOldTakeLinks],
  ['devices', forgetEndedDevices],
  ['recalculations', () => forgetRecalculations(RECALCULATIONS_KEPT_DAYS)],
  ['deliveries', () => forgetDeliveries(DELIVERIES_KEPT_DAYS)],
  // Last: it is the longest.
  ['photos', sweepPhotos],
];

/** Drops what has been kept for as long as was promised; what cannot be dropped now holds up nothing else. Safe to run twice, and by two workers at once. */
export async function dropWhatIsOld(): Promise<void> {
  for (const [what, drop] of DUTIES) await drop().catch((error: unknown) => log.warn({ err: error, what }, 'what is old could not be dropped; tried again in an hour'));
}
