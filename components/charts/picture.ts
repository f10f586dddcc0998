/**
 * What a chart draws of one batch. Times are seconds since 1970 (as uPlot takes
 * them), gravity SG, temperature °C, gas L/h. Absent things are null or empty.
 */
export interface GravityPoint {
  at: number;
  gravity: number;
  /** 80 % interval. */
  lo: number;
  hi: number;
}

export interface Span {
  from: number;
  to: number;
}

/** An event: a post on the bed with one or two letters. */
export interface Post {
  at: number;
  letters: string;
  word: string;
  /** Not done yet: drawn as a dashed outline. */
  toCome: boolean;
}

/** A stretch that is called out: `flat 31 h`, `equal`. */
export interface Bracket {
  from: number;
  to: number;
  gravity: number;
  words: string;
  kind: 'flat' | 'equal';
}

/** A curve laid over the evidence that is no part of it. */
export interface Laid {
  points: readonly { at: number; gravity: number }[];
  /** Its name, in a dashed frame: `what if, not real`. */
  words: string;
  /** The likely days of its end, where it foresees one. */
  end: { lo: number; hi: number; gravity: number } | null;
}

export interface Picture {
  now: number;
  /** The batch is over, and `now` is when it ended. */
  ended?: boolean;
  /** Parallel columns, ascending in time. */
  readings: { at: readonly number[]; gravity: readonly (number | null)[]; temperature: readonly (number | null)[] };
  /** Fit up to now and forecast after it. */
  curve: readonly GravityPoint[];
  /** What should have happened, where the batch left its curve. */
  expected: readonly GravityPoint[];
  gas: readonly { at: number; value: number }[];
  /** As it was judged, which looks over more hours than a bar. */
  gasNow: number | null;
  originalGravity: number | null;
  /** Where the fall should stop. */
  bed: { value: number; lo: number; hi: number } | null;
  likelyEnd: { lo: number; hi: number; words: string } | null;
  /** When the sensor was last heard, if it has gone silent since. */
  silentAt: number | null;
  /** Hydrometer readings. */
  rings: readonly { at: number; gravity: number }[];
  posts: readonly Post[];
  bracket: Bracket | null;
  /** Wanted temperatures. */
  range: { min: number; max: number } | null;
  /** Gas that the airlock holds, L/h. */
  airlockHolds: number | null;
  /** The keeper's choice: a name of DRINK_COLOURS or `#rrggbb`. */
  drink: string;
  laid?: readonly Laid[] | undefined;
}

/** The instant up to which the curve is known rather than foreseen. */
export const knownUntil = (picture: Picture): number => Math.min(picture.now, picture.silentAt ?? picture.now);

/** It lies flat and should not: then the band shows what it should have done, and there is no forecast. */
export const hasStopped = (picture: Picture): boolean => picture.expected.length > 1 && picture.bracket?.kind === 'flat';

/** The curve's value at a time by straight lines between its points; null outside it. */
export function valueAt(curve: readonly GravityPoint[], at: number): GravityPoint | null {
  const first = curve[0];
  const last = curve[curve.length - 1];
  if (!first || !last || at < first.at || at > last.at) return null;
  const after = curve.findIndex((point) => point.at >= at);
  const right = curve[after]!;
  const left = curve[after - 1] ?? right;
  const share = right.at === left.at ? 0 : (at - left.at) / (right.at - left.at);
  const between = (a: number, b: number) => a + (b - a) * share;
  return { at, gravity: between(left.gravity, right.gravity), lo: between(left.lo, right.lo), hi: between(left.hi, right.hi) };
}

/** Cuts a curve in two at a time; both parts hold the point at the cut, so that they meet. */
export function cutAt(curve: readonly GravityPoint[], at: number): { past: GravityPoint[]; coming: GravityPoint[] } {
  const seam = valueAt(curve, at);
  const past = curve.filter((point) => point.at < at);
  const coming = curve.filter((point) => point.at > at);
  return seam ? { past: [...past, seam], coming: [seam, ...coming] } : { past, coming };
}

/** Gravity where the bright dot stands: the curve's value, else the last reading's. */
export function gravityNow(picture: Picture): number | null {
  const known = knownUntil(picture);
  if (hasStopped(picture) && picture.bracket) return picture.bracket.gravity;
  const fitted = valueAt(picture.curve, known)?.gravity;
  if (fitted !== undefined) return fitted;
  return picture.readings.gravity.findLast((value, index) => value !== null && picture.readings.at[index]! <= picture.now) ?? null;
}

const DAY = 86_400;

/** The span a batch page opens with: from just before the pitch to past the likely end, at most as far ahead as behind, at least three days. */
export function wholeSpan(picture: Picture, pitchedAt: number | null): Span {
  const starts = [pitchedAt, picture.readings.at[0], picture.curve[0]?.at, picture.posts[0]?.at, picture.rings[0]?.at].filter((value): value is number => typeof value === 'number');
  const start = starts.length > 0 ? Math.min(...starts, picture.now) : picture.now - DAY;
  const past = Math.max(picture.now - start, DAY);
  const foreseen = Math.min((picture.curve.at(-1)?.at ?? 0) - picture.now, 6 * DAY);
  const ends = [picture.likelyEnd?.hi, ...(picture.laid ?? []).map((laid) => laid.end?.hi)].filter((end) => end !== undefined);
  const wanted = Math.max(foreseen, ...ends.map((end) => end - picture.now + DAY));
  // Room right of now for its figures, however long the past.
  const ahead = picture.ended ? Math.max(DAY, past * 0.12) : Math.max(3 * DAY, past * 0.16, Math.min(wanted, past, 21 * DAY));
  return { from: start - (past + ahead) * 0.025, to: picture.now + ahead };
}
