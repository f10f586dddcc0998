import { forgetOldLetters } from '@/db/queries/letters';
import { forgetEndedDevices } from '@/db/queries/devices';
import { forgetOldMails } from '@/db/queries/outbox';
import { forgetRecalculations } from '@/db/queries/recalculations';
import { forgetOldTries } from '@/db/queries/sign-in-tries';
import { forgetOldTakeLinks } from '@/db/queries/take-links';
import { forgetDeliveries } from '@/db/queries/webhooks';
import { forgetOldBeats } from './heartbeat';
import { sweepPhotos } from './photos/sweep';
import { purgeRefusals } from './readings/purge';

/** Mails that went or were given up stay this long on their alert. */
const MAILS_KEPT_DAYS = 365;
/** Letters, spent links and invitations that came to nothing. */
const LETTERS_KEPT_DAYS = 30;

const RECALCULATIONS_KEPT_DAYS = 7;
const DELIVERIES_KEPT_DAYS = 30;

/** Drops what has been kept for as long as was promised. Safe to run twice, and by two workers at once. */
export async function dropWhatIsOld(): Promise<void> {
  await purgeRefusals();
  await forgetOldMails(MAILS_KEPT_DAYS);
  await forgetOldLetters(LETTERS_KEPT_DAYS);
  await forgetOldTries();
  await forgetOldBeats();
  await forgetOldTakeLinks();
  await forgetEndedDevices();
  await forgetRecalculations(RECALCULATIONS_KEPT_DAYS);
  await forgetDeliveries(DELIVERIES_KEPT_DAYS);
  // Last: the store may be away while the database is not.
  await sweepPhotos();
}
