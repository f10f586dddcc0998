import { Op, type Transaction } from 'sequelize';
import { inTransaction } from '@/db/client';
import { Webhook, WebhookDelivery } from '@/db/models';
import { lastDeliveries } from '@/db/queries/webhooks';
import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import { systemClock, type Clock } from '@/lib/clock';
import { privateTargetsAllowed } from '@/lib/config/env';
import type { CreatedWebhookBody, CreateWebhook, DeliveryBody, UpdateWebhook, WebhookBody } from '@/lib/contracts/webhooks';
import { ConflictError, InvalidError, NotFoundError } from '@/lib/errors';
import { auditBy } from '../audit/write';
import { iso, isoOrNull } from '../iso';
import { refusedTarget } from './post';
import { makeWebhookSecret, seal } from './signature';

const MOST = 20;
const SHOWN = 100;

async function present(rows: readonly Webhook[], transaction?: Transaction): Promise<WebhookBody[]> {
  const last = new Map((await lastDeliveries(rows.map((row) => row.id), transaction)).map((delivery) => [delivery.webhookId, delivery]));
  return rows.map((row) => {
    const delivery = last.get(row.id);
    return { id: row.id, url: row.url, events: row.events, note: row.note, disabled: row.disabledAt !== null, failing_since: isoOrNull(row.failingSince), given_up_at: isoOrNull(row.givenUpAt), created_at: iso(row.createdAt), last: delivery ? { at: iso(delivery.at), state: delivery.state, status: delivery.status } : null };
  });
}

function check(url: string): void {
  const refused = refusedTarget(url, privateTargetsAllowed());
  if (refused) throw new InvalidError('This address cannot be used.', { url: [refused] });
}

async function load(actor: Actor, id: string, transaction?: Transaction): Promise<Webhook> {
  const row = await Webhook.findOne({ where: { id, cellarId: actor.cellarId }, transaction, ...(transaction && { lock: transaction.LOCK.UPDATE }) });
  if (!row) throw new NotFoundError('webhook');
  return row;
}

export async function listWebhooks(actor: Actor): Promise<{ items: WebhookBody[] }> {
  authorize(actor, 'webhooks.manage');
  return { items: await present(await Webhook.findAll({ where: { cellarId: actor.cellarId }, order: [['createdAt', 'ASC']] })) };
}

/** The key that signs is in this answer and nowhere else in the clear. */
export async function createWebhook(actor: Actor, input: CreateWebhook): Promise<CreatedWebhookBody> {
  authorize(actor, 'webhooks.manage');
  check(input.url);
  const secret = makeWebhookSecret();
  return inTransaction(async (transaction) => {
    if ((await Webhook.count({ where: { cellarId: actor.cellarId }, transaction })) >= MOST) throw new ConflictError(`A cellar has at most ${MOST} webhooks.`);
    const row = await Webhook.create({ cellarId: actor.cellarId, url: input.url, events: [...new Set(input.events)], secret: seal(secret), note: input.note, createdBy: actor.personId }, { transaction });
    await row.reload({ transaction });
    await auditBy(actor, 'webhook.created', row.id, { url: input.url, events: input.events }, transaction);
    return { ...(await present([row], transaction))[0]!, secret };
  });
}

export async function updateWebhook(actor: Actor, id: string, input: UpdateWebhook, clock: Clock = systemClock): Promise<WebhookBody> {
  authorize(actor, 'webhooks.manage');
  if (input.url !== undefined) check(input.url);
  return inTransaction(async (transaction) => {
    const row = await load(actor, id, transaction);
    await row.update(
      {
        ...(input.url !== undefined && { url: input.url }),
        ...(input.events !== undefined && { events: [...new Set(input.events)] }),
        ...(input.note !== undefined && { note: input.note }),
        ...(input.disabled !== undefined && { disabledAt: input.disabled ? (row.disabledAt ?? new Date(clock.now())) : null, givenUpAt: null, ...(!input.disabled && { failingSince: null }) }),
      },
      { transaction },
    );
    await auditBy(actor, 'webhook.updated', id, { ...input }, transaction);
    return (await present([row], transaction))[0]!;
  });
}

export async function removeWebhook(actor: Actor, id: string): Promise<void> {
  authorize(actor, 'webhooks.manage');
  await inTransaction(async (transaction) => {
    const row = await load(actor, id, transaction);
    await row.destroy({ transaction });
    await auditBy(actor, 'webhook.removed', id, { url: row.url }, transaction);
  });
}

/** Sends a word that nothing happened, to see whether it arrives. */
export async function tryWebhook(actor: Actor, id: string): Promise<void> {
  authorize(actor, 'webhooks.manage');
  await inTransaction(async (transaction) => {
    const row = await load(actor, id, transaction);
    if (row.disabledAt) throw new ConflictError('This webhook is switched off. Switch it on first.');
    await WebhookDelivery.create({ cellarId: actor.cellarId, webhookId: row.id, event: 'test', payload: { batch: null } }, { transaction });
  });
}

const stateOf = (row: WebhookDelivery): DeliveryBody['state'] => (row.deliveredAt ? 'delivered' : row.failedAt ? 'failed' : 'waiting');

/** What was sent and what became of it, newest first. */
export async function listDeliveries(actor: Actor, id: string): Promise<{ items: DeliveryBody[] }> {
  authorize(actor, 'webhooks.manage');
  await load(actor, id);
  const rows = await WebhookDelivery.findAll({ where: { webhookId: id }, order: [['createdAt', 'DESC']], limit: SHOWN });
  return {
    items: rows.map((row) => ({
      id: row.id,
      event: row.event,
      created_at: iso(row.createdAt),
      state: stateOf(row),
      attempts: row.attempts,
      next_attempt_at: stateOf(row) === 'waiting' ? iso(row.nextAttemptAt) : null,
      delivered_at: isoOrNull(row.deliveredAt),
      status: row.lastStatus,
      error: row.lastError,
    })),
  };
}

/** Sends a delivery that was given up, or waits, now. */
export async function deliverAgain(actor: Actor, id: string, deliveryId: string, clock: Clock = systemClock): Promise<void> {
  authorize(actor, 'webhooks.manage');
  await load(actor, id);
  const [again] = await WebhookDelivery.update({ failedAt: null, nextAttemptAt: new Date(clock.now()), attempts: 0 }, { where: { id: deliveryId, webhookId: id, deliveredAt: { [Op.is]: null } } });
  if (again === 0) throw new NotFoundError('delivery that did not arrive');
}
