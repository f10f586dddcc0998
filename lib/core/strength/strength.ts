import { platoOf } from '../gravity/plato';

/** Density of ethanol over that of water at 20 °C: 789.24/998.20 (OIML R 22). */
export const ETHANOL_SPECIFIC_GRAVITY = 789.24 / 998.2;

/** Strength, % vol, by the trade's factor: (OG − FG) × 131.25. Common practice; within 0.2 % vol below 6 % vol, low for strong drinks. */
export function abvSimple(originalGravity: number, gravity: number): number {
  return (originalGravity - gravity) * 131.25;
}

/** Real extract, °P, from original and apparent extract: 0.1808 OE + 0.8192 AE (Balling; De Clerck; ASBC). */
export function realExtract(originalPlato: number, apparentPlato: number): number {
  return 0.1808 * originalPlato + 0.8192 * apparentPlato;
}

/** Alcohol, % mass, by Balling: (OE − RE)/(2.0665 − 0.010665 OE), extracts in °P. */
export function abwBalling(originalPlato: number, apparentPlato: number): number {
  return (originalPlato - realExtract(originalPlato, apparentPlato)) / (2.0665 - 0.010665 * originalPlato);
}

/**
 * Strength, % vol at 20 °C, by Balling's relation from the two gravities 20/20.
 * Good to about 0.2 % vol to 9 % vol and 0.5 % vol to 14 % vol; a laboratory
 * distils. Never below 0.
 */
export function abvBalling(originalGravity: number, gravity: number): number {
  const abw = abwBalling(platoOf(originalGravity), platoOf(gravity));
  return Math.max(0, (abw * gravity) / ETHANOL_SPECIFIC_GRAVITY);
}

/** Apparent attenuation, %, in gravity points: 100 (OG − G)/(OG − 1). Above 100 for a drink drier than water. */
export function apparentAttenuation(originalGravity: number, gravity: number): number | null {
  const points = originalGravity - 1;
  return points > 0.001 ? (100 * (originalGravity - gravity)) / points : null;
}

/**
 * Gravity points still left when a must of `originalPoints` has made the alcohol
 * its yeast can bear: sugar for the alcohol gone (0.789 pt per g/L of ethanol)
 * and the alcohol itself lightening the liquid (0.1885·E − 2.5e-4·E² pt, fitted
 * to OIML R 22 water-ethanol densities). E is g/L of ethanol.
 */
export function pointsAtTolerance(originalPoints: number, toleranceAbv: number): number {
  const e = 7.89 * toleranceAbv;
  return originalPoints - (0.789 * e + 0.1885 * e - 2.5e-4 * e * e);
}
