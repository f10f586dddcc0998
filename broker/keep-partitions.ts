import { database } from '@/db/client';
import { ensurePartitions, monthsAhead } from '@/db/queries/partitions';
import { systemClock } from '@/lib/clock';
import { logFor } from '@/lib/log';

const EVERY_MS = 3_600_000;
const log = logFor('partitions');

/** Makes the partitions of the coming months now and every hour; returns the function that stops it. */
export function keepPartitionsAhead(): () => void {
  const make = () =>
    ensurePartitions(database(), monthsAhead(systemClock.now())).catch((error: unknown) => log.warn({ err: error }, 'partitions could not be made; tried again in an hour, or when a reading needs one'));
  void make();
  const timer = setInterval(() => void make(), EVERY_MS);
  return () => clearInterval(timer);
}
