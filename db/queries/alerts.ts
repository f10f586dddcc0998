import { QueryTypes, type Transaction } from 'sequelize';
import type { HeldBy, MeansName } from '../../lib/core/alerts/telling';
import type { Alert, Batch } from '../models';
import { database } from '../client';

export interface AlertRow extends Pick<Alert, 'id' | 'call' | 'kind' | 'level' | 'state' | 'since' | 'openedAt' | 'acknowledgedAt' | 'note' | 'lookAgainAt' | 'resolvedAt' | 'evidence'> {
  /** The order's time as PostgreSQL writes it: whole microseconds, which a Date would cut. */
  openedAtText: string;
  batch: Pick<Batch, 'id' | 'name' | 'tag' | 'vesselKind' | 'drinkColour' | 'neck' | 'volumeL' | 'vesselL'>;
  acknowledgedBy: { id: string; name: string } | null;
  resolvedBy: { id: string; name: string } | null;
  told: Array<{ person: string; means: MeansName; at: string | null; state: 'waiting' | 'held' | 'sent' | 'failed' | 'dropped'; heldBy: HeldBy | 'turn' | null; due: string; error: string | null }>;
  /** The vessel is muted until then. */
  mutedUntil: Date | null;
  /** What it is about is no longer so since `at` (ms); `keepMin` is set for its rule, null: the usual. */
  gone: { rule: string; at: number; keepMin: number | null } | null;
}

interface Filter {
  cellarId: string;
  id?: string;
  state?: string;
  batchId?: string;
  after?: { at: string; key: string } | null;
  limit: number;
}

/** Alerts of a cellar, newest first, each with its batch and who was told of it. */
export function findAlerts({ cellarId, id, state, batchId, after, limit }: Filter, transaction?: Transaction): Promise<AlertRow[]> {
  return database().query<AlertRow>(
    `select a.id, a.call, a.kind, a.level, a.state, a.since, a.opened_at as "openedAt", a.opened_at::text as "openedAtText",
       a.acknowledged_at as "acknowledgedAt", a.note, a.look_again_at as "lookAgainAt", a.resolved_at as "resolvedAt", a.evidence,
       json_build_object('id', b.id, 'name', b.name, 'tag', b.tag, 'vesselKind', b.vessel_kind, 'drinkColour', b.drink_colour, 'neck', b.neck, 'volumeL', b.volume_l, 'vesselL', b.vessel_l) as batch,
       case when taker.id is not null then json_build_object('id', taker.id, 'name', taker.name) end as "acknowledgedBy",
       case when clearer.id is not null then json_build_object('id', clearer.id, 'name', clearer.name) end as "resolvedBy",
       coalesce((
         select json_agg(json_build_object('person', p.name, 'means', o.means, 'at', o.sent_at,
             'state', case when o.sent_at is not null then 'sent' when o.dropped_at is not null then 'dropped' when o.failed_at is not null then 'failed' when o.held_by is not null then 'held' else 'waiting' end,
             'heldBy', o.held_by, 'due', o.next_attempt_at, 'error', o.last_error) order by o.id)
         from outbox o join people p on p.id = o.person_id where o.alert_id = a.id), '[]') as told,
       (select max(m.until_at) from mutes m where m.batch_id = a.batch_id and m.ended_at is null and m.until_at > now()) as "mutedUntil",
       (select json_build_object('rule', s.rule, 'at', s.state->'goneSince', 'keepMin', (
           select r.keep_min from rule_settings r where r.cellar_id = a.cellar_id and r.rule = s.rule and (r.batch_id = a.batch_id or r.batch_id is null) order by r.batch_id nulls last limit 1))
         from alert_states s where s.batch_id = a.batch_id and s.alert_id = a.id and s.state->>'phase' = 'keeping') as gone
     from alerts a
     join batches b on b.id = a.batch_id
     left join people taker on taker.id = a.acknowledged_by
     left join people clearer on clearer.id = a.resolved_by
     where a.cellar_id = $cellarId
       and ($id::uuid is null or a.id = $id) and ($state::text is null or a.state = $state) and ($batchId::uuid is null or a.batch_id = $batchId)
       and ($afterAt::timestamptz is null or (a.opened_at, a.id) < ($afterAt, $afterKey::uuid))
     order by a.opened_at desc, a.id desc limit $limit`,
    { bind: { cellarId, id: id ?? null, state: state ?? null, batchId: batchId ?? null, afterAt: after?.at ?? null, afterKey: after?.key ?? null, limit }, type: QueryTypes.SELECT, transaction },
  );
}

export type AlertCounts = Record<'open' | 'acknowledged' | 'resolved', number>;

/** How many alerts of a cellar, or of one batch of it, are in each state. */
export async function countAlerts(cellarId: string, batchId: string | null): Promise<AlertCounts> {
  const [row] = await database().query<AlertCounts>(
    `select count(*) filter (where state = 'open')::int as open, count(*) filter (where state = 'acknowledged')::int as acknowledged, count(*) filter (where state = 'resolved')::int as resolved
     from alerts where cellar_id = $cellarId and ($batchId::uuid is null or batch_id = $batchId)`,
    { bind: { cellarId, batchId }, type: QueryTypes.SELECT },
  );
  return row ?? { open: 0, acknowledged: 0, resolved: 0 };
}
