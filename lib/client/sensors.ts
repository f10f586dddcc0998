'use client';

import type { z } from 'zod';
import type { SurroundingsBody } from '../contracts/surroundings';
import type { CreatedSensorBody, createSensor as createSensorSchema, rawReadingList, refusedList, SensorBody, SensorHealthBody, SensorHealthList, SensorLimits, sensorList, stayList, UpdateSensor } from '../contracts/sensors';
import { sendJson, withQuery } from './fetcher';
import { isPath, refresh, useResource } from './use-resource';

export function useSensors(query: { limit?: number; cursor?: string } = {}) {
  const { data, ...rest } = useResource<z.infer<typeof sensorList>>(withQuery('/sensors', query));
  return { sensors: data?.items, nextCursor: data?.next_cursor ?? null, ...rest };
}

export function useSensor(id: string | null) {
  const { data, ...rest } = useResource<SensorBody>(id && `/sensors/${id}`);
  return { sensor: data, ...rest };
}

/** What the sensor sent that was not taken, and why, newest first; asked for again every so often where somebody waits for it. */
export function useRefusals(sensorId: string | null, everyMs = 0) {
  const { data, ...rest } = useResource<z.infer<typeof refusedList>>(sensorId && `/sensors/${sensorId}/refusals`, { refreshInterval: everyMs });
  return { refusals: data?.items, ...rest };
}

/** The answer holds the secret, this one time. */
export async function createSensor(input: z.input<typeof createSensorSchema>): Promise<CreatedSensorBody> {
  const sensor = await sendJson<CreatedSensorBody>('POST', '/sensors', input);
  await refresh(isPath('/sensors'));
  return sensor;
}

/** Renames, switches off, or moves it: `batch_id` null takes it out. */
export async function updateSensor(id: string, input: UpdateSensor): Promise<SensorBody> {
  const sensor = await sendJson<SensorBody>('PATCH', `/sensors/${id}`, input);
  await refresh((path) => path.startsWith('/sensors') || path.startsWith('/batches') || isPath('/shelf')(path));
  return sensor;
}

export const useSensorHealth = (id: string) => useResource<SensorHealthBody>(`/sensors/${id}/health`);
/** Of all of them; asked again by the minute, since days and gaps move slowly. */
export const useSensorsHealth = () => useResource<SensorHealthList>('/sensor-health', { refreshInterval: 60_000 });
export const useStays = (id: string) => useResource<z.infer<typeof stayList>>(`/sensors/${id}/stays`);
export const useRawReadings = (id: string, limit: number, everyMs = 0) => useResource<z.infer<typeof rawReadingList>>(withQuery(`/sensors/${id}/readings`, { limit }), { refreshInterval: everyMs });
/** What the probes around a batch say; asked again by the minute, since they speak on their own. */
export const useSurroundings = (batchId: string) => useResource<SurroundingsBody>(`/batches/${batchId}/surroundings`, { refreshInterval: 60_000 });
export const useSensorLimits = () => useResource<SensorLimits>('/sensor-limits');

const ofSensors = (path: string) => path.startsWith('/sensors') || path.startsWith('/batches') || isPath('/shelf')(path);

/** The answer holds the new secret, this one time; the old one ends at once. */
export async function rotateSensor(id: string): Promise<CreatedSensorBody> {
  const sensor = await sendJson<CreatedSensorBody>('POST', `/sensors/${id}/secret`);
  await refresh(isPath(`/sensors/${id}`));
  return sensor;
}

export async function removeSensor(id: string): Promise<void> {
  await sendJson('DELETE', `/sensors/${id}`);
  await refresh(isPath('/sensors'));
}

/** Sends a reporting interval down to the sensor. */
export async function setSensor(id: string, intervalS: number): Promise<void> {
  await sendJson('POST', `/sensors/${id}/settings`, { interval_s: intervalS });
  await refresh(ofSensors);
}

export async function setSensorLimits(input: Partial<SensorLimits>): Promise<void> {
  await sendJson('PATCH', '/sensor-limits', input);
  await refresh((path) => path.startsWith('/sensor'));
}
