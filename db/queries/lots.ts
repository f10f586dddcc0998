import { QueryTypes, type Transaction } from 'sequelize';
import type { Range } from '@/lib/core/units/range';
import type { DrinkKind } from '@/lib/core/types';
import { wallTime } from '@/lib/core/units/zone';
import { database } from '../client';
import { Cellar, type Lot } from '../models';

export interface TastingFigures {
  look: number | null;
  smell: number | null;
  taste: number | null;
  balance: number | null;
  sparkle: string | null;
  score: number | null;
}

export interface LotRow extends Pick<Lot, 'id' | 'batchId' | 'code' | 'name' | 'bottledAt' | 'readyFrom' | 'volumeL' | 'originalGravity' | 'finalGravity' | 'sparkle' | 'caution' | 'note' | 'nextTime' | 'bench' | 'cost' | 'overrideReason' | 'overrideAt'> {
  abv: Range | null;
  batch: { id: string; name: string; kind: DrinkKind; drinkColour: string };
  overrideBy: { id: string; name: string } | null;
  bottled: number;
  left: number;
  opened: number;
  given: number;
  broken: number;
  gushed: number;
  places: string[];
  tastings: TastingFigures[];
}

export interface LotFilter {
  cellarId: string;
  id?: string;
  q?: string;
  /** Whom bottles were given to, and what was noted with it, is searched too. */
  searchGiven?: boolean;
  kind?: string;
  placeId?: string;
  batchId?: string;
  state?: 'all' | 'cellared' | 'ready' | 'empty' | 'caution';
  sort?: 'bottled' | 'ready' | 'name' | 'left' | 'abv' | 'score';
  order?: 'asc' | 'desc';
  now?: Date;
  offset?: number;
  limit: number;
}

const SORTS = {
  bottled: 'l.bottled_at',
  ready: 'l.ready_from',
  name: 'lower(l.name)',
  left: 'stand.left_count',
  abv: `(l.abv->>'value')::float8`,
  score: 'taste.mean_score',
} as const;

const STATES = {
  all: 'true',
  cellared: 'stand.left_count > 0',
  ready: 'stand.left_count > 0 and l.ready_from <= $now',
  empty: 'stand.left_count = 0',
  caution: 'l.caution is not null and stand.left_count > 0',
} as const;

