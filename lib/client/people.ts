'use client';

import type { z } from 'zod';
import type { createInvitation as invitationForm, InvitationBody, invitationList, InvitationView, joinByInvitation as joinForm, Role } from '../contracts/people';
import { sendJson } from './fetcher';
import { cellarChanged } from './me';
import { isPath, refresh, useResource } from './use-resource';

const refreshPeople = () => refresh((path) => isPath('/members')(path) || isPath('/invitations')(path) || isPath('/me')(path));

export async function changeRole(personId: string, role: Role): Promise<void> {
  await sendJson('PATCH', `/members/${personId}`, { role });
  await refreshPeople();
}

export async function removeMember(personId: string): Promise<void> {
  await sendJson('DELETE', `/members/${personId}`);
  await refreshPeople();
}

export async function handOver(personId: string, passphrase: string): Promise<void> {
  await sendJson('POST', `/members/${personId}/hand-over`, { passphrase });
  await refreshPeople();
}

/** Null waits: not everybody may ask. */
export function useInvitations(ask: boolean) {
  const { data, ...rest } = useResource<z.infer<typeof invitationList>>(ask ? '/invitations' : null);
  return { invitations: data?.items, ...rest };
}

export async function invite(form: z.input<typeof invitationForm>): Promise<InvitationBody> {
  const made = await sendJson<InvitationBody>('POST', '/invitations', form);
  await refreshPeople();
  return made;
}

export async function revokeInvitation(id: string): Promise<void> {
  await sendJson('DELETE', `/invitations/${id}`);
  await refreshPeople();
}

export const lookAtInvitation = (token: string) => sendJson<InvitationView>('POST', '/invitations/look', { token });
export const joinByInvitation = (form: z.input<typeof joinForm>) => sendJson<{ email: string }>('POST', '/invitations/join', form);

export async function acceptInvitation(token: string): Promise<void> {
  await sendJson('POST', '/invitations/accept', { token });
  await cellarChanged();
}

export async function createCellar(form: { name: string; time_zone: string }): Promise<void> {
  await sendJson('POST', '/cellars', form);
  await cellarChanged();
}

export async function updateCellar(form: { name?: string; time_zone?: string; currency?: string | null }): Promise<void> {
  await sendJson('PATCH', '/cellar', form);
  await refresh(isPath('/me'));
}

export async function deleteCellar(form: { name: string; passphrase: string }): Promise<void> {
  await sendJson('DELETE', '/cellar', form);
  await cellarChanged();
}

export async function leaveCellar(): Promise<void> {
  await sendJson('POST', '/cellar/leave');
  await cellarChanged();
}
