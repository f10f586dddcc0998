/** pK of sulphur dioxide in a drink. OIV-MA-AS323-04C, Table I: strength in % vol by temperature in °C. */
const STRENGTHS = [0, 5, 10, 15] as const;
const TEMPERATURES = [20, 25, 30, 35, 40] as const;
const PK: readonly (readonly number[])[] = [
  [1.798, 2.0, 2.219, 2.334, 2.493],
  [1.897, 2.098, 2.299, 2.397, 2.527],
  [1.997, 2.198, 2.394, 2.488, 2.606],
  [2.099, 2.301, 2.503, 2.607, 2.728],
];

export interface Pk {
  pk: number;
  /** What the table was read at: outside it, its nearest edge. */
  abvPercent: number;
  celsius: number;
  outsideTable: boolean;
}

function place(grid: readonly number[], x: number): { i: number; share: number } {
  let i = 0;
  while (i < grid.length - 2 && x > (grid[i + 1] ?? Infinity)) i += 1;
  const [a, b] = [grid[i] ?? 0, grid[i + 1] ?? 1];
  return { i, share: (x - a) / (b - a) };
}

/**
 * pK by interpolation on both axes, within 0.01 of the table's own curve. The
 * table begins at 20 °C and ends at 15 % vol; beyond, its edge is used and said
 * so: in a colder drink the molecular share is smaller than reckoned.
 */
export function sulphitePk(abvPercent: number, celsius: number): Pk {
  const abv = Math.min(15, Math.max(0, abvPercent));
  const t = Math.min(40, Math.max(20, celsius));
  const [row, column] = [place(STRENGTHS, abv), place(TEMPERATURES, t)];
  const at = (i: number, j: number): number => PK[i]?.[j] ?? NaN;
  const along = (i: number): number => at(i, column.i) * (1 - column.share) + at(i, column.i + 1) * column.share;
  const pk = along(row.i) * (1 - row.share) + along(row.i + 1) * row.share;
  return { pk, abvPercent: abv, celsius: t, outsideTable: abv !== abvPercent || t !== celsius };
}

/** Molecular sulphite as a share of the free: 1/(1 + 10^(pH − pK)). */
export const molecularShare = (pH: number, pk: number): number => 1 / (1 + 10 ** (pH - pk));
