import type { FailureKind } from '@/lib/mail/transport';

const SECOND = 1_000;
const MINUTE = 60 * SECOND;
const HOUR = 60 * MINUTE;

/** A mail this old about a vessel misleads; it is given up and shown as failed. */
export const GIVE_UP_AFTER_MS = 48 * HOUR;
/** A server that says no this often means it. */
export const REFUSALS_BEFORE_GIVING_UP = 5;

/** First wait, what it grows by, and the longest. A "no" is tried again too: servers say 550 for faults of their own. */
const WAITS: Record<FailureKind, { first: number; factor: number; longest: number }> = {
  unavailable: { first: 5 * SECOND, factor: 2, longest: 5 * MINUTE },
  deferred: { first: 30 * SECOND, factor: 2, longest: 30 * MINUTE },
  refused: { first: MINUTE, factor: 4, longest: 2 * HOUR },
};

/**
 * When to try again after a failure, or null to give up. Pure.
 * @param tries how many were made, this one included; for `refused`, how many were refused
 * @param spread 0 to 1: waits differ by a quarter up and down, so that many do not come back in one instant
 */
export function nextTry(kind: FailureKind, tries: number, createdAt: number, now: number, spread: number): number | null {
  if (kind === 'refused' && tries >= REFUSALS_BEFORE_GIVING_UP) return null;
  if (now - createdAt >= GIVE_UP_AFTER_MS) return null;
  const { first, factor, longest } = WAITS[kind];
  const wait = Math.min(longest, first * factor ** Math.max(0, tries - 1));
  return now + Math.round(wait * (0.75 + 0.5 * spread));
}
