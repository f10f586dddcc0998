import type { BatchSetup, CurvePoint, Estimate, Footing, Instant } from './types';
import { effectOf, type Addition, type Vat } from './additions/effect';
import { blend, contentsOf, NOTHING, readContents, sweetened, unfermented } from './family/contents';
import { hoursInterval } from './fit/intervals';
import { KineticCurve } from './fit/kinetic';
import { fitCurve } from './fit/map';
import { gasLPerH, swapGasLPerH } from './gas/gas';
import { warmth } from './series/track';
import { EXTRACT_PER_ETHANOL, LOST_PER_ETHANOL } from './strength/expected';
import { abvBalling, pointsAtTolerance } from './strength/strength';
import { pointsOf, sgOf } from './units/convert';

/** Something that has not happened. Absent: as it is. */
export interface WhatIf {
  /** Where it would stop, SG. */
  finalGravity?: number | undefined;
  /** The drink this warm from now on, °C. */
  temperatureC?: number | undefined;
  /** Sugar that would go in now, g. */
  sugarG?: number | undefined;
  /** A liquid that would go in now: must, juice or syrup. */
  liquid?: { volumeL: number; gravity: number } | undefined;
}

type Vessel = Pick<BatchSetup, 'kind' | 'volumeL' | 'vesselL' | 'alcoholToleranceAbv'>;

export interface WhatIfOutcome {
  /** From now on. */
  curve: readonly CurvePoint[];
  volumeL: number;
  /** With everything stirred in and before any of it ferments, SG. */
  gravity: number;
  finalGravity: number;
  /** Within a point of its end. Null where it is at its end already, or rests and nothing says that it will go on. */
  end: Estimate | null;
  abvPercent: number;
  /** Most gas from now on, L/h, and when. */
  gas: { value: number; at: Instant };
  neck: { limit: number; /** `tube` until `from`, an airlock afterwards; null: an airlock will do from now on. */ tubeUntil: Instant | null };
  /** The yeast bears no more alcohol than this, so that sugar is left. */
  toleranceReached: boolean;
}

const HOUR_MS = 3_600_000;
const POINTS = 120;
/** The final gravity is told, not estimated: no freedom is left to it, points. */
const TOLD_SD = 0.002;
/** Onset after an addition to a batch that works, days at 20 °C: the yeast is there already (as the priors have it). */
const RESTART_ONSET = 0.12;
/** An airlock has to suffice for this long before it takes the tube's place, h (as the neck call has it). */
const SURE_H = 9;

/**
 * What would become of a batch if one thing were otherwise, from its own fitted
 * curve. Without a change it is the forecast itself. Another final gravity fits
 * the curve to the same readings anew with that end; another temperature runs
 * the same curve faster or slower (Q10 as in the judgement); an addition begins
 * a new stretch in which the yeast works off what is there at the pace it had,
 * in points, less what alcohol takes from it (our own approximation), and all
 * added sugar ferments unless the yeast's tolerance stops it. Null where the
 * vessel could not hold it, or where there is nothing to go by.
 */
export function whatIf(footing: Footing, vessel: Vessel, change: WhatIf = {}): WhatIfOutcome | null {
  const added = additionOf(change);
  const fitted = change.finalGravity === undefined ? new KineticCurve(footing.parameters) : endingAt(footing, pointsOf(change.finalGravity));
  if (!fitted) return null;
  const pace = change.temperatureC === undefined ? footing.warmth : warmth(change.temperatureC);
  if (added) return withAddition(footing, vessel, added, fitted, pace, change.finalGravity);
  const scene: Scene = { footing, vessel, pace, volumeL: vessel.volumeL, effectiveOg: footing.effectiveOg, level: footing.level };
  const fg = change.finalGravity === undefined ? footing.finalGravity.value : fitted.fg;
  if (footing.state === 'terminal') return told(scene, resting(footing.level), fg, null, false);
  // A curve fitted to a stall ends at the stall: what the yeast could still do is in its range.
  if (footing.state === 'stuck') return takenUp(scene, change.finalGravity === undefined ? Math.min(footing.prior[1]!.mean, footing.level) : fg);
  const hours = hoursTo(footing, fitted, pace, change.finalGravity !== undefined);
  return told(scene, { curve: fitted, from: footing.tau }, fg, hours, false);
}

interface Scene {
  footing: Footing;
  vessel: Vessel;
  /** Thermal days in a day. */
  pace: number;
  volumeL: number;
  effectiveOg: number;
  level: number;
}

