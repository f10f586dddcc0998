import { randomUUID } from 'node:crypto';
import { isDeepStrictEqual } from 'node:util';
import type { Transaction } from 'sequelize';
import { Alert, ImportRun } from '@/db/models';
import { lockAlertStates, saveAlertState } from '@/db/queries/alert-states';
import { ruleSettingsOf } from '@/db/queries/messages';
import { dropHeld } from '@/db/queries/outbox';
import { notifyChange } from '@/lib/services/changes';
import { lookAt, type LookContext } from '@/lib/core/alerts/look';
import { INACTIVE, isUp, step, type AlertEvent, type AlertState, type Look } from '@/lib/core/alerts/machine';
import { ALERT_RULES, ruleAsSet, type AlertRule } from '@/lib/core/alerts/rules';
import type { Assessment, Call, Instant } from '@/lib/core/types';
import type { AlertPayload } from '@/lib/mail/payload';
import { alertPayload, type BatchName, type CellarName } from './payload';
import { tell, toldAsAsked, toldBefore, toldFirst } from './tell';

interface Judged {
  batch: BatchName;
  cellar: CellarName;
  /** Null: the batch is over, and so is all that could be said of it. */
  assessment: Assessment | null;
  context: LookContext;
  at: Instant;
}

/** Where one rule stands, and the alert it has up. */
interface Standing {
  state: AlertState;
  alert: Alert | null;
}

/**
 * Moves every rule of a batch one step, and carries out what the steps decide:
 * the alert's row, the state of the machine and the messages owed are written in
 * the one transaction given.
 * @returns whether anything a person sees has changed
 */
export async function evaluateAlerts(judged: Judged, transaction: Transaction): Promise<boolean> {
  const { batch, at } = judged;
  const rows = await lockAlertStates(batch.id, transaction);
  const ids = rows.flatMap((row) => (row.alertId === null ? [] : [row.alertId]));
  const alerts = ids.length ? await Alert.findAll({ where: { id: ids }, transaction }) : [];

  const settings = await ruleSettingsOf(batch.cellarId, batch.id, transaction);

  let seen = false;
  let heard = false;
  const hushedUntil = await hushedTo(batch, transaction);
  for (const usual of ALERT_RULES) {
    const { rule, enabled } = ruleAsSet(usual, settings);
    const row = rows.find((item) => item.rule === rule.name);
    const before: Standing = { state: row?.state ?? INACTIVE, alert: alerts.find((item) => item.id === row?.alertId) ?? null };
    const look: Look = judged.assessment && enabled ? lookAt(rule, judged.assessment, judged.context, at) : { type: 'end' };
    const { state, events } = step(rule, before.state, look, at);
    const call = judged.assessment?.calls[rule.call] ?? null;
    let alert = before.alert;
    for (const event of events) {
      const hushed = event.type === 'opened' && at - rule.forMs <= hushedUntil;
      alert = await carryOut({ judged, rule, call, event, alert, hushed }, transaction);
      heard ||= !hushed;
    }
    // A silence that proves nothing of its sensor lasts all the same: the alert says no shorter one than the shelf.
    const stands = look.type === 'true' || (state.phase === 'open' && alert?.kind === 'silent' && call?.kind === 'silent');
    if (alert && call && stands && isUp(state) && !isDeepStrictEqual(alert.evidence, call)) {
      heard ||= alert.kind !== call.kind;
      seen ||= !isDeepStrictEqual(read(alert.evidence), read(call));
      await alert.update({ kind: call.kind, evidence: call }, { transaction });
    }
    seen ||= isUp(state) && isUp(before.state) && state.phase !== before.state.phase;
    const alertId = state.phase === 'inactive' || state.phase === 'pending' ? null : (alert?.id ?? null);
    const changed = alertId !== (row?.alertId ?? null) || !isDeepStrictEqual(state, before.state);
    if (changed) await saveAlertState(batch.id, { rule: rule.name, state, alertId }, transaction);
    seen ||= events.length > 0;
  }
  if (seen) await notifyChange({ cellar: batch.cellarId, kind: 'alert', batch: batch.id }, transaction, { toWebhooks: heard });
  return seen;
}

/** What a person reads of a call; its figures alone move with every look. */
const read = ({ kind, headline, reason }: Call) => ({ kind, headline, reason });

interface Happened {
  judged: Judged;
  rule: AlertRule;
  call: Call | null;
  event: AlertEvent;
  alert: Alert | null;
  /** It is shown, and nobody is told. */
  hushed: boolean;
}

/** A first look at a batch that came in finds what was so all along. */
const HUSH_MS = 3_600_000;

/** What is seen until then wakes nobody: a batch brought it from another house, where it was known. */
async function hushedTo({ importId }: BatchName, transaction: Transaction): Promise<number> {
  const run = importId && (await ImportRun.findByPk(importId, { attributes: ['createdAt'], transaction }));
  return run ? run.createdAt.getTime() + HUSH_MS : -Infinity;
}

/** Writes what one event means. Returns the alert that it concerns. */
async function carryOut({ judged, rule, call, event, alert, hushed }: Happened, transaction: Transaction): Promise<Alert | null> {
  const { batch, cellar, at } = judged;
  const message = async (subject: Alert, name: AlertPayload['event'], key: string, people: Parameters<typeof tell>[1], shown: Call) => {
    const payload = alertPayload({ alertId: subject.id, rule, event: name, call: shown, since: subject.since.getTime(), at, batch, cellar });
    await tell({ cellarId: batch.cellarId, alertId: subject.id, key: `alert:${subject.id}:${key}`, payload, level: rule.level, at }, people, transaction);
  };

  switch (event.type) {
    case 'opened': {
      if (!call) throw new Error('An alert opens on a call.');
      const { cellarId, id: batchId } = batch;
      const opened = await Alert.create(
        { id: randomUUID(), cellarId, batchId, call: rule.call, kind: call.kind, level: rule.level, state: 'open', since: new Date(event.since), openedAt: new Date(at), evidence: call },
        { transaction },
      );
      if (!hushed) await message(opened, 'opened', 'opened', await toldFirst(cellarId, rule, transaction), call);
      return opened;
    }
    case 'repeated':
      if (alert && call) await message(alert, 'repeated', `repeated-${event.count}`, await toldBefore(alert.id, transaction), call);
      return alert;
    case 'look_again':
      if (alert?.acknowledgedBy) await message(alert, 'look_again', `look-again-${at}`, await toldAsAsked(batch.cellarId, rule, alert.acknowledgedBy, transaction), call ?? alert.evidence);
      return alert;
    case 'resolved':
      if (!alert) return null;
      await alert.update({ state: 'resolved', resolvedAt: new Date(at) }, { transaction });
      // Whoever was still to be told need not hear of it at all.
      await dropHeld(alert.id, new Date(at), 'it had passed before its time came', transaction);
      if (rule.tellsEnd && event.by === 'data') await message(alert, 'resolved', 'resolved', await toldBefore(alert.id, transaction), alert.evidence);
      return alert;
    case 'taken':
      return alert;
  }
}
