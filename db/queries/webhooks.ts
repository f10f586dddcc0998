import { QueryTypes, type Transaction } from 'sequelize';
import { database } from '../client';

/** Owes each webhook of the cellar that asked for it one delivery; one that still waits for its first try says the same. */
export async function oweDeliveries({ cellar: cellarId, kind: event, batch: batchId }: { cellar: string; kind: string; batch: string | null }, transaction: Transaction): Promise<void> {
  await database().query(
    `insert into webhook_deliveries (cellar_id, webhook_id, event, payload)
     select w.cellar_id, w.id, $event, jsonb_build_object('batch', $batchId::text)
     from webhooks w
     where w.cellar_id = $cellarId::uuid and w.disabled_at is null and $event = any(w.events)
       and not exists (select 1 from webhook_deliveries d where d.webhook_id = w.id and d.event = $event and d.attempts = 0 and d.leased_until is null and d.delivered_at is null and d.failed_at is null and d.payload->>'body' is null and d.payload->>'batch' is not distinct from $batchId::text)`,
    { bind: { cellarId, event, batchId }, transaction },
  );
}

export interface DueDelivery {
  id: string;
  cellarId: string;
  webhookId: string;
  event: string;
  payload: { batch: string | null; body?: string };
  createdAt: Date;
  attempts: number;
  url: string;
  secret: Buffer;
}

/** Takes what is due for a sender; the lease passes to another should this one die. */
export function takeDeliveries(limit: number, leaseMs: number): Promise<DueDelivery[]> {
  return database().query<DueDelivery>(
    `with due as (
       select d.id from webhook_deliveries d join webhooks w on w.id = d.webhook_id
       where d.delivered_at is null and d.failed_at is null and d.next_attempt_at <= now() and coalesce(d.leased_until, '-infinity') <= now() and w.disabled_at is null
       order by d.next_attempt_at limit $limit for update of d skip locked
     )
     update webhook_deliveries d set leased_until = now() + $leaseMs * interval '1 millisecond', attempts = attempts + 1
     from due, webhooks w where d.id = due.id and w.id = d.webhook_id
     returning d.id, d.cellar_id as "cellarId", d.webhook_id as "webhookId", d.event, d.payload, d.created_at as "createdAt", d.attempts, w.url, w.secret`,
    { bind: { limit, leaseMs }, type: QueryTypes.SELECT },
  );
}

export interface Settled {
  id: string;
  attempts: number;
  payload: object;
  status: number | null;
  error: string | null;
  /** Null: delivered where there is no error, given up where there is. */
  againInMs: number | null;
}

export async function settleDelivery({ id, attempts, payload, status, error, againInMs }: Settled): Promise<void> {
  await database().query(
    `update webhook_deliveries set leased_until = null, payload = $payload::jsonb, last_status = $status, last_error = $error,
       delivered_at = case when $error::text is null then now() end,
       failed_at = case when $error::text is not null and $againInMs::float8 is null then now() end,
       next_attempt_at = coalesce(now() + $againInMs::float8 * interval '1 millisecond', next_attempt_at)
     where id = $id and ($error::text is null or (attempts = $attempts and delivered_at is null))`,
    { bind: { id, attempts, payload: JSON.stringify(payload), status, error, againInMs } },
  );
}

/** Since when none arrives; from now on where the last one did. Null: it is gone. */
export async function failedSince(webhookId: string, now: Date): Promise<Date | null> {
  const [row] = await database().query<{ since: Date }>(`update webhooks set failing_since = coalesce(failing_since, $now) where id = $webhookId returning failing_since as since`, { bind: { webhookId, now }, type: QueryTypes.SELECT });
  return row?.since ?? null;
}

export async function arrivedAt(webhookId: string): Promise<void> {
  await database().query(`update webhooks set failing_since = null where id = $webhookId and failing_since is not null`, { bind: { webhookId } });
}

export async function forgetDeliveries(days: number): Promise<void> {
  await database().query(`delete from webhook_deliveries where created_at < now() - $days * interval '1 day'`, { bind: { days } });
}

export interface WebhookLast {
  webhookId: string;
  at: Date;
  state: 'waiting' | 'delivered' | 'failed';
  status: number | null;
}

export function lastDeliveries(webhookIds: readonly string[], transaction?: Transaction): Promise<WebhookLast[]> {
  return database().query<WebhookLast>(
    `select distinct on (webhook_id) webhook_id as "webhookId", coalesce(delivered_at, failed_at, created_at) as at,
       case when delivered_at is not null then 'delivered' when failed_at is not null then 'failed' else 'waiting' end as state, last_status as status
     from webhook_deliveries where webhook_id = any($ids::uuid[]) order by webhook_id, created_at desc`,
    { bind: { ids: `{${webhookIds.join(',')}}` }, type: QueryTypes.SELECT, transaction },
  );
}
