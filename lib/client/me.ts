'use client';

import type { z } from 'zod';
import type { Action } from '../core/actions';
import type { MeBody, memberList, signInList, updateMe as updateMeSchema } from '../contracts/people';
import { sendJson } from './fetcher';
import { isPath, refresh, useResource } from './use-resource';

/** Who is signed in, in which cellar, and what they may do there. */
export function useMe() {
  const { data, ...rest } = useResource<MeBody>('/me', { revalidateOnFocus: false });
  return { me: data, may: (action: Action) => data?.may.includes(action) ?? false, ...rest };
}

export function useMembers() {
  const { data, ...rest } = useResource<z.infer<typeof memberList>>('/members');
  return { members: data?.items, ...rest };
}

/** The person's open sign-ins. */
export function useSignIns() {
  const { data, ...rest } = useResource<z.infer<typeof signInList>>('/sign-ins');
  return { signIns: data?.items, ...rest };
}

export async function endSignIn(id: string): Promise<void> {
  await sendJson('DELETE', `/sign-ins/${id}`);
  await refresh(isPath('/sign-ins'));
}

/** Ends every sign-in of the person, this one too: go to the sign-in page afterwards. */
export const signOutEverywhere = () => sendJson<null>('DELETE', '/sign-ins');

/** Pages of this browser share the cookie that says which cellar: all of them have to know. */
const CELLAR_CHANNEL = 'fallbright-cellar';

/** Everything on screen is asked for again, in every tab: another cellar is shown. */
export async function cellarChanged(): Promise<void> {
  const channel = new BroadcastChannel(CELLAR_CHANNEL);
  channel.postMessage('changed');
  channel.close();
  await refresh(() => true);
}

/** Hears that another tab shows another cellar. @returns what stops it */
export function onCellarChanged(): () => void {
  const channel = new BroadcastChannel(CELLAR_CHANNEL);
  channel.onmessage = () => void refresh(() => true);
  return () => channel.close();
}

/** Shows another of the person's cellars. */
export async function chooseCellar(cellarId: string): Promise<void> {
  await sendJson('POST', '/cellars/active', { cellar_id: cellarId });
  await cellarChanged();
}

export async function updateMe(input: z.input<typeof updateMeSchema>): Promise<void> {
  await sendJson('PATCH', '/me', input);
  await refresh(isPath('/me'));
}
