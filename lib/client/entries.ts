'use client';

import type { z } from 'zod';
import type { EntryBody, entryList, RevisionList, UpdateEntry } from '../contracts/batches';
import { isOfBatch } from './batches';
import { sendJson, withQuery } from './fetcher';
import { sendOrKeepEntry } from './unsent/send';
import type { NewEntry } from './unsent/store';
import { isPath, refresh, useResource } from './use-resource';

export type { NewEntry };

/** The log of a batch, newest first. */
export function useEntries(batchId: string | null, query: { limit?: number; cursor?: string } = {}) {
  const { data, ...rest } = useResource<z.infer<typeof entryList>>(batchId && withQuery(`/batches/${batchId}/entries`, query));
  return { entries: data?.items, nextCursor: data?.next_cursor ?? null, ...rest };
}

const refreshBatch = (batchId: string) => refresh((path) => isOfBatch(batchId)(path) || isPath('/shelf')(path));

/**
 * Gives the entry a `client_id` where it has none, so that a second try after a
 * lost answer keeps one. Away from the network it is kept on this device and sent
 * later: null then.
 */
export async function createEntry(batchId: string, input: NewEntry): Promise<EntryBody | null> {
  const logged = await sendOrKeepEntry(batchId, { ...input, client_id: input.client_id ?? crypto.randomUUID() });
  if (!('sent' in logged)) return null;
  await refreshBatch(batchId);
  return logged.sent;
}

export async function removeEntry(batchId: string, entryId: string): Promise<void> {
  await sendJson('DELETE', `/batches/${batchId}/entries/${entryId}`);
  await refreshBatch(batchId);
}

/** Corrects an entry; what it said before is kept. */
export async function updateEntry(batchId: string, entryId: string, input: UpdateEntry): Promise<EntryBody> {
  const entry = await sendJson<EntryBody>('PATCH', `/batches/${batchId}/entries/${entryId}`, input);
  await refreshBatch(batchId);
  return entry;
}

/** What an entry said before each correction, newest first. */
export function useRevisions(batchId: string, entryId: string | null) {
  const { data, ...rest } = useResource<RevisionList>(entryId && `/batches/${batchId}/entries/${entryId}/revisions`);
  return { revisions: data?.items, ...rest };
}
