'use client';

import type { z } from 'zod';
import type { createWebhook as createForm, CreatedWebhookBody, deliveryList, UpdateWebhook, webhookList } from '../contracts/webhooks';
import { sendJson } from './fetcher';
import { refresh, useResource } from './use-resource';

export function useWebhooks() {
  const { data, ...rest } = useResource<z.infer<typeof webhookList>>('/webhooks');
  return { webhooks: data?.items, ...rest };
}

/** Asked again every few seconds: a delivery takes its time. */
export function useDeliveries(id: string | null) {
  const { data, ...rest } = useResource<z.infer<typeof deliveryList>>(id && `/webhooks/${id}/deliveries`, { refreshInterval: 4_000 });
  return { deliveries: data?.items, ...rest };
}

const again = () => refresh((path) => path.startsWith('/webhooks'));

export async function createWebhook(input: z.input<typeof createForm>): Promise<CreatedWebhookBody> {
  const made = await sendJson<CreatedWebhookBody>('POST', '/webhooks', input);
  await again();
  return made;
}
export const updateWebhook = (id: string, input: UpdateWebhook) => sendJson('PATCH', `/webhooks/${id}`, input).then(again);
export const removeWebhook = (id: string) => sendJson('DELETE', `/webhooks/${id}`).then(again);
export const tryWebhook = (id: string) => sendJson('POST', `/webhooks/${id}/try`).then(again);
export const deliverAgain = (id: string, delivery: string) => sendJson('POST', `/webhooks/${id}/deliveries/${delivery}/again`).then(again);
