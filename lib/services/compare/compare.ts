import { Entry, type Batch } from '@/db/models';
import { keptCurve } from '@/db/queries/batch-states';
import { findBatches } from '@/db/queries/batches';
import { findLots } from '@/db/queries/lots';
import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import { systemClock, type Clock } from '@/lib/clock';
import type { z } from 'zod';
import { mean } from 'simple-statistics';
import { Op } from 'sequelize';
import { ENTRY_KINDS } from '@/lib/contracts/batches';
import { snakeKeys } from '@/lib/contracts/case';
import type { CompareBody, compareQuery } from '@/lib/contracts/compare';
import type { AssessmentBody } from '@/lib/contracts/assessment';
import { apparentAttenuation } from '@/lib/core/strength/strength';
import { NotFoundError } from '@/lib/errors';
import { presentBatch } from '../batches/present';
import { loadBatch } from '../batches/load';
import { seriesOf } from '../batches/get-series';
import { drinkState } from '../drink/state';
import { iso } from '../iso';

const HOUR_S = 3600;
const hoursFrom = (zero: number, seconds: number) => Number(((seconds - zero) / HOUR_S).toFixed(3));

/** Batches laid over each other: hour 0 is the pitch of each. */
export async function compareBatches(actor: Actor, query: z.infer<typeof compareQuery>, clock: Clock = systemClock): Promise<CompareBody> {
  authorize(actor, 'batches.read');
  const items: CompareBody['items'] = [];
  for (const id of [...new Set(query.batches)]) items.push(await one(actor, id, query, clock));
  return { items };
}

/** From the pitch to the end, or the part of it that is asked for. */
function spanOf({ pitchedAt, endedAt }: Pick<Batch, 'pitchedAt' | 'endedAt'>, { from_hour: from, to_hour: to }: z.infer<typeof compareQuery>): { from?: string; to?: string } {
  if (!pitchedAt) return endedAt ? { to: iso(endedAt) } : {};
  const at = (hour: number) => pitchedAt.getTime() + hour * HOUR_S * 1000;
  const last = Math.min(to === undefined ? Infinity : at(to), endedAt?.getTime() ?? Infinity);
  return { from: iso(at(from ?? 0)), ...(Number.isFinite(last) && { to: iso(last) }) };
}

/** Hours of the curve on each side of a part that is asked for. */
const MARGIN_H = 2;
const seconds = (at: string | undefined, hours: number): number | null => (at === undefined ? null : Date.parse(at) / 1000 + hours * HOUR_S);

async function one(actor: Actor, id: string, query: z.infer<typeof compareQuery>, clock: Clock): Promise<CompareBody['items'][number]> {
  const batch = await loadBatch(actor.cellarId, id);
  const [row] = await findBatches({ cellarId: actor.cellarId, id, limit: 1 });
  if (!row) throw new NotFoundError('batch');
  const state = await drinkState(batch, batch.endedAt ?? new Date(clock.now()));
  const series = await seriesOf(actor.cellarId, id, { points: query.points, ...spanOf(batch, query) }, clock);
  const entries = await Entry.findAll({ where: { batchId: id, removedAt: { [Op.is]: null } }, order: [['at', 'ASC']] });
  const lots = await findLots({ cellarId: actor.cellarId, batchId: id, limit: 100 });
  const zero = batch.pitchedAt ? batch.pitchedAt.getTime() / 1000 : null;
  const kindOf = (kind: string) => ENTRY_KINDS.find((item) => item === kind);
  const scores = lots.flatMap((lot) => lot.tastings.flatMap((tasting) => (tasting.score === null ? [] : [tasting.score])));
  const og = state.ledger.effectiveOg;
  // Written by the worker in this form.
  const assessment = row.assessment as AssessmentBody | null;
  // Before it stands still its end is a forecast, and not a result.
  const terminalAt = assessment?.stage === 'terminal' ? assessment.terminal_at?.value : undefined;
  // What has not happened is not laid beside what has.
  const until = (batch.endedAt?.getTime() ?? clock.now()) / 1000;
  const span = spanOf(batch, query);
  const asked = query.from_hour !== undefined || query.to_hour !== undefined;
  // Of a part each point of the curve, and a little beyond it, so that it meets the rest.
  const [from, to] = asked ? [seconds(span.from, -MARGIN_H), seconds(span.to, MARGIN_H)] : [null, null];
  const curve = (await keptCurve(id, { whole: asked }))
    .map((point) => ({ at: Date.parse(point.at) / 1000, gravity: point.gravity }))
    .filter((point) => point.at <= until && point.at >= (from ?? -Infinity) && point.at <= (to ?? Infinity));
  return {
    batch: presentBatch(row, actor),
    zero_at: zero === null ? null : iso(zero * 1000),
    hours: zero === null ? [] : series.at.map((at) => hoursFrom(zero, at)),
    gravity: zero === null ? [] : series.gravity,
    temperature: zero === null ? [] : series.temperature,
    curve: zero === null ? [] : curve.map((point) => ({ hour: hoursFrom(zero, point.at), gravity: point.gravity })),
    by_hand: zero === null ? [] : entries.flatMap((entry) => (entry.kind === 'reading' && entry.gravity !== null ? [{ hour: hoursFrom(zero, entry.at.getTime() / 1000), gravity: entry.gravity }] : [])),
    posts: zero === null ? [] : entries.flatMap((entry) => {
      const kind = kindOf(entry.kind);
      return kind && !['reading', 'note', 'observation'].includes(kind) ? [{ hour: hoursFrom(zero, entry.at.getTime() / 1000), kind }] : [];
    }),
    result: {
      gravity: state.gravity,
      abv_percent: state.strength?.balling.value.value ?? null,
      how: state.strength ? snakeKeys(state.strength.balling.how) : null,
      attenuation_percent: og !== null && state.gravity !== null ? apparentAttenuation(og, state.gravity) : null,
      hours_to_terminal: zero === null || !terminalAt ? null : hoursFrom(zero, Date.parse(terminalAt) / 1000),
      score: scores.length > 0 ? Number(mean(scores).toFixed(2)) : null,
      lots: lots.length,
    },
  };
}
