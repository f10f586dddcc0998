'use client';

import type { z } from 'zod';
import type { AccountBody, createToken as tokenForm, CreatedToken, deleteAccount as deleteForm, mailConfirmed, recoveryCodes, secondFactorSecret, tokenList, TrailKind, trailList } from '../contracts/people';
import { sendJson, withQuery } from './fetcher';
import { isPath, refresh, useResource } from './use-resource';

export function useAccount() {
  const { data, ...rest } = useResource<AccountBody>('/account');
  return { account: data, ...rest };
}

const refreshAccount = () => refresh((path) => path.startsWith('/account') || isPath('/sign-ins')(path));

async function change<T>(work: Promise<T>): Promise<T> {
  const answer = await work;
  await refreshAccount();
  return answer;
}

export const changePassphrase = (form: { current: string; passphrase: string }) => change(sendJson<null>('POST', '/account/passphrase', form));
export const changeMail = (form: { email: string; passphrase: string }) => change(sendJson<null>('POST', '/account/mail-address', form));
export const dropMailChange = () => change(sendJson<null>('DELETE', '/account/mail-address'));
export const beginSecondFactor = (passphrase: string) => sendJson<z.infer<typeof secondFactorSecret>>('POST', '/account/second-factor', { passphrase });
export const confirmSecondFactor = (code: string) => change(sendJson<z.infer<typeof recoveryCodes>>('POST', '/account/second-factor/confirm', { code }));
export const endSecondFactor = (form: { passphrase: string; code: string }) => change(sendJson<null>('POST', '/account/second-factor/off', form));
export const renewRecoveryCodes = (form: { passphrase: string; code: string }) => change(sendJson<z.infer<typeof recoveryCodes>>('POST', '/account/recovery-codes', form));
export const deleteAccount = (form: z.input<typeof deleteForm>) => sendJson<null>('DELETE', '/account', form);

export const askForSignInLink = (email: string) => sendJson<null>('POST', '/sign-in-links', { email });
export const askForPassphraseLink = (email: string) => sendJson<null>('POST', '/passphrase-links', { email });
export const resetPassphrase = (form: { token: string; passphrase: string }) => sendJson<null>('POST', '/passphrase-resets', form);
export const confirmMail = (token: string) => sendJson<z.infer<typeof mailConfirmed>>('POST', '/mail-confirmations', { token });

export function useTokens() {
  const { data, ...rest } = useResource<z.infer<typeof tokenList>>('/tokens');
  return { tokens: data?.items, ...rest };
}

export async function createToken(form: z.input<typeof tokenForm>): Promise<CreatedToken> {
  const made = await sendJson<CreatedToken>('POST', '/tokens', form);
  await refresh(isPath('/tokens'));
  return made;
}

export async function revokeToken(id: string): Promise<void> {
  await sendJson('DELETE', `/tokens/${id}`);
  await refresh(isPath('/tokens'));
}

export interface TrailFilter {
  kind: TrailKind | null;
  person: string | null;
  from: string | null;
  to: string | null;
}

/** The cellar's trail, or what happened to one's own account. */
export function useTrail(path: '/audit' | '/account/trail', filter: TrailFilter, limit: number) {
  const { data, ...rest } = useResource<z.infer<typeof trailList>>(withQuery(path, { ...filter, limit }));
  return { lines: data?.items, more: (data?.next_cursor ?? null) !== null, ...rest };
}

/** Where the trail is saved from. */
export const trailFile = (kind: 'csv' | 'json', filter: TrailFilter) => `/api/v1${withQuery(`/audit.${kind}`, { ...filter })}`;
