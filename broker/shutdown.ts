import { logFor } from '@/lib/log';

/** After this a stop that hangs is ended by force: the supervisor would do it anyway, with less to say. */
const LONGEST_MS = 10_000;

/** Runs `stop` once on SIGTERM or SIGINT, then ends the process. */
export function onShutdown(part: string, stop: () => Promise<void>): void {
  const log = logFor(part);
  let stopping = false;
  const begin = (signal: string) => {
    if (stopping) return;
    stopping = true;
    log.info({ signal }, 'stopping');
    setTimeout(() => {
      log.error('did not stop in time');
      process.exit(1);
    }, LONGEST_MS).unref();
    stop().then(
      () => process.exit(0),
      (error: unknown) => {
        log.error({ err: error }, 'did not stop cleanly');
        process.exit(1);
      },
    );
  };
  process.on('SIGTERM', () => begin('SIGTERM'));
  process.on('SIGINT', () => begin('SIGINT'));
}
