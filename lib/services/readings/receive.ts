import type { SensorIdentity } from '@/lib/auth/sensors';
import { systemClock, type Clock } from '@/lib/clock';
import { telemetryResult, type TelemetryResult } from '@/lib/contracts/telemetry';
import type { BodyForm } from './parse';
import { recordMessages } from './record';
import { notesOf } from './sensor-book';

/** Takes in one message over HTTP, as the ingest does over MQTT; when it returns, all of it is committed. */
export async function receiveReadings(sensor: SensorIdentity, body: Buffer, form: BodyForm, { clock = systemClock }: { clock?: Clock } = {}): Promise<TelemetryResult> {
  const { stored, duplicates, refused } = await recordMessages([{ sensor, road: 'http', body, form, arrivedAt: clock.now() }]);
  const notes = (await notesOf([sensor.id], systemClock.now())).get(sensor.id);
  // Told until the sensor says that it has them.
  const owed = notes && notes.wantedIntervalS !== null && notes.settingsVersion > (notes.confirmedVersion ?? 0);
  return telemetryResult.parse({
    stored,
    duplicates,
    refused: refused.flat().map(({ index, reason }) => ({ index, reason })),
    ...(owed && { settings: { version: notes.settingsVersion, interval_s: notes.wantedIntervalS } }),
  });
}
