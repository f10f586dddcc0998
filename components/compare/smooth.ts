interface Spot {
  x: number;
  y: number;
}

const px = (value: number): string => value.toFixed(1);

/**
 * A line through all spots without corners, that never rises where they do not:
 * piecewise cubic, slopes limited after Fritsch and Carlson, SIAM J. Numer. Anal.
 * 17 (1980) 238, by the harmonic mean of Fritsch and Butland (1984).
 */
export function smoothPath(spots: readonly Spot[]): string {
  const [first] = spots;
  if (!first) return '';
  const steps = spots.slice(1).map((spot, index) => {
    const width = spot.x - spots[index]!.x;
    return { width, slope: width > 0 ? (spot.y - spots[index]!.y) / width : 0 };
  });
  const slopeAt = (index: number): number => {
    const [before, after] = [steps[index - 1], steps[index]];
    if (!before || !after) return (before ?? after)?.slope ?? 0;
    return before.slope * after.slope <= 0 ? 0 : (2 * before.slope * after.slope) / (before.slope + after.slope);
  };
  const parts = steps.map(({ width }, index) => {
    const [from, to] = [spots[index]!, spots[index + 1]!];
    const third = width / 3;
    return `C${px(from.x + third)} ${px(from.y + third * slopeAt(index))} ${px(to.x - third)} ${px(to.y - third * slopeAt(index + 1))} ${px(to.x)} ${px(to.y)}`;
  });
  return `M${px(first.x)} ${px(first.y)}${parts.join('')}`;
}
