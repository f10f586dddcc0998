import { inTransaction } from '@/db/client';
import { oweMails } from '@/db/queries/outbox';
import type { AlertPayload } from '@/lib/mail/payload';

/** What the outbox keeps for one alert's mail. */
export function alertMail(overrides: { name?: string; headline?: string; event?: AlertPayload['event']; alertId?: string } = {}): AlertPayload {
  return {
    template: 'alert',
    event: overrides.event ?? 'opened',
    at: '2026-03-04T06:00:00Z',
    alert: { id: overrides.alertId ?? 'a1', rule: 'stalled', level: 'check', kind: 'stuck', since: '2026-03-03T06:00:00Z', headline: overrides.headline ?? 'Stopped at 1.041.', reason: 'No fall.', act: null, changes_it: null, evidence: [] },
    batch: { id: 'b1', name: overrides.name ?? 'Oat stout', tag: 5, place: null, vessel: 'carboy' },
    cellar: { name: 'Low barn', time_zone: 'UTC' },
  };
}

/** Owes one mail to one person, due from `at`, ms since 1970. */
export async function owe(personId: string, key: string, at: number, options: { cellarId?: string | null; payload?: unknown } = {}): Promise<void> {
  const { cellarId = null, payload = alertMail() } = options;
  await inTransaction((transaction) => oweMails([{ cellarId, alertId: null, personId, dedupeKey: `${key}:${personId}`, payload, notBefore: new Date(at) }], transaction));
}
