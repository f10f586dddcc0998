import type { ReadingInput } from './factories';

const HOUR = 3_600_000;

/** A beer that ferments from 1.050 towards 1.010 as a logistic, one reading an hour; a little deterministic noise. */
export function healthyBeer(pitchedAt: number, hours: number, temperature: number | ((hour: number) => number) = 20): ReadingInput[] {
  return Array.from({ length: hours }, (_, hour) => ({
    at: pitchedAt + hour * HOUR,
    gravity: 1.01 + 0.04 / (1 + Math.exp((hour - 48) / 10)) + 0.0003 * Math.sin(hour * 2.3),
    temperature: typeof temperature === 'function' ? temperature(hour) : temperature,
  }));
}

/** What a batch of it is set up with. */
export const BEER = {
  kind: 'beer',
  originalGravity: 1.05,
  attenuationMinPercent: 72,
  attenuationMaxPercent: 82,
  alcoholToleranceAbv: 9,
  temperatureMinC: 18,
  temperatureMaxC: 22,
  volumeL: 4.5,
  vesselL: 6,
  neck: 'blow_off',
} as const;
