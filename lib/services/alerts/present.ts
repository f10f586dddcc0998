import type { AlertRow } from '@/db/queries/alerts';
import { alertSchema, type AlertBody } from '@/lib/contracts/alerts';
import { presentCall } from '@/lib/contracts/assessment';
import { ruleAsSet, ruleNamed } from '@/lib/core/alerts/rules';

const iso = (at: string | Date | null) => (at === null ? null : new Date(at).toISOString());

export function presentGone({ rule: name, at, keepMin }: NonNullable<AlertRow['gone']>): AlertBody['gone'] {
  const usual = ruleNamed(name);
  const { rule } = ruleAsSet(usual, [{ rule: usual.name, ofBatch: true, enabled: true, forMin: null, keepMin }]);
  return { since: new Date(at).toISOString(), kept_until: new Date(at + rule.keepMs).toISOString() };
}

/** What goes over the wire for an alert. */
export function presentAlert(row: AlertRow): AlertBody {
  const { batch } = row;
  return alertSchema.parse({
    id: row.id,
    batch: { id: batch.id, name: batch.name, tag: batch.tag, vessel_kind: batch.vesselKind, drink_colour: batch.drinkColour, neck: batch.neck, volume_l: batch.volumeL, vessel_l: batch.vesselL },
    call: row.call,
    kind: row.kind,
    level: row.level,
    state: row.state,
    since: iso(row.since),
    opened_at: iso(row.openedAt),
    acknowledged_at: iso(row.acknowledgedAt),
    acknowledged_by: row.acknowledgedBy,
    note: row.note,
    look_again_at: iso(row.lookAgainAt),
    resolved_at: iso(row.resolvedAt),
    resolved_by: row.resolvedBy,
    gone: row.gone && presentGone(row.gone),
    evidence: presentCall(row.evidence),
    told: row.told.map((one) => ({ person: one.person, means: one.means, at: iso(one.at), state: one.state, held_by: one.state === 'held' ? one.heldBy : null, due: one.state === 'held' ? iso(one.due) : null, error: one.error })),
    muted_until: iso(row.mutedUntil),
  });
}
