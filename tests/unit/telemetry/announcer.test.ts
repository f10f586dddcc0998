import { describe, expect, it } from 'vitest';
import type { ReadingRow } from '@/db/queries/record-readings';
import { Announcer } from '@/lib/services/readings/announcer';

const row = (sensorId: number, measuredAt: number): ReadingRow => ({ sensorId, receivedAt: measuredAt, reading: { measuredAt, gravity: 1.05, temperature: 20, battery: null, signal: null, inclination: null, foam: null, sequence: null } });

/** Rows that come in and are committed at once. */
function take(announcer: Announcer, rows: ReadingRow[], now: number): number[] {
  const told = announcer.due(rows, now);
  announcer.stored(rows, told, now);
  return told;
}

describe('the announcer', () => {
  it('announces a sensor that was quiet at once, and once in a batch', () => {
    expect(take(new Announcer(), [row(1, 10), row(2, 10), row(1, 20)], 1_000)).toEqual([1, 2]);
  });

  it('makes a sensor that spoke within the last second wait', () => {
    const announcer = new Announcer();
    take(announcer, [row(1, 10)], 1_000);
    expect(take(announcer, [row(1, 20), row(2, 20)], 1_999)).toEqual([2]);
  });

  it('announces it at once again after a quiet second', () => {
    const announcer = new Announcer();
    take(announcer, [row(1, 10)], 1_000);
    expect(take(announcer, [row(1, 20)], 2_000)).toEqual([1]);
  });

  it('holds nothing for said while it is not stored: a batch that is tried again has its word', () => {
    const announcer = new Announcer();
    announcer.due([row(1, 10)], 1_000);
    expect(announcer.due([row(1, 10)], 1_000)).toEqual([1]);
  });
});
