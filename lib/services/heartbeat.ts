import { hostname } from 'node:os';
import { QueryTypes } from 'sequelize';
import { database } from '@/db/client';

/** The parts of the house that say that they live. `broker` is whichever process takes readings over MQTT. */
export type Part = 'broker' | 'worker';

/** How often a part says so, ms. */
export const HEARTBEAT_MS = 5_000;

/** This process among others of the same part. */
const instance = `${hostname()}:${process.pid}`;

/** Says that this process lives. The time is the database's, so that machines' clocks need not agree. */
export async function beat(part: Part, detail: Record<string, unknown> = {}): Promise<void> {
  await database().query(
    `insert into heartbeats (part, instance, at, detail) values ($part, $instance, now(), $detail)
     on conflict (part, instance) do update set at = excluded.at, detail = excluded.detail`,
    { bind: { part, instance, detail: JSON.stringify(detail) } },
  );
}

/** How long ago any process of that part last said that it lives, ms; null: none ever did. */
export async function beatAge(part: Part): Promise<number | null> {
  const [row] = await database().query<{ age: number | null }>(`select extract(epoch from now() - max(at))::float8 * 1000 as age from heartbeats where part = $part`, {
    bind: { part },
    type: QueryTypes.SELECT,
  });
  return row?.age ?? null;
}

/** Drops the rows of processes that ended long ago; the newest of each part stays, since its age tells of an outage. */
export async function forgetOldBeats(): Promise<void> {
  await database().query(`delete from heartbeats h where at < now() - interval '1 day' and exists (select 1 from heartbeats n where n.part = h.part and n.at > h.at)`);
}
