'use client';

import type { z } from 'zod';
import type { CatalogueBody, CatalogueForm, CatalogueItem } from '../contracts/catalogue';
import type { BatchProposal, CopyMust, MustBody, MustList, mustSheetSchema, updateMust as updateSchema } from '../contracts/musts';
import { sendJson, withQuery } from './fetcher';
import { isPath, refresh, useResource } from './use-resource';

/** A sheet as a form sends it; what it leaves out takes the schema's defaults. */
export type MustSheetInput = z.input<typeof mustSheetSchema>;

/** The program's ingredients and yeasts with the cellar's own. */
export function useCatalogue() {
  const { data, ...rest } = useResource<CatalogueBody>('/catalogue');
  return { catalogue: data, ...rest };
}

export function useMusts(query: { q?: string; archived?: 'yes' | 'no'; limit?: number; cursor?: string } = {}) {
  const { data, ...rest } = useResource<MustList>(withQuery('/musts', query));
  return { musts: data?.items, nextCursor: data?.next_cursor ?? null, ...rest };
}

export function useMust(id: string | null, version?: number) {
  const { data, ...rest } = useResource<MustBody>(id && withQuery(`/musts/${id}`, { version }));
  return { must: data, ...rest };
}

/** What a batch from the sheet would be started with. */
export function useBatchProposal(mustId: string | null, query: { version?: number; vessel_l?: number } = {}) {
  const { data, ...rest } = useResource<BatchProposal>(mustId && withQuery(`/musts/${mustId}/batch-proposal`, query));
  return { proposal: data, ...rest };
}

async function changed<T>(answer: T): Promise<T> {
  await refresh((path) => path.startsWith('/musts'));
  return answer;
}

export const createMust = async (sheet: MustSheetInput) => changed(await sendJson<MustBody>('POST', '/musts', { sheet }));
/** @throws ClientError `conflict` where somebody wrote a newer version meanwhile. */
export const updateMust = async (id: string, input: z.input<typeof updateSchema>) => changed(await sendJson<MustBody>('PATCH', `/musts/${id}`, input));
export const copyMust = async (id: string, input: Omit<CopyMust, 'sheet'> & { sheet?: MustSheetInput }) => changed(await sendJson<MustBody>('POST', `/musts/${id}/copy`, input));
export const archiveMust = async (id: string) => changed(await sendJson<null>('DELETE', `/musts/${id}`));

async function catalogueChanged<T>(answer: T): Promise<T> {
  await refresh(isPath('/catalogue'));
  return answer;
}

export const addToCatalogue = async (item: CatalogueForm) => catalogueChanged(await sendJson<CatalogueItem>('POST', '/catalogue', item));
export const updateCatalogue = async (id: string, item: CatalogueForm) => catalogueChanged(await sendJson<CatalogueItem>('PATCH', `/catalogue/${id}`, item));
export const removeFromCatalogue = async (id: string) => catalogueChanged(await sendJson<null>('DELETE', `/catalogue/${id}`));
