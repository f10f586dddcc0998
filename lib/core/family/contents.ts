/** What is in a vessel, as three masses that only a person can change: the ledger of a batch. */
import { platoOf, sgOfPlato } from '../gravity/plato';
import { waterDensity } from '../gravity/density';
import { EXTRACT_PER_ETHANOL, LOST_PER_ETHANOL } from '../strength/expected';
import { abwBalling, ETHANOL_SPECIFIC_GRAVITY, realExtract } from '../strength/strength';

/**
 * Masses in a vessel, g. All three add when drinks are mixed, so sugar and
 * alcohol are conserved through additions, rackings, splits and blends. Gas and
 * yeast that left are not counted: they follow from the alcohol (Balling).
 */
export interface Contents {
  /** The whole liquid. */
  massG: number;
  ethanolG: number;
  /** Real extract: what is dissolved and not alcohol, sugar above all. */
  extractG: number;
}

export interface Readout {
  volumeL: number;
  /** The original gravity that a must with all this sugar would have had, SG: Balling's mass balance. */
  effectiveOg: number;
  gravity: number;
  abvPercent: number;
}

export const NOTHING: Contents = { massG: 0, ethanolG: 0, extractG: 0 };

/** A drink of known volume, effective original gravity and present gravity (both SG 20/20) as masses. */
export function contentsOf(drink: { volumeL: number; originalGravity: number; gravity: number }): Contents {
  const massG = drink.volumeL * drink.gravity * waterDensity(20);
  const original = platoOf(drink.originalGravity);
  const apparent = platoOf(drink.gravity);
  return {
    massG,
    ethanolG: (massG * abwBalling(original, apparent)) / 100,
    extractG: (massG * realExtract(original, apparent)) / 100,
  };
}

/** Water at 20 °C. */
export const water = (volumeL: number): Contents => ({ massG: volumeL * waterDensity(20), ethanolG: 0, extractG: 0 });

/** Something with sugar and water in it; what is neither (pulp) does not count. */
export const sweetened = (sugarG: number, waterG: number): Contents => ({ massG: sugarG + waterG, ethanolG: 0, extractG: sugarG });

/** An unfermented liquid of known gravity, SG. */
export const unfermented = (volumeL: number, gravity: number): Contents => contentsOf({ volumeL, originalGravity: gravity, gravity });

export const blend = (parts: readonly Contents[]): Contents =>
  parts.reduce<Contents>(
    (all, part) => ({ massG: all.massG + part.massG, ethanolG: all.ethanolG + part.ethanolG, extractG: all.extractG + part.extractG }),
    NOTHING,
  );

/** The same drink, more or less of it. */
export const portion = (contents: Contents, share: number): Contents => ({
  massG: contents.massG * share,
  ethanolG: contents.ethanolG * share,
  extractG: contents.extractG * share,
});

/**
 * Volume, effective original gravity, gravity and strength of what is in a vessel;
 * the inverse of {@link contentsOf} to 1e-9. Null for an empty vessel.
 */
export function readContents(contents: Contents): Readout | null {
  const { massG, ethanolG, extractG } = contents;
  if (!(massG > 0)) return null;
  const original = (100 * (extractG + EXTRACT_PER_ETHANOL * ethanolG)) / (massG + LOST_PER_ETHANOL * ethanolG);
  const real = (100 * extractG) / massG;
  const gravity = sgOfPlato((real - 0.1808 * original) / 0.8192);
  return {
    volumeL: massG / (gravity * waterDensity(20)),
    effectiveOg: sgOfPlato(original),
    gravity,
    abvPercent: ((100 * ethanolG) / massG) * (gravity / ETHANOL_SPECIFIC_GRAVITY),
  };
}