/** Lots with where they stand, what became of them and what people found, in one statement. */
export function findLots(filter: LotFilter, transaction?: Transaction): Promise<LotRow[]> {
  const conditions = ['l.cellar_id = $cellarId', STATES[filter.state ?? 'all']];
  if (filter.id !== undefined) conditions.push('l.id = $id');
  if (filter.kind !== undefined) conditions.push('b.kind = $kind');
  if (filter.batchId !== undefined) conditions.push('l.batch_id = $batchId');
  if (filter.placeId !== undefined) conditions.push('exists (select 1 from bottle_stands s join lot_bottles x on x.id = s.lot_bottle_id where x.lot_id = l.id and s.place_id = $placeId)');
  if (filter.q) conditions.push(`(l.name ilike '%' || $q || '%' or l.code ilike '%' || $q || '%' or b.name ilike '%' || $q || '%' or l.note ilike '%' || $q || '%'${filter.searchGiven ? ` or exists (select 1 from openings o where o.lot_id = l.id and o.removed_at is null and (o.given_to ilike '%' || $q || '%' or o.note ilike '%' || $q || '%'))` : ''})`);
  const direction = filter.order === 'asc' ? 'asc' : 'desc';
  return database().query<LotRow>(
    `select l.id, l.batch_id as "batchId", l.code, l.name, l.bottled_at as "bottledAt", l.ready_from as "readyFrom", l.volume_l as "volumeL", l.original_gravity as "originalGravity", l.final_gravity as "finalGravity",
       l.abv, l.sparkle, l.caution, l.note, l.next_time as "nextTime", l.bench, l.cost, l.override_reason as "overrideReason", l.override_at as "overrideAt",
       json_build_object('id', b.id, 'name', b.name, 'kind', b.kind, 'drinkColour', b.drink_colour) as batch,
       case when o.id is not null then json_build_object('id', o.id, 'name', o.name) end as "overrideBy",
       made.count as bottled, stand.left_count as left, stand.places, fate.opened, fate.given, fate.broken, fate.gushed, taste.tastings
     from lots l
     join batches b on b.id = l.batch_id
     left join people o on o.id = l.override_by
     left join lateral (select coalesce(sum(lb.count), 0)::int as count from lot_bottles lb where lb.lot_id = l.id) made on true
     left join lateral (
       select coalesce(sum(s.count), 0)::int as left_count, coalesce(json_agg(distinct p.name) filter (where p.name is not null), '[]') as places
       from bottle_stands s join lot_bottles lb on lb.id = s.lot_bottle_id left join places p on p.id = s.place_id where lb.lot_id = l.id
     ) stand on true
     left join lateral (
       select coalesce(sum(count) filter (where kind = 'opened'), 0)::int as opened, coalesce(sum(count) filter (where kind = 'given'), 0)::int as given,
         coalesce(sum(count) filter (where kind = 'broken'), 0)::int as broken, coalesce(sum(count) filter (where kind = 'gushed'), 0)::int as gushed
       from openings where lot_id = l.id and removed_at is null
     ) fate on true
     left join lateral (
       select avg(t.score) as mean_score, coalesce(json_agg(json_build_object('look', t.look, 'smell', t.smell, 'taste', t.taste, 'balance', t.balance, 'sparkle', t.sparkle, 'score', t.score)) filter (where t.id is not null), '[]') as tastings
       from tastings t where t.lot_id = l.id and t.removed_at is null
     ) taste on true
     where ${conditions.join(' and ')}
     order by ${SORTS[filter.sort ?? 'bottled']} ${direction} nulls last, l.id ${direction} limit $limit offset $offset`,
    {
      bind: {
        cellarId: filter.cellarId,
        limit: filter.limit,
        offset: filter.offset ?? 0,
        ...(filter.state === 'ready' && { now: filter.now ?? new Date() }),
        ...(filter.id !== undefined && { id: filter.id }),
        ...(filter.kind !== undefined && { kind: filter.kind }),
        ...(filter.batchId !== undefined && { batchId: filter.batchId }),
        ...(filter.placeId !== undefined && { placeId: filter.placeId }),
        ...(filter.q && { q: filter.q.replace(/[\\%_]/g, '\\$&') }),
      },
      type: QueryTypes.SELECT,
      transaction,
    },
  );
}

/** Until the transaction ends nobody else gives a code in this cellar: two who bottle at once get one each. */
export async function lockCodes(cellarId: string, transaction: Transaction): Promise<void> {
  await database().query('select pg_advisory_xact_lock(hashtextextended($key, 0))', { bind: { key: `lot-code:${cellarId}` }, transaction });
}

/** Codes are one however they are written. */
export async function codeTaken(cellarId: string, code: string, transaction: Transaction): Promise<boolean> {
  const rows = await database().query('select 1 from lots where cellar_id = $cellarId and lower(code) = lower($code)', { bind: { cellarId, code }, type: QueryTypes.SELECT, transaction });
  return rows.length > 0;
}

/** The next code of the year that the cellar's calendar shows: `26-041`. */
export async function nextCode(cellarId: string, at: Date, transaction?: Transaction): Promise<string> {
  const { timeZone } = await Cellar.findByPk(cellarId, { attributes: ['timeZone'], rejectOnEmpty: true, transaction });
  const year = String(wallTime(at.getTime() / 1000, timeZone).year % 100).padStart(2, '0');
  const [row] = await database().query<{ last: number }>(
    `select coalesce(max(substring(code from '^\\d\\d-(\\d{1,6})$')::int), 0) as last from lots where cellar_id = $cellarId and code ~ ('^' || $year || '-\\d{1,6}$')`,
    { bind: { cellarId, year }, type: QueryTypes.SELECT, transaction },
  );
  return `${year}-${String((row?.last ?? 0) + 1).padStart(3, '0')}`;
}

export interface StandRow {
  lotBottleId: string;
  place: { id: string; name: string } | null;
  count: number;
}

