import { settingsToSend } from '@/db/queries/sensor-settings';
import { settingsTopic } from '@/lib/contracts/topics';
import type { SensorSettings } from '@/lib/contracts/telemetry';

/** What is to lie on a sensor's settings topic; an empty payload takes it away. */
export interface OwedSettings {
  topic: string;
  payload: string;
}

/** Settings for the sensors of one cellar, or of every cellar; the house itself asks, for its broker. */
export async function owedSettings(cellarId: string | null): Promise<OwedSettings[]> {
  return (await settingsToSend(cellarId)).map(({ identifier, version, intervalS, gone }) => ({
    topic: settingsTopic(identifier),
    payload: gone ? '' : JSON.stringify({ version, interval_s: intervalS } satisfies SensorSettings),
  }));
}
