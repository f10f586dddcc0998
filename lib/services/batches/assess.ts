import { isDeepStrictEqual } from 'node:util';
import { Op, type Transaction } from 'sequelize';
import { inTransaction } from '@/db/client';
import { Batch, Cellar, Entry } from '@/db/models';
import { tryLockBatch } from '@/db/queries/alert-states';
import { readingsOfBatch } from '@/db/queries/batch-readings';
import { batchState, keepAssessment, saveBatchState } from '@/db/queries/batch-states';
import { judgementMark } from '@/db/queries/judgement-mark';
import { systemClock, type Clock } from '@/lib/clock';
import { presentJudgement, type AssessmentBody, type Drawn } from '@/lib/contracts/assessment';
import { assess } from '@/lib/core/assess';
import { heeded } from '@/lib/core/calls/overruled';
import { CALL_NAMES, type CallName } from '@/lib/core/types';
import { evaluateAlerts } from '@/lib/services/alerts/evaluate';
import { notifyChange } from '@/lib/services/changes';
import { overrulingsOf } from '@/lib/services/entries/overrule';
import { jobsFromCalls } from '@/lib/services/jobs/from-calls';
import { setupOf } from './setup';
import { surroundingsAt } from './surroundings';

/** Points of the curve that the shelf's lanes get; the batch page asks for all. */
const LANE_POINTS = 120;

export interface AssessDeps {
  clock?: Clock;
  /** False while the ingest is or was just down. */
  silenceCounts?: boolean;
}

/** `busy`: another worker is at this batch. `gone`: there is no such batch. */
export type AssessOutcome = 'assessed' | 'ended' | 'busy' | 'gone';

/**
 * Judges a batch as it stands now, keeps the judgement, and moves its alerts:
 * all in one transaction, by one worker at a time. The house does this by
 * itself, so nobody is asked for leave.
 */
export function assessBatch(batchId: string, { clock = systemClock, silenceCounts = true }: AssessDeps = {}): Promise<AssessOutcome> {
  return inTransaction(async (transaction) => {
    if (!(await tryLockBatch(batchId, transaction))) return 'busy';
    const batch = await Batch.findByPk(batchId, { transaction });
    if (!batch) return 'gone';
    const cellar = await Cellar.findByPk(batch.cellarId, { transaction, rejectOnEmpty: true });
    const now = clock.now();
    const ended = batch.state === 'ended';
    // An ended batch stands as it ended.
    const at = batch.endedAt?.getTime() ?? now;
    // Before the log is read: what is written meanwhile makes the judgement out of date.
    const mark = (await judgementMark(batch.cellarId, batchId, transaction)) ?? '';
    const entries = await Entry.findAll({ where: { batchId, removedAt: { [Op.is]: null } }, transaction });
    const readings = await readingsOfBatch(batchId, at, transaction);
    const setup = setupOf(batch, entries, cellar.timeZone, await surroundingsAt(batchId, at, transaction));
    const judgement = assess(setup, readings, at);

    await keep(batch, presentJudgement(judgement), mark, new Date(at), transaction);
    if (ended) {
      await evaluateAlerts({ batch, cellar, assessment: null, context: { neck: batch.neck, events: [], silenceCounts }, at: now }, transaction);
      await jobsFromCalls(batch, null, [], now, transaction);
      return 'ended';
    }
    // What a person has overruled alerts nobody and makes no job; the judgement is kept as it is.
    const acted = heeded(judgement.assessment, overrulingsOf(entries));
    await evaluateAlerts({ batch, cellar, assessment: acted, context: { neck: batch.neck, events: setup.events, silenceCounts }, at }, transaction);
    await jobsFromCalls(batch, acted, entries, at, transaction);
    return 'assessed';
  });
}

/** Keeps the judgement for the screens, and for later where a verdict changed; says so where anything did. */
async function keep(batch: Batch, { curve, expected, gas, footing, ...assessment }: Drawn, mark: string, at: Date, transaction: Transaction): Promise<void> {
  const { id: batchId, cellarId } = batch;
  const before = (await batchState<AssessmentBody>(batchId, transaction))?.assessment ?? null;
  await saveBatchState({ batchId, cellarId, at, mark, assessment, curve: thinned(curve), expected: thinned(expected), drawing: { curve, expected, gas, footing } }, transaction);
  const changed = changedCalls(before, assessment);
  if (changed.length) await keepAssessment({ cellarId, batchId, at, changed, assessment }, transaction);
  const same = before !== null && isDeepStrictEqual({ ...before, at: null }, { ...assessment, at: null });
  // Figures move with every reading; another program hears when a call changes.
  if (!same) await notifyChange({ cellar: cellarId, kind: 'assessment', batch: batchId }, transaction, { toWebhooks: changed.length > 0 });
}

function changedCalls(before: AssessmentBody | null, after: AssessmentBody): CallName[] {
  return CALL_NAMES.filter((name) => {
    const [old, now] = [before?.calls[name], after.calls[name]];
    return old?.verdict !== now.verdict || old?.kind !== now.kind;
  });
}

/** At most LANE_POINTS of them, evenly, with the first and the last. */
function thinned<T>(points: readonly T[]): T[] {
  if (points.length <= LANE_POINTS) return [...points];
  const step = (points.length - 1) / (LANE_POINTS - 1);
  return Array.from({ length: LANE_POINTS }, (_, index) => points[Math.round(index * step)]!);
}
