/**
 * The shapes that the fermentation core takes and gives. Times are instants in
 * milliseconds since 1970-01-01T00:00:00Z; gravity is SG at 20 °C/20 °C;
 * temperature °C; volume L. Absent values are null, never a guess.
 */

/** Milliseconds since 1970-01-01T00:00:00Z. */
export type Instant = number;

export const DRINK_KINDS = ['beer', 'cider', 'mead', 'wine'] as const;
/** `wine` is country or fruit wine. */
export type DrinkKind = (typeof DRINK_KINDS)[number];

/** One reading of a float sensor. */
export interface Reading {
  at: Instant;
  gravity: number;
  temperature: number | null;
  battery?: number | null;
  /** When the server had it. A reading counts only from then on; absent: at once. */
  receivedAt?: Instant | null;
}

export const NECKS = ['blow_off', 'airlock', 'bung', 'open'] as const;
export type Neck = (typeof NECKS)[number];

export const FOAMS = ['none', 'ring', 'cover', 'at_neck'] as const;
/** What foam stands on the drink: `ring` at the glass, `cover` all over it, `at_neck` about to leave the vessel. */
export type Foam = (typeof FOAMS)[number];

export const EVENT_KINDS = ['reading', 'rack', 'addition', 'top_up', 'neck', 'stabilise', 'note'] as const;
/**
 * `reading` is a hydrometer reading already corrected to 20 °C. A `note` that
 * carries a gravity counts as one. `addition` moves the effective original
 * gravity by `sugarG`, or by `volumeL` of liquid at `gravity`; so does `top_up`.
 */
export type EventKind = (typeof EVENT_KINDS)[number];

export interface BatchEvent {
  at: Instant;
  kind: EventKind;
  sugarG?: number | null;
  /** Mass of fruit or other pieces that release sugar slowly, g. */
  fruitG?: number | null;
  volumeL?: number | null;
  gravity?: number | null;
  /** Standard error of a reading's gravity, points; absent: a hydrometer's 0.7. A refractometer in a fermented drink is off by 2 to 4. */
  gravitySd?: number | null;
  /** Of liquid that goes in: its gravity were its alcohol sugar still; absent: `gravity`, which is right for a must. */
  originalGravity?: number | null;
  neck?: Neck | null;
  /** Foam that somebody or a probe saw. */
  foam?: Foam | null;
  /** Of a fining: when it will have sunk. */
  settlesAt?: Instant | null;
  /** When this became known; absent: at once. Lets the past be judged by what was known then. */
  knownAt?: Instant | null;
}

/** What is known of a batch apart from its readings. */
export interface BatchSetup {
  kind: DrinkKind;
  /** Null: not pitched yet, or not told. */
  pitchedAt: Instant | null;
  originalGravity: number | null;
  volumeL: number;
  vesselL: number;
  /** Apparent attenuation as a fraction; above 1 is normal for dry cider, mead and wine. */
  attenuation: { min: number; max: number } | null;
  alcoholToleranceAbv: number | null;
  temperature: { minC: number; maxC: number } | null;
  /** What closes the neck now, if told; the last neck event wins. */
  neck?: Neck | null;
  /** Temperature of the room it stands in, °C; absent or null: not measured. */
  roomC?: number | null;
  events: readonly BatchEvent[];
  /** IANA zone in which sentences name days and hours; absent: UTC. */
  timeZone?: string;
}

export const STAGES = ['not_started', 'lag', 'accelerating', 'peak', 'slowing', 'terminal', 'unknown'] as const;
export type Stage = (typeof STAGES)[number];

export const VERDICTS = ['no', 'soon', 'yes', 'hold', 'unknown'] as const;
export type Verdict = (typeof VERDICTS)[number];

export const CALL_NAMES = ['started', 'neck', 'stalled', 'temperature', 'rack', 'bottle', 'sensor'] as const;
export type CallName = (typeof CALL_NAMES)[number];

/** An estimate with its 80 % interval. */
export interface Estimate {
  value: number;
  lo: number;
  hi: number;
}

