import type { TelemetryReading } from '@/lib/contracts/telemetry';
import type { Truth } from './ferment';
import { between, normal, stream, type Uniform } from './random';

/** A stretch without a link: what was measured in it comes late, or never. */
export interface Gap {
  fromH: number;
  toH: number;
  kept: boolean;
}

/** How a float sensor departs from the truth. Gravity in points, times in hours since the pitch. */
export interface SensorTraits {
  /** White noise, sd; up to 1.6 times as much while the gas is strong. */
  whitePoints: number;
  /** Slow noise: sd and time constant. */
  slowPoints: number;
  slowHours: number;
  /** Share of readings that a bubble lifts by 3 to 20 points. */
  bubbleShare: number;
  /** Bursts of bubbles, 1 to 7 h each. */
  burstsPerDay: number;
  pointsPerC: number;
  /** Error in proportion to the gravity. */
  gain: number;
  offsetPoints: number;
  /** What settles on the float. */
  driftPointsPerDay: number;
  /** What sticks to it at the height of the foam; it falls off within a day or two. */
  foamPoints: number;
  /** The float hangs on the glass in this span. */
  frozen: { fromH: number; toH: number } | null;
  /** The cell gives up: voltage falls for three days before, then silence. */
  flatAtH: number | null;
  /** Share of readings that never arrive. */
  lostShare: number;
  gaps: readonly Gap[];
  /** How far its clock is off. */
  clockHours: number;
  /** It sees the foam above the liquid. */
  seesFoam: boolean;
}

/** An ordinary float, drawn for a seed; a scenario says what is out of the ordinary. */
export function ordinaryTraits(seed: number): SensorTraits {
  const draw = stream(seed, 'sensor');
  return {
    whitePoints: between(draw, 0.3, 0.6),
    slowPoints: between(draw, 0.1, 0.25),
    slowHours: between(draw, 2, 6),
    bubbleShare: between(draw, 0.002, 0.008),
    burstsPerDay: between(draw, 0.05, 0.2),
    pointsPerC: between(draw, -0.1, 0.1),
    gain: 0.006 * normal(draw),
    offsetPoints: Math.max(-0.8, Math.min(0.8, 0.4 * normal(draw))),
    driftPointsPerDay: between(draw, -0.01, 0.02),
    foamPoints: between(draw, 0, 0.6),
    frozen: null,
    flatAtH: null,
    lostShare: 0.004,
    gaps: [],
    clockHours: 0,
    seesFoam: false,
  };
}

/** What goes over the wire, but for its time. */
export type Measured = Required<Pick<TelemetryReading, 'gravity' | 'temperature' | 'battery' | 'signal'>> & Pick<TelemetryReading, 'foam'>;

/** Gas at which noise and foam are at their full, L/h per litre of drink. */
const STRONG_GAS = 0.04;
/** Foam over a litre of drink: gas by how long the foam holds it, 0.3 h, on about 18 mm a litre. */
const FOAM_MM_PER_GAS = 0.3 * 1000 * 0.18;

const round = (value: number, digits: number) => Number(value.toFixed(digits));
const clamp = (value: number, low: number, high: number) => Math.min(high, Math.max(low, value));

/**
 * One float in one batch. Every reading draws the same amount from every stream,
 * so two floats of one seed differ only where their traits do.
 */
export class FloatSensor {
  private slow = 0;
  private foam = 0;
  private burstUntilH = -1;
  private hangingAt: number | null = null;
  private readonly draws: Record<'white' | 'slow' | 'bubble' | 'burst' | 'temperature' | 'signal', Uniform>;

  constructor(
    private readonly traits: SensorTraits,
    seed: number,
    private readonly volumeL: number,
    /** Steps of the float when somebody moved it. */
    private readonly moves: readonly { atH: number; points: number }[],
  ) {
    const draw = (purpose: string) => stream(seed, purpose);
    this.draws = {
      white: draw('white'),
      slow: draw('slow'),
      bubble: draw('bubble'),
      burst: draw('burst'),
      temperature: draw('temperature'),
      signal: draw('signal'),
    };
  }

  /** What it measures; `passedH` since its last reading. */
  measure(hours: number, passedH: number, truth: Truth): Measured {
    const { traits } = this;
    const strength = clamp(truth.gasLPerH / this.volumeL / STRONG_GAS, 0, 1);
    this.drift(passedH, strength);
    const white = traits.whitePoints * (1 + 0.6 * strength) * normal(this.draws.white);
    const moved = this.moves.reduce((sum, move) => sum + (move.atH <= hours ? move.points : 0), 0);
    const level =
      (truth.gravity - 1) * 1000 * (1 + traits.gain) +
      traits.offsetPoints +
      (traits.driftPointsPerDay * hours) / 24 +
      traits.pointsPerC * (truth.temperatureC - 20) +
      this.foam +
      this.slow +
      moved;
    const bubble = this.bubble(hours, passedH, strength);
    const points = this.held(hours, level) ?? level + white + bubble;
    const signal = Math.round(-63 + 4 * normal(this.draws.signal));
    const temperature = round(truth.temperatureC + 0.05 * normal(this.draws.temperature), 2);
    return {
      gravity: round(clamp(1 + points / 1000, 0.97, 1.2), 4),
      temperature,
      battery: this.battery(hours),
      signal,
      ...(traits.seesFoam ? { foam: Math.round(FOAM_MM_PER_GAS * truth.gasLPerH) } : {}),
    };
  }

  private drift(passedH: number, strength: number): void {
    const keep = Math.exp(-passedH / this.traits.slowHours);
    this.slow = keep * this.slow + Math.sqrt(1 - keep * keep) * this.traits.slowPoints * normal(this.draws.slow);
    const sticking = this.traits.foamPoints * strength;
    this.foam = sticking > this.foam ? sticking : this.foam + (sticking - this.foam) * (1 - Math.exp(-passedH / 30));
  }

  private bubble(hours: number, passedH: number, strength: number): number {
    const chance = this.draws.burst();
    const length = between(this.draws.burst, 1, 7);
    if (strength > 0.1 && hours > this.burstUntilH && chance < (this.traits.burstsPerDay * passedH) / 24) this.burstUntilH = hours + length;
    const lifted = this.draws.bubble() < (hours < this.burstUntilH ? 0.5 : this.traits.bubbleShare);
    const height = between(this.draws.bubble, 3, hours < this.burstUntilH ? 10 : 20);
    return lifted ? height : 0;
  }

  /** A float that hangs on the glass shows one number, with hardly any noise. */
  private held(hours: number, level: number): number | null {
    const { frozen } = this.traits;
    if (!frozen || hours < frozen.fromH || hours >= frozen.toH) return (this.hangingAt = null);
    this.hangingAt ??= level;
    return this.hangingAt + 0.04 * Math.sin(hours);
  }

  private battery(hours: number): number {
    const { flatAtH } = this.traits;
    const steady = 4.1 - 0.0045 * (hours / 24);
    if (flatAtH === null) return round(Math.max(3.3, steady), 2);
    const leftH = flatAtH - hours;
    return round(leftH > 72 ? steady : 2.9 + (steady - 2.9) * clamp(leftH / 72, 0, 1) ** 0.7, 2);
  }
}
