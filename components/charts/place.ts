/** Where labels go so that none lies on another: pure, in pixels. */

export interface PlacedPost {
  index: number;
  /** Left edge of the box with the letters. */
  left: number;
  width: number;
  /** The word beside the box fits. */
  word: boolean;
}

export interface PostSizes {
  /** Width of the box. */
  box: number;
  /** Width of the word, its gap included. */
  word: number;
  x: number;
}

/**
 * Boxes stand with their left edge on the event. One that would cover its
 * neighbour moves right, by at most its own width; beyond that it is left to
 * overlap. A word that would run into the next box, or past the end, goes.
 */
export function placePosts(posts: readonly PostSizes[], end: number): PlacedPost[] {
  let taken = -Infinity;
  const placed = posts.map((post, index) => {
    const left = Math.min(Math.max(post.x, taken + 2), post.x + post.box + 2);
    taken = Math.max(taken, left + post.box);
    return { index, left, width: post.box, word: false };
  });
  return placed.map((post, index) => {
    const room = (placed[index + 1]?.left ?? end) - (post.left + post.width);
    return { ...post, word: posts[index]!.word + 6 <= room };
  });
}

export interface Stretch {
  from: number;
  to: number;
}

/** Right end of words of that width, as far right as they cover nothing that is taken; null where they fit nowhere. */
export function rightmostRoom(width: number, { from, to }: Stretch, taken: readonly Stretch[]): number | null {
  let end = to;
  for (const place of [...taken].sort((a, b) => b.to - a.to)) {
    if (place.from >= end || place.to <= from) continue;
    if (end - Math.max(place.to, from) >= width) break;
    end = place.from;
  }
  return end - from >= width ? end : null;
}

export interface Label {
  x: number;
  y: number;
  width: number;
  height: number;
}

const overlap = (a: Label, b: Label) => a.x < b.x + b.width && b.x < a.x + a.width && a.y < b.y + b.height && b.y < a.y + a.height;

/** Keeps the labels that cover none of the taken places, in the order given. Indices of those kept. */
export function keepClear(labels: readonly Label[], taken: readonly Label[] = []): number[] {
  const places = [...taken];
  return labels.flatMap((label, index) => {
    if (places.some((place) => overlap(label, place))) return [];
    places.push(label);
    return [index];
  });
}
