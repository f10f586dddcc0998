'use client';

import type { z } from 'zod';
import type { createShare as createShareSchema, SharedBatch, ShareBody } from '../contracts/shares';
import type { createTasting as createSchema, guestTasting, TastingBody, TastingList } from '../contracts/tastings';
import { isOfBatch } from './batches';
import { sendJson } from './fetcher';
import { isPath, refresh, useResource } from './use-resource';

export function useTastings(lotId: string | null) {
  const { data, ...rest } = useResource<TastingList>(lotId && `/lots/${lotId}/tastings`);
  return { tastings: data?.items, summary: data?.summary, ...rest };
}

const refreshLots = () => refresh((path) => path.startsWith('/lots') || path.startsWith('/musts'));

export async function createTasting(lotId: string, input: z.input<typeof createSchema>): Promise<TastingBody> {
  const tasting = await sendJson<TastingBody>('POST', `/lots/${lotId}/tastings`, { ...input, client_id: input.client_id ?? crypto.randomUUID() });
  await refreshLots();
  return tasting;
}

export async function removeTasting(id: string): Promise<void> {
  await sendJson('DELETE', `/tastings/${id}`);
  await refreshLots();
}

/** The share links of the cellar, or of one batch. */
export function useShares(batchId?: string) {
  const { data, ...rest } = useResource<{ items: ShareBody[] }>(batchId === undefined ? '/shares' : `/batches/${batchId}/shares`);
  return { shares: data?.items, ...rest };
}

const refreshShares = (batchId?: string) => refresh((path) => isPath('/shares')(path) || (batchId !== undefined && isOfBatch(batchId)(path)) || (path.startsWith('/lots/') && path.endsWith('/label')));

export async function createShare(batchId: string, input: z.input<typeof createShareSchema> = {}): Promise<ShareBody> {
  const share = await sendJson<ShareBody>('POST', `/batches/${batchId}/shares`, input);
  await refreshShares(batchId);
  return share;
}

export async function revokeShare(share: Pick<ShareBody, 'id' | 'batch'>): Promise<void> {
  await sendJson('DELETE', `/shares/${share.id}`);
  await refreshShares(share.batch.id);
}

/** A page left open asks again this often; it has no live line. */
const SHARED_AGAIN_MS = 60_000;

/** The public page's own resource; the token in the address is all the leave there is. */
export function useShared(token: string) {
  const path = `/share/${token}`;
  const first = useResource<SharedBatch>(path, { revalidateOnFocus: false, revalidateOnReconnect: false });
  const again = useResource<SharedBatch>(`${path}?again=true`, { revalidateOnMount: false, refreshInterval: SHARED_AGAIN_MS });
  return { shared: again.data ?? first.data, error: again.error ?? first.error, retry: first.retry };
}

export async function tasteShared(token: string, input: z.input<typeof guestTasting>): Promise<void> {
  await sendJson('POST', `/share/${token}/tastings`, { ...input, client_id: input.client_id ?? crypto.randomUUID() });
  await refresh(isPath(`/share/${token}`));
}
