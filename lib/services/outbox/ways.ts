/** The ways out of the house besides mail, for the process that sends. */
import { env, privateTargetsAllowed } from '@/lib/config/env';
import { pushKeys } from '@/lib/push/keys';
import { webPushTransport } from '@/lib/push/transport';
import { byPush } from './by-push';
import type { Means } from './means';

/** A push service wants to know whom to ask: the address that mails come from. */
export const contactOf = (from: string): string => `mailto:${/<([^>]+)>\s*$/.exec(from)?.[1] ?? from.trim()}`;

export function furtherMeans(now: () => number): Means[] {
  return [byPush({ transport: webPushTransport({ keys: pushKeys, contact: contactOf(env().MAIL_FROM), allowPrivate: privateTargetsAllowed() }), now })];
}
