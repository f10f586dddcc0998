import { stringify } from 'csv-stringify/sync';
import { thingNames, trail, type TrailFilter, type TrailRow } from '@/db/queries/trail';
import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import type { TrailLine, TrailQuery } from '@/lib/contracts/people';
import { InvalidError } from '@/lib/errors';
import { namesOf } from '../entries/names';
import { iso } from '../iso';
import { about, says } from './words';

/** More than a cellar writes in years; an export past it is asked for by its dates. */
const MOST_EXPORTED = 50_000;

type Filter = Omit<TrailQuery, 'cursor' | 'limit'>;

const whereOf = (filter: Filter): Omit<TrailFilter, 'cellarId' | 'limit'> => ({
  kind: filter.kind,
  personId: filter.person,
  from: filter.from === undefined ? undefined : new Date(filter.from),
  to: filter.to === undefined ? undefined : new Date(filter.to),
});

async function namesIn(rows: readonly TrailRow[], cellarId: string | null): Promise<Map<string, string>> {
  const people = await namesOf(rows.filter(({ action }) => action.startsWith('member.') || action === 'cellar.handed-over').flatMap(about));
  return cellarId === null ? people : new Map([...(await thingNames(cellarId, rows.flatMap(about))), ...people]);
}

function present(row: TrailRow, names: ReadonlyMap<string, string>): TrailLine {
  return {
    id: row.id,
    at: iso(row.at),
    kind: row.kind,
    action: row.action,
    says: says(row, names),
    subject: row.subject,
    person: row.personId === null ? null : { id: row.personId, name: row.personName ?? '' },
    address: row.address,
    means: row.means,
    detail: row.detail,
  };
}

function cursorOf(cursor: string | undefined): number | undefined {
  if (cursor === undefined) return undefined;
  if (!/^\d{1,15}$/.test(cursor)) throw new InvalidError('The page to go on from is not one of this list.', { cursor: ['is not a cursor of this list'] });
  return Number(cursor);
}

async function page(filter: TrailFilter): Promise<{ items: TrailLine[]; next_cursor: string | null }> {
  const rows = await trail({ ...filter, limit: filter.limit + 1 });
  const shown = rows.slice(0, filter.limit);
  const names = await namesIn(shown, filter.cellarId);
  return { items: shown.map((row) => present(row, names)), next_cursor: rows.length > filter.limit ? String(shown.at(-1)!.id) : null };
}

/** Who did what in the cellar, newest first. */
export async function listTrail(actor: Actor, { cursor, limit, ...filter }: TrailQuery): Promise<{ items: TrailLine[]; next_cursor: string | null }> {
  authorize(actor, 'audit.read');
  return page({ ...whereOf(filter), cellarId: actor.cellarId, before: cursorOf(cursor), limit });
}

/** What happened to a person's own account. */
export async function listAccountTrail(personId: string, { cursor, limit, ...filter }: TrailQuery): Promise<{ items: TrailLine[]; next_cursor: string | null }> {
  return page({ ...whereOf(filter), cellarId: null, personId, before: cursorOf(cursor), limit });
}

async function whole(actor: Actor, filter: Filter): Promise<TrailLine[]> {
  authorize(actor, 'audit.read');
  const rows = await trail({ ...whereOf(filter), cellarId: actor.cellarId, limit: MOST_EXPORTED });
  const names = await namesIn(rows, actor.cellarId);
  return rows.map((row) => present(row, names));
}

/** The trail as CSV (RFC 4180). A spreadsheet would run a cell that begins like a formula: it gets a quote before it (OWASP ASVS 5.0 1.2.10). */
export async function trailAsCsv(actor: Actor, filter: Filter): Promise<string> {
  const lines = await whole(actor, filter);
  return stringify(
    lines.map((line) => [line.at, line.person?.name ?? '', line.says, line.kind, line.action, line.subject, line.address ?? '', line.means ?? '', JSON.stringify(line.detail)]),
    { header: true, columns: ['at', 'who', 'what', 'kind', 'action', 'subject', 'address', 'by', 'detail'], escape_formulas: true, record_delimiter: 'windows' },
  );
}

export async function trailAsJson(actor: Actor, filter: Filter): Promise<string> {
  return JSON.stringify({ items: await whole(actor, filter) }, null, 2);
}
