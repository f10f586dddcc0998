import { roundDown, roundTo } from '../units/rounding';

/**
 * Factors of the UK excise: fall of gravity in excess degrees (points) up to which
 * each holds. HM Revenue and Customs, Excise Notice 226, section 30.3; made for
 * beer, guidance only, and not given above 100.7.
 */
export const EXCISE_FACTORS: readonly { readonly upTo: number; readonly factor: number }[] = [
  { upTo: 6.9, factor: 0.125 },
  { upTo: 10.4, factor: 0.126 },
  { upTo: 17.2, factor: 0.127 },
  { upTo: 26.1, factor: 0.128 },
  { upTo: 36.0, factor: 0.129 },
  { upTo: 46.5, factor: 0.13 },
  { upTo: 57.1, factor: 0.131 },
  { upTo: 67.9, factor: 0.132 },
  { upTo: 78.8, factor: 0.133 },
  { upTo: 89.7, factor: 0.134 },
  { upTo: 100.7, factor: 0.135 },
];

export interface ExciseStrength {
  factor: number;
  /** % vol before truncation. */
  full: number;
  /** % vol truncated to one decimal, as the duty is: never rounded up. */
  truncated: number;
}

/**
 * Strength, % vol, by the UK excise factors. Gravities are read to a tenth of a
 * point, as the notice prints them. Null above a fall of 100.7 points, where no
 * factor is published, and for a gravity above the original.
 */
export function abvExcise(originalGravity: number, gravity: number): ExciseStrength | null {
  const fall = roundTo((originalGravity - gravity) * 1000, 0.1);
  if (!(fall >= 0)) return null;
  const row = EXCISE_FACTORS.find(({ upTo }) => fall <= upTo);
  if (!row) return null;
  const full = fall * row.factor;
  return { factor: row.factor, full, truncated: roundDown(full, 0.1) };
}
