import { describe, expect, test } from 'vitest';
import { gravityOf, sugarOf } from '@/devices/simulator/density';

describe('gravity of sugar and alcohol in water', () => {
  // Sugar: NBS Circular C440 (1942), 10 and 20 % sucrose: 103.81 and 216.20 g/L, SG 1.04003 and 1.08297.
  test.each([
    [103.81, 0, 1.04003],
    [216.2, 0, 1.08297],
    // OIML R 22: 10 % vol is 78.92 g/L, 984.71 kg/m3.
    [0, 78.92, 0.98648],
    [0, 0, 1],
  ])('%f g/L of sugar and %f g/L of ethanol weigh %f', (sugar, ethanol, gravity) => {
    expect(Math.abs(gravityOf(sugar, ethanol) - gravity)).toBeLessThan(1e-4);
  });

  test('the sugar of a must comes back from its gravity', () => {
    for (const gravity of [1.01, 1.048, 1.09, 1.13]) expect(gravityOf(sugarOf(gravity), 0)).toBeCloseTo(gravity, 7);
  });
});
