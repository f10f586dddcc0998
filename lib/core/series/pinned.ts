/** A float's offset against the hydrometer, and how well it is known. */
export class Pinned {
  /** Offset of the float, points at OG, and share of it that scales with gravity. */
  private offset = 0;
  private gain = 0;
  private variance: [number, number, number] = [0.8 ** 2 + 0.3, 0, 0.012 ** 2];
  private calibrated = false;

  /** A float level in points, as the hydrometer would show it. */
  calibrate(points: number): number {
    return points - this.offset - this.gain * points;
  }

  get isCalibrated(): boolean {
    return this.calibrated;
  }

  /** Standard deviation of the calibrated level, points. */
  calibrationSd(points: number): number {
    const [a, b, c] = this.variance;
    return Math.sqrt(Math.max(0, a + 2 * points * b + points * points * c));
  }

  /**
   * Hydrometer reading beside a float level: a linear Gaussian update of offset
   * and gain. Returns how far apart the two were before it.
   */
  pin(floatPoints: number, hydrometerPoints: number, sd: number): number {
    const miss = floatPoints - hydrometerPoints - this.offset - this.gain * floatPoints;
    const [a, b, c] = this.variance;
    const pa = a + b * floatPoints;
    const pb = b + c * floatPoints;
    const s = pa + pb * floatPoints + sd * sd;
    this.offset += (pa / s) * miss;
    this.gain += (pb / s) * miss;
    this.variance = [a - (pa * pa) / s, b - (pa * pb) / s, c - (pb * pb) / s];
    this.calibrated = true;
    return miss;
  }

  /** Lets the offset have drifted since the last pin. */
  loosen(days: number): void {
    const [a, b, c] = this.variance;
    this.variance = [a + (0.04 * days) ** 2 + 0.3, b, c];
  }
}
