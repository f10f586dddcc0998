import type { Picture } from './picture';

/**
 * A chart's strips share one canvas and one time axis. Each has its own scale,
 * which is stretched over the whole height so that the strip's own values fall
 * inside it; then a post or the now-line can run through all of them.
 */
export interface Strip {
  /** Pixels from the top of the plot to the strip's highest value. */
  top: number;
  /** Pixels from its highest to its lowest value. */
  height: number;
  min: number;
  max: number;
}

export type ChartStyle = 'page' | 'phone' | 'lane';

export interface Layout {
  style: ChartStyle;
  /** Of the whole plot, px. */
  height: number;
  gravity: Strip;
  temperature: Strip | null;
  gas: Strip | null;
  /** Where a strip ends and the next begins, px from the top. */
  rules: number[];
  ticks: { gravity: number[]; temperature: number[]; gas: number[] };
  /** Gutters for the figures at the left and the edge at the right. */
  left: number;
  right: number;
  /** A phone's lane: the likely end stands at the top right, away from the temperature, and the reading at the pitch goes without its figure. */
  short: boolean;
}

/** The lowest and highest value of a strip's scale, stretched over the whole plot. */
export function stretched(strip: Strip, height: number): [number, number] {
  const perPixel = (strip.max - strip.min) / strip.height;
  return [strip.max - (height - strip.top) * perPixel, strip.max + strip.top * perPixel];
}

/** Round values inside a span, about `count` of them, steps of 1, 2 or 5. */
export function roundSteps(min: number, max: number, count: number): number[] {
  if (!(max > min) || count < 1) return [];
  const rough = (max - min) / count;
  const power = 10 ** Math.floor(Math.log10(rough));
  const step = [1, 2, 5, 10].map((factor) => factor * power).find((candidate) => candidate >= rough * 0.999)!;
  const first = Math.ceil(min / step - 1e-9);
  const last = Math.floor(max / step + 1e-9);
  return Array.from({ length: last - first + 1 }, (_, index) => Number(((first + index) * step).toPrecision(12)));
}

const POINT = 0.001;

/** Between the middles of two figures of an axis, px: less, and one is written onto the other. */
const FIGURES_APART = 13;
const known = (values: readonly (number | null | undefined)[]): number[] => values.filter((value): value is number => typeof value === 'number' && Number.isFinite(value));

/**
 * The highest reading that still says something of the fall. Single ones above
 * it are bubbles; they are drawn as far as the room over the ceiling goes.
 */
function ceilingOf(readings: readonly number[]): number {
  const sorted = [...readings].sort((a, b) => a - b);
  return sorted[Math.floor((sorted.length - 1) * 0.97)] ?? -Infinity;
}

/** Floor and ceiling of the fall: the bed and the original gravity, widened by what lies outside them. */
function gravitySpan(picture: Picture, page: boolean): { min: number; max: number } {
  const readings = known(picture.readings.gravity);
  const laid = (picture.laid ?? []).flatMap((one) => one.points.map((point) => point.gravity));
  const marked = known([...picture.rings.map((ring) => ring.gravity), ...picture.curve.map((point) => (page ? point.hi : point.gravity)), ...laid]);
  const seen = [...readings, ...marked];
  const top = Math.max(ceilingOf(readings), ...marked, picture.originalGravity ?? -Infinity, (picture.bed?.value ?? -Infinity) + 10 * POINT);
  const lowest = Math.min(...seen, picture.originalGravity ?? Infinity);
  const floor = picture.bed?.value ?? lowest - 2 * POINT;
  if (!Number.isFinite(top)) return { min: 1, max: 1.06 };
  // A reading a little under the bed is drawn under it; only a far one moves the floor.
  const min = lowest < floor - 4 * POINT ? lowest : floor;
  return { min, max: Math.max(top, min + 10 * POINT) };
}

function temperatureSpan(picture: Picture): { min: number; max: number } | null {
  const seen = known(picture.readings.temperature);
  const ends = known([picture.range?.min, picture.range?.max]);
  if (seen.length === 0 && ends.length === 0) return null;
  let min = Math.min(...seen, ...ends);
  let max = Math.max(...seen, ...ends);
  if (max - min < 4) [min, max] = [(min + max) / 2 - 2, (min + max) / 2 + 2];
  return { min, max };
}

function pageLayout(picture: Picture, style: 'page' | 'phone'): Layout {
  const phone = style === 'phone';
  const [gravityHeight, stripHeight] = phone ? [228, 58] : [336, 92];
  const under = phone ? 40 : 40;
  const fall = gravitySpan(picture, true);
  // A reading at the top has its figure over it.
  const gravityTop = phone ? 24 : 30;
  const gravity = { top: gravityTop, height: gravityHeight - under - gravityTop, ...fall };
  const warmth = temperatureSpan(picture);
  const hasGas = picture.gas.length > 0;
  const rules = [gravityHeight];
  let next = gravityHeight;
  let temperature: Strip | null = null;
  let gas: Strip | null = null;
  if (warmth) {
    temperature = { top: next + (phone ? 20 : 26), height: stripHeight - (phone ? 32 : 40), ...warmth };
    next += stripHeight;
    rules.push(next);
  }
  if (hasGas) {
    const peak = Math.max(...picture.gas.map((bin) => bin.value), picture.airlockHolds ?? 0, 0.05);
    gas = { top: next + (phone ? 20 : 24), height: stripHeight - (phone ? 30 : 34), min: 0, max: peak };
    next += stripHeight;
    rules.push(next);
  }
  const bed = picture.bed?.value ?? null;
  return {
    style,
    height: next,
    gravity,
    temperature,
    gas,
    rules,
    ticks: {
      // A round value too near the bed's own figure gives way to it.
      gravity: roundSteps(gravity.min, gravity.max, phone ? 6 : 7).filter((value) => bed === null || (Math.abs(value - bed) / (gravity.max - gravity.min)) * gravity.height >= FIGURES_APART),
      temperature: picture.range ? [picture.range.min, picture.range.max] : warmth ? roundSteps(warmth.min, warmth.max, 2) : [],
      gas: gas ? roundSteps(0, gas.max, phone ? 2 : 4) : [],
    },
    left: phone ? 46 : 68,
    right: phone ? 0 : 14,
    short: false,
  };
}

function laneLayout(picture: Picture, height: number, short: boolean): Layout {
  const low = height < 70;
  const bed = height - (low ? 20 : 28);
  const top = low ? 8 : 12;
  const warmth = temperatureSpan(picture);
  return {
    style: 'lane',
    height,
    gravity: { top, height: bed - top, ...gravitySpan(picture, false) },
    temperature: warmth && { top: height - (low ? 13 : 19), height: low ? 8 : 12, ...warmth },
    gas: null,
    rules: [],
    ticks: { gravity: [], temperature: [], gas: [] },
    left: 0,
    right: 0,
    short,
  };
}

/** Where everything stands; a lane takes its height, a page has its own. */
export function layOut(picture: Picture, style: ChartStyle, laneHeight = 84, short = false): Layout {
  return style === 'lane' ? laneLayout(picture, laneHeight, short) : pageLayout(picture, style);
}
