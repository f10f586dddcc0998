/** Density of ethanol-water mixtures. */

/** Density of pure ethanol at 20 °C, kg/m³ (OIML R 22, erratum on its cover). */
export const ETHANOL_DENSITY = 789.24;

/** Coefficients of OIML R 22: powers of the mass fraction at 20 °C. */
const MIXTURE: readonly number[] = [
  998.20123, -192.9769495, 389.1238958, -1668.103923, 13522.15441, -88292.78388, 306287.4042, -613838.1234, 747017.2998,
  -547846.1354, 223446.0334, -39032.85426,
];

/** Powers of (t − 20) in pure water. */
const WATER: readonly number[] = [
  -0.20618513, -0.0052682542, 3.6130013e-05, -3.8957702e-07, 7.169354e-09, -9.9739231e-11,
];

/** Row i: powers of the mass fraction, from the first, times (t − 20) to the i-th. */
const CROSSED: readonly (readonly number[])[] = [
  [
    0.1693443461530087, -10.46914743455169, 71.96353469546523, -704.7478054272792, 3924.090430035045, -12101.64659068747,
    22486.46550400788, -26055.62982188164, 18523.73922069467, -7420.201433430137, 1285.617841998974,
  ],
  [
    -0.0119301300505701, 0.2517399633803461, -2.170575700536993, 13.53034988843029, -50.29988758547014, 109.635566657757,
    -142.2753946421155, 108.043594285623, -44.14153236817392, 7.442971530188783,
  ],
  [
    -0.0006802995733503803, 0.01876837790289664, -0.2002561813734156, 1.02299296671922, -2.895696483903638, 4.810060584300675,
    -4.672147440794683, 2.458043105903461, -0.5411227621436812,
  ],
  [
    4.075376675622027e-06, -8.76305857347111e-06, 6.515031360099368e-06, -1.51578483698721e-06,
  ],
  [
    -2.788074354782409e-08, 1.345612883493354e-08,
  ],
];

/** Σ c·x^k for k from 1: a polynomial without its constant. */
const withoutConstant = (coefficients: readonly number[], x: number): number =>
  coefficients.reduceRight((sum, c) => (sum + c) * x, 0);

/**
 * Density of an ethanol-water mixture, kg/m³. OIML R 22 (1975), International
 * Alcoholometric Tables, general formula; −20 to 40 °C, all strengths.
 *
 * @param massFraction ethanol by mass, 0 to 1
 * @param celsius temperature, °C
 */
export function ethanolDensity(massFraction: number, celsius: number): number {
  const t = celsius - 20;
  const [constant = 0, ...rest] = MIXTURE;
  let density = constant + withoutConstant(rest, massFraction) + withoutConstant(WATER, t);
  CROSSED.forEach((row, i) => {
    density += withoutConstant(row, massFraction) * t ** (i + 1);
  });
  return density;
}

/** Strength at 20 °C, % vol, of a mixture of the given mass fraction (OIML R 22: q = ρ(p, 20)·p/789.24). */
export function abvOfMassFraction(massFraction: number): number {
  return (100 * ethanolDensity(massFraction, 20) * massFraction) / ETHANOL_DENSITY;
}

/** Mass fraction of ethanol in a mixture of so many % vol at 20 °C: Newton's method on {@link abvOfMassFraction}, to 1e-12. */
export function massFractionOfAbv(abvPercent: number): number {
  let p = abvPercent / 126;
  for (let i = 0; i < 30; i += 1) {
    const slope = (abvOfMassFraction(p + 1e-6) - abvOfMassFraction(p - 1e-6)) / 2e-6;
    const step = (abvOfMassFraction(p) - abvPercent) / slope;
    p -= step;
    if (Math.abs(step) < 1e-13) break;
  }
  return p;
}
