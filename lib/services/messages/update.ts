import { inTransaction } from '@/db/client';
import { messageTimesOf, saveChoice, saveEscalation, saveMessageTimes, saveRuleSetting, tellable } from '@/db/queries/messages';
import { askHeldAgain } from '@/db/queries/outbox';
import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import { systemClock, type Clock } from '@/lib/clock';
import type { MessagesBody, UpdateEscalation, UpdateMessages, UpdateRule } from '@/lib/contracts/messages';
import { ruleNamed } from '@/lib/core/alerts/rules';
import { wantedUsually } from '@/lib/core/alerts/telling';
import { InvalidError } from '@/lib/errors';
import { auditBy } from '../audit/write';
import { loadBatch } from '../batches/load';
import { notifyChange } from '../changes';
import { presentMessages } from './present';

interface Deps {
  clock?: Clock;
}

/** The person's own: what they hear of in this cellar, their quiet hours and morning digest in all of them. */
export async function updateMessages(actor: Actor, signInId: string | null, { quiet, digest_at, choices }: UpdateMessages, { clock = systemClock }: Deps = {}): Promise<MessagesBody> {
  authorize(actor, 'alerts.read');
  const now = new Date(clock.now());
  await inTransaction(async (transaction) => {
    for (const { rule, means, wanted } of choices ?? []) {
      const usual = wantedUsually(ruleNamed(rule).level, means);
      await saveChoice(actor.cellarId, actor.personId, { rule, means, wanted: wanted === usual ? null : wanted }, transaction);
    }
    if (quiet === undefined && digest_at === undefined) return;
    const before = await messageTimesOf(actor.personId, transaction);
    const times = {
      quiet: quiet === undefined ? before.quiet : quiet && { fromMin: quiet.from, toMin: quiet.to },
      digestMin: digest_at === undefined ? before.digestMin : digest_at,
    };
    await saveMessageTimes(actor.personId, times, transaction);
    // What the old hours hold back is looked at again by the new ones.
    if (quiet !== undefined) await askHeldAgain(actor.personId, now, transaction);
  });
  return presentMessages(actor, signInId, now);
}

/** Sets a rule for the cellar, or for one batch of it. */
export async function updateRule(actor: Actor, signInId: string | null, input: UpdateRule, { clock = systemClock }: Deps = {}): Promise<MessagesBody> {
  authorize(actor, 'cellar.manage');
  const { rule, batch_id: batchId, usual, enabled, for_min: forMin, keep_min: keepMin } = input;
  await inTransaction(async (transaction) => {
    if (batchId !== null) await loadBatch(actor.cellarId, batchId, transaction);
    // For a batch "on as usual" is kept too: it may be off in the cellar.
    const nothing = usual || (batchId === null && enabled && forMin === null && keepMin === null);
    await saveRuleSetting(actor.cellarId, batchId, nothing ? { rule } : { rule, enabled, forMin, keepMin }, transaction);
    await auditBy(actor, 'rule.set', batchId ?? actor.cellarId, { rule, ...(nothing ? { usual: true } : { enabled, for_min: forMin, keep_min: keepMin }) }, transaction);
    await notifyChange({ cellar: actor.cellarId, kind: 'alert', batch: batchId }, transaction);
  });
  return presentMessages(actor, signInId, new Date(clock.now()));
}

/** Who is told next where nobody answers. */
export async function updateEscalation(actor: Actor, signInId: string | null, { after_min: afterMin, people }: UpdateEscalation, { clock = systemClock }: Deps = {}): Promise<MessagesBody> {
  authorize(actor, 'cellar.manage');
  await inTransaction(async (transaction) => {
    const known = new Set((await tellable(actor.cellarId, transaction)).map(({ id }) => id));
    if (people.some((id) => !known.has(id))) throw new InvalidError('Somebody named cannot be told of alerts here.', { people: ['must be people of this cellar who are not guests'] });
    await saveEscalation(actor.cellarId, { afterMin, order: people }, transaction);
    await auditBy(actor, 'escalation.set', actor.cellarId, { after_min: afterMin, people }, transaction);
  });
  return presentMessages(actor, signInId, new Date(clock.now()));
}
