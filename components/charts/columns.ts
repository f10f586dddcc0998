import uPlot from 'uplot';
import { levelOf } from './level';
import { cutAt, hasStopped, knownUntil, type GravityPoint, type Picture } from './picture';

/** Place of each series in uPlot's columns; 0 is time. */
export const SERIES = { bandHigh: 1, bandLow: 2, fit: 3, forecast: 4, expectedHigh: 5, expectedLow: 6, expected: 7, readings: 8, temperature: 9, gas: 10 } as const;

type Table = [number[], ...(number | null)[][]];

/** uPlot wants times strictly ascending; a time that comes twice keeps its last values. */
export function ascending(table: Table): Table {
  const [at, ...columns] = table;
  const order = at.map((_, index) => index).sort((a, b) => at[a]! - at[b]! || a - b);
  const keep = order.filter((index, place) => at[index] !== at[order[place + 1] ?? -1]);
  return [keep.map((index) => at[index]!), ...columns.map((column) => keep.map((index) => column[index] ?? null))];
}

const table = (points: readonly GravityPoint[], ...pick: ((point: GravityPoint) => number)[]): Table => [points.map((point) => point.at), ...pick.map((value) => points.map(value))];

/** The readings up to now as a line without doubt. */
function readingsAsCurve(picture: Picture): GravityPoint[] {
  return picture.readings.at.flatMap((at, index) => {
    const gravity = picture.readings.gravity[index];
    return typeof gravity === 'number' && at <= picture.now ? [{ at, gravity, lo: gravity, hi: gravity }] : [];
  });
}

/**
 * All that is drawn as lines, bands, dots and bars, joined on one ascending time
 * column. A lane, which has no dots, takes a line through its readings where
 * nothing could be fitted.
 */
export function columnsOf(picture: Picture, lane = false): uPlot.AlignedData {
  const stopped = hasStopped(picture);
  const fitted = picture.curve.length > 1;
  const { past, coming } = cutAt(fitted ? picture.curve : lane ? readingsAsCurve(picture) : [], knownUntil(picture));
  // Where the batch has stopped, the band belongs to what it should have done.
  const ahead = stopped ? [] : coming;
  const begins = picture.curve[0]?.at ?? -Infinity;
  const level = fitted ? levelOf(readingsAsCurve(picture).filter((point) => stopped || point.at < begins), stopped ? picture.now : Infinity) : [];
  const solid = stopped && level.length > 0 ? level : [...level, ...past];
  const banded = fitted && !stopped ? [...past, ...ahead.slice(1)] : [];
  const tables: Table[] = [
    ascending(table(banded, (point) => point.hi, (point) => point.lo)),
    ascending(table(solid, (point) => point.gravity)),
    ascending(table(ahead, (point) => point.gravity)),
    ascending(table(stopped ? picture.expected : [], (point) => point.hi, (point) => point.lo)),
    ascending(table(picture.expected, (point) => point.gravity)),
    ascending([[...picture.readings.at], [...picture.readings.gravity], [...picture.readings.temperature]]),
    ascending([picture.gas.map((bin) => bin.at), picture.gas.map((bin) => bin.value)]),
  ];
  return uPlot.join(tables as uPlot.AlignedData[]);
}
