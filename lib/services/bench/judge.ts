import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import { systemClock, type Clock } from '@/lib/clock';
import type { BenchForm, BenchVerdictBody } from '@/lib/contracts/bench';
import { judgeBench } from '@/lib/core/bottling/verdict';
import { loadBatch } from '../batches/load';
import { drinkState } from '../drink/state';
import { presentVerdict } from './present';
import { benchRequest } from './request';

/** Safe or stop, with the pressure in every bottle. A stop says what is wrong and the ways out, and holds no dose. */
export async function judge(actor: Actor, batchId: string, form: BenchForm, clock: Clock = systemClock): Promise<BenchVerdictBody> {
  authorize(actor, 'batches.read');
  const state = await drinkState(await loadBatch(actor.cellarId, batchId), new Date(clock.now()));
  return presentVerdict(judgeBench((await benchRequest(state, form)).request), form);
}
