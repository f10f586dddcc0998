'use client';

import type { z } from 'zod';
import type { createMute as createMuteSchema, MessagesBody, MuteBody, muteList, TakePage, updateEscalation, updateMessages, updateRule } from '../contracts/messages';
import { sendJson } from './fetcher';
import { isPath, refresh, useResource } from './use-resource';

/** Rules, own choices, devices, turns and mutes. */
export function useMessages() {
  const { data, ...rest } = useResource<MessagesBody>('/messages');
  return { messages: data, ...rest };
}

async function change(path: string, body: unknown): Promise<void> {
  await sendJson<MessagesBody>('PATCH', path, body);
  await refresh((key) => isPath('/messages')(key));
}

export const saveMessages = (input: z.input<typeof updateMessages>) => change('/messages', input);
export const saveRule = (input: z.input<typeof updateRule>) => change('/messages/rules', input);
export const saveEscalation = (input: z.input<typeof updateEscalation>) => change('/messages/escalation', input);
export const sendTest = () => sendJson<null>('POST', '/messages/test');

/** Vessels that are muted now; null waits. */
export function useMutes(may: boolean) {
  const { data, ...rest } = useResource<z.infer<typeof muteList>>(may ? '/mutes' : null);
  return { mutes: data?.items, ...rest };
}

const afterMute = () => refresh((key) => isPath('/mutes')(key) || isPath('/messages')(key) || isPath('/alerts')(key));

export async function muteVessel(batchId: string, input: z.input<typeof createMuteSchema>): Promise<MuteBody> {
  const mute = await sendJson<MuteBody>('POST', `/batches/${batchId}/mutes`, input);
  await afterMute();
  return mute;
}

export async function endMute(id: string): Promise<void> {
  await sendJson('DELETE', `/mutes/${id}`);
  await afterMute();
}

/** What a mailed link would take in hand. */
export function useTakeLink(token: string) {
  const { data, ...rest } = useResource<TakePage>(`/take/${encodeURIComponent(token)}`, { revalidateOnFocus: false });
  return { page: data, ...rest };
}

export async function takeByLink(token: string): Promise<TakePage> {
  const page = await sendJson<TakePage>('POST', `/take/${encodeURIComponent(token)}`);
  await refresh(isPath(`/take/${encodeURIComponent(token)}`));
  return page;
}
