import { levelOf } from '@/components/charts/level';
import type { SharedBatch } from '@/lib/contracts/shares';

interface Point {
  /** Seconds since 1970. */
  at: number;
  gravity: number;
}

const seconds = (iso: string): number => Date.parse(iso) / 1000;

interface Fall {
  line: Point[];
  /** What was read by hand. */
  read: Point[];
  /** Gravity at the foot of the picture; null without a line. */
  floor: number | null;
}

/** The whole fall as one line. While it works the picture goes down to where the curve will end, so that it does not look finished. */
export function fallOf(shared: Pick<SharedBatch, 'entries' | 'curve' | 'series' | 'ended_at'>, now: number): Fall {
  const read = shared.entries.flatMap((entry) => (entry.gravity === null ? [] : [{ at: seconds(entry.at), gravity: entry.gravity }]));
  // The curve goes on into the forecast; what has not happened is not shown to guests.
  const until = shared.ended_at ? seconds(shared.ended_at) : now / 1000;
  const fitted = shared.curve.map((point) => ({ at: seconds(point.at), gravity: point.gravity })).filter((point) => point.at <= until);
  const measured = shared.series.at.flatMap((at, index) => {
    const gravity = shared.series.gravity[index];
    return gravity == null ? [] : [{ at, gravity, lo: gravity, hi: gravity }];
  });
  // A racking or an addition begins a new curve: the fall before it is told by the readings.
  const before = fitted.length > 1 ? levelOf(measured.filter((point) => point.at < fitted[0]!.at), Infinity) : [];
  const line = fitted.length > 1 ? [...before, ...fitted] : measured.length > 1 ? measured : read;
  const deep = shared.ended_at ? line : [...line, ...shared.curve];
  return {
    line: line.map(({ at, gravity }) => ({ at, gravity })).toSorted((a, b) => a.at - b.at),
    read,
    floor: line.length === 0 ? null : Math.min(...deep.map((point) => point.gravity)),
  };
}
