import type { Transaction } from 'sequelize';
import { inTransaction } from '@/db/client';
import { Entry, Lot, LotBottle, type Batch } from '@/db/models';
import { addBottles, codeTaken, lockCodes, nextCode } from '@/db/queries/lots';
import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import { systemClock, type Clock } from '@/lib/clock';
import type { BottleBatchForm } from '@/lib/contracts/bench';
import type { LotBody } from '@/lib/contracts/lots';
import type { BenchOverridden, BenchRequest, BenchSafe } from '@/lib/core/bottling/bench';
import { readyFrom } from '@/lib/core/bottling/conditioning';
import { primes } from '@/lib/core/bottling/judge';
import { judgeBench, overrideStop } from '@/lib/core/bottling/verdict';
import { strengthByMethods } from '@/lib/core/strength/methods';
import { times, within, type Range } from '@/lib/core/units/range';
import { ConflictError, InvalidError } from '@/lib/errors';
import { auditBy } from '../audit/write';
import { loadBatch } from '../batches/load';
import { notifyChange } from '../changes';
import { detailOf } from '../drink/ledger';
import { drinkState, type DrinkState } from '../drink/state';
import { lessen, sentBefore } from '../family/flow';
import { answerJobs } from '../jobs/answer';
import { getLot } from '../lots/get';
import type { KeptBench, KeptCost, KeptPressure } from '../lots/kept';
import { lotJobs } from '../lots/jobs';
import { writtenReason } from '../lots/reason';
import { LIGHT_FROM, SPARKLING_FROM } from '../lots/sparkle';
import { notAhead } from '../not-ahead';
import { roomFor } from '../places/room';
import { takeOut } from '../sensors/place';
import { presentDose } from './present';
import { benchRequest } from './request';

type Allowed = BenchSafe | BenchOverridden;
/** Half a division of a hydrometer. */
const READING_DOUBT = 0.0005;

/**
 * The one gate to a filled bottle: judged here, from the log, whatever the screen
 * thought. A stop is put aside only by a brewer's written reason, and never for
 * glass that must stay still.
 */
function allow(actor: Actor, request: BenchRequest, reason: string | null, now: number): Allowed {
  const verdict = judgeBench(request);
  if (verdict.verdict === 'safe') return verdict;
  if (reason === null) throw new ConflictError(`${verdict.headline}. ${verdict.sentence}`);
  authorize(actor, 'lots.override');
  const put = overrideStop(request, { reason: writtenReason('override_reason', reason), by: actor.personId, at: now });
  if (put.verdict === 'overridden') return put;
  throw new ConflictError(`No reason puts this aside. ${put.problems.find((problem) => !problem.overridable)?.sentence ?? verdict.sentence}`);
}

/** Bottles a batch: judges it, fills the plan, and makes the lot with all that was judged. */
export function bottleBatch(actor: Actor, batchId: string, input: BottleBatchForm, clock: Clock = systemClock): Promise<LotBody> {
  return inTransaction((transaction) => bottleIn(actor, batchId, input, clock, transaction));
}

