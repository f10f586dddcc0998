import type { Transaction } from 'sequelize';
import { inTransaction } from '@/db/client';
import { Entry, type Batch } from '@/db/models';
import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import { systemClock, type Clock } from '@/lib/clock';
import { snakeKeys } from '@/lib/contracts/case';
import type { MovedBody, RackForm, TopUpBatchForm, TopUpForm } from '@/lib/contracts/family';
import { rack } from '@/lib/core/family/cellarwork';
import { readContents, type Contents } from '@/lib/core/family/contents';
import { ConflictError, InvalidError } from '@/lib/errors';
import { auditBy } from '../audit/write';
import { getBatch } from '../batches/get';
import { notifyChange } from '../changes';
import { namesOf } from '../entries/names';
import { presentEntry } from '../entries/present';
import { answerJobs } from '../jobs/answer';
import { notAhead } from '../not-ahead';
import { contentsIn, inflowOf, loadBatches, pourIn, sentBefore, shownReadout, type Inflow } from './flow';

const SLACK_L = 1e-6;

/** Lines of one act stand in the log a millisecond apart, so that their order can be told: first over, then topped up, then sulphited; the last one at the time told. */
const earlier = (at: Date, steps: number) => new Date(at.getTime() - steps);

interface Poured {
  entries: Entry[];
  effect: MovedBody['effect'];
}

/** Everything there is in the transaction for one act on one batch. */
async function act(actor: Actor, batchId: string, input: { at: string; client_id: string | null }, topUps: readonly TopUpForm[], clock: Clock, work: (batch: Batch, inflows: Inflow[], at: Date, transaction: Transaction) => Promise<Poured>): Promise<MovedBody> {
  authorize(actor, 'cellarwork.do');
  const at = notAhead(input.at, clock.now());
  return inTransaction(async (transaction) => {
    const sources = topUps.flatMap((topUp) => (topUp.what === 'batch' && topUp.batch_id ? [topUp.batch_id] : []));
    if (sources.includes(batchId)) throw new InvalidError('A batch cannot top itself up.', { top_up: ['choose another batch'] });
    const batches = await loadBatches(actor.cellarId, [batchId, ...sources], transaction);
    const batch = batches.get(batchId)!;
    const known = await sentBefore(actor.cellarId, input.client_id, transaction);
    if (known && known.batchId !== batchId) throw new ConflictError('This was sent for another batch.');
    if (!known && batch.state === 'ended') throw new ConflictError('This batch is over.');
    const inflows: Inflow[] = [];
    if (!known) for (const [index, topUp] of topUps.entries()) inflows.push(await inflowOf(topUp, batches, at, topUps.length > 1 ? `top_up.${index}` : 'top_up', transaction));
    const { entries, effect } = known ? { entries: [known], effect: null } : await work(batch, inflows, at, transaction);
    await notifyChange({ cellar: actor.cellarId, kind: 'entry', batch: batchId }, transaction);
    const names = await namesOf(entries.map((entry) => entry.personId), transaction);
    for (const entry of entries) await entry.reload({ transaction });
    return { entries: entries.map((entry) => presentEntry(entry, actor, names)), batch: await getBatch(actor, batchId, transaction), effect };
  });
}

function effectOf(before: Contents | null, leftL: number, topUps: readonly Inflow[]): MovedBody['effect'] {
  const reading = before && readContents(before);
  if (!before || !reading || topUps.some((inflow) => inflow.contents === null)) return null;
  const moved = rack(before, Math.min(leftL, reading.volumeL), topUps.map((inflow) => inflow.contents!));
  if (!moved.reading) return null;
  return { before: shownReadout(reading), after: shownReadout(moved.reading), gravity_change_points: moved.gravityChangePoints, abv_change_percent: moved.abvChangePercent, cautions: [...moved.cautions], how: snakeKeys(moved.how) };
}

