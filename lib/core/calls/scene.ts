import type { Estimate, Instant } from '../types';
import type { Watch } from '../stages/watch';
import { whenWords } from './words';

/** What the calls of one moment have in common. */
export interface Scene {
  watch: Watch;
  at: Instant;
  /** Hours since the pitch. */
  hour: number;
  timeZone: string;
  /** Calibrated level now, points. */
  level: number | null;
  rate: { value: number; sd: number } | null;
  gas: Estimate | null;
  temperature: number | null;
  /** Hours since the last reading; null where there never was one. */
  silentH: number | null;
  silent: boolean;
}

export const sinceOf = (scene: Scene, hour: number | null): Instant | null =>
  hour === null ? null : Math.min(scene.at, scene.watch.track.instantOf(hour));

export const when = (scene: Scene, at: Instant): string => whenWords(at, scene.at, scene.timeZone);

/** The instant so many hours from now. */
export const later = (scene: Scene, hours: number): Instant => scene.at + Math.round(hours * 3_600_000);
