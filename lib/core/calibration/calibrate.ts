import { feltAt, validSpan } from './apply';
import { fitPolynomial, slopeExtremes, valueOf } from './polynomial';
import { t95 } from './student';

export const DEGREES = [1, 2, 3] as const;
export type Degree = (typeof DEGREES)[number];

/** One point: the float in a liquid whose gravity is known. */
export interface CalibrationPoint {
  /** Degrees from the vertical. */
  inclination: number;
  /** Known gravity, SG at 20 °C/20 °C. */
  gravity: number;
  /** Of the liquid, °C. */
  temperature: number;
}

export interface JudgedPoint extends CalibrationPoint {
  /** Known less fitted, SG. */
  leftOver: number;
  /** 0 to 1: how far the curve follows this point alone. */
  leverage: number;
  /** What the curve made without this point would miss it by, SG; null where it alone holds the curve. */
  missedBy: number | null;
}

export interface CalibrationFit {
  degree: Degree;
  /** Of the density felt, in ascending powers of degrees. */
  coefficients: number[];
  /** Span of the points, degrees. */
  low: number;
  high: number;
  /** Span of their gravities. */
  gravityLow: number;
  gravityHigh: number;
  correctsTemperature: boolean;
  /** Residual standard deviation, SG. */
  sigma: number;
  /** 95 % half width of the curve where it is widest between its points, SG. */
  rightTo: number;
  points: JudgedPoint[];
  /** The curve with its 95 % band, for the picture. */
  curve: { inclination: number; felt: number; half: number }[];
}

export type FitOutcome = { ok: true; fit: CalibrationFit } | { ok: false; reason: string };

/** Points closer together than this in gravity say nothing about the slope (common practice). */
const LEAST_SPAN_SG = 0.02;
const CURVE_STEPS = 60;

/**
 * Fits the density that a float feels to its inclination. Refused with the reason:
 * too few points, too close together, or a curve that turns back on itself
 * anywhere it would be used, where one inclination would mean two gravities.
 */
export function fitCalibration(points: readonly CalibrationPoint[], degree: Degree, correctsTemperature: boolean): FitOutcome {
  const needed = degree + 2;
  if (points.length < needed) return { ok: false, reason: `A curve of degree ${degree} needs ${needed} points or more; ${points.length === 1 ? 'there is 1' : `there are ${points.length}`}.` };
  const gravities = points.map((point) => point.gravity);
  const [gravityLow, gravityHigh] = [Math.min(...gravities), Math.max(...gravities)];
  if (gravityHigh - gravityLow < LEAST_SPAN_SG) return { ok: false, reason: `The points lie within ${Math.round((gravityHigh - gravityLow) * 1000)} points of gravity; they must span 20 or more.` };
  const x = points.map((point) => point.inclination);
  const y = points.map((point) => (correctsTemperature ? feltAt(point.gravity, point.temperature) : point.gravity));
  const fit = fitPolynomial(x, y, degree);
  if (!fit || fit.sigma === null) return { ok: false, reason: `A curve of degree ${degree} needs ${degree + 1} different inclinations or more.` };

  const [low, high] = [Math.min(...x), Math.max(...x)];
  const span = validSpan(low, high);
  const slope = slopeExtremes(fit.coefficients, span.from, span.to);
  if (!(slope.min > 0 || slope.max < 0)) return { ok: false, reason: turnsBack(fit.coefficients, span, degree) };

  const factor = t95(points.length - degree - 1);
  const half = (at: number) => factor * (fit.standardError(at) ?? 0);
  const curve = Array.from({ length: CURVE_STEPS + 1 }, (_, step) => {
    const inclination = span.from + ((span.to - span.from) * step) / CURVE_STEPS;
    return { inclination, felt: valueOf(fit.coefficients, inclination), half: half(inclination) };
  });
  return {
    ok: true,
    fit: {
      degree,
      coefficients: fit.coefficients,
      low,
      high,
      gravityLow,
      gravityHigh,
      correctsTemperature,
      sigma: fit.sigma,
      rightTo: Math.max(half(low), half(high), ...curve.filter((at) => at.inclination >= low && at.inclination <= high).map((at) => at.half)),
      points: points.map((point, index) => ({
        ...point,
        leftOver: fit.residuals[index]!,
        leverage: fit.leverage[index]!,
        // The deleted residual e/(1 − h): Cook, Weisberg, Residuals and Influence in Regression (1982), section 2.2.
        missedBy: fit.leverage[index]! > 1 - 1e-9 ? null : fit.residuals[index]! / (1 - fit.leverage[index]!),
      })),
      curve,
    },
  };
}

function turnsBack(coefficients: readonly number[], span: { from: number; to: number }, degree: number): string {
  let place = span.from;
  let sign = 0;
  for (let step = 0; step <= 200; step += 1) {
    const at = span.from + ((span.to - span.from) * step) / 200;
    const slope = slopeExtremes(coefficients, at, at).min;
    if (sign !== 0 && Math.sign(slope) !== sign) {
      place = at;
      break;
    }
    sign = Math.sign(slope) || sign;
  }
  return `The curve turns back near ${place.toFixed(1)}°: one inclination would mean two gravities. ${degree > 1 ? 'Leave out a point that is wrong, take a straighter curve, or add points there.' : 'Leave out the point that is wrong.'}`;
}
