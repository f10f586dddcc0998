import { describe, expect, it } from 'vitest';
import { smoothPath } from '@/components/compare/smooth';

/** Heights along the cubics of a path, in its order. */
function along(path: string): number[] {
  const numbers = (text: string) => text.trim().split(/\s+/).map(Number);
  const [start, ...cubics] = path.slice(1).split('C').map(numbers);
  let from = start![1]!;
  return cubics.flatMap(([, y1, , y2, , y3]) => {
    const heights = Array.from({ length: 21 }, (_, index) => {
      const t = index / 20;
      return (1 - t) ** 3 * from + 3 * (1 - t) ** 2 * t * y1! + 3 * (1 - t) * t * t * y2! + t ** 3 * y3!;
    });
    from = y3!;
    return heights;
  });
}

describe('a line without corners', () => {
  it('goes through every spot', () => {
    const path = smoothPath([{ x: 0, y: 0 }, { x: 10, y: 40 }, { x: 20, y: 50 }]);
    expect(path.startsWith('M0.0 0.0C')).toBe(true);
    expect(path).toContain(' 10.0 40.0C');
    expect(path.endsWith(' 20.0 50.0')).toBe(true);
  });

  it('never goes back where the spots do not', () => {
    const heights = along(smoothPath([0, 1, 1.2, 60, 60, 60.1, 99].map((y, index) => ({ x: index * 10, y }))));
    for (const [index, height] of heights.slice(1).entries()) expect(height).toBeGreaterThanOrEqual(heights[index]! - 0.051);
  });

  it('turns at a spot and not beyond it', () => {
    const heights = along(smoothPath([0, 10, 4].map((y, index) => ({ x: index * 10, y }))));
    expect(Math.max(...heights)).toBeLessThanOrEqual(10 + 1e-9);
  });

  it('is straight between two, and nothing of none', () => {
    expect(smoothPath([])).toBe('');
    expect(along(smoothPath([{ x: 0, y: 0 }, { x: 30, y: 30 }]))[10]).toBeCloseTo(15, 6);
  });
});
