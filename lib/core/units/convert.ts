/** Conversions between the units people read and the ones the core reckons in. */

/** Gravity points (0.001 SG) of a specific gravity at 20 °C/20 °C: 1.062 gives 62. */
export const pointsOf = (sg: number): number => (sg - 1) * 1000;

/** Specific gravity of a number of gravity points: 62 gives 1.062. */
export const sgOf = (points: number): number => 1 + points / 1000;

/** °F of °C. Exact by definition. */
export const fahrenheitOf = (celsius: number): number => celsius * 1.8 + 32;

/** °C of °F. Exact by definition. */
export const celsiusOf = (fahrenheit: number): number => (fahrenheit - 32) / 1.8;

/** Litres in a US liquid gallon: 231 cubic inches of 2.54 cm (NIST Handbook 44, appendix C). */
export const LITRES_PER_US_GALLON = 3.785411784;

/** Litres in an imperial gallon (UK Weights and Measures Act 1985, schedule 1). */
export const LITRES_PER_IMPERIAL_GALLON = 4.54609;
