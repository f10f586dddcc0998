import { deleteRefusalsBefore } from '@/db/queries/refusals';
import { systemClock, type Clock } from '@/lib/clock';
import { REFUSED_KEPT_DAYS } from '@/lib/contracts/telemetry';

const DAY_MS = 86_400_000;

/** Forgets refused messages older than they are kept; returns how many went. The worker calls it once a day or more often. */
export function purgeRefusals({ clock = systemClock }: { clock?: Clock } = {}): Promise<number> {
  return deleteRefusalsBefore(clock.now() - REFUSED_KEPT_DAYS * DAY_MS);
}
