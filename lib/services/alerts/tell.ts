import type { Transaction } from 'sequelize';
import { escalationOf, hearersOf } from '@/db/queries/messages';
import { oweMails, toldOfOpening, type Owed } from '@/db/queries/outbox';
import type { AlertRule } from '@/lib/core/alerts/rules';
import { isWanted, MEANS, turnsOf, type MeansName } from '@/lib/core/alerts/telling';
import type { Instant } from '@/lib/core/types';
import type { MailPayload } from '@/lib/mail/payload';

/** What is not urgent waits this long for more to go in the same message: when a heater fails, every vessel cools. */
export const GROUP_WAIT_MS = 10_000;

interface Telling {
  cellarId: string | null;
  alertId: string | null;
  /** Names the state change; with the person and the means it is the dedupe key. */
  key: string;
  payload: MailPayload;
  level: AlertRule['level'];
  at: Instant;
}

/** The key under which one state change is owed to one person. */
export const dedupeKey = (key: string, personId: string, means: MeansName = 'mail') => (means === 'mail' ? `${key}:${personId}` : `${key}:${personId}:${means}`);

interface To {
  personId: string;
  means: MeansName;
  /** Others are told this much sooner and may answer, ms. */
  turnMs?: number;
}

/** Owes each of these people one message about one state change, in the transaction that made it. */
export async function tell({ cellarId, alertId, key, payload, level, at }: Telling, people: readonly To[], transaction: Transaction): Promise<void> {
  const soonest = level === 'act' ? at : at + GROUP_WAIT_MS;
  const owed = people.map(({ personId, means, turnMs = 0 }): Owed => {
    const notBefore = new Date(Math.max(soonest, at + turnMs));
    return { cellarId, alertId, personId, means, dedupeKey: dedupeKey(key, personId, means), payload, notBefore, turn: turnMs > 0 };
  });
  await oweMails(owed, transaction);
}

/** Who hears that an alert has opened: by what each chose, one after another where the cellar has an order. */
export async function toldFirst(cellarId: string, rule: AlertRule, transaction: Transaction): Promise<To[]> {
  const hearers = await hearersOf(cellarId, transaction);
  const ways = hearers.flatMap(({ personId, choices, hasDevice }) => MEANS.filter((means) => (means !== 'push' || hasDevice) && isWanted(rule, means, choices)).map((means): To => ({ personId, means })));
  const turns = turnsOf([...new Set(ways.map(({ personId }) => personId))], rule.level, await escalationOf(cellarId, transaction));
  return ways.map((way) => ({ ...way, turnMs: turns.get(way.personId) ?? 0 }));
}

/** Who hears what became of it: those who heard that it began, and still tend the cellar. */
export const toldBefore = (alertId: string, transaction: Transaction): Promise<To[]> => toldOfOpening(alertId, transaction);

/** The person who has it in hand wanted to be asked: where they chose no means, by mail. */
export async function toldAsAsked(cellarId: string, rule: AlertRule, personId: string, transaction: Transaction): Promise<To[]> {
  const hearer = (await hearersOf(cellarId, transaction)).find((item) => item.personId === personId);
  if (!hearer) return [];
  const means = MEANS.filter((name) => (name !== 'push' || hearer.hasDevice) && isWanted(rule, name, hearer.choices));
  return (means.length ? means : (['mail'] as const)).map((name) => ({ personId, means: name }));
}
