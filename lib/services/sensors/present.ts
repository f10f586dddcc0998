import type { SensorRow } from '@/db/queries/sensors';
import type { SensorBody } from '@/lib/contracts/sensors';

const iso = (at: string | Date) => new Date(at).toISOString();

/** What goes over the wire for a sensor; its secret's hash never does. */
export function presentSensor(row: SensorRow): SensorBody {
  return {
    id: row.identifier,
    name: row.name,
    kind: row.kind === 'file' ? 'float' : row.kind,
    interval_s: row.intervalS,
    disabled: row.disabledAt !== null,
    place: row.place,
    created_at: iso(row.createdAt),
    batch: row.batch && { id: row.batch.id, name: row.batch.name, since: iso(row.batch.since) },
    last: row.last && {
      measured_at: iso(row.last.measuredAt),
      received_at: iso(row.last.receivedAt),
      gravity: row.last.gravity,
      temperature: row.last.temperature,
      battery: row.last.battery,
      signal: row.last.signal,
    },
    refused_24h: row.refused24h,
    settings:
      row.settingsAt && row.wantedIntervalS !== null
        ? { version: row.settingsVersion, interval_s: row.wantedIntervalS, sent_at: iso(row.settingsAt), confirmed_at: row.confirmedAt && row.confirmedVersion === row.settingsVersion ? iso(row.confirmedAt) : null }
        : null,
    calibration: row.calibration && { version: row.calibration.version, applies_from: iso(row.calibration.appliesFrom) },
  };
}
