/** Where a must of a given original gravity ends, by Balling's relation run forwards. */
import { platoOf, sgOfPlato } from '../gravity/plato';
import { ETHANOL_SPECIFIC_GRAVITY } from './strength';

/** Extract used for 1 g of ethanol, g, and the carbon dioxide and yeast that leave with it (Balling). */
export const EXTRACT_PER_ETHANOL = 2.0665;
export const LOST_PER_ETHANOL = 1.0665;

export interface Outcome {
  finalGravity: number;
  abvPercent: number;
  /** Real extract left in the drink, g/L: sugar not fermented, and what is not sugar. */
  extractGPerL: number;
}

/**
 * Gravity, strength and extract once a share of the original extract has
 * fermented. Balling's relation (see SOURCES.balling, SOURCES.realExtract); as
 * good as {@link abvBalling}, 0.2 to 0.5 % vol.
 *
 * @param share of the original extract that has fermented, 0 to 1
 */
export function fermented(originalGravity: number, share: number): Outcome {
  const original = platoOf(originalGravity);
  const used = original * share;
  const ethanol = used / EXTRACT_PER_ETHANOL;
  // 100 g of must less the gas and the yeast that left it.
  const left = 100 - LOST_PER_ETHANOL * ethanol;
  const realExtract = (100 * (original - used)) / left;
  const finalGravity = sgOfPlato((realExtract - 0.1808 * original) / 0.8192);
  const abw = (100 * ethanol) / left;
  return {
    finalGravity,
    abvPercent: (abw * finalGravity) / ETHANOL_SPECIFIC_GRAVITY,
    extractGPerL: (realExtract / 100) * finalGravity * 998.2,
  };
}

/** Share of the original extract that has to ferment for a strength, % vol; 1 where the must cannot reach it. By bisection, to 1e-9. */
export function shareForStrength(originalGravity: number, abvPercent: number): number {
  if (fermented(originalGravity, 1).abvPercent <= abvPercent) return 1;
  let [lo, hi] = [0, 1];
  for (let i = 0; i < 40; i += 1) {
    const mid = (lo + hi) / 2;
    if (fermented(originalGravity, mid).abvPercent < abvPercent) lo = mid;
    else hi = mid;
  }
  return hi;
}

/** Lowest gravity the must can reach: all its extract fermented. A floor for safety, lower than drinks reach. */
export const driestGravity = (originalGravity: number): number => fermented(originalGravity, 1).finalGravity;
