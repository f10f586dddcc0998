import type { Batch, Cellar } from '@/db/models';
import type { AlertRule } from '@/lib/core/alerts/rules';
import type { Call, Instant } from '@/lib/core/types';
import type { AlertPayload } from '@/lib/mail/payload';

export type BatchName = Pick<Batch, 'id' | 'cellarId' | 'importId' | 'name' | 'tag' | 'place' | 'vesselKind'>;
export type CellarName = Pick<Cellar, 'id' | 'name' | 'timeZone'>;

interface Told {
  alertId: string;
  rule: AlertRule;
  event: AlertPayload['event'];
  call: Call;
  since: Instant;
  at: Instant;
  batch: BatchName;
  cellar: CellarName;
}

/** What a mail about an alert is made from. */
export function alertPayload({ alertId, rule, event, call, since, at, batch, cellar }: Told): AlertPayload {
  return {
    template: 'alert',
    event,
    at: new Date(at).toISOString(),
    alert: {
      id: alertId,
      rule: rule.name,
      level: rule.level,
      kind: call.kind,
      since: new Date(since).toISOString(),
      headline: call.headline,
      reason: call.reason,
      act: call.act,
      changes_it: call.changesIt,
      evidence: call.evidence.map(({ name, value, threshold, unit }) => ({ name, value, threshold, unit })),
    },
    batch: { id: batch.id, name: batch.name, tag: batch.tag, place: batch.place, vessel: batch.vesselKind },
    cellar: { name: cellar.name, time_zone: cellar.timeZone },
  };
}
