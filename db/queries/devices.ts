import { QueryTypes, type Transaction } from 'sequelize';
import { database } from '../client';
import { OPEN_SIGN_IN } from './sessions';

export interface DeviceRow {
  id: string;
  signInId: string;
  endpoint: string;
  p256dh: string;
  auth: string;
  userAgent: string;
  createdAt: Date;
  lastTakenAt: Date | null;
  lastError: string | null;
}

/** The person's devices that take push messages: those whose sign-in is still open. */
export function devicesOf(personId: string): Promise<DeviceRow[]> {
  return database().query(
    `select d.id, d.sign_in_id as "signInId", d.endpoint, d.p256dh, d.auth, d.user_agent as "userAgent", d.created_at as "createdAt", d.last_taken_at as "lastTakenAt", d.last_error as "lastError"
     from push_subscriptions d join sign_ins s on s.id = d.sign_in_id where d.person_id = $personId and ${OPEN_SIGN_IN} order by d.created_at, d.id`,
    { bind: { personId }, type: QueryTypes.SELECT },
  );
}

interface NewDevice {
  personId: string;
  signInId: string;
  endpoint: string;
  p256dh: string;
  auth: string;
  userAgent: string;
}

/** A browser's address belongs to whoever registered it last; the browser itself holds the only key to it. */
export async function keepDevice(device: NewDevice, transaction: Transaction): Promise<string> {
  const [row] = await database().query<{ id: string }>(
    `insert into push_subscriptions (person_id, sign_in_id, endpoint, p256dh, auth, user_agent) values ($personId, $signInId, $endpoint, $p256dh, $auth, $userAgent)
     on conflict (endpoint) do update set person_id = excluded.person_id, sign_in_id = excluded.sign_in_id, p256dh = excluded.p256dh, auth = excluded.auth, user_agent = excluded.user_agent, last_error = null
     returning id`,
    { bind: { ...device }, type: QueryTypes.SELECT, transaction },
  );
  return row!.id;
}

export async function removeDevice(personId: string, id: string, transaction: Transaction): Promise<boolean> {
  const rows = await database().query(`delete from push_subscriptions where id = $id and person_id = $personId returning id`, { bind: { id, personId }, type: QueryTypes.SELECT, transaction });
  return rows.length > 0;
}

export async function forgetDevice(id: string): Promise<void> {
  await database().query(`delete from push_subscriptions where id = $id`, { bind: { id } });
}

/** What came of the last message to it; null: it was taken. */
export async function noteDevice(id: string, at: Date, error: string | null): Promise<void> {
  await database().query(`update push_subscriptions set last_taken_at = case when $error::text is null then $at::timestamptz else last_taken_at end, last_error = $error where id = $id`, { bind: { id, at, error } });
}

/** Addresses whose sign-in has ended are of no more use: a browser registers anew when somebody signs in. */
export async function forgetEndedDevices(): Promise<void> {
  await database().query(`delete from push_subscriptions d using sign_ins s where s.id = d.sign_in_id and not (${OPEN_SIGN_IN})`);
}
