import type { BatchSetup } from '@/lib/core/types';
import type { Random } from './random';

/** Bends what is told of a batch as people do, by its group. */
export function mistell(group: string, setup: BatchSetup, r: Random, final: number, og: number): void {
  switch (group) {
    case 'yeast range 4 points off': {
      const mid = 1 - (final + (r.chance(0.5) ? 4 : -4)) / og;
      setup.attenuation = { min: mid - 0.035, max: mid + 0.035 };
      break;
    }
    case 'no original gravity':
      setup.originalGravity = null;
      break;
    case 'volume off by a quarter': {
      const factor = r.chance(0.5) ? 0.75 : 1.25;
      setup.volumeL *= factor;
      setup.vesselL = Math.max(setup.vesselL, setup.volumeL * 1.05);
      break;
    }
    case 'no yeast told':
      setup.attenuation = null;
      setup.alcoholToleranceAbv = null;
      break;
    default:
      break;
  }
}
