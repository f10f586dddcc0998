'use client';

import type { z } from 'zod';
import type { blendForm, blendResult, DrinkBody, FamilyBody, finingForm, FiningBody, MovedBody, rackForm, secondDoseForm, splitForm, splitResult, topUpBatchForm } from '../contracts/family';
import { isOfBatch } from './batches';
import { sendJson } from './fetcher';
import { isPath, refresh, useResource } from './use-resource';

/** What is in the vessel by the log: for additions, the bench and the family. */
export function useDrink(batchId: string | null) {
  const { data, ...rest } = useResource<DrinkBody>(batchId && `/batches/${batchId}/drink`);
  return { drink: data, ...rest };
}

export function useFamily(batchId: string | null) {
  const { data, ...rest } = useResource<FamilyBody>(batchId && `/batches/${batchId}/family`);
  return { family: data, ...rest };
}

export function useFinings(batchId: string | null) {
  const { data, ...rest } = useResource<{ items: FiningBody[] }>(batchId && `/batches/${batchId}/finings`);
  return { finings: data?.items, ...rest };
}

async function changed<T>(answer: T, ...batchIds: string[]): Promise<T> {
  await refresh((path) => batchIds.some((id) => isOfBatch(id)(path)) || isPath('/batches')(path) || isPath('/shelf')(path) || isPath('/jobs')(path));
  return answer;
}

/** One `client_id` an act, so that a second try after a lost answer does it once. */
const once = <T extends { client_id?: string | null | undefined }>(input: T) => ({ ...input, client_id: input.client_id ?? crypto.randomUUID() });

export const rackBatch = async (id: string, input: z.input<typeof rackForm>) => changed(await sendJson<MovedBody>('POST', `/batches/${id}/rack`, once(input)), id);
export const topUpBatch = async (id: string, input: z.input<typeof topUpBatchForm>) => changed(await sendJson<MovedBody>('POST', `/batches/${id}/top-up`, once(input)), id);
export const splitBatch = async (id: string, input: z.input<typeof splitForm>) => changed(await sendJson<z.infer<typeof splitResult>>('POST', `/batches/${id}/split`, once(input)), id);

export async function blendBatches(input: z.input<typeof blendForm>): Promise<z.infer<typeof blendResult>> {
  const answer = await sendJson<z.infer<typeof blendResult>>('POST', '/blends', once(input));
  return changed(answer, answer.batch.id, ...input.parts.map((part) => part.batch_id));
}

export const startFining = async (batchId: string, input: z.input<typeof finingForm>) => changed(await sendJson<FiningBody>('POST', `/batches/${batchId}/finings`, once(input)), batchId);

export async function secondDose(finingId: string, input: z.input<typeof secondDoseForm>): Promise<FiningBody> {
  const fining = await sendJson<FiningBody>('POST', `/finings/${finingId}/second`, once(input));
  return changed(fining, fining.batch_id);
}
