import type { CalibrationFit } from '@/lib/core/calibration/calibrate';
import { gravityText } from '@/components/ui/units';

/** Where things stand in the picture, px. */
export interface Frame {
  width: number;
  height: number;
  left: number;
  right: number;
  top: number;
  bottom: number;
}

export interface Scale {
  from: number;
  to: number;
  ticks: number[];
}

const STEPS = [0.001, 0.002, 0.005, 0.01, 0.02, 0.05, 0.1, 0.5, 1, 2, 5, 10, 20, 50];

/** A scale that holds the values with even ticks, about `wanted` of them. */
export function scaleOf(values: readonly number[], wanted: number): Scale {
  const [low, high] = values.length === 0 ? [0, 1] : [Math.min(...values), Math.max(...values)];
  const span = high - low || Math.abs(high) * 0.01 || 1;
  const step = STEPS.find((candidate) => span / candidate <= wanted) ?? 100;
  const from = Math.floor((low - span * 0.02) / step) * step;
  const to = Math.ceil((high + span * 0.02) / step) * step;
  const count = Math.round((to - from) / step);
  return { from, to, ticks: Array.from({ length: count + 1 }, (_, index) => Number((from + index * step).toFixed(6))) };
}

/** Of inclinations: nothing leans less than 0° or more than 90°. */
export function degreesScale(values: readonly number[], wanted: number): Scale {
  const { from, to, ticks } = scaleOf([0, ...values], wanted);
  return { from: Math.max(0, from), to: Math.min(90, to), ticks: ticks.filter((tick) => tick >= 0 && tick <= 90) };
}

export const placed = (scale: Scale, start: number, end: number) => (value: number) => start + ((value - scale.from) / (scale.to - scale.from)) * (end - start);

/** The curve and its band as SVG paths. */
export function curvePaths(fit: CalibrationFit, x: (degrees: number) => number, y: (gravity: number) => number): { line: string; band: string } {
  const at = (inclination: number, felt: number) => `${x(inclination).toFixed(1)} ${y(felt).toFixed(1)}`;
  const line = fit.curve.map((point, index) => `${index === 0 ? 'M' : 'L'}${at(point.inclination, point.felt)}`).join('');
  const upper = fit.curve.map((point) => at(point.inclination, point.felt + point.half));
  const lower = fit.curve.map((point) => at(point.inclination, point.felt - point.half)).reverse();
  return { line, band: `M${[...upper, ...lower].join('L')}Z` };
}

/** The picture in one sentence, for those who hear the page. */
export function pictureWords(fit: CalibrationFit): string {
  const points = (gravity: number) => `${(gravity * 1000).toFixed(1)} points`;
  return `Curve of degree ${fit.degree} through ${fit.points.length} points from ${gravityText(fit.gravityLow)} at ${fit.low.toFixed(1)}° to ${gravityText(fit.gravityHigh)} at ${fit.high.toFixed(1)}°; largest left over ${points(Math.max(...fit.points.map((point) => Math.abs(point.leftOver))))}.`;
}

/** Which labels have room: from the left, each at least so far from the last one shown, px. */
export function withRoom(places: readonly number[], apart: number): boolean[] {
  let last = -Infinity;
  const order = places.map((place, index) => ({ place, index })).sort((a, b) => a.place - b.place);
  const shown = places.map(() => false);
  for (const { place, index } of order) {
    if (place - last < apart) continue;
    shown[index] = true;
    last = place;
  }
  return shown;
}
