import { database } from '@/db/client';
import { forgetOldMails } from '@/db/queries/outbox';
import { forgetOldTries } from '@/db/queries/sign-in-tries';
import { REFUSED_KEPT_DAYS } from '@/lib/contracts/telemetry';
import { forgetOldBeats } from './heartbeat';

/** Mails that went or were given up stay this long on their alert. */
const MAILS_KEPT_DAYS = 365;

/** Drops what has been kept for as long as was promised. Safe to run twice, and by two workers at once. */
export async function dropWhatIsOld(): Promise<void> {
  await database().query(`delete from refusals where received_at < now() - make_interval(days => $days)`, { bind: { days: REFUSED_KEPT_DAYS } });
  await forgetOldMails(MAILS_KEPT_DAYS);
  await forgetOldTries();
  await forgetOldBeats();
}
