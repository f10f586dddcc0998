import type { Span } from '@/components/charts/picture';
import { valueAt, type Curve, type Point } from './curves';

export const DAY_S = 86_400;
const STEPS_D = [0.25, 0.5, 1, 2, 5, 7, 14, 28, 56, 112];
/** Air above and below what is drawn, as a share of its height. */
const AIR = 0.06;

/** From the pitch to the last day that any of them has, s since the pitch; a day at least. */
export const wholeOf = (curves: readonly Curve[]): Span => ({ from: 0, to: DAY_S * Math.max(1, ...curves.flatMap((curve) => [...curve.points, ...curve.rings]).map((point) => point.day)) });

/** What of a curve lies between two days, with its values at the edges, so that the line runs out of the picture and not short of it. */
export function between(points: readonly Point[], from: number, to: number): Point[] {
  const edge = (day: number): Point[] => {
    const value = valueAt(points, day);
    return value === null ? [] : [{ day, value }];
  };
  return [...edge(from), ...points.filter((point) => point.day > from && point.day < to), ...edge(to)];
}

/** Lowest and highest of what is shown, with air; null where nothing is. */
export function heightOf(shown: readonly Point[]): { bottom: number; top: number } | null {
  if (shown.length === 0) return null;
  const values = shown.map((point) => point.value);
  const [low, high] = [Math.min(...values), Math.max(...values)];
  const air = (high - low || 0.01) * AIR;
  return { bottom: low - air, top: high + air };
}

/** Round figures inside a span, about so many. */
export function ticks(lo: number, hi: number, about: number): number[] {
  const rough = (hi - lo) / about;
  const size = 10 ** Math.floor(Math.log10(rough));
  const step = [1, 2, 5, 10].map((n) => n * size).find((n) => n >= rough) ?? size;
  return Array.from({ length: Math.floor(hi / step) - Math.ceil(lo / step) + 1 }, (_, index) => (Math.ceil(lo / step) + index) * step);
}

/** Days to write below a span, at most so many. */
export function dayTicks(from: number, to: number, most: number): number[] {
  const step = STEPS_D.find((size) => (to - from) / size <= most) ?? STEPS_D.at(-1)!;
  return ticksBy(from, to, step);
}

const ticksBy = (from: number, to: number, step: number): number[] => Array.from({ length: Math.floor(to / step + 1e-9) - Math.ceil(from / step - 1e-9) + 1 }, (_, index) => (Math.ceil(from / step - 1e-9) + index) * step);
