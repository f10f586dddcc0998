import { gravityText, temperatureText } from '@/components/ui/units';
import type { CompareBody } from '@/lib/contracts/compare';

export type Compared = CompareBody['items'][number];
/** What is drawn over the days since the pitch. */
export type Measure = 'gravity' | 'share' | 'temperature';

export interface Point {
  /** Days since the pitch. */
  day: number;
  value: number;
}

export interface Curve {
  id: string;
  name: string;
  colour: string;
  points: Point[];
  /** Read by hand. */
  rings: Point[];
  /** Where something was done, on the curve. */
  posts: Array<Point & { letter: string; kind: string }>;
}

const HOURS = 24;
/** As the log writes them. */
const LETTERS: Partial<Record<Compared['posts'][number]['kind'], string>> = { neck: 'N', rack: 'R', addition: 'A', top_up: 'T', fining: 'F', stabilise: 'S', split: 'Y', blend: 'B', bottling: 'L' };

/** Share of its points that a batch has lost, %: curves of strong and weak musts lie over each other. */
const shareFallen = (og: number, gravity: number): number => (100 * (og - gravity)) / (og - 1);

function valueOf(item: Compared, measure: Measure): (gravity: number | null, temperature: number | null) => number | null {
  const og = item.batch.original_gravity;
  switch (measure) {
    case 'gravity':
      return (gravity) => gravity;
    case 'share':
      return (gravity) => (og === null || og <= 1.005 || gravity === null ? null : shareFallen(og, gravity));
    case 'temperature':
      return (_gravity, temperature) => temperature;
  }
}

/** Value on the curve at a day, between its neighbours; null outside of it. */
export function valueAt(points: readonly Point[], day: number): number | null {
  const after = points.findIndex((point) => point.day >= day);
  if (after === -1) return null;
  const [left, right] = [points[Math.max(0, after - 1)]!, points[after]!];
  if (after === 0) return right.day === day ? right.value : null;
  const share = right.day === left.day ? 0 : (day - left.day) / (right.day - left.day);
  return left.value + share * (right.value - left.value);
}

/** Each value as the median of itself and its neighbours, so that a float that was knocked draws no spike. */
const CALM_EACH_SIDE = 4;
function calmed(points: readonly Point[]): Point[] {
  return points.map((point, index) => {
    const around = points.slice(Math.max(0, index - CALM_EACH_SIDE), index + CALM_EACH_SIDE + 1).map((item) => item.value).toSorted((a, b) => a - b);
    return { day: point.day, value: around[Math.floor(around.length / 2)]! };
  });
}

/** A batch as a curve: as judged, else as measured; where no sensor was in it, the readings by hand are joined. */
export function curveOf(item: Compared, measure: Measure, colour: string): Curve {
  const value = valueOf(item, measure);
  const judged = measure === 'temperature' ? [] : item.curve.flatMap(({ hour, gravity }): Point[] => {
    const found = value(gravity, null);
    return hour < 0 || found === null ? [] : [{ day: hour / HOURS, value: found }];
  });
  const sensed = item.hours.flatMap((hour, index): Point[] => {
    const found = value(item.gravity[index] ?? null, item.temperature[index] ?? null);
    return hour < 0 || found === null ? [] : [{ day: hour / HOURS, value: found }];
  });
  const rings = measure === 'temperature' ? [] : item.by_hand.flatMap(({ hour, gravity }): Point[] => {
    const found = value(gravity, null);
    return hour < 0 || found === null ? [] : [{ day: hour / HOURS, value: found }];
  });
  const start = value(item.batch.original_gravity, null);
  const byHand = [...(start === null || measure === 'temperature' ? [] : [{ day: 0, value: start }]), ...rings].toSorted((a, b) => a.day - b.day);
  const points = judged.length > 1 ? judged : sensed.length > 2 * CALM_EACH_SIDE ? calmed(sensed) : sensed.length > 1 ? sensed : byHand;
  const posts = item.posts.flatMap(({ hour, kind }) => {
    const letter = LETTERS[kind];
    const found = valueAt(points, hour / HOURS);
    return letter === undefined || found === null ? [] : [{ day: hour / HOURS, value: found, letter, kind }];
  });
  return { id: item.batch.id, name: item.batch.name, colour, points, rings, posts };
}

/** The same batch with the readings of a part of it in the place of the few that the whole had there. */
export function closer(item: Compared, near: Compared | undefined): Compared {
  if (!near) return item;
  return { ...item, ...closerReadings(item, near), curve: spliced(item.curve, near.curve) };
}

/** Points of a part in place of those that lie between its ends. */
function spliced<P extends { hour: number }>(whole: P[], part: P[]): P[] {
  const [from, to] = [part[0]?.hour, part.at(-1)?.hour];
  return from === undefined || to === undefined ? whole : [...whole.filter(({ hour }) => hour < from), ...part, ...whole.filter(({ hour }) => hour > to)];
}

function closerReadings(item: Compared, near: Compared): Pick<Compared, 'hours' | 'gravity' | 'temperature'> {
  const rows = ({ hours, gravity, temperature }: Compared) => hours.map((hour, index) => ({ hour, gravity: gravity[index] ?? null, temperature: temperature[index] ?? null }));
  const all = spliced(rows(item), rows(near));
  return { hours: all.map((row) => row.hour), gravity: all.map((row) => row.gravity), temperature: all.map((row) => row.temperature) };
}

/** Days at which the table tells every batch, as far as the longest goes. */
export function tableDays(curves: readonly Curve[]): number[] {
  const last = Math.max(0, ...curves.map((curve) => curve.points.at(-1)?.day ?? 0));
  return [0, 1, 2, 3, 5, 7, 10, 14, 21, 28, 42, 60, 90, 120, 180, 365].filter((day) => day <= last);
}

export const written = (value: number, measure: Measure): string => (measure === 'gravity' ? gravityText(value) : measure === 'share' ? `${value.toFixed(0)} %`.replace('-', '−') : temperatureText(value));
