/** Water at 20 °C, kg/m³ (OIML R 22, A1). */
const WATER = 998.20123;

/** ICUMSA SPS-4 (1998), Bettin et al., Zuckerindustrie 123 (1998) 341: terms b1..b6 at 20 °C. */
const SUGAR = [385.1761, 135.3705, 40.9299, -3.9643, 13.4853, -17.289];

/** OIML R 22 (1975): terms A2..A12, the whole formula at 20 °C. */
const ETHANOL = [
  -192.9769495, 389.1238958, -1668.103923, 13522.15441, -88292.78388, 306287.4042, -613838.1234, 747017.2998, -547846.1354, 223446.0334,
  -39032.85426,
];

/** Density at 20 °C, kg/m³, of water with a mass fraction of something whose terms are given. */
function density(fraction: number, terms: readonly number[]): number {
  let value = 0;
  for (let index = terms.length - 1; index >= 0; index -= 1) value = (value + (terms[index] ?? 0)) * fraction;
  return WATER + value;
}

/** The same from g/L: the mass fraction depends on the density sought; five rounds settle to 1e-7. */
function densityOfConcentration(gramsPerLitre: number, terms: readonly number[]): number {
  let value = WATER;
  for (let round = 0; round < 5; round += 1) value = density(gramsPerLitre / value, terms);
  return value;
}

/**
 * Gravity (SG 20 °C/20 °C) of a liquid with sugar and ethanol, both g/L at 20 °C:
 * Tabarié's relation d = d_sugar + d_ethanol - 1 (OIV-MA-AS2-03B), the sugar
 * counted as sucrose. Good to about 0.0005 below 15 % vol; the relation itself
 * neglects that sugar and alcohol share the water.
 */
export function gravityOf(sugar: number, ethanol: number): number {
  return (densityOfConcentration(sugar, SUGAR) + densityOfConcentration(ethanol, ETHANOL)) / WATER - 1;
}

/** Sugar (g/L, counted as sucrose) of a must of this gravity before it ferments; bisection to 1e-6 g/L. */
export function sugarOf(gravity: number): number {
  let low = 0;
  let high = 600;
  for (let round = 0; round < 50; round += 1) {
    const middle = (low + high) / 2;
    if (gravityOf(middle, 0) < gravity) low = middle;
    else high = middle;
  }
  return (low + high) / 2;
}
