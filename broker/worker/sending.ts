import { nextDue } from '@/db/queries/outbox';
import { systemClock } from '@/lib/clock';
import { logFor } from '@/lib/log';
import { sendLetters } from '@/lib/services/letters/send';
import { sendDue, type SendDeps } from '@/lib/services/outbox/send';
import { startLoop, type Loop } from './loop';

const log = logFor('outbox');

/** The longest a mail can wait for a look, should no word of it come. */
const POLL_MS = 2_000;
const FIRST_PAUSE_MS = 1_000;
const LONGEST_PAUSE_MS = 60_000;

export interface Sending {
  wake(): void;
  figures(): Record<string, number>;
  stop(): Promise<void>;
}

/** Sends the outbox. While the mail server cannot be reached it asks ever more rarely, whoever waits. */
export function startSending(deps: Omit<SendDeps, 'clock' | 'stopping'>): Sending {
  const figures = { mails: 0 };
  let pause = FIRST_PAUSE_MS;
  let pausedUntil = 0;
  let stopping = false;

  const loop: Loop = startLoop(
    async () => {
      const now = systemClock.now();
      if (now < pausedUntil) return pausedUntil - now;
      // Somebody waits for a letter before the screen.
      const letters = await sendLetters({ ...deps, stopping: () => stopping });
      const due = letters.unavailable ? letters : await sendDue({ ...deps, stopping: () => stopping });
      const mails = letters.mails + due.mails;
      const { unavailable } = due;
      figures.mails += mails;
      if (unavailable) {
        pausedUntil = systemClock.now() + pause * (0.75 + 0.5 * Math.random());
        pause = Math.min(pause * 2, LONGEST_PAUSE_MS);
        return pausedUntil - systemClock.now();
      }
      if (mails) pause = FIRST_PAUSE_MS;
      return Math.max(10, Math.min(((await nextDue()) ?? Infinity) - systemClock.now(), POLL_MS));
    },
    (error) => {
      log.error({ err: error }, 'the outbox could not be read');
      return POLL_MS;
    },
  );

  return {
    wake: () => loop.wake(),
    figures: () => ({ ...figures }),
    stop: async () => {
      stopping = true;
      await loop.stop();
      deps.transport.close();
    },
  };
}
