'use client';

import type { z } from 'zod';
import type { CalibrationBody, calibrationForm, calibrationPointForm, CalibrationPointBody, CalibrationVersionBody, offsetForm } from '../contracts/calibration';
import { sendJson } from './fetcher';
import { refresh, useResource } from './use-resource';

export const useCalibration = (sensor: string) => useResource<CalibrationBody>(`/sensors/${sensor}/calibration`);

const again = () => refresh((path) => path.startsWith('/sensors') || path.startsWith('/batches'));
const at = (sensor: string, rest: string) => `/sensors/${sensor}/calibration/${rest}`;

async function sendAndRefresh<T>(method: 'POST' | 'DELETE', path: string, body?: unknown): Promise<T> {
  const answer = await sendJson<T>(method, path, body);
  await again();
  return answer;
}

export const addPoint = (sensor: string, input: z.input<typeof calibrationPointForm>) => sendAndRefresh<CalibrationPointBody>('POST', at(sensor, 'points'), input);
/** A hydrometer reading of the log as a point. */
export const pairPoint = (sensor: string, entryId: string) => sendAndRefresh<CalibrationPointBody>('POST', at(sensor, 'pairs'), { entry_id: entryId });
export const removePoint = (sensor: string, point: string) => sendAndRefresh<null>('DELETE', at(sensor, `points/${point}`));
export const keepCalibration = (sensor: string, input: z.input<typeof calibrationForm>) => sendAndRefresh<CalibrationVersionBody>('POST', at(sensor, 'versions'), input);
export const keepOffset = (sensor: string, input: z.input<typeof offsetForm>) => sendAndRefresh<CalibrationVersionBody>('POST', at(sensor, 'offset'), input);
export const takeBackCalibration = (sensor: string, version: number) => sendAndRefresh<null>('DELETE', at(sensor, `versions/${version}`));
