import type { Transaction } from 'sequelize';
import type { Batch } from '@/db/models';
import { feedDue, type Feed } from '@/lib/core/rounds/feed';
import type { Assessment, Instant } from '@/lib/core/types';
import { drinkState, lastFedAt } from '../drink/state';

/** What a batch is to be fed now; nothing where its must sheet does not tell what its yeast needs. */
export async function feedOf(batch: Batch, assessment: Assessment, at: Instant, transaction: Transaction): Promise<Feed | null> {
  if (!batch.mustVersionId) return null;
  const state = await drinkState(batch, new Date(at), transaction);
  const { nitrogen } = state.makeup;
  const og = state.ledger.effectiveOg;
  if (og === null || nitrogen.neededMgL === null || state.expectedFinal === null) return null;
  return feedDue({
    stage: assessment.stage,
    fedAt: lastFedAt(state.entries)?.getTime() ?? null,
    at,
    volumeL: batch.volumeL,
    neededMgL: nitrogen.neededMgL,
    givenMgL: nitrogen.givenMgL,
    givenG: nitrogen.complexG,
    originalGravity: og,
    gravity: state.gravity,
    expectedFinal: state.expectedFinal.value,
    abvPercent: state.strength?.balling.value.value ?? 0,
  });
}
