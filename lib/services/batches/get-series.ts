import type { z } from 'zod';
import { allReadings, seriesExtent, thinnedSeries, type SeriesPoint } from '@/db/queries/series';
import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import { systemClock, type Clock } from '@/lib/clock';
import type { SeriesBody, seriesQuery } from '@/lib/contracts/batches';
import { NotFoundError } from '@/lib/errors';

/** Beyond any reading, s since 1970. */
const ALWAYS = { from: 0, to: Date.UTC(2200, 0, 1) / 1000 };
/** A bucket gives at most this many readings: lowest and highest, in gravity and in temperature. */
const PER_BUCKET = 4;

const seconds = (at: string) => Date.parse(at) / 1000;
const iso = (at: number) => new Date(at * 1000).toISOString();

function body(from: number, to: number, count: number, points: readonly SeriesPoint[]): SeriesBody {
  return {
    from: iso(from),
    to: iso(to),
    count,
    at: points.map((point) => point.at),
    gravity: points.map((point) => point.gravity),
    temperature: points.map((point) => point.temperature),
  };
}

/**
 * The batch's readings, thinned in the database to at most `points` of them, so
 * that a year of readings costs the browser what a day does. All are readings
 * that were taken; the extremes and the latest are always among them.
 */
export async function getSeries(actor: Actor, batchId: string, query: z.infer<typeof seriesQuery>, clock: Clock = systemClock): Promise<SeriesBody> {
  authorize(actor, 'batches.read');
  return seriesOf(actor.cellarId, batchId, query, clock);
}

/** The same for whoever was let in otherwise. */
export async function seriesOf(cellarId: string, batchId: string, query: z.infer<typeof seriesQuery>, clock: Clock = systemClock): Promise<SeriesBody> {
  const from = query.from === undefined ? ALWAYS.from : seconds(query.from);
  const to = query.to === undefined ? ALWAYS.to : seconds(query.to);
  const extent = await seriesExtent(cellarId, batchId, from, to);
  if (!extent) throw new NotFoundError('batch');
  const { first, last } = extent;
  if (first === null || last === null) {
    const now = clock.now() / 1000;
    return body(query.from === undefined ? now : from, query.to === undefined ? now : to, 0, []);
  }

  const end = last.at + 1;
  // One place is for the latest reading. Whole seconds keep the times exact.
  const width = Math.ceil((end - first) / Math.floor((query.points - 1) / PER_BUCKET));
  const thinned = await thinnedSeries(batchId, first, end, width);
  const points = thinned.count <= query.points ? await allReadings(batchId, first, end) : withLast(thinned.points, last);
  return body(query.from === undefined ? first : from, query.to === undefined ? last.at : to, thinned.count, points);
}

function withLast(points: SeriesPoint[], last: SeriesPoint): SeriesPoint[] {
  return (points.at(-1)?.at ?? -Infinity) < last.at ? [...points, last] : points;
}