/** Where the bottles of a lot stand. */
export function standsOfLot(lotId: string, transaction?: Transaction): Promise<StandRow[]> {
  return database().query<StandRow>(
    `select s.lot_bottle_id as "lotBottleId", case when p.id is not null then json_build_object('id', p.id, 'name', p.name) end as place, s.count
     from bottle_stands s join lot_bottles lb on lb.id = s.lot_bottle_id left join places p on p.id = s.place_id where lb.lot_id = $lotId order by p.name nulls first`,
    { bind: { lotId }, type: QueryTypes.SELECT, transaction },
  );
}

/** Puts bottles somewhere. */
export async function addBottles(where: { cellarId: string; lotBottleId: string; placeId: string | null }, count: number, transaction: Transaction): Promise<void> {
  await database().query(
    `insert into bottle_stands (cellar_id, lot_bottle_id, place_id, count) values ($cellarId, $lotBottleId, $placeId, $count)
     on conflict (lot_bottle_id, coalesce(place_id, '00000000-0000-0000-0000-000000000000'::uuid)) do update set count = bottle_stands.count + excluded.count`,
    { bind: { ...where, count }, transaction },
  );
}

/** Takes bottles from somewhere. @returns false where not so many stand there. */
export async function takeBottles(where: { lotBottleId: string; placeId: string | null }, count: number, transaction: Transaction): Promise<boolean> {
  const [row] = await database().query<{ count: number }>('select count from bottle_stands where lot_bottle_id = $lotBottleId and place_id is not distinct from $placeId for update', { bind: where, type: QueryTypes.SELECT, transaction });
  if (!row || row.count < count) return false;
  if (row.count === count) await database().query('delete from bottle_stands where lot_bottle_id = $lotBottleId and place_id is not distinct from $placeId', { bind: where, transaction });
  else await database().query('update bottle_stands set count = count - $count where lot_bottle_id = $lotBottleId and place_id is not distinct from $placeId', { bind: { ...where, count }, transaction });
  return true;
}

export interface PlaceRow {
  id: string;
  name: string;
  capacity: number | null;
  temperatureC: number | null;
  bottles: number;
  lots: number;
}

/** Places with how many bottles stand there. */
export function findPlaces(cellarId: string, id?: string, transaction?: Transaction): Promise<PlaceRow[]> {
  return database().query<PlaceRow>(
    `select p.id, p.name, p.capacity, p.temperature_c as "temperatureC", coalesce(sum(s.count), 0)::int as bottles, count(distinct lb.lot_id)::int as lots
     from places p left join bottle_stands s on s.place_id = p.id left join lot_bottles lb on lb.id = s.lot_bottle_id
     where p.cellar_id = $cellarId and p.removed_at is null and ($id::uuid is null or p.id = $id)
     group by p.id order by lower(p.name)`,
    { bind: { cellarId, id: id ?? null }, type: QueryTypes.SELECT, transaction },
  );
}

export interface MoveRow {
  at: Date;
  from: { id: string; name: string } | null;
  to: { id: string; name: string } | null;
  sizeMl: number;
  count: number;
  by: { id: string; name: string } | null;
  overrideReason: string | null;
}

/** Moves of a lot's bottles, newest first. */
export function movesOfLot(lotId: string, transaction?: Transaction): Promise<MoveRow[]> {
  return database().query<MoveRow>(
    `select m.at, lb.size_ml as "sizeMl", m.count, m.override_reason as "overrideReason",
       case when f.id is not null then json_build_object('id', f.id, 'name', f.name) end as "from",
       case when t.id is not null then json_build_object('id', t.id, 'name', t.name) end as "to",
       case when p.id is not null then json_build_object('id', p.id, 'name', p.name) end as by
     from bottle_moves m join lot_bottles lb on lb.id = m.lot_bottle_id left join places f on f.id = m.from_place left join places t on t.id = m.to_place left join people p on p.id = m.person_id
     where m.lot_id = $lotId order by m.at desc, m.id desc limit 100`,
    { bind: { lotId }, type: QueryTypes.SELECT, transaction },
  );
}

