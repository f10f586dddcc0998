import { inTransaction } from '@/db/client';
import { devicesOf, keepDevice, removeDevice as removeRow } from '@/db/queries/devices';
import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import { privateTargetsAllowed } from '@/lib/config/env';
import type { CreateDevice } from '@/lib/contracts/messages';
import { ForbiddenError, InvalidError, NotFoundError } from '@/lib/errors';
import { mayPushTo } from '@/lib/push/transport';
import { audit, auditBy } from '../audit/write';

/** More devices than this nobody has; each is one request a message. */
const MOST_DEVICES = 20;
const USER_AGENT_KEPT = 300;

/** Takes push messages on this browser for as long as its sign-in lasts; again is the same device. */
export async function createDevice(actor: Actor, signInId: string | null, { endpoint, keys }: CreateDevice, userAgent: string): Promise<{ id: string }> {
  authorize(actor, 'alerts.read');
  if (signInId === null) throw new ForbiddenError('A device is registered by the person who sits before it, not by a token.');
  if (!mayPushTo(endpoint, privateTargetsAllowed())) throw new InvalidError('Messages cannot be sent to that address.', { endpoint: ['must be an https address on the open Internet'] });
  const known = await devicesOf(actor.personId);
  if (known.length >= MOST_DEVICES && !known.some((device) => device.endpoint === endpoint)) throw new InvalidError('You have many devices registered. Take one away first.', { endpoint: [`at most ${MOST_DEVICES} devices`] });
  return inTransaction(async (transaction) => {
    const id = await keepDevice({ personId: actor.personId, signInId, endpoint, ...keys, userAgent: userAgent.slice(0, USER_AGENT_KEPT) }, transaction);
    if (!known.some((device) => device.endpoint === endpoint)) await auditBy(actor, 'device.registered', id, { service: new URL(endpoint).host }, transaction);
    return { id };
  });
}

/** @throws NotFoundError for another person's */
export async function removeDevice(personId: string, id: string): Promise<void> {
  await inTransaction(async (transaction) => {
    if (!(await removeRow(personId, id, transaction))) throw new NotFoundError('device');
    await audit({ action: 'device.removed', subject: id, personId, cellarId: null }, transaction);
  });
}
