import { sucroseDensity, sucroseFractionOf } from './density';

/** Cubic expansion of hydrometer glass per kelvin, conventional value of ISO 1768:1975. */
export const GLASS_EXPANSION = 25e-6;

/**
 * Specific gravity at 20 °C/20 °C from what a glass hydrometer shows in a sample
 * at another temperature. A hydrometer of constant mass floats where the liquid
 * has the indicated density, glass expansion allowed for; the liquid is taken as
 * a sucrose solution (ICUMSA). Error: none to speak of in an unfermented must; a
 * dry strong wine needs a correction 1.2 to 1.4 times as large, so up to 0.0005
 * SG is left at 10 or 30 °C.
 *
 * @param reading what the hydrometer shows, SG against water at its own calibration temperature
 * @param sampleC temperature of the sample, °C, 0 to 40
 * @param calibrationC temperature the hydrometer is graduated for, °C; 20 unless told
 */
export function correctHydrometer(reading: number, sampleC: number, calibrationC = 20): number {
  const indicated = reading * sucroseDensity(0, calibrationC);
  const density = indicated / (1 + GLASS_EXPANSION * (sampleC - calibrationC));
  const w = sucroseFractionOf(density, sampleC);
  return sucroseDensity(w, 20) / sucroseDensity(0, 20);
}
