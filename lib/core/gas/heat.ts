/** °C that a must warms as it falls a point and keeps all its heat: 100 kJ per mol of hexose (Williams, Am. J. Enol. Vitic. 33 (1982) 149). */
const DEGREES_PER_POINT = 0.31;

/** Hours in which a vessel loses most of a difference to its room: our own choice, longer the larger it is. */
const lossHours = (volumeL: number): number => 4 + 0.6 * volumeL;

/**
 * °C above its room of a vessel that works steadily (Williams 1982, above; the loss is our own).
 *
 * @param volumeL what is in the vessel, L
 * @param pointsPerDay fall of the gravity; a rise warms nothing
 */
export function selfHeatingC(volumeL: number, pointsPerDay: number): number {
  return (DEGREES_PER_POINT / 24) * lossHours(volumeL) * Math.max(0, pointsPerDay);
}
