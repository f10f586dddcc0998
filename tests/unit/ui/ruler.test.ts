import { expect, it } from 'vitest';
import { scaleEnd } from '@/components/ui/Ruler';

it.each([
  [0.1, 0.1],
  [0.3, 0.5],
  [1.2, 2],
  [7, 10],
  [8, 10],
  [24, 25],
  [130, 200],
  [0, 1],
])('a ruler for %d ends at %d', (value, end) => {
  expect(scaleEnd(value)).toBeCloseTo(end, 10);
});
