import { binFrom } from './bins';
import { middleOf } from './order';
import type { Track } from './track';

/** Step at a known hour: the level 1 to 7.5 h after against the line of the 14 h before; null when there is too little. */
export function stepAt(track: Track, hour: number): number | null {
  const before = track.line(hour - 14, hour, 0.4);
  const after = track.level(hour + 1, hour + 7.5);
  if (!before || after === null) return null;
  const at = before.level + (before.slope / 24) * Math.min(hour + 4.25 - before.middle, 16);
  return after - at;
}

/**
 * Looks for an unlogged step between `hour` - 35 and `hour` - 32, in a quiet
 * stretch only: while the fall is steep its own bend looks like a step. Robust
 * lines of the 24 h that end 8 h before and begin 8 h after are drawn out to the
 * edge, so that a burst of bubbles beside it (under 8 h) spoils neither; they must
 * part by more than 2.2 points and four standard errors, and the lines right
 * beside the edge must agree.
 */
export function findStep(track: Track, hour: number, notBefore: number): { hour: number; points: number } | null {
  const { bins } = track;
  const first = binFrom(bins, hour - 35);
  const last = binFrom(bins, hour - 32);
  let best = -1;
  let widest = 1.4;
  for (let i = Math.max(first, 3); i < last && i + 2 < bins.n; i += 1) {
    if (bins.hour[i]! < notBefore + 12) continue;
    if (bins.masked[i] || bins.masked[i - 1] || bins.t[i]! - bins.t[i - 1]! > Math.max(3, 2.5 * track.spacing)) continue;
    const before = middleOf(bins.g[i - 3]!, bins.g[i - 2]!, bins.g[i - 1]!);
    const after = middleOf(bins.g[i]!, bins.g[i + 1]!, bins.g[i + 2]!);
    const change = Math.abs(after - before);
    if (change > widest) {
      widest = change;
      best = i;
    }
  }
  if (best < 0) return null;
  const wide = jumpAt(track, best, 8, 24);
  const near = jumpAt(track, best, 0, 16);
  if (wide === null || near === null || near * wide < 0 || Math.abs(near) < 0.5 * Math.abs(wide)) return null;
  return { hour: bins.hour[best]!, points: Math.abs(near) < Math.abs(wide) ? near : wide };
}

/**
 * Looks for sugar that nobody logged: an upward jump 8 to 11 h ago that is still
 * there once any burst of bubbles (under 8 h) would be over. It may come at any
 * pace of the fall, which hides smaller steps.
 */
export function findSugar(track: Track, hour: number, notBefore: number): { hour: number; points: number } | null {
  const { bins } = track;
  for (let i = binFrom(bins, hour - 14); i < bins.n && bins.hour[i]! <= hour - 11; i += 1) {
    if (i < 6 || bins.hour[i]! < notBefore + 24 || bins.masked[i] || bins.t[i]! - bins.t[i - 1]! > Math.max(3, 2.5 * track.spacing)) continue;
    const jump = Math.min(bins.g[i]!, bins.g[i + 1] ?? -99) - Math.max(bins.g[i - 1]!, bins.g[i - 2]!);
    if (jump < 3.5) continue;
    const before = track.line(bins.hour[i]! - 20, bins.hour[i]!, 0.6);
    const at = bins.hour[i]!;
    const soon = track.level(at, at + 4);
    const late = track.level(at + 8, hour + 1);
    if (!before || soon === null || late === null) continue;
    const drawn = (h: number): number => before.level + (before.slope / 24) * (h - before.middle);
    const now = late - drawn((at + 8 + hour) / 2);
    const then = soon - drawn(at + 2);
    if (then > 5.5 && now > Math.max(4.5, 0.6 * then)) return { hour: at, points: then };
  }
  return null;
}

/** Step just before bin i as the parting of two robust lines `gap` h away from it; null when it is within their doubt. */
function jumpAt(track: Track, i: number, gap: number, span: number): number | null {
  const { bins } = track;
  const at = bins.hour[i]!;
  const before = track.line(at - gap - span, at - gap, 0.6);
  const after = track.line(at + gap, at + gap + span, 0.6);
  if (!before || !after) return null;
  const bend = Math.abs(after.slope - before.slope);
  if (Math.max(-before.slope, -after.slope) > 7 || bend > 4) return null;
  const edge = (bins.t[i]! + bins.t[i - 1]!) / 2;
  const levelBefore = before.level + (before.slope / 24) * (edge - before.middle);
  const levelAfter = after.level + (after.slope / 24) * (edge - after.middle);
  const points = levelAfter - levelBefore;
  const se = (Math.hypot(before.se, after.se) * (gap + span / 2)) / 24;
  return Math.abs(points) > Math.max(2.2, Math.min(4, 4 * se), 0.3 * bend) ? points : null;
}
