import type { Transaction } from 'sequelize';
import { database } from '@/db/client';
import { listen, type Listener } from '@/db/listen';
import { oweDeliveries } from '@/db/queries/webhooks';
import { CHANGES_CHANNEL, changeSchema, EVERY_CELLAR, type Change } from '../contracts/events';

/** Says that something changed, once `transaction` commits; with a rollback nothing is said. It carries no data. Webhooks that asked for it are owed a delivery with it, unless only our own pages have a use for it. */
export async function notifyChange(change: Change, transaction: Transaction, { toWebhooks = true } = {}): Promise<void> {
  if (toWebhooks) await oweDeliveries(change, transaction);
  await announce(change, transaction);
}

async function announce(change: Change, transaction: Transaction): Promise<void> {
  await database().query('select pg_notify($channel, $payload)', { bind: { channel: CHANGES_CHANNEL, payload: JSON.stringify(change) }, transaction });
}

/** Says that a person's sign-ins, or their place in a cellar, have changed: open streams are looked at again at once. It stays within the house. */
export const notifyAccess = (cellarId: string | null, personId: string, transaction: Transaction) => announce({ cellar: cellarId ?? EVERY_CELLAR, kind: 'member', batch: null, person: personId }, transaction);

/** Hears what changed in any cellar, for as long as the process lives; `onConnect` again after each break, since what was said meanwhile went unheard. */
export function hearChanges(heard: { onChange(change: Change): void; onConnect(): void; onError(error: unknown): void }): Listener {
  return listen({
    channel: CHANGES_CHANNEL,
    onConnect: heard.onConnect,
    onError: heard.onError,
    onMessage(payload) {
      const change = changeOf(payload);
      if (change) heard.onChange(change);
      else heard.onError(new Error('a change was announced that cannot be read'));
    },
  });
}

function changeOf(payload: string): Change | null {
  try {
    return changeSchema.parse(JSON.parse(payload));
  } catch {
    return null;
  }
}
