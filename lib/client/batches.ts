'use client';

import { useMemo } from 'react';
import type { z } from 'zod';
import type { JudgementBody, VerdictChangeList } from '../contracts/assessment';
import type { BATCH_STATES, BatchBody, BatchList, createBatch as createBatchSchema, SeriesAnswer, SeriesBody, UpdateBatch } from '../contracts/batches';
import { sendJson, withQuery } from './fetcher';
import { isPath, refresh, useResource } from './use-resource';

/** What a form sends; what it leaves out takes the schema's defaults. */
export type NewBatch = z.input<typeof createBatchSchema>;

export function useBatches(query: { state?: (typeof BATCH_STATES)[number]; limit?: number; cursor?: string } = {}) {
  const { data, ...rest } = useResource<BatchList>(withQuery('/batches', query));
  return { batches: data?.items, nextCursor: data?.next_cursor ?? null, ...rest };
}

export function useBatch(id: string | null) {
  const { data, ...rest } = useResource<BatchBody>(id && `/batches/${id}`);
  return { batch: data, ...rest };
}

/** The judgement now, or as it was known at a past time, with its fitted curve, forecast and gas; asked for again while a newer one is on its way. */
export function useJudgement(id: string | null, at?: string) {
  const { data, ...rest } = useResource<JudgementBody>(id && withQuery(`/batches/${id}/judgement`, { at }), { refreshInterval: (latest?: JudgementBody) => (latest?.pending ? 1_000 : 0) });
  return { judgement: data, ...rest };
}

/** Past verdicts, newest first. */
export function useVerdictChanges(id: string | null) {
  const { data, ...rest } = useResource<VerdictChangeList>(id && `/batches/${id}/assessments`);
  return { changes: data?.items, ...rest };
}

/** The sensor's readings, thinned to `points` with their extremes kept; without a span the whole batch. */
export function useSeries(id: string | null, query: { from?: string; to?: string; points?: number } = {}) {
  const { data, ...rest } = useResource<SeriesAnswer>(id && withQuery(`/batches/${id}/series`, query));
  const series = useMemo<SeriesBody | undefined>(() => data && { ...data, at: data.at.map((time) => Date.parse(time) / 1000) }, [data]);
  return { series, ...rest };
}

export const isOfBatch = (id: string) => (path: string) => path.startsWith(`/batches/${id}`);
const isList = (path: string) => isPath('/batches')(path) || isPath('/shelf')(path);

/** @throws ClientError with `fields` where the form is wrong. */
export async function createBatch(input: NewBatch): Promise<BatchBody> {
  const batch = await sendJson<BatchBody>('POST', '/batches', input);
  await refresh((path) => isList(path) || isPath('/sensors')(path));
  return batch;
}

export async function updateBatch(id: string, input: UpdateBatch): Promise<BatchBody> {
  const batch = await sendJson<BatchBody>('PATCH', `/batches/${id}`, input);
  await refresh((path) => isList(path) || isOfBatch(id)(path));
  return batch;
}