/** Racks a batch off its lees, in one act with what it is topped up with and the sulphite that goes in. */
export function rackBatch(actor: Actor, batchId: string, input: RackForm, clock: Clock = systemClock): Promise<MovedBody> {
  return act(actor, batchId, input, input.top_up, clock, async (batch, inflows, at, transaction) => {
    const over = batch.volumeL - input.left_l;
    if (over <= 0) throw new InvalidError('Nothing would be left.', { left_l: [`must be less than the ${batch.volumeL} L there are`] });
    const vesselL = input.vessel.vessel_l ?? batch.vesselL;
    const full = over + inflows.reduce((sum, inflow) => sum + inflow.litres, 0);
    if (full > vesselL + SLACK_L) throw new InvalidError('The vessel cannot hold it.', { 'vessel.vessel_l': [`${full.toFixed(2)} L go into ${vesselL} L`] });
    const effect = effectOf(await contentsIn(batch, at, transaction), input.left_l, inflows);

    // The vessel is set with the volume: the table holds that one fits the other.
    await batch.update(
      {
        volumeL: over,
        vesselL,
        ...(input.vessel.vessel_kind !== undefined && { vesselKind: input.vessel.vessel_kind }),
        ...(input.vessel.tag !== undefined && { tag: input.vessel.tag }),
        ...(input.vessel.place !== undefined && { place: input.vessel.place }),
        ...(input.vessel.neck !== undefined && { neck: input.vessel.neck }),
        updatedAt: new Date(clock.now()),
      },
      { transaction },
    );
    const racked = await Entry.create(
      { cellarId: batch.cellarId, batchId, kind: 'rack', at: earlier(at, input.top_up.length + 1), volumeL: over, neck: input.vessel.neck ?? null, text: input.text, detail: { left_l: input.left_l }, personId: actor.personId, clientId: input.client_id },
      { transaction },
    );
    const entries = [racked, ...(await pourAll(actor, batch, inflows, input.top_up, earlier(at, 1), transaction))];
    if (input.sulphite_g) {
      entries.push(
        await Entry.create({ cellarId: batch.cellarId, batchId, kind: 'addition', at, detail: { substance: 'sulphite', ingredient: 'potassium-metabisulphite', name: 'potassium metabisulphite', grams: input.sulphite_g }, personId: actor.personId }, { transaction }),
      );
    }
    await answerJobs(actor, batch, racked, new Date(clock.now()), transaction);
    await auditBy(actor, 'batch.racked', batchId, { left: input.left_l, topUps: input.top_up.length }, transaction);
    return { entries, effect };
  });
}

/** Tops a batch up: with water, must, a drink from elsewhere, or another batch. */
export function topUpBatch(actor: Actor, batchId: string, input: TopUpBatchForm, clock: Clock = systemClock): Promise<MovedBody> {
  return act(actor, batchId, input, [input.top_up], clock, async (batch, inflows, at, transaction) => {
    const full = batch.volumeL + input.top_up.volume_l;
    if (full > batch.vesselL + SLACK_L) throw new InvalidError('The vessel cannot hold it.', { 'top_up.volume_l': [`the vessel has room for ${(batch.vesselL - batch.volumeL).toFixed(2)} L`] });
    const effect = effectOf(await contentsIn(batch, at, transaction), 0, inflows);
    const entries = await pourAll(actor, batch, inflows, [input.top_up], at, transaction);
    await entries[0]!.update({ clientId: input.client_id, text: input.text ?? entries[0]!.text }, { transaction });
    await auditBy(actor, 'batch.topped_up', batchId, { what: input.top_up.what, litres: input.top_up.volume_l }, transaction);
    return { entries, effect };
  });
}

async function pourAll(actor: Actor, batch: Batch, inflows: readonly Inflow[], topUps: readonly TopUpForm[], at: Date, transaction: Transaction): Promise<Entry[]> {
  const entries: Entry[] = [];
  for (const [index, inflow] of inflows.entries()) entries.push(await pourIn(actor, batch, inflow, topUps[index]!, earlier(at, inflows.length - 1 - index), transaction));
  const litres = inflows.reduce((sum, inflow) => sum + inflow.litres, 0);
  if (litres > 0) await batch.update({ volumeL: Math.min(batch.vesselL, batch.volumeL + litres) }, { transaction });
  return entries;
}
