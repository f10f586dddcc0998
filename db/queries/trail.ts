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
  return database().query<TrailRow>(
    `select * from (
       select a.id, a.at, ${KIND} as kind, a.action, a.subject, a.person_id as "personId", p.name as "personName", a.address, a.means, a.detail
       from audit a left join people p on p.id = a.person_id
       where a.cellar_id is not distinct from $cellarId
         and ($personId::uuid is null or a.person_id = $personId)
         and ($from::timestamptz is null or a.at >= $from) and ($to::timestamptz is null or a.at < $to)
         and ($before::bigint is null or a.id < $before)
     ) t
     where $kind::text is null or kind = $kind
     order by id desc limit $limit`,
    { bind: { cellarId, personId: personId ?? null, kind: kind ?? null, from: from ?? null, to: to ?? null, before: before ?? null, limit }, type: QueryTypes.SELECT },
  );
}
