import { systemClock } from '@/lib/clock';
import { logFor } from '@/lib/log';
import { Announcer } from '@/lib/services/readings/announcer';

const EVERY_MS = 500;
const log = logFor('announcer');

/** An announcer that pays what it owes twice a second; `stop` pays the last of it. */
export function startAnnouncer(): { announcer: Announcer; stop: () => Promise<void> } {
  const announcer = new Announcer();
  let flushing = false;
  const flush = async () => {
    if (flushing) return;
    flushing = true;
    await announcer.flush(systemClock.now()).catch((error: unknown) => log.warn({ err: error }, 'stored readings could not be announced; tried again'));
    flushing = false;
  };
  const timer = setInterval(() => void flush(), EVERY_MS);
  return {
    announcer,
    stop: async () => {
      clearInterval(timer);
      await flush();
    },
  };
}
