import { z } from 'zod';
import { id, line } from './common';

/** Each says that something changed, with how it stands now. */
export const WEBHOOK_EVENTS = ['alert', 'assessment', 'entry', 'batch', 'sensor', 'lot', 'job'] as const;
export type WebhookEvent = (typeof WEBHOOK_EVENTS)[number];

const url = z
  .string()
  .max(500, 'must have at most 500 characters')
  .refine((value) => URL.canParse(value) && /^https?:$/.test(new URL(value).protocol), 'must be a web address such as https://hooks.example/fallbright')
  .refine((value) => !URL.canParse(value) || (!new URL(value).username && !new URL(value).password), 'must not hold a name or a password');

export const createWebhook = z.object({
  url,
  events: z.array(z.enum(WEBHOOK_EVENTS)).min(1, 'choose one or more').max(WEBHOOK_EVENTS.length),
  note: line(80).nullable().default(null),
});
export type CreateWebhook = z.infer<typeof createWebhook>;
export const updateWebhook = z.object({ url: url.optional(), events: createWebhook.shape.events.optional(), note: line(80).nullable().optional(), disabled: z.boolean().optional() });
export type UpdateWebhook = z.infer<typeof updateWebhook>;

export const webhookSchema = z.object({
  id,
  url: z.string(),
  events: z.array(z.string()),
  note: z.string().nullable(),
  disabled: z.boolean(),
  /** Since when no delivery arrives; null where the last one did. */
  failing_since: z.string().nullable(),
  /** When the house switched it off, because none arrived for days. */
  given_up_at: z.string().nullable(),
  created_at: z.string(),
  last: z.object({ at: z.string(), state: z.enum(['waiting', 'delivered', 'failed']), status: z.number().int().nullable() }).nullable(),
});
export type WebhookBody = z.infer<typeof webhookSchema>;
/** The one answer that holds the key that deliveries are signed with. */
export const createdWebhookSchema = webhookSchema.extend({ secret: z.string() });
export type CreatedWebhookBody = z.infer<typeof createdWebhookSchema>;
export const webhookList = z.object({ items: z.array(webhookSchema) });

export const deliverySchema = z.object({
  id,
  event: z.string(),
  created_at: z.string(),
  state: z.enum(['waiting', 'delivered', 'failed']),
  attempts: z.number().int(),
  next_attempt_at: z.string().nullable(),
  delivered_at: z.string().nullable(),
  status: z.number().int().nullable(),
  error: z.string().nullable(),
});
export type DeliveryBody = z.infer<typeof deliverySchema>;
export const deliveryList = z.object({ items: z.array(deliverySchema) });
export const byDelivery = z.object({ id, deliveryId: id });

/** A signature counts for this long, s: what was overheard cannot be sent again later. */
export const REPLAY_WINDOW_S = 300;
