import { inTransaction } from '@/db/client';
import { Membership, Person, Webhook } from '@/db/models';
import { arrivedAt, failedSince } from '@/db/queries/webhooks';
import { audit } from '../audit/write';
import { oweNotice } from '../letters/owe';

/** None arrived for this long, and the last was tried for a day: nobody listens there any more. */
export const GIVE_UP_AFTER_MS = 5 * 86_400_000;

/** A delivery arrived: what failed before it is forgotten. */
export const noteArrival = (webhookId: string): Promise<void> => arrivedAt(webhookId);

/** A try failed. Where deliveries have failed for days and this one is given up, the webhook is switched off and its keepers are told by letter. */
export async function noteFailure(webhookId: string, givenUp: boolean, now: number): Promise<void> {
  const since = await failedSince(webhookId, new Date(now));
  if (!givenUp || since === null || now - since.getTime() < GIVE_UP_AFTER_MS) return;
  await inTransaction(async (transaction) => {
    const webhook = await Webhook.findByPk(webhookId, { transaction, lock: transaction.LOCK.UPDATE });
    if (!webhook || webhook.disabledAt) return;
    const at = new Date(now);
    await webhook.update({ disabledAt: at, givenUpAt: at }, { transaction });
    await audit({ action: 'webhook.given-up', subject: webhook.id, personId: null, cellarId: webhook.cellarId, detail: { url: webhook.url, since: since.toISOString() } }, transaction);
    const keepers = await Membership.findAll({ where: { cellarId: webhook.cellarId, role: 'keeper' }, transaction });
    for (const person of await Person.findAll({ where: { id: keepers.map((keeper) => keeper.personId) }, transaction })) {
      await oweNotice(person, 'webhook-given-up', `${webhook.id}:${person.id}:${now}`, at, transaction, new URL(webhook.url).host);
    }
  });
}
