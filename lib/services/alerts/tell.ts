import type { Transaction } from 'sequelize';
import { oweMails } from '@/db/queries/outbox';
import type { AlertRule } from '@/lib/core/alerts/rules';
import type { Instant } from '@/lib/core/types';
import type { MailPayload } from '@/lib/mail/payload';

/** What is not urgent waits this long for more to go in the same mail: when a heater fails, every vessel cools. */
export const GROUP_WAIT_MS = 10_000;

interface Telling {
  cellarId: string | null;
  alertId: string | null;
  people: readonly string[];
  /** Names the state change; with the person it is the dedupe key. */
  key: string;
  payload: MailPayload;
  level: AlertRule['level'];
  at: Instant;
}

/** The key under which one state change is owed to one person. */
export const dedupeKey = (key: string, personId: string) => `${key}:${personId}`;

/** Owes each of these people one mail about one state change, in the transaction that made it. */
export async function tell({ cellarId, alertId, people, key, payload, level, at }: Telling, transaction: Transaction): Promise<void> {
  const notBefore = new Date(level === 'act' ? at : at + GROUP_WAIT_MS);
  await oweMails(
    people.map((personId) => ({ cellarId, alertId, personId, dedupeKey: dedupeKey(key, personId), payload, notBefore })),
    transaction,
  );
}
