import type { Instant } from '../types';
import { INACTIVE, step, type AlertEvent, type AlertState, type Timing } from './machine';

/** A part that has not said for this long that it lives is taken to be down. */
export const STALE_HEARTBEAT_MS = 30_000;
/** After an outage sensors need time to deliver what they kept. */
export const GRACE_MS = 30 * 60_000;
/** Looks further apart than this leave a gap in which anything may have happened. */
export const LOOK_GAP_MS = 5 * 60_000;

/** When the ingest's own absence is told to the keepers. */
export const INGEST_TIMING: Timing = { forMs: 5 * 60_000, keepMs: 60_000, restMs: 6 * 3_600_000, repeatMs: 24 * 3_600_000, repeats: 3 };

export interface IngestState {
  /** The ingest has been seen up at every look since; null: it is down. */
  upSince: Instant | null;
  lookedAt: Instant;
  alert: AlertState;
}

export interface IngestLook {
  state: IngestState;
  events: AlertEvent[];
  /** A silent sensor may be blamed on the sensor. */
  silenceCounts: boolean;
}

/**
 * Watches the door through which readings come, so that its outage is one
 * alert about the house and not one about every sensor.
 * @param kept null at the very first look, which knows of no outage
 * @param heartbeatAt the newest sign of life of any ingest; null: none ever ran here (readings come over HTTP)
 */
export function lookAtIngest(kept: IngestState | null, heartbeatAt: Instant | null, now: Instant): IngestLook {
  if (heartbeatAt === null) {
    return { state: { upSince: kept?.upSince ?? now - GRACE_MS, lookedAt: now, alert: kept?.alert ?? INACTIVE }, events: [], silenceCounts: true };
  }
  const down = now - heartbeatAt > STALE_HEARTBEAT_MS;
  const { state: alert, events } = step(INGEST_TIMING, kept?.alert ?? INACTIVE, down ? { type: 'true', since: heartbeatAt } : { type: 'false' }, now);
  const upSince = down ? null : upFrom(kept, now);
  return { state: { upSince, lookedAt: now, alert }, events, silenceCounts: upSince !== null && now - upSince >= GRACE_MS };
}

function upFrom(kept: IngestState | null, now: Instant): Instant {
  if (kept === null) return now - GRACE_MS;
  const watched = now - kept.lookedAt <= LOOK_GAP_MS;
  return kept.upSince !== null && watched ? kept.upSince : now;
}
