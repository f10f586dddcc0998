import { systemClock } from '@/lib/clock';
import { logFor } from '@/lib/log';
import { recalculateNext } from '@/lib/services/readings/recalculate';
import { startLoop } from './loop';

const log = logFor('recalculation');
const POLL_MS = 2_000;
const AFTER_FAILURE_MS = 10_000;

/** Turns readings by new calibrations, a piece at a time, behind everything else. */
export function startRecalculating(): { stop(): Promise<void> } {
  return startLoop(
    async () => ((await recalculateNext(systemClock.now())) ? 0 : POLL_MS),
    (error) => {
      log.error({ err: error }, 'readings could not be turned by their calibration; tried again');
      return AFTER_FAILURE_MS;
    },
  );
}
