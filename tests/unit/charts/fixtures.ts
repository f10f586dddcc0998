import type { GravityPoint, Picture } from '@/components/charts/picture';

export const NOW = Date.parse('2026-10-15T14:32:00Z') / 1000;
export const HOUR = 3600;

/** A straight fall of 1 point in 4 h from 1.060, fitted from five days back to two days on. */
export const straight = (from = NOW - 120 * HOUR, to = NOW + 48 * HOUR): GravityPoint[] =>
  Array.from({ length: (to - from) / HOUR + 1 }, (_, hour) => {
    const gravity = 1.06 - (hour / 4) * 0.001;
    return { at: from + hour * HOUR, gravity, lo: gravity - 0.002, hi: gravity + 0.002 };
  });

export const picture = (over: Partial<Picture> = {}): Picture => ({
  now: NOW,
  readings: { at: [], gravity: [], temperature: [] },
  curve: [],
  expected: [],
  gas: [],
  gasNow: null,
  originalGravity: 1.06,
  bed: { value: 1.01, lo: 1.007, hi: 1.013 },
  likelyEnd: null,
  silentAt: null,
  rings: [],
  posts: [],
  bracket: null,
  range: { min: 15, max: 20 },
  airlockHolds: 0.6,
  drink: 'gold',
  ...over,
});
