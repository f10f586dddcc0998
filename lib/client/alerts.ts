'use client';

import type { z } from 'zod';
import type { acknowledgeAlert as acknowledgeSchema, ALERT_STATES, AlertBody, alertList, resolveAlert as resolveSchema } from '../contracts/alerts';
import { isOfBatch } from './batches';
import { sendJson, withQuery } from './fetcher';
import { isPath, refresh, useResource } from './use-resource';

/** Null waits: until it is known that the person may see them. */
export function useAlerts(query: { state?: (typeof ALERT_STATES)[number]; batch?: string; limit?: number; cursor?: string } | null = {}) {
  const { data, ...rest } = useResource<z.infer<typeof alertList>>(query && withQuery('/alerts', query));
  return { alerts: data?.items, counts: data?.counts, nextCursor: data?.next_cursor ?? null, ...rest };
}

async function changed(alert: AlertBody): Promise<AlertBody> {
  await refresh((path) => isPath('/alerts')(path) || isPath('/shelf')(path) || isPath('/batches')(path) || isOfBatch(alert.batch.id)(path));
  return alert;
}

/** Takes the alert in hand. */
export const acknowledgeAlert = async (id: string, input: z.input<typeof acknowledgeSchema> = {}) => changed(await sendJson<AlertBody>('POST', `/alerts/${id}/acknowledge`, input));

export const resolveAlert = async (id: string, input: z.input<typeof resolveSchema> = {}) => changed(await sendJson<AlertBody>('POST', `/alerts/${id}/resolve`, input));
