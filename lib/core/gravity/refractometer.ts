/** The refractometer: at the start, and in a drink that has alcohol in it. */
import { abwBalling } from '../strength/strength';
import { brixOf, platoOf, sgOfPlato } from './plato';

/** Correction to add to °Bx by temperature, at 10, 15, 20, 25 and 30 % (OIV-MA-AS2-02, Table I, 10 to 17 °C). */
const BELOW_20: Readonly<Record<number, readonly [number, number, number, number, number]>> = {
  10: [-0.59, -0.62, -0.65, -0.67, -0.69],
  11: [-0.54, -0.57, -0.59, -0.61, -0.63],
  12: [-0.49, -0.51, -0.53, -0.55, -0.56],
  13: [-0.43, -0.45, -0.47, -0.48, -0.5],
  14: [-0.38, -0.39, -0.4, -0.42, -0.43],
  15: [-0.32, -0.33, -0.34, -0.35, -0.36],
  16: [-0.26, -0.27, -0.28, -0.28, -0.29],
  17: [-0.2, -0.2, -0.21, -0.21, -0.22],
  20: [0, 0, 0, 0, 0],
};
const COLUMNS = [10, 15, 20, 25, 30] as const;
const ROWS = Object.keys(BELOW_20).map(Number);

function cell(celsius: number, column: number): number {
  const row = BELOW_20[celsius];
  return row?.[column] ?? 0;
}

/**
 * °Bx corrected to 20 °C, by interpolation in the OIV's table. Null outside the
 * part of the table that is known here, 10 to 20 °C: let the sample come to room
 * temperature, or use an instrument that corrects itself.
 */
export function correctBrix(brix: number, sampleC: number): number | null {
  if (!(sampleC >= 10 && sampleC <= 20)) return null;
  const j = Math.min(COLUMNS.length - 2, Math.max(0, Math.floor((Math.min(30, Math.max(10, brix)) - 10) / 5)));
  const across = (Math.min(30, Math.max(10, brix)) - (COLUMNS[j] ?? 10)) / 5;
  const above = ROWS.find((t) => t >= sampleC) ?? 20;
  const below = ROWS.findLast((t) => t <= sampleC) ?? 10;
  const at = (t: number): number => cell(t, j) * (1 - across) + cell(t, j + 1) * across;
  const down = above === below ? 0 : (sampleC - below) / (above - below);
  return brix + at(below) * (1 - down) + at(above) * down;
}

/** Specific gravity 20/20 of an unfermented must of so many °Bx: the inverse of {@link brixOf} by Newton's method, to 1e-12. */
export function sgOfBrix(brix: number): number {
  let sg = 1 + brix / 258;
  for (let i = 0; i < 20; i += 1) {
    const slope = (3 * 182.46007 * sg - 2 * 775.68212) * sg + 1262.7794;
    const step = (brixOf(sg) - brix) / slope;
    sg -= step;
    if (Math.abs(step) < 1e-13) break;
  }
  return sg;
}

/**
 * °Bx that 1 % mass of alcohol adds to the reading: rise of the refractive index of
 * ethanol-water, 1.3330 to 1.3395 at 10 %, over that of sucrose, 1.3330 to 1.3478
 * (CRC Handbook, concentrative properties: from memory, and not to be tested
 * against; the sucrose value is OIV's). A tenth more or less of it moves the
 * gravity of a dry cider by 0.0015.
 */
export const BRIX_PER_ALCOHOL = (1.3395 - 1.333) / (1.34782 - 1.333);

/** What a refractometer would show, °Bx, in a drink of these gravities: its real extract and its alcohol's share. */
export function brixShown(originalGravity: number, gravity: number): number {
  const [original, apparent] = [platoOf(originalGravity), platoOf(gravity)];
  return 0.1808 * original + 0.8192 * apparent + BRIX_PER_ALCOHOL * abwBalling(original, apparent);
}

/**
 * Specific gravity of a drink with alcohol from its refractometer reading at 20 °C
 * and its original gravity: Balling's extract and alcohol, with the alcohol's
 * share of the reading taken off. Within 0.004 SG of a hydrometer for most drinks;
 * never good enough to bottle by. Null where the reading is above the original.
 *
 * @param wortFactor what the instrument shows for a must over its true °Bx; 1 unless the person has found another
 */
export function gravityByRefractometer(originalGravity: number, shownBrix: number, wortFactor = 1): number | null {
  const original = platoOf(originalGravity);
  const shown = shownBrix / wortFactor;
  if (shown > original + 0.3) return null;
  // shown = RE + k A and A = (OE − RE)/(2.0665 − 0.010665 OE), solved for RE.
  const perAlcohol = 2.0665 - 0.010665 * original;
  const real = (shown * perAlcohol - BRIX_PER_ALCOHOL * original) / (perAlcohol - BRIX_PER_ALCOHOL);
  return sgOfPlato((real - 0.1808 * original) / 0.8192);
}
