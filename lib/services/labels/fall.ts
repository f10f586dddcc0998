/** A point of the fall: how far from pitch to bottling, and how far from the bed to the original gravity, both 0 to 1. */
export interface FallPoint {
  t: number;
  level: number;
}

export interface Fall {
  points: FallPoint[];
  posts: Array<{ t: number; letter: string }>;
}

export interface FallInput {
  pitchedAt: number;
  bottledAt: number;
  originalGravity: number;
  finalGravity: number;
  /** Of the curve, or readings by hand where there was no float; ascending. */
  curve: ReadonlyArray<{ at: number; gravity: number }>;
  posts: ReadonlyArray<{ at: number; letter: string }>;
}

const clamp = (value: number) => Math.min(1, Math.max(0, value));

/** The batch's own fall for a label, from its log. Null where there is none to draw. */
export function fallOf({ pitchedAt, bottledAt, originalGravity, finalGravity, curve, posts }: FallInput): Fall | null {
  const span = bottledAt - pitchedAt;
  const drop = originalGravity - finalGravity;
  if (!(span > 0) || !(drop > 0.001)) return null;
  const within = curve.filter((point) => point.at > pitchedAt && point.at < bottledAt);
  const points = [{ at: pitchedAt, gravity: originalGravity }, ...within, { at: bottledAt, gravity: finalGravity }].map((point) => ({ t: clamp((point.at - pitchedAt) / span), level: clamp((point.gravity - finalGravity) / drop) }));
  return { points, posts: posts.filter((post) => post.at >= pitchedAt && post.at <= bottledAt).map((post) => ({ t: clamp((post.at - pitchedAt) / span), letter: post.letter })) };
}

/** Height of the fall at or after `t`: what a text to the right of it has to stay above. */
export const highestFrom = (fall: Fall, t: number): number => Math.max(0, ...fall.points.filter((point) => point.t >= t).map((point) => point.level), levelAt(fall, t));

export function levelAt({ points }: Fall, t: number): number {
  const next = points.findIndex((point) => point.t >= t);
  if (next <= 0) return points[0]?.level ?? 0;
  const [a, b] = [points[next - 1]!, points[next]!];
  return b.t === a.t ? b.level : a.level + ((b.level - a.level) * (t - a.t)) / (b.t - a.t);
}
