import { database } from '@/db/client';
import { tellOfReadings, type ReadingRow, type Span } from '@/db/queries/record-readings';

/** An open page hears of a vessel's readings at most this often. */
const AT_MOST_EVERY_MS = 1_000;

/**
 * Keeps a flood of readings from becoming a flood of words: a sensor that spoke
 * within the last second is announced a little later, once for all it sent.
 */
export class Announcer {
  private readonly toldAt = new Map<number, number>();
  private owed = new Map<number, Span>();

  /** Of the sensors in these rows, those to announce with the insert. */
  due(rows: readonly ReadingRow[], now: number): number[] {
    const quiet = (sensorId: number) => now - (this.toldAt.get(sensorId) ?? -Infinity) >= AT_MOST_EVERY_MS && !this.owed.has(sensorId);
    return [...new Set(rows.map((row) => row.sensorId))].filter(quiet);
  }

  /** The rows are committed, with the word of those told: the others are owed theirs. Sooner it would be said before there is anything to see. */
  stored(rows: readonly ReadingRow[], told: readonly number[], now: number): void {
    const said = new Set(told);
    for (const sensorId of said) this.toldAt.set(sensorId, now);
    for (const { sensorId, reading: { measuredAt } } of rows) {
      if (said.has(sensorId)) continue;
      const span = this.owed.get(sensorId);
      if (!span) this.owed.set(sensorId, { sensorId, first: measuredAt, last: measuredAt });
      else {
        span.first = Math.min(span.first, measuredAt);
        span.last = Math.max(span.last, measuredAt);
      }
    }
  }

  /** Announces what is owed. Where that fails it stays owed. */
  async flush(now: number): Promise<void> {
    for (const [sensorId, at] of this.toldAt) if (now - at >= AT_MOST_EVERY_MS) this.toldAt.delete(sensorId);
    if (this.owed.size === 0) return;
    const spans = [...this.owed.values()];
    this.owed = new Map();
    try {
      await tellOfReadings(database(), spans);
      for (const { sensorId } of spans) this.toldAt.set(sensorId, now);
    } catch (error) {
      for (const span of spans) if (!this.owed.has(span.sensorId)) this.owed.set(span.sensorId, span);
      throw error;
    }
  }
}
