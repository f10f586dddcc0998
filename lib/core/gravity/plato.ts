/**
 * Specific gravity against degrees Plato or Brix: mass percent of sucrose that
 * gives the same density. Plato and Brix differ by less than 0.01 in this range
 * and are taken as one.
 */

/**
 * Degrees Plato of a specific gravity 20/20. ASBC polynomial; within 0.003 °P of
 * the NBS Circular C440 table to 22 °P, low by 0.02 °P at 29 °P. Below 1.000 it
 * is the customary extrapolation for dry drinks ("apparent extract").
 */
export function platoOf(sg: number): number {
  return ((135.997 * sg - 630.272) * sg + 1111.14) * sg - 616.868;
}

/**
 * Specific gravity 20/20 of a sucrose solution of so many degrees Plato: the
 * inverse of {@link platoOf} by Newton's method, to 1e-12 SG. From -6 to 35 °P.
 */
export function sgOfPlato(plato: number): number {
  let sg = 1 + plato / 258;
  for (let i = 0; i < 20; i += 1) {
    const slope = (3 * 135.997 * sg - 2 * 630.272) * sg + 1111.14;
    const step = (platoOf(sg) - plato) / slope;
    sg -= step;
    if (Math.abs(step) < 1e-13) break;
  }
  return sg;
}

/**
 * Degrees Brix of a specific gravity 20/20. Cubic through the NBS Circular C440
 * (1942) table, rms 0.001 °Bx, good to 30 °Bx, so for strong musts rather than worts.
 */
export function brixOf(sg: number): number {
  return ((182.46007 * sg - 775.68212) * sg + 1262.7794) * sg - 669.56218;
}
