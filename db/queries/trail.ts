import { QueryTypes } from 'sequelize';
import { database } from '../client';

export interface TrailRow {
  id: number;
  at: Date;
  kind: 'access' | 'override' | 'deletion' | 'sensor' | 'work';
  action: string;
  subject: string;
  personId: string | null;
  personName: string | null;
  address: string | null;
  means: string | null;
  detail: Record<string, unknown>;
}

/** What a line is about, by the name of what was done: an override first, whatever it was of. */
const KIND = `case
    when a.action ~ '(against-a-stop|overrid|overrul)' then 'override'
    when a.action ~ '^(member|invitation|token|cellar|share|calendar|sign-in|passphrase|password-link|mail-address|second-factor|recovery-codes|account|person)[.-]' then 'access'
    when a.action ~ '[.](removed|deleted|dropped|archived|undone|opening-undone)$' then 'deletion'
    when a.action ~ '^(sensor|calibration|probe|webhook|import)[.-]' then 'sensor'
    else 'work' end`;

export interface TrailFilter {
  /** The cellar's trail, or (with null) what one person did to their own account. */
  cellarId: string | null;
  personId?: string | undefined;
  kind?: TrailRow['kind'] | undefined;
  from?: Date | undefined;
  to?: Date | undefined;
  /** Only lines older than this one. */
  before?: number | undefined;
  limit: number;
}

/** The trail, newest first. */
export function trail({ cellarId, personId, kind, from, to, before, limit }: TrailFilter): Promise<TrailRow[]> {
  // Spelt out, not `is not distinct from`: that one reads the trails of all cellars.
  const conditions = [cellarId === null ? 'a.cellar_id is null' : 'a.cellar_id = $cellarId'];
  if (personId !== undefined) conditions.push('a.person_id = $personId');
  if (kind !== undefined) conditions.push(`${KIND} = $kind`);
  if (from !== undefined) conditions.push('a.at >= $from');
  if (to !== undefined) conditions.push('a.at < $to');
  if (before !== undefined) conditions.push('a.id < $before');
  return database().query<TrailRow>(
    `select a.id, a.at, ${KIND} as kind, a.action, a.subject, a.person_id as "personId", p.name as "personName", a.address, a.means, a.detail
     from audit a left join people p on p.id = a.person_id
     where ${conditions.join(' and ')}
     order by a.id desc limit $limit`,
    {
      bind: {
        limit,
        ...(cellarId !== null && { cellarId }),
        ...(personId !== undefined && { personId }),
        ...(kind !== undefined && { kind }),
        ...(from !== undefined && { from }),
        ...(to !== undefined && { to }),
        ...(before !== undefined && { before }),
      },
      type: QueryTypes.SELECT,
    },
  );
}

/** What things of a cellar are called, by their identifier; an alert by its vessel, a lot by its code. */
export async function thingNames(cellarId: string, identifiers: readonly string[]): Promise<Map<string, string>> {
  if (identifiers.length === 0) return new Map();
  const rows = await database().query<{ key: string; name: string }>(
    `with wanted as (select distinct unnest($identifiers::text[]) as key),
     ids as (select key, key::uuid as id from wanted where key ~ '^[0-9a-f]{8}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{12}$')
     select i.key, b.name from ids i join batches b on b.id = i.id where b.cellar_id = $cellarId
     union all select i.key, b.name from ids i join alerts a on a.id = i.id join batches b on b.id = a.batch_id where a.cellar_id = $cellarId
     union all select i.key, l.code from ids i join lots l on l.id = i.id where l.cellar_id = $cellarId
     union all select i.key, m.name from ids i join must_sheets m on m.id = i.id where m.cellar_id = $cellarId
     union all select w.key, s.name from wanted w join sensors s on s.identifier = w.key where s.cellar_id = $cellarId`,
    { bind: { cellarId, identifiers: [...identifiers] }, type: QueryTypes.SELECT },
  );
  return new Map(rows.map(({ key, name }) => [key, name]));
}