/** An estimate with its 80 % and 95 % intervals; the 80 % one lies inside the other. */
export interface WideEstimate extends Estimate {
  lo95: number;
  hi95: number;
}

export interface Evidence {
  name: string;
  value: number;
  /** Null where the figure is shown for its own sake. */
  threshold: number | null;
  unit: string;
}

/** A judgement the program makes, with its evidence. */
export interface Call {
  verdict: Verdict;
  /** Finer kind: sluggish | stuck | cold; refermentation; silent | frozen | drifting; low | high; overdue. */
  kind: string | null;
  since: Instant | null;
  expectedAt: Instant | null;
  /** What and when, one short sentence: `Swap tube for airlock: from Thu 14:00.` */
  headline: string;
  /** Why, one or two short sentences with the figures. */
  reason: string;
  /** What to do first, or null when there is nothing to do. */
  act: string | null;
  /** What would change the verdict. */
  changesIt: string | null;
  evidence: readonly Evidence[];
}

/** The judgement of one batch at one time. */
export interface Assessment {
  at: Instant;
  stage: Stage;
  /** Present gravity, SG, smoothed. */
  gravity: Estimate | null;
  /** Where it was last known to stand, SG: now, or by the last sound word of a float that gives nothing, or by a hydrometer since. */
  lastGravity: { at: Instant; value: number } | null;
  /** Median of the last three hours of data, °C. */
  temperatureC: number | null;
  lastReadingAt: Instant | null;
  /** Fall in points a day, positive while it falls. */
  ratePointsPerDay: Estimate | null;
  gasLPerH: Estimate | null;
  finalGravity: WideEstimate | null;
  terminalAt: Estimate | null;
  abvPercent: number | null;
  /** Strength at the expected final gravity. */
  expectedAbvPercent: number | null;
  /** Apparent attenuation so far, %. */
  attenuationPercent: number | null;
  calls: Record<CallName, Call>;
}

/** A point of the fitted curve (past) or of the forecast (after `at`), SG with its 80 % band. */
export interface CurvePoint {
  at: Instant;
  gravity: number;
  lo: number;
  hi: number;
}

/** What a forecast stands on, small enough to be carried to where it is played with: see ./what-if. Gravities in points. */
export interface Footing {
  at: Instant;
  /** h since the pitch at `at`. */
  hour: number;
  /** Where the stretch begins that the curve follows (the pitch, or the last addition), h since the pitch. */
  from: number;
  /** Original gravity with all sugar added since. */
  effectiveOg: number;
  level: number;
  /** Expected final gravity as it is judged, with the half width of its 80 % interval. */
  finalGravity: { value: number; half80: number };
  /** Thermal age of the stretch now, days at 20 °C, and how much of it a day brings at the present temperature. */
  tau: number;
  warmth: number;
  temperatureC: number | null;
  /** Share of the fall that is done. */
  done: number;
  hoursToEnd: number | null;
  ratePointsPerDay: number | null;
  state: 'falling' | 'stuck' | 'terminal';
  /** Highest pace so far, points a day. */
  maxRate: number;
  peaked: boolean;
  neck: Neck | null;
  /** Parameters of the kinetic curve, its priors, and the readings (medians of stretches) that it was fitted to. */
  parameters: readonly number[];
  prior: readonly { mean: number; sd: number }[];
  data: { hours: readonly number[]; tau: readonly number[]; points: readonly number[]; sd: readonly number[] };
}

/** What `assess` gives: the judgement, and what a picture of it needs. */
export interface Judgement {
  assessment: Assessment;
  /** From the pitch to the likely end, ascending, at most 240 points; empty where nothing can be fitted. */
  curve: readonly CurvePoint[];
  /** What should have happened, where a batch has left its curve (stalled); else empty. */
  expected: readonly CurvePoint[];
  /** Gas in L/h by bin, ascending, at most 240 points. */
  gas: readonly { at: Instant; value: number }[];
  /** Null where nothing can be fitted. */
  footing: Footing | null;
}
