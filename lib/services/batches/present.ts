import type { BatchRow } from '@/db/queries/batches';
import { may, type Actor } from '@/lib/auth/policies';
import type { AssessmentBody } from '@/lib/contracts/assessment';
import type { BatchBody } from '@/lib/contracts/batches';

const iso = (at: string | Date | null) => (at === null ? null : new Date(at).toISOString());

/** What goes over the wire for a batch; alerts only to those who may see them. */
export function presentBatch(row: BatchRow, actor: Actor): BatchBody {
  return {
    id: row.id,
    name: row.name,
    kind: row.kind,
    drink_colour: row.drinkColour,
    vessel_kind: row.vesselKind,
    tag: row.tag,
    place: row.place,
    volume_l: row.volumeL,
    vessel_l: row.vesselL,
    neck: row.neck,
    pitched_at: iso(row.pitchedAt),
    original_gravity: row.originalGravity,
    yeast: row.yeast,
    attenuation_min_percent: row.attenuationMinPercent,
    attenuation_max_percent: row.attenuationMaxPercent,
    alcohol_tolerance_abv: row.alcoholToleranceAbv,
    temperature_min_c: row.temperatureMinC,
    temperature_max_c: row.temperatureMaxC,
    state: row.state,
    ended_at: iso(row.endedAt),
    created_at: row.createdAt.toISOString(),
    must: row.must && { id: row.must.id, version_id: row.must.versionId, name: row.must.name, version: row.must.version },
    sensor: row.sensor && { id: row.sensor.id, name: row.sensor.name, last_heard_at: iso(row.sensor.lastHeardAt) },
    // Written by the worker in this form; the response schema checks it again.
    assessment: row.assessment as AssessmentBody | null,
    overruled: row.overruled.map((one) => ({ ...one, call: one.call as BatchBody['overruled'][number]['call'], instead: one.instead === 'yes' || one.instead === 'no' ? one.instead : null, at: new Date(one.at).toISOString() })),
    alerts: may(actor.role, 'alerts.read')
      ? row.alerts.map((alert) => ({ id: alert.id, call: alert.call, state: alert.state, opened_at: new Date(alert.openedAt).toISOString(), taken_by: alert.takenBy }))
      : [],
  };
}
