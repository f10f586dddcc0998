import { readFileSync } from 'node:fs';
import { z } from 'zod';
import { timestamp } from '@/lib/contracts/common';
import { isSensorIdentifier } from '@/lib/contracts/topics';

/** In DATA_DIR: the simulated sensors of the demo. Holds their secrets; written for the owner alone. */
export const SIMULATORS_FILE = 'simulators.json';

export const simulatedSensor = z.object({
  sensor: z.string().refine(isSensorIdentifier, 'is not a sensor identifier'),
  secret: z.string().min(1),
  scenario: z.string().min(1),
  seed: z.number().int(),
  /** The pitch: readings at a time depend on it, on the scenario, the seed and the interval. */
  startedAt: timestamp,
  interval_s: z.number().min(10).max(86_400).default(900),
});
export type SimulatedSensor = z.infer<typeof simulatedSensor>;

/** A list that cannot be used, said in one sentence. */
export class SensorsFileError extends Error {
  override name = 'SensorsFileError';
}

/** Reads the list. @returns null when there is no such file. @throws SensorsFileError */
export function readSensorsFile(path: string): SimulatedSensor[] | null {
  let text: string;
  try {
    text = readFileSync(path, 'utf8');
  } catch (error) {
    if (error instanceof Error && 'code' in error && error.code === 'ENOENT') return null;
    throw new SensorsFileError(`${path} cannot be read: ${error instanceof Error ? error.message : String(error)}`);
  }
  let content: unknown;
  try {
    content = JSON.parse(text);
  } catch {
    throw new SensorsFileError(`${path} is not JSON. Delete it and start the demo again.`);
  }
  const parsed = z.array(simulatedSensor).safeParse(content);
  if (parsed.success) return parsed.data;
  const [issue] = parsed.error.issues;
  throw new SensorsFileError(`${path} is wrong at ${issue?.path.join('.')}: ${issue?.message}. Delete it and start the demo again.`);
}
