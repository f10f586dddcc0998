/** What the gas of all vessels does to the air of the room they stand in. */
import { figure, how, type Figure } from '../how/how';
import { published } from '../how/sources';
import { roundDown, roundUp } from '../units/rounding';

/** CO2 in the air of a place of work, ppm, averaged over eight hours: EH40/2005 (HSE), 29 CFR 1910.1000 (OSHA). */
export const CO2_LIMIT_PPM = 5000;
/** What fresh air holds, ppm. */
const FRESH_PPM = 420;
/** A small room, 3 by 3 by 2.2 m. Our own choice: nobody has told theirs. */
export const SMALL_ROOM_M3 = 20;
/** Nobody need be told of what a closed room takes longer than a day to gather. Our own rule. */
const WORTH_SAYING_H = 24;

const LIMITS = published('HSE EH40/2005 and 29 CFR 1910.1000 Table Z-1: 5000 ppm of CO2 over eight hours, 15 000 ppm over fifteen minutes (EH40)');

export interface AirNote {
  /** Rise in a closed room, ppm an hour, rounded up. */
  rise: Figure;
  /** Hours from fresh air to the limit, rounded down. */
  hours: number;
  sentence: string;
}

/** Rise of CO2 in a closed room that no air comes into, and how soon it is at the limit for a working day; null where there is too little to say. */
export function airNote(gasLPerH: number, vessels: number, roomM3 = SMALL_ROOM_M3): AirNote | null {
  if (!(gasLPerH > 0) || !(roomM3 > 0)) return null;
  const rise = (1000 * gasLPerH) / roomM3;
  const hours = roundDown((CO2_LIMIT_PPM - FRESH_PPM) / rise, 1);
  if (hours > WORTH_SAYING_H) return null;
  return {
    hours,
    rise: figure(
      roundUp(rise, 10),
      'ppm an hour',
      how('litres of gas an hour ÷ litres of the room, as if no air came in; the limit less 420 ppm of fresh air ÷ the rise gives the hours', LIMITS, [
        ['gas of all vessels', Number(gasLPerH.toFixed(2)), 'L/h'],
        ['room', roomM3, 'm³'],
        ['limit over eight hours', CO2_LIMIT_PPM, 'ppm'],
      ]),
    ),
    sentence: `${vessels === 1 ? 'One vessel gives' : `${vessels} vessels give`} off ${gasLPerH.toFixed(1)} L of carbon dioxide an hour. It collects low, and is not smelt. Closed up with them, a small room of ${roomM3} m³ reaches the limit of a working day in ${hours} h: air it before you go in, and keep a door open.`,
  };
}