/** The same inside somebody's transaction. There is no other way to a lot. */
export async function bottleIn(actor: Actor, batchId: string, input: BottleBatchForm, clock: Clock, transaction: Transaction): Promise<LotBody> {
  authorize(actor, 'lots.bottle');
  const at = notAhead(input.at, clock.now());
  // The lock keeps two people from bottling the same drink twice.
  const batch = await loadBatch(actor.cellarId, batchId, transaction);
  const known = await sentBefore(actor.cellarId, input.client_id, transaction);
  const before = known && detailOf(known).lot_id;
  if (known && (known.batchId !== batchId || !before)) throw new ConflictError('This was sent for something else.');
  if (before) return getLot(actor, before, clock, transaction);
  if (batch.state === 'ended') throw new ConflictError('This batch is over: nothing is left to bottle.');

  // Judged as things stand now, also where it was bottled earlier today.
  const now = new Date(clock.now());
  const state = await drinkState(batch, now, transaction);
  const { request } = await benchRequest(state, input, transaction);
  const judged = allow(actor, request, input.override_reason, now.getTime());
  const place = input.place_id === null ? null : await roomFor(actor.cellarId, input.place_id, judged.plan.bottles, transaction);
  if (place?.temperatureC !== null && place && place.temperatureC > input.warmest_store_c) {
    throw new InvalidError('That place is warmer than the bottles were judged for.', { place_id: [`gets ${place.temperatureC} °C; judge the bench with that as the warmest place`] });
  }

  const lot = await writeLot({ actor, batch, input, state, request, judged, at, now, standsC: place?.temperatureC ?? input.cellar_c }, transaction);
  await writeBottles(lot, judged, input.place_id, transaction);
  await emptyVessel({ actor, batch, input, judged, at, now }, lot, transaction);
  await lotJobs({ lot, primed: primes(request), overridden: judged.verdict === 'overridden', now }, transaction);
  await auditBy(actor, judged.verdict === 'overridden' ? 'lot.bottled-against-a-stop' : 'lot.bottled', lot.id, { batch: batchId, code: lot.code, bottles: judged.plan.bottles, reason: judged.verdict === 'overridden' ? judged.reason : null }, transaction);
  await notifyChange({ cellar: actor.cellarId, kind: 'lot', batch: batchId }, transaction);
  await notifyChange({ cellar: actor.cellarId, kind: 'batch', batch: batchId }, transaction);
  return getLot(actor, lot.id, clock, transaction);
}

interface Bottling {
  actor: Actor;
  batch: Batch;
  input: BottleBatchForm;
  state: DrinkState;
  request: BenchRequest;
  judged: Allowed;
  at: Date;
  now: Date;
  /** Where it will stand, °C. */
  standsC: number;
}

async function writeLot({ actor, batch, input, state, request, judged, at, now, standsC }: Bottling, transaction: Transaction): Promise<Lot> {
  await lockCodes(actor.cellarId, transaction);
  const code = input.code ?? (await nextCode(actor.cellarId, at, transaction));
  if (await codeTaken(actor.cellarId, code, transaction)) throw new InvalidError('This code is taken.', { code: ['another lot has it'] });
  const override = judged.verdict === 'overridden' ? judged : null;
  return Lot.create(
    {
      cellarId: actor.cellarId,
      batchId: batch.id,
      code,
      name: input.name ?? batch.name,
      bottledAt: at,
      readyFrom: new Date(readyFrom(at.getTime(), standsC, primes(request)).at),
      volumeL: judged.plan.bottledL,
      originalGravity: state.ledger.effectiveOg,
      finalGravity: request.done.gravity,
      abv: strengthOf(state, request, judged.abvAddedPercent),
      sparkle: sparkleOf(judged, wantedOf(input)),
      bench: kept(input, request, judged),
      overrideReason: override?.reason ?? null,
      overrideBy: override ? actor.personId : null,
      overrideAt: override ? now : null,
      caution: override ? `Bottled against a stop: ${override.headline}. At worst ${override.worstBar.toFixed(1)} bar. Eye protection and gloves; keep it cold and boxed; open outdoors.` : null,
      cost: costOf(state, batch, judged, input),
      createdBy: actor.personId,
    },
    { transaction },
  );
}

function strengthOf(state: DrinkState, request: BenchRequest, added: number): Range | null {
  const og = state.ledger.effectiveOg;
  const gravity = request.done.gravity;
  if (og === null || gravity === null) return null;
  const { value } = strengthByMethods(within(og, READING_DOUBT), within(gravity, READING_DOUBT)).balling;
  return { lo: value.lo, value: value.value + added, hi: value.hi + added };
}

