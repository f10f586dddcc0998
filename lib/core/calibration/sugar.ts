import { sucroseDensity } from '../gravity/density';

/**
 * SG at 20 °C/20 °C of so much table sugar in a litre of the finished solution at
 * 20 °C (ICUMSA sucrose density; the mass fraction by fixed point, which halves
 * its error eightfold a round).
 * @param gramsPerLitre 0 to 400
 */
export function gravityOfSugarWater(gramsPerLitre: number): number {
  let fraction = gramsPerLitre / 1000;
  for (let round = 0; round < 30; round += 1) fraction = gramsPerLitre / sucroseDensity(fraction, 20);
  return sucroseDensity(fraction, 20) / sucroseDensity(0, 20);
}
