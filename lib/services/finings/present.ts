import type { FiningRun } from '@/db/models';
import type { FiningBody } from '@/lib/contracts/family';
import { FININGS, finingState } from '@/lib/core/additions/fining';
import { iso, isoOrNull } from '../iso';

export function presentFining(run: FiningRun, now: number): FiningBody {
  const fining = FININGS.find((item) => item.key === run.fining);
  const state = finingState({ intervalMin: run.intervalMin, settleDays: run.settleDays, firstAt: run.firstAt.getTime(), secondAt: run.secondAt?.getTime() ?? null }, now);
  return {
    id: run.id,
    batch_id: run.batchId,
    fining: run.fining,
    name: fining?.name ?? run.fining,
    parts: [...(fining?.parts ?? [])],
    first_at: iso(run.firstAt),
    second_at: isoOrNull(run.secondAt),
    interval_min: run.intervalMin,
    settle_days: run.settleDays,
    state: state.state,
    due_at: 'dueAt' in state ? iso(state.dueAt) : null,
    late_min: state.state === 'second_due' ? state.lateMin : null,
    bright_from: 'brightFrom' in state ? iso(state.brightFrom) : null,
    allergens: [...(fining?.allergens ?? [])],
    caution: fining?.caution ?? '',
  };
}
