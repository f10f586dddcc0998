import type { DrinkKind } from '../types';

/** Litres of CO2 (20 °C, 1 bar) that leave 1 L of liquid as it falls 1 point: 1.01 g/L (Balling's split) at 1.84 g/L of gas. */
export const GAS_L_PER_L_PER_POINT = 0.55;

/**
 * Gas leaving the vessel, L/h at 20 °C and 1 bar, from the fall in points a day.
 * Follows the fall closely once the liquid is saturated (Pandiella et al. 1995);
 * the first 1.5 points dissolve. Within 4 % from 1.040 to 1.120. Never below 0.
 */
export function gasLPerH(pointsPerDay: number, volumeL: number): number {
  return (GAS_L_PER_L_PER_POINT * volumeL * Math.max(0, pointsPerDay)) / 24;
}

/** Hours that a bubble stays in the foam (Bikerman's unit of foaminess, 1938): our own choice, 1.0 for beer and 0.3 for the rest. */
export const FOAMINESS_H: Record<DrinkKind, number> = { beer: 1.0, cider: 0.3, mead: 0.3, wine: 0.3 };

/**
 * Gas, L/h, below which an airlock may take the place of the blow-off tube: foam
 * stays under half the headspace and an ordinary airlock passes it. Our own rule.
 */
export function swapGasLPerH(kind: DrinkKind, volumeL: number, vesselL: number): number {
  const headspace = Math.max(vesselL - volumeL, 0.02 * vesselL);
  return Math.min(2, (0.5 * headspace) / FOAMINESS_H[kind]);
}

/** Extra volumes of CO2 if the remaining points ferment in a closed bottle: 0.51 a point. */
export const VOLUMES_PER_POINT = 0.51;
