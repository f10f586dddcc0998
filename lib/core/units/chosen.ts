/** The units a person reads and types in. What is kept and reckoned with is always SG, °C and litres. */
export const GRAVITY_UNITS = ['sg', 'brix', 'plato'] as const;
export type GravityUnit = (typeof GRAVITY_UNITS)[number];
export const TEMPERATURE_UNITS = ['c', 'f'] as const;
export type TemperatureUnit = (typeof TEMPERATURE_UNITS)[number];
export const VOLUME_UNITS = ['l', 'us_gal', 'imp_gal'] as const;
export type VolumeUnit = (typeof VOLUME_UNITS)[number];

export interface ChosenUnits {
  gravity: GravityUnit;
  temperature: TemperatureUnit;
  volume: VolumeUnit;
}

export const USUAL_UNITS: ChosenUnits = { gravity: 'sg', temperature: 'c', volume: 'l' };
