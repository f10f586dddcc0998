import { Op, type Transaction } from 'sequelize';
import { Alert, Job, type Batch, type Entry } from '@/db/models';
import { batchState } from '@/db/queries/batch-states';
import type { Actor } from '@/lib/auth/policies';
import type { AssessmentBody } from '@/lib/contracts/assessment';
import type { EntryDetail } from '@/lib/contracts/batches';
import type { Overruling } from '@/lib/core/calls/overruled';
import type { CallName } from '@/lib/core/types';
import { ConflictError } from '@/lib/errors';
import { clearAlert } from '../alerts/resolve';
import { CALL_OF_KIND } from '@/lib/core/rounds/wanted';

/** What the program said when it was overruled: the log keeps both. */
export async function saidThen(batch: Batch, call: CallName, transaction: Transaction): Promise<NonNullable<EntryDetail['said']>> {
  const judged = (await batchState<AssessmentBody>(batch.id, transaction))?.assessment.calls[call];
  if (!judged) throw new ConflictError('It is not judged yet, so that there is nothing to overrule.');
  return { verdict: judged.verdict, kind: judged.kind, headline: judged.headline };
}

/** Nobody is told of it any more, and it leaves the rounds. */
export async function quieten(actor: Actor, batch: Batch, call: CallName, reason: string | null, now: Date, transaction: Transaction): Promise<void> {
  const alerts = await Alert.findAll({ where: { batchId: batch.id, call, state: { [Op.ne]: 'resolved' } }, transaction });
  for (const alert of alerts) await clearAlert(actor, alert.id, reason, now.getTime(), transaction);
  const kinds = Object.entries(CALL_OF_KIND).flatMap(([kind, of]) => (of === call ? [kind] : []));
  await Job.update({ droppedAt: now, overAt: now }, { where: { batchId: batch.id, source: 'call', kind: kinds, doneAt: null, droppedAt: null, overAt: null }, transaction });
}

/** The last word of a person on each call, by their entries. */
export function overrulingsOf(entries: readonly Pick<Entry, 'kind' | 'at' | 'detail'>[]): Overruling[] {
  const last = new Map<CallName, Overruling>();
  for (const entry of [...entries].sort((a, b) => a.at.getTime() - b.at.getTime())) {
    const detail = (entry.detail ?? null) as EntryDetail | null;
    if (entry.kind === 'overrule' && detail?.call && detail.said) last.set(detail.call, { call: detail.call, verdict: detail.said.verdict, kind: detail.said.kind });
  }
  return [...last.values()];
}