/** By what was wanted, where it was told; else by what is likely in the bottle. */
function sparkleOf(judged: Allowed, wanted: number | null): Lot['sparkle'] {
  const volumes = wanted ?? Math.max(0, ...judged.bottles.map((bottle) => bottle.volumes.value.value));
  return judged.dose.way === 'none' && volumes < SPARKLING_FROM ? 'still' : volumes >= SPARKLING_FROM ? 'sparkling' : volumes >= LIGHT_FROM ? 'light' : 'still';
}

const wantedOf = (input: BottleBatchForm): number | null => (input.priming.way === 'weighed' ? input.priming.wanted_volumes : null);

function kept(input: BottleBatchForm, request: BenchRequest, judged: Allowed): KeptBench {
  return {
    drink: { abvPercent: Math.min(30, request.drink.abvPercent + judged.abvAddedPercent), sugarGPerL: request.drink.sugarGPerL },
    shown: {
      verdict: judged.verdict,
      headline: judged.headline,
      problems: judged.verdict === 'overridden' ? judged.problems.map((problem) => problem.sentence) : [],
      cellar_c: input.cellar_c,
      warmest_store_c: input.warmest_store_c,
      worst_bar: Math.max(0, ...judged.bottles.map((bottle) => bottle.worst.bar)),
      volumes: judged.bottles[0]?.volumes.value ?? null,
      wanted_volumes: wantedOf(input),
      dose: presentDose(judged.dose),
      cautions: [...judged.cautions],
    },
  };
}

/** What of the must sheet's cost went into these bottles; what stays on the lees was paid for all the same. */
function costOf(state: DrinkState, batch: Batch, judged: Allowed, input: BottleBatchForm): KeptCost {
  const outcome = state.makeup.outcome;
  const blended = state.stories.links.some((link) => link.to === batch.id && link.kind !== 'split');
  const part = input.ends_batch ? 1 : Math.min(1, (judged.plan.bottledL + judged.plan.lostL) / batch.volumeL);
  return { must: outcome ? times(outcome.cost.value, batch.mustShare * part) : null, known: outcome !== null && outcome.cost.known && !blended, other: input.other_cost };
}

async function writeBottles(lot: Lot, judged: Allowed, placeId: string | null, transaction: Transaction): Promise<void> {
  for (const [position, bottle] of judged.bottles.entries()) {
    const pressure: KeptPressure = { volumes: bottle.volumes.value.hi, worstVolumes: bottle.worstVolumes.value, cellarBar: bottle.cellar.bar, warmBar: bottle.warm.bar, worstBar: bottle.worst.bar };
    const { rating, confirmed } = bottle.holds;
    const row = await LotBottle.create(
      { cellarId: lot.cellarId, lotId: lot.id, position, kind: bottle.choice.kind, closure: bottle.choice.closure, sizeMl: bottle.choice.sizeMl, ratingBar: rating === 'never' ? null : rating, ratingConfirmed: confirmed, count: bottle.count, pressure },
      { transaction },
    );
    await addBottles({ cellarId: lot.cellarId, lotBottleId: row.id, placeId }, bottle.count, transaction);
  }
}

/** The batch is over, or goes on with what is left. */
async function emptyVessel({ actor, batch, input, judged, at, now }: Omit<Bottling, 'state' | 'request' | 'standsC'>, lot: Lot, transaction: Transaction): Promise<void> {
  const gone = judged.plan.bottledL + judged.plan.lostL;
  const entry = await Entry.create(
    { cellarId: batch.cellarId, batchId: batch.id, kind: 'bottling', at, volumeL: input.ends_batch ? judged.plan.bottledL : Math.min(gone, batch.volumeL), text: `Lot ${lot.code}.`, detail: { lot_id: lot.id, left_l: judged.plan.lostL }, personId: actor.personId, clientId: input.client_id },
    { transaction },
  );
  await answerJobs(actor, batch, entry, now, transaction);
  if (!input.ends_batch) return lessen(batch, Math.min(gone, batch.volumeL), at, transaction);
  await batch.update({ state: 'ended', endedAt: at, updatedAt: at }, { transaction });
  await takeOut({ batchId: batch.id }, at, transaction);
}