export async function writeMove(move: { cellarId: string; lotId: string; lotBottleId: string; fromPlace: string | null; toPlace: string | null; count: number; at: Date; personId: string; overrideReason: string | null }, transaction: Transaction): Promise<void> {
  await database().query(
    `insert into bottle_moves (cellar_id, lot_id, lot_bottle_id, from_place, to_place, count, at, person_id, override_reason)
     values ($cellarId, $lotId, $lotBottleId, $fromPlace, $toPlace, $count, $at, $personId, $overrideReason)`,
    { bind: move, transaction },
  );
}

export interface LiftedRow {
  at: Date;
  caution: string;
  reason: string;
  by: { id: string; name: string } | null;
}

/** Cautions that were taken off a lot, newest first. */
export function liftedOfLot(cellarId: string, lotId: string, transaction?: Transaction): Promise<LiftedRow[]> {
  return database().query<LiftedRow>(
    `select c.at, c.caution, c.reason, case when p.id is not null then json_build_object('id', p.id, 'name', p.name) end as by
     from caution_lifts c left join people p on p.id = c.person_id
     where c.cellar_id = $cellarId and c.lot_id = $lotId order by c.at desc, c.id limit 50`,
    { bind: { cellarId, lotId }, type: QueryTypes.SELECT, transaction },
  );
}

export async function writeLift(lift: { cellarId: string; lotId: string; caution: string; reason: string; personId: string; at: Date }, transaction: Transaction): Promise<void> {
  await database().query(`insert into caution_lifts (cellar_id, lot_id, caution, reason, person_id, at) values ($cellarId, $lotId, $caution, $reason, $personId, $at)`, { bind: lift, transaction });
}

export interface OpeningRow {
  id: string;
  at: Date;
  kind: 'opened' | 'given' | 'broken' | 'gushed';
  lotBottleId: string;
  sizeMl: number;
  count: number;
  to: string | null;
  note: string | null;
  place: { id: string; name: string } | null;
  by: { id: string; name: string } | null;
}

/** What became of a lot's bottles, newest first. */
export function openingsOfLot(lotId: string, transaction?: Transaction): Promise<OpeningRow[]> {
  return database().query<OpeningRow>(
    `select o.id, o.at, o.kind, o.lot_bottle_id as "lotBottleId", lb.size_ml as "sizeMl", o.count, o.given_to as "to", o.note,
       case when pl.id is not null then json_build_object('id', pl.id, 'name', pl.name) end as place,
       case when p.id is not null then json_build_object('id', p.id, 'name', p.name) end as by
     from openings o join lot_bottles lb on lb.id = o.lot_bottle_id left join places pl on pl.id = o.place_id left join people p on p.id = o.person_id
     where o.lot_id = $lotId and o.removed_at is null order by o.at desc, o.id limit 500`,
    { bind: { lotId }, type: QueryTypes.SELECT, transaction },
  );
}

/** Notes for the next time on one lot: its own and those of its tastings, newest first. */
export function nextTimeOfLot(lotId: string, transaction?: Transaction): Promise<Array<{ note: string; lotId: string; code: string; by: string | null; at: Date }>> {
  return database().query(
    `select * from (
       select l.next_time as note, l.id as "lotId", l.code, p.name as by, l.next_time_at as at from lots l left join people p on p.id = l.next_time_by where l.id = $lotId and l.next_time is not null
       union all
       select t.next_time, l.id, l.code, coalesce(p.name, t.guest_name), t.at from tastings t join lots l on l.id = t.lot_id left join people p on p.id = t.person_id where l.id = $lotId and t.next_time is not null and t.removed_at is null
     ) notes order by at desc limit 50`,
    { bind: { lotId }, type: QueryTypes.SELECT, transaction },
  );
}

/** Kinds of bottle that stand in a place. */
export async function bottlesAt(placeId: string, transaction?: Transaction): Promise<string[]> {
  const rows = await database().query<{ id: string }>('select lot_bottle_id as id from bottle_stands where place_id = $placeId', { bind: { placeId }, type: QueryTypes.SELECT, transaction });
  return rows.map((row) => row.id);
}