/** A curve and the thermal age at which it stands now. */
interface Course {
  curve: Pick<KineticCurve, 'gravity' | 'rate'>;
  from: number;
}

function additionOf({ sugarG, liquid }: WhatIf): Addition | null {
  if (sugarG !== undefined && sugarG > 0) return { what: 'sugar', sugarG, waterG: 0 };
  return liquid && liquid.volumeL > 0 ? { what: 'must', ...liquid } : null;
}

/** The same readings with another end. */
function endingAt(footing: Footing, fg: number): KineticCurve | null {
  if (fg >= footing.effectiveOg - 1) return null;
  const { hours, tau, points, sd } = footing.data;
  const normals = footing.prior.map((normal, j) => (j === 1 ? { mean: fg, sd: TOLD_SD } : normal));
  const data = { n: points.length, hours: Float64Array.from(hours), tau: Float64Array.from(tau), g: Float64Array.from(points), sd: Float64Array.from(sd) };
  const start = footing.parameters.map((value, j) => (j === 1 ? fg : value));
  return fitCurve(data, { normals }, start)?.curve ?? null;
}

/** Hours until the curve is within a point of its end; as the judgement has it where only the pace is another. */
function hoursTo(footing: Footing, curve: KineticCurve, pace: number, refitted: boolean): number {
  const byCurve = (one: KineticCurve, warm: number): number => {
    const drop = one.og - one.fg;
    return drop <= 1 ? 0 : Math.max(0, ((one.tauOfShare(1 / drop) - footing.tau) / warm) * 24);
  };
  if (refitted || footing.hoursToEnd === null) return byCurve(curve, pace);
  // The judgement holds the curve against the tail of the record; a warmer day shortens both alike.
  return (footing.hoursToEnd * footing.warmth) / pace;
}

const resting = (level: number): Course => ({ curve: { gravity: () => level, rate: () => 0 }, from: 0 });

/** A batch that rests short of its end, were it to take up again: an exponential at the best pace it had. */
function takenUp(scene: Scene, fg: number): WhatIfOutcome {
  const { footing, level, pace } = scene;
  const rest = level - fg;
  const share = Math.max(0.15, Math.min(0.6, footing.maxRate / Math.max(20, footing.effectiveOg))) / footing.warmth;
  const course: Course = { curve: { gravity: (tau) => fg + rest * Math.exp(-share * tau), rate: (tau) => rest * share * Math.exp(-share * tau) }, from: 0 };
  return told(scene, course, fg, rest <= 1 ? 0 : (24 * Math.log(rest)) / share / pace, false);
}

function withAddition(footing: Footing, vessel: Vessel, addition: Addition, fitted: KineticCurve, pace: number, toldFg: number | undefined): WhatIfOutcome | null {
  const vat = { volumeL: vessel.volumeL, originalGravity: sgOf(footing.effectiveOg), gravity: sgOf(footing.level) };
  const after = effectOf(vat, addition)?.after;
  if (!after || after.volumeL > vessel.vesselL) return null;
  const effectiveOg = pointsOf(after.effectiveOg);
  const level = pointsOf(after.gravity);
  const settled = toldFg === undefined ? footing.finalGravity.value : pointsOf(toldFg);
  const { fg, toleranceReached } = endAfter(vat, sgOf(Math.min(settled, footing.level)), addition, vessel.alcoholToleranceAbv);
  const scene: Scene = { footing, vessel, pace, volumeL: after.volumeL, effectiveOg, level };
  const drop = level - fg;
  if (drop <= 1) return told(scene, resting(level), fg, 0, toleranceReached);
  // Uptake and its half-saturation hold in points, not in shares of a fall; alcohol made so far slows it down.
  const scale = (fitted.og - fitted.fg) / drop;
  const slowed = 1 - fitted.delta * (1 - Math.min(1, Math.max(0, (footing.level - fitted.fg) / (fitted.og - fitted.fg))));
  const kr = Math.min(Math.exp(3), fitted.kr * scale);
  const kappa = (fitted.k * scale * slowed) / (1 + kr);
  const curve = new KineticCurve([level, fg, Math.log(Math.min(20, Math.max(0.007, kappa))), Math.log(RESTART_ONSET), Math.log(Math.max(0.0025, kr)), Math.log(fitted.delta / (1 - fitted.delta))]);
  return told(scene, { curve, from: 0 }, fg, (curve.tauOfShare(1 / drop) / pace) * 24, toleranceReached);
}

/**
 * Where a drink that would have stopped at `fg` (SG) stops after an addition: the
 * extract it would have left stays, added sugar ferments out, added must leaves the
 * same share as the batch's own. By mass (Balling).
 */
