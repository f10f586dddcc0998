import { randomUUID } from 'node:crypto';
import { QueryTypes } from 'sequelize';
import { database, inTransaction } from '@/db/client';
import { keepDevice } from '@/db/queries/devices';
import type { endpointsMessages } from '@/lib/contracts/endpoints-messages';
import { isoAt } from './cellar';
import { EVERYBODY, NOT_GUESTS, type RoleRow } from './role-rows';

/** A key and a secret of the right form; nothing can be read with them. */
export const DEVICE_KEYS = { p256dh: 'BNcRdreALRFXTkOOUHK1EtK2wtaz5Ry4YfYCA_0QTpQtUbVlUls0VJXg7A8u-Ts1XbjhazAkj7I99e8QcYP7DkM', auth: 'tBHItJI5svbpez7KI4CCXg' };

const HOUR_MS = 3_600_000;
const inAnHour = () => isoAt(Date.now() + HOUR_MS);

/** A mute and a device, made past the services. */
export async function messageThings({ cellarId, batchId, personId, signInId }: { cellarId: string; batchId: string; personId: string; signInId: string }): Promise<{ muteId: string; deviceId: string }> {
  const [mute] = await database().query<{ id: string }>(`insert into mutes (cellar_id, batch_id, muted_by, from_at, until_at) values ($cellarId, $batchId, $personId, now(), now() + interval '1 hour') returning id`, {
    bind: { cellarId, batchId, personId },
    type: QueryTypes.SELECT,
  });
  const deviceId = await inTransaction((transaction) => keepDevice({ personId, signInId, endpoint: `https://push.example/${randomUUID()}`, ...DEVICE_KEYS, userAgent: 'a test' }, transaction));
  return { muteId: mute!.id, deviceId };
}

/** Messages. Written out by hand on purpose, as the other rows are. */
export const messageRows: Record<Exclude<keyof typeof endpointsMessages, 'getTakeLink' | 'useTakeLink'>, RoleRow> = {
  getMessages: { may: NOT_GUESTS, good: 200, path: () => '/messages' },
  updateMessages: { may: NOT_GUESTS, good: 200, path: () => '/messages', body: () => ({ quiet: { from: 1320, to: 420 } }) },
  updateRule: { may: ['keeper'], good: 200, names: true, path: () => '/messages/rules', body: (t) => ({ rule: 'stalled', batch_id: t.batchId, enabled: false }) },
  updateEscalation: { may: ['keeper'], good: 200, path: () => '/messages/escalation', body: () => ({ after_min: 30, people: [] }) },
  sendTestMessage: { may: NOT_GUESTS, good: 204, path: () => '/messages/test' },
  listMutes: { may: NOT_GUESTS, good: 200, path: () => '/mutes' },
  createMute: { may: NOT_GUESTS, good: 201, names: true, path: (t) => `/batches/${t.batchId}/mutes`, body: () => ({ until: inAnHour() }) },
  endMute: { may: NOT_GUESTS, good: 204, names: true, path: (t) => `/mutes/${t.muteId}` },
  createDevice: { may: NOT_GUESTS, good: 201, path: () => '/devices', body: () => ({ endpoint: `https://push.example/${randomUUID()}`, keys: DEVICE_KEYS }) },
  removeDevice: { may: EVERYBODY, good: 204, names: true, path: (t) => `/devices/${t.deviceId}` },
};
