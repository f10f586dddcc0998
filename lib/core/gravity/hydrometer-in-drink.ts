import { ethanolDensity, massFractionOfAbv } from '../strength/ethanol';
import { sucroseDensity, sucroseFractionOf } from './density';
import { GLASS_EXPANSION } from './hydrometer';

/**
 * Specific gravity 20/20 from what a glass hydrometer shows in a fermented drink
 * at another temperature. Alcohol widens more than sugar water, so a dry strong
 * drink needs 1.2 to 1.4 times the correction of a must. The drink is taken as
 * alcohol and water expanding as OIML R 22 says, with the rest of its density as
 * a sugar solution expanding as ICUMSA says (Tabarié's sum of the two parts, our
 * own use of it). Error below 0.0002 SG from 5 to 30 °C where the strength is
 * known to 1 % vol.
 *
 * @param reading what the hydrometer shows, SG against water at its own calibration temperature
 * @param sampleC temperature of the sample, °C, 0 to 40
 * @param abvPercent strength of the drink, % vol; 0 gives the must's correction
 * @param calibrationC temperature the hydrometer is graduated for, °C
 */
export function correctHydrometerInDrink(reading: number, sampleC: number, abvPercent: number, calibrationC = 20): number {
  const indicated = reading * sucroseDensity(0, calibrationC);
  const density = indicated / (1 + GLASS_EXPANSION * (sampleC - calibrationC));
  const p = massFractionOfAbv(Math.max(0, abvPercent));
  const lightening = (celsius: number): number => ethanolDensity(p, celsius) - ethanolDensity(0, celsius);
  const extract = sucroseFractionOf(density - lightening(sampleC), sampleC);
  return (sucroseDensity(extract, 20) + lightening(20)) / sucroseDensity(0, 20);
}
