import { brixOf } from './plato';
import { waterDensity } from './density';
import { pointsOf } from '../units/convert';

/** Points of gravity that 1 g of sugar in 1 L brings: 0.3865 (NBS Circular C440: 2.59 g/L a point, within 1 % from 1.010 to 1.090). */
export const POINTS_PER_G_PER_L = 0.3865;

/**
 * Extract of an unfermented must, g/L, from its specific gravity 20/20: mass
 * percent times density. Counts everything dissolved as sucrose; grape and apple
 * musts hold about a tenth less fermentable sugar than this says.
 */
export function extractGPerL(sg: number): number {
  return (brixOf(sg) / 100) * sg * waterDensity(20);
}

/**
 * Original gravity, SG, after sugar or another liquid went in (mass balance; the
 * volumes are taken to add up, which is good to 0.3 %).
 */
export function gravityAfterSugar(sg: number, volumeL: number, sugarG: number): number {
  return 1 + (pointsOf(sg) + (POINTS_PER_G_PER_L * sugarG) / volumeL) / 1000;
}

/** Specific gravity after mixing two liquids: mean of the points weighted by volume. */
export function gravityOfBlend(sg: number, volumeL: number, otherSg: number, otherVolumeL: number): number {
  return 1 + (pointsOf(sg) * volumeL + pointsOf(otherSg) * otherVolumeL) / (volumeL + otherVolumeL) / 1000;
}
