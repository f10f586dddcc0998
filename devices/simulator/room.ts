import type { RoomStep } from './scenario';
import { between, stream } from './random';

const HOUR = 3_600_000;

/**
 * Temperature of the air about the vessel, °C, by hours since the pitch: the
 * plan, day and night (warmest about 16:00 UTC), and weather that wanders.
 */
export function roomTemperature(steps: readonly RoomStep[], dayNightC: number, start: number, seed: number): (hours: number) => number {
  const draw = stream(seed, 'weather');
  const waves = [61, 149].map((period) => ({ period, phase: between(draw, 0, 2 * Math.PI), size: between(draw, 0.1, 0.35) }));
  return (hours) => {
    let mean = steps[0]?.meanC ?? 20;
    for (const step of steps) if (step.fromH <= hours) mean = step.meanC;
    const clock = (start / HOUR + hours) % 24;
    const daily = (dayNightC / 2) * Math.cos((2 * Math.PI * (clock - 16)) / 24);
    return waves.reduce((sum, { period, phase, size }) => sum + size * Math.sin((2 * Math.PI * hours) / period + phase), mean + daily);
  };
}
