'use client';

import type { z } from 'zod';
import type { BenchFacts, benchForm, BenchVerdictBody, bottleBatchForm } from '../contracts/bench';
import type { CompareBody } from '../contracts/compare';
import type { LabelFacts, labelQuery } from '../contracts/labels';
import type { LotBody, LotList, lotQuery, MoveBottles, openBottles as openSchema, PlaceBody, placeForm, UpdateLot, UpdatePlaceForm } from '../contracts/lots';
import { isOfBatch } from './batches';
import { sendJson, withQuery } from './fetcher';
import { isPath, refresh, useResource } from './use-resource';

/** What the log says to the bottling bench. */
export function useBench(batchId: string | null) {
  const { data, ...rest } = useResource<BenchFacts>(batchId && `/batches/${batchId}/bench`);
  return { facts: data, ...rest };
}

/** The server's own judgement, from its own figures; the screen's is only for while somebody types. */
export const judgeBench = (batchId: string, form: z.input<typeof benchForm>) => sendJson<BenchVerdictBody>('POST', `/batches/${batchId}/bench`, form);

async function changed<T>(answer: T, batchId?: string): Promise<T> {
  await refresh((path) => path.startsWith('/lots') || path.startsWith('/places') || isPath('/jobs')(path) || (batchId !== undefined && (isOfBatch(batchId)(path) || isPath('/batches')(path) || isPath('/shelf')(path))));
  return answer;
}

/** @throws ClientError `conflict` where the bench is stopped and no reason puts the stop aside. */
export const bottleBatch = async (batchId: string, form: z.input<typeof bottleBatchForm>) => changed(await sendJson<LotBody>('POST', `/batches/${batchId}/bottle`, { ...form, client_id: form.client_id ?? crypto.randomUUID() }), batchId);

export type LotSearch = Partial<z.input<typeof lotQuery>>;

export function useLots(query: LotSearch = {}) {
  const { data, ...rest } = useResource<LotList>(withQuery('/lots', query as Record<string, string | number | null | undefined>));
  return { lots: data?.items, nextCursor: data?.next_cursor ?? null, ...rest };
}

/** Address of the cellar book as CSV, as it is searched and sorted. */
export const lotsCsvUrl = (query: LotSearch = {}) => withQuery('/api/v1/lots.csv', query as Record<string, string | number | null | undefined>);

export function useLot(id: string | null) {
  const { data, ...rest } = useResource<LotBody>(id && `/lots/${id}`);
  return { lot: data, ...rest };
}

export const updateLot = async (id: string, input: UpdateLot) => changed(await sendJson<LotBody>('PATCH', `/lots/${id}`, input));
export const moveBottles = async (id: string, input: Omit<MoveBottles, 'override_reason'> & { override_reason?: string | null }) => changed(await sendJson<LotBody>('POST', `/lots/${id}/move`, input));
export const openBottles = async (id: string, input: z.input<typeof openSchema>) => changed(await sendJson<LotBody>('POST', `/lots/${id}/openings`, { ...input, client_id: input.client_id ?? crypto.randomUUID() }));
export const liftCaution = async (lotId: string, reason: string) => changed(await sendJson<LotBody>('POST', `/lots/${lotId}/lift-caution`, { reason }));
export const undoOpening = async (lotId: string, openingId: string) => changed(await sendJson<null>('DELETE', `/lots/${lotId}/openings/${openingId}`));

export function usePlaces() {
  const { data, ...rest } = useResource<{ items: PlaceBody[] }>('/places');
  return { places: data?.items, ...rest };
}

export const createPlace = async (input: z.input<typeof placeForm>) => changed(await sendJson<PlaceBody>('POST', '/places', input));
export const updatePlace = async (id: string, input: UpdatePlaceForm) => changed(await sendJson<PlaceBody>('PATCH', `/places/${id}`, input));
export const removePlace = async (id: string) => changed(await sendJson<null>('DELETE', `/places/${id}`));

/** What the log has to say on a label. */
export function useLabelFacts(lotId: string | null) {
  const { data, ...rest } = useResource<LabelFacts>(lotId && `/lots/${lotId}/label`);
  return { label: data, ...rest };
}

/** Address of the PDF; the preview on the screen is this file. */
export const labelsPdfUrl = (lotId: string, query: Partial<z.input<typeof labelQuery>>) => withQuery(`/api/v1/lots/${lotId}/labels.pdf`, query as Record<string, string | number | null | undefined>);

/** Batches over each other, aligned at their pitch. */
/** @param hours of the readings, since the pitch; absent: all */
export function useCompare(batchIds: readonly string[], points?: number, hours?: { from: number; to: number }) {
  const { data, ...rest } = useResource<CompareBody>(batchIds.length > 0 ? withQuery('/compare', { batches: batchIds.join(','), points, from_hour: hours?.from, to_hour: hours?.to }) : null);
  return { compared: data?.items, ...rest };
}
