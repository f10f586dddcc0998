'use client';

import type { z } from 'zod';
import type { CreatedSensorBody, createSensor as createSensorSchema, refusedList, SensorBody, sensorList, UpdateSensor } from '../contracts/sensors';
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

/** What the sensor sent that was not taken, and why, newest first. */
export function useRefusals(sensorId: string | null) {
  const { data, ...rest } = useResource<z.infer<typeof refusedList>>(sensorId && `/sensors/${sensorId}/refusals`);
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
