import type { GravityPoint } from './picture';

const median = (values: number[]): number => values.sort((a, b) => a - b)[values.length >> 1]!;

/** Readings to a median: enough that a bubble that lifts two or three of them does not show. */
const TOGETHER = 9;

/** Readings that end this near to now are taken to hold until now; those of a stretch that was zoomed into do not. */
const REACHES_NOW_S = 3 * 3600;

/**
 * The level itself, by medians of neighbouring readings. It stands in for the
 * fit before the curve begins (a racking or an addition begins a new one), and
 * where a batch has stopped: a curve that must also lie flat fits neither part.
 */
export function levelOf(points: readonly GravityPoint[], now: number): GravityPoint[] {
  const level: GravityPoint[] = [];
  for (let start = 0; start < points.length; start += TOGETHER) {
    const some = points.slice(start, start + TOGETHER);
    const gravity = median(some.map((point) => point.gravity));
    // The first begins with the record and the last ends with it, so that nothing is cut off.
    const at = start === 0 ? some[0]!.at : start + TOGETHER >= points.length ? some.at(-1)!.at : some[some.length >> 1]!.at;
    level.push({ at, gravity, lo: gravity, hi: gravity });
  }
  const last = level.at(-1);
  return last && now - last.at < REACHES_NOW_S ? [...level, { ...last, at: now }] : level;
}
