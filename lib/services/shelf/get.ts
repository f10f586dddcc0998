import type { z } from 'zod';
import { countShelf, findBatches, type BatchRow } from '@/db/queries/batches';
import { laneEntries, laneSeries, type LaneEntryRow, type LaneSeriesRow } from '@/db/queries/shelf';
import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import { systemClock, type Clock } from '@/lib/clock';
import type { LaneBody, ShelfBody, shelfQuery } from '@/lib/contracts/batches';
import { InvalidError } from '@/lib/errors';
import { presentBatch } from '../batches/present';

/** More vessels than anybody looks over at once; the rest comes after them. */
const MOST_LANES = 500;
/** A lane is some 700 pixels wide: more points than this are not seen. */
const LANE_POINTS = 400;
const HOUR_S = 3600;
const DAY_MS = 86_400_000;
const LONGEST_DAYS = 400;

/** Every batch at work, and those that ended inside the span, each with its curve, forecast and posts: four queries however many there are. */
export async function getShelf(actor: Actor, query: z.infer<typeof shelfQuery>, clock: Clock = systemClock): Promise<ShelfBody> {
  authorize(actor, 'batches.read');
  const from = new Date(query.from);
  const to = new Date(query.to);
  if (to <= from) throw new InvalidError('The calendar ends before it begins.', { to: ['must be after `from`'] });
  if (to.getTime() - from.getTime() > LONGEST_DAYS * DAY_MS) throw new InvalidError('The calendar is too long.', { to: [`must be at most ${LONGEST_DAYS} days after \`from\``] });

  const rows = await findBatches({ cellarId: actor.cellarId, workingSince: from, limit: MOST_LANES, skip: query.skip, withCurve: true });
  const total = query.skip === 0 && rows.length < MOST_LANES ? rows.length : await countShelf(actor.cellarId, from);
  const ids = rows.map((row) => row.id);
  const span = { from: from.getTime() / 1000, to: to.getTime() / 1000 };
  // Readings fill the calendar only up to now.
  const width = Math.max(HOUR_S, (Math.min(span.to, clock.now() / 1000) - span.from) / LANE_POINTS);
  const [series, entries] = await Promise.all([laneSeries(ids, span.from, span.to, width), laneEntries(ids, from, to)]);
  const seriesOf = new Map(series.map((row) => [row.batchId, row]));
  const entriesOf = new Map<string, LaneEntryRow[]>(ids.map((id) => [id, []]));
  for (const entry of entries) entriesOf.get(entry.batchId)?.push(entry);
  return {
    now: new Date(clock.now()).toISOString(),
    total,
    items: rows.map((row) => lane(row, actor, query, seriesOf.get(row.id), entriesOf.get(row.id) ?? [])),
  };
}

function lane(row: BatchRow, actor: Actor, span: { from: string; to: string }, series: LaneSeriesRow | undefined, entries: LaneEntryRow[]): LaneBody {
  return {
    ...presentBatch(row, actor),
    series: { from: span.from, to: span.to, count: series?.count ?? 0, at: series?.at ?? [], gravity: series?.gravity ?? [], temperature: series?.temperature ?? [] },
    // Written by the worker in this form; the response schema checks it again.
    curve: (row.curve ?? []) as LaneBody['curve'],
    expected: (row.expected ?? []) as LaneBody['expected'],
    entries: entries.map((entry) => ({
      id: entry.id,
      kind: entry.kind as LaneBody['entries'][number]['kind'],
      at: entry.at.toISOString(),
      gravity: entry.gravity,
      neck: entry.neck as LaneBody['entries'][number]['neck'],
      text: entry.text,
    })),
  };
}