function endAfter(vat: Vat, fg: number, addition: Addition, toleranceAbv: number | null): { fg: number; toleranceReached: boolean } {
  const extra = addition.what === 'must' ? unfermented(addition.volumeL, addition.gravity) : addition.what === 'sugar' ? sweetened(addition.sugarG, addition.waterG) : NOTHING;
  const now = contentsOf(vat);
  const end = contentsOf({ ...vat, gravity: fg });
  const share = end.extractG / end.massG;
  // The liquid loses what leaves as gas and yeast on its way to the end.
  const lost = LOST_PER_ETHANOL / EXTRACT_PER_ETHANOL;
  const left = (share * (now.massG - lost * now.extractG)) / (1 - share * lost);
  const all = now.extractG + EXTRACT_PER_ETHANOL * now.ethanolG;
  const leftOfExtra = addition.what === 'must' && all > 0 ? (extra.extractG * Math.max(0, left)) / all : 0;
  const mixed = blend([now, extra]);
  const made = Math.max(0, mixed.extractG - left - leftOfExtra) / EXTRACT_PER_ETHANOL;
  const read = readContents({ massG: mixed.massG - LOST_PER_ETHANOL * made, ethanolG: mixed.ethanolG + made, extractG: mixed.extractG - EXTRACT_PER_ETHANOL * made });
  const before = readContents(mixed);
  if (!read || !before) return { fg: pointsOf(fg), toleranceReached: false };
  const dry = pointsOf(read.gravity);
  if (toleranceAbv === null) return { fg: dry, toleranceReached: false };
  // A yeast that has borne more than its packet says may be expected to bear that.
  const borne = Math.max(toleranceAbv, abvBalling(vat.originalGravity, fg));
  const stop = Math.min(pointsAtTolerance(pointsOf(before.effectiveOg), borne), pointsOf(before.gravity));
  return stop > dry ? { fg: stop, toleranceReached: true } : { fg: dry, toleranceReached: false };
}

/** Curve, end, strength, gas and neck of a course. */
function told({ footing, vessel, pace, volumeL, effectiveOg, level }: Scene, { curve, from }: Course, fg: number, hours: number | null, toleranceReached: boolean): WhatIfOutcome {
  const at = (ahead: number): Instant => footing.at + Math.round(ahead * HOUR_MS);
  const gravity = (ahead: number): number => curve.gravity(from + (ahead / 24) * pace);
  const gas = (ahead: number): number => gasLPerH(curve.rate(from + (ahead / 24) * pace) * pace, volumeL);
  const span = Math.max(24, Math.min(60 * 24, 1.15 * (hours ?? 0)));
  const half = footing.finalGravity.half80;
  const points = Array.from({ length: POINTS }, (_, i): CurvePoint => {
    const ahead = (i / (POINTS - 1)) * span;
    // The band opens towards that of the end.
    const doubt = Math.max(0.5, half * Math.min(1, ahead / Math.max(24, hours ?? 24)));
    const value = gravity(ahead);
    return { at: at(ahead), gravity: sgOf(value), lo: sgOf(value - doubt), hi: sgOf(value + doubt) };
  });
  const limit = swapGasLPerH(vessel.kind, volumeL, vessel.vesselL);
  let most = { value: gas(0), at: footing.at };
  let over = most.value >= limit ? 0 : null;
  for (let ahead = 3; ahead <= span; ahead += 3) {
    const value = gas(ahead);
    if (value > most.value) most = { value, at: at(ahead) };
    if (value >= limit) over = ahead;
  }
  // As long as the krausen builds the tube stays on, whatever the figure says.
  if (!footing.peaked && most.value > 0) over = Math.max(over ?? 0, (most.at - footing.at) / HOUR_MS);
  // A new stretch is known as well as its share of the whole fall allows, not as well as the old one was.
  const done = effectiveOg === footing.effectiveOg ? footing.done : Math.min(0.99, Math.max(0, (effectiveOg - level) / Math.max(1, effectiveOg - fg)));
  const interval = hours === null ? null : hoursInterval(hours, done);
  return {
    curve: points,
    volumeL,
    gravity: sgOf(level),
    finalGravity: sgOf(fg),
    end: hours === null || interval === null ? null : { value: at(hours), lo: at(interval.lo), hi: at(interval.hi) },
    abvPercent: abvBalling(sgOf(effectiveOg), sgOf(fg)),
    gas: most,
    neck: { limit, tubeUntil: over === null ? null : at(over + 3 + SURE_H) },
    toleranceReached,
  };
}
