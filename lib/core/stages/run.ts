import type { BatchEvent, BatchSetup, Instant, Reading } from '../types';
import { accept } from '../series/bins';
import { select } from '../series/order';
import { LOOK_H, Watch } from './watch';

/** Least lag between measuring and receiving that still counts as a wrong clock. */
const CLOCK_MS = 30 * 60_000;

/**
 * How far the sensor's clock is behind, ms: when even the quickest readings (5 %)
 * arrive more than half an hour after their time, or before it, the clock is
 * wrong. Rounded to 10 min, so that it stays put. A wrong clock is late by the
 * same for most readings; lags that differ are a backlog, sent when it could be,
 * and the times in it are right.
 */
function clockErrorOf(known: readonly Reading[]): number {
  const lags = new Float64Array(known.length);
  let n = 0;
  for (const reading of known) {
    if (reading.receivedAt == null) continue;
    lags[n] = reading.receivedAt - reading.at;
    n += 1;
  }
  if (n < 12) return 0;
  const quick = select(lags, 0, n, Math.floor(0.05 * n));
  if (select(lags, 0, n, Math.floor(0.5 * n)) - quick > CLOCK_MS) return 0;
  return Math.abs(quick) > CLOCK_MS ? Math.round(quick / 600_000) * 600_000 : 0;
}

/**
 * One batch looked at over and over. What became known late starts the looks anew, so
 * that every time is judged as if it were the only one; the rest is carried on.
 */
export class Run {
  private readonly all: Reading[];
  private watch: Watch | null = null;
  private known: Reading[] = [];
  private knownEvents: BatchEvent[] = [];
  private last = Number.NEGATIVE_INFINITY;
  private readonly late: boolean;
  /** Error of the sensor's clock that the known readings show, ms. */
  private clockError = 0;

  constructor(
    private readonly setup: BatchSetup,
    readings: readonly Reading[],
  ) {
    this.all = accept(readings).readings;
    this.late = this.all.some(({ at, receivedAt }) => receivedAt != null && (receivedAt > at || at - receivedAt > CLOCK_MS));
  }

  /** Every reading that can be used, by measured time. */
  get readings(): readonly Reading[] {
    return this.all;
  }

  /** The state of the batch at a time; null before the pitch, or where it was not told. */
  at(at: Instant): { watch: Watch; hour: number } | null {
    const pitched = this.setup.pitchedAt;
    if (pitched === null || at < pitched) return null;
    this.learn(at);
    const watch = this.watch!;
    const end = watch.track.hourOf(at);
    let hour = watch.lookedAt;
    while (hour + LOOK_H <= end + 1e-9) {
      hour += LOOK_H;
      watch.look(hour, this.known);
    }
    if (end > hour + 1e-9) {
      // Between two looks only the figures move; the rules wait for the next look. The record now
      // holds an unfinished hour, so the next time starts from the beginning again.
      watch.advance(end, this.known);
      this.watch = null;
    }
    return { watch, hour: end };
  }

  /** Takes in what has become known by `at`; starts anew when that reaches behind the last look. */
  private learn(at: Instant): void {
    const behind = this.watch ? this.watch.track.instantOf(this.watch.lookedAt) : Number.NEGATIVE_INFINITY;
    let anew = this.watch === null || at < this.last;
    const events = this.setup.events.filter((event) => event.at <= at && (event.knownAt ?? event.at) <= at);
    if (events.length !== this.knownEvents.length) {
      if (events.some((event) => !this.knownEvents.includes(event) && event.at <= behind)) anew = true;
    }
    let known = this.all;
    if (this.late) {
      known = this.all.filter((reading) => (reading.receivedAt ?? reading.at) <= at);
      const error = clockErrorOf(known);
      if (error !== this.clockError) anew = true;
      this.clockError = error;
      if (error !== 0) known = known.map((reading) => ({ ...reading, at: reading.at + error }));
      if (!anew && known.some((reading) => (reading.receivedAt ?? reading.at) > this.last && reading.at < behind)) anew = true;
    }
    if (anew || events.length !== this.knownEvents.length || this.late) {
      this.knownEvents = events;
      this.known = known;
      if (anew || events.length > 0) this.watch = anew ? new Watch(this.setup, this.setup.pitchedAt!, events) : this.watch;
      if (!anew) this.watch!.hear(events);
    } else this.known = known;
    this.last = at;
  }
}
