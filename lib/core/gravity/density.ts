/** Densities of water and of sucrose solutions. */

/**
 * Density of air-free water at 101.325 kPa, kg/m³, 0 to 40 °C. Tanaka, Girard,
 * Davis, Peuto, Bignell, Metrologia 38 (2001) 301–309; uncertainty below 0.001 kg/m³.
 */
export function waterDensity(celsius: number): number {
  const a = (celsius - 3.983035) ** 2 * (celsius + 301.797);
  return 999.97495 * (1 - a / (522528.9 * (celsius + 69.34881)));
}

/** Water term inside the ICUMSA sucrose formula, kg/m³ (Kell's form on ITS-90). */
function icumsaWater(t: number): number {
  const top =
    999.83952 +
    t * (16.952577 + t * (-7.9905127e-3 + t * (-46.241757e-6 + t * (105.84601e-9 - t * 281.03006e-12))));
  return top / (1 + 16.887236e-3 * t);
}

const POLYNOMIALS: readonly (readonly number[])[] = [
  [385.1761, 135.3705, 40.9299, -3.9643, 13.4853, -17.289],
  [-46.272, -7.172, 1.1597, 5.1126, 17.5254],
  [59.7712, 7.2491, 12.363, -35.4791],
  [-47.2207, -21.6977, 27.6301],
  [18.3184, 12.3081],
];

/**
 * Density of a sucrose solution, kg/m³. ICUMSA SPS-4 (1998); Bettin, Emmerich,
 * Spieweck, Toth, Zuckerindustrie 123 (1998) 341–348. Holds from 0 to 80 °C. A
 * small negative mass fraction is accepted: it stands for liquids lighter than water.
 */
export function sucroseDensity(massFraction: number, celsius: number): number {
  const tau = (celsius - 20) / 100;
  let density = icumsaWater(celsius);
  let power = 1;
  for (const coefficients of POLYNOMIALS) {
    let term = 0;
    for (let i = coefficients.length - 1; i >= 0; i -= 1) term = (term + (coefficients[i] ?? 0)) * massFraction;
    density += power * term;
    power *= tau;
  }
  return density;
}

/**
 * Sucrose mass fraction whose solution has the given density, kg/m³, at the
 * given temperature: Newton's method on {@link sucroseDensity}, to 1e-12.
 */
export function sucroseFractionOf(density: number, celsius: number): number {
  let w = (density - sucroseDensity(0, celsius)) / 400;
  for (let i = 0; i < 30; i += 1) {
    const slope = (sucroseDensity(w + 1e-6, celsius) - sucroseDensity(w - 1e-6, celsius)) / 2e-6;
    const step = (sucroseDensity(w, celsius) - density) / slope;
    w -= step;
    if (Math.abs(step) < 1e-13) break;
  }
  return w;
}
