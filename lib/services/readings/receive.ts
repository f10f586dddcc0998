import type { SensorIdentity } from '@/lib/auth/sensors';
import { systemClock, type Clock } from '@/lib/clock';
import { telemetryResult, type TelemetryResult } from '@/lib/contracts/telemetry';
import type { BodyForm } from './parse';
import { recordMessages } from './record';

/** Takes in one message over HTTP, as the ingest does over MQTT; when it returns, all of it is committed. */
export async function receiveReadings(sensor: SensorIdentity, body: Buffer, form: BodyForm, { clock = systemClock }: { clock?: Clock } = {}): Promise<TelemetryResult> {
  const { stored, duplicates, refused } = await recordMessages([{ sensor, road: 'http', body, form, arrivedAt: clock.now() }]);
  return telemetryResult.parse({ stored, duplicates, refused: refused.flat().map(({ index, reason }) => ({ index, reason })) });
}
