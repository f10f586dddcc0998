/** Parameters of the wine model, per hour and g/L. */
export interface CramerParameters {
  /** Highest specific growth, 1/h. */
  muMax: number;
  /** Nitrogen at half growth, g/L. */
  kN: number;
  /** Cells from nitrogen, g/g. */
  yieldCells: number;
  /** Highest specific alcohol production, g ethanol per g cells per hour. */
  betaMax: number;
  /** Sugar at half production, g/L. */
  kS: number;
  /** Ethanol from sugar, g/g. */
  yieldEthanol: number;
  /** Death per g/L of ethanol, L/(g h). */
  death: number;
}

/**
 * A. C. Cramer, S. Vlassides, D. E. Block, Kinetic model for nitrogen-limited wine
 * fermentations, Biotechnology and Bioengineering 77 (2002) 49-60.
 */
export const CRAMER_2002: CramerParameters = {
  muMax: 0.16,
  kN: 0.01,
  yieldCells: 31,
  betaMax: 0.3,
  kS: 10,
  yieldEthanol: 0.47,
  death: 0.0001,
};

/** Where a ferment stands, g/L. */
export interface Broth {
  cells: number;
  nitrogen: number;
  ethanol: number;
  sugar: number;
}

/**
 * The model's right-hand side, g/(L h): growth until the nitrogen is gone, alcohol
 * from living cells, death that rises with alcohol. `growth`, `production` and
 * `dying` scale the three rates; 1 is the published, isothermal model.
 */
export function rates(parameters: CramerParameters, broth: Broth, growth = 1, production = 1, dying = 1): Broth {
  const nitrogen = Math.max(broth.nitrogen, 0);
  const sugar = Math.max(broth.sugar, 0);
  const mu = (growth * parameters.muMax * nitrogen) / (parameters.kN + nitrogen);
  const beta = (production * parameters.betaMax * sugar) / (parameters.kS + sugar);
  return {
    cells: (mu - dying * parameters.death * broth.ethanol) * broth.cells,
    nitrogen: (-mu * broth.cells) / parameters.yieldCells,
    ethanol: beta * broth.cells,
    sugar: (-beta * broth.cells) / parameters.yieldEthanol,
  };
}
