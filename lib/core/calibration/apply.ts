import { sucroseDensity, sucroseFractionOf } from '../gravity/density';
import { valueOf } from './polynomial';

/** What turns what a float sent into gravity. */
export interface Calibration {
  /** In ascending powers of the inclination, degrees; null: the gravity that it sends is taken. */
  coefficients: readonly number[] | null;
  /** Inclinations of the points it was made from, degrees. */
  low: number | null;
  high: number | null;
  /** Added to the gravity, SG. */
  offset: number;
  /** Whether the liquid's own expansion is taken out. */
  correctsTemperature: boolean;
}

/** What a float sent. */
export interface Sent {
  /** SG; null where it sends none. */
  gravity: number | null;
  /** Degrees from the vertical. */
  inclination: number | null;
  /** °C. */
  temperature: number | null;
}

/** Beyond the points by this share of their span, and by a degree at least, the curve still counts; further out there is no gravity. */
const BEYOND = 0.15;
/** Gravities that a must or a drink can have (the contract's span). */
const POSSIBLE = { min: 0.97, max: 1.2 };
/** Where the density of sucrose solutions is known, °C. */
const KNOWN_C = { min: 0, max: 60 };

const WATER_20 = sucroseDensity(0, 20);
const within = (celsius: number) => Math.min(KNOWN_C.max, Math.max(KNOWN_C.min, celsius));

/** The inclinations for which a curve made between `low` and `high` counts, degrees. */
export function validSpan(low: number, high: number): { from: number; to: number } {
  const margin = Math.max(1, (high - low) * BEYOND);
  return { from: Math.max(0, low - margin), to: Math.min(90, high + margin) };
}

/**
 * Density against water at 20 °C of a liquid that has this gravity at 20 °C/20 °C,
 * at another temperature: what a float feels. The liquid expands as a sucrose
 * solution (ICUMSA SPS-4, see `density.ts`); the float's own expansion is not known and not taken out.
 */
export function feltAt(gravity: number, celsius: number): number {
  return sucroseDensity(sucroseFractionOf(gravity * WATER_20, 20), within(celsius)) / WATER_20;
}

/** The reverse of {@link feltAt}: SG at 20 °C/20 °C, to 1e-12. */
export function at20(felt: number, celsius: number): number {
  return sucroseDensity(sucroseFractionOf(felt * WATER_20, within(celsius)), 20) / WATER_20;
}

/** Gravity, SG at 20 °C/20 °C, or null where the calibration cannot tell it. */
export function gravityBy(calibration: Calibration, sent: Sent): number | null {
  const base = calibration.coefficients && sent.inclination !== null ? fromInclination(calibration, sent) : sent.gravity;
  if (base === null) return null;
  const gravity = base + calibration.offset;
  return gravity >= POSSIBLE.min && gravity <= POSSIBLE.max ? gravity : null;
}

function fromInclination({ coefficients, low, high, correctsTemperature }: Calibration, { inclination, temperature }: Sent): number | null {
  if (!coefficients || inclination === null || low === null || high === null) return null;
  const { from, to } = validSpan(low, high);
  if (inclination < from || inclination > to) return null;
  const felt = valueOf(coefficients, inclination);
  // Outside what sugar solutions can be, the correction would leave its formula.
  if (!(felt > 0.9 && felt < 1.3)) return null;
  return correctsTemperature && temperature !== null ? at20(felt, temperature) : felt;
}
