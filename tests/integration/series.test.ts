import fc from 'fast-check';
import { NextRequest } from 'next/server';
import { describe, expect, it, vi } from 'vitest';
import { GET } from '@/app/api/v1/batches/[id]/series/route';
import { database } from '@/db/client';
import { Assignment } from '@/db/models';
import { ManualClock } from '@/lib/clock';
import { getSeries } from '@/lib/services/batches/get-series';
import { NotFoundError } from '@/lib/errors';
import { useDatabase } from '../support/database';
import { buildBatch, buildMember, buildSensor, writeReadings, type ReadingInput } from '../support/factories';
import { sessionCookie } from '../support/web';

vi.mock('server-only', () => ({}));

const START = Date.UTC(2026, 2, 1);
const MINUTE_MS = 60_000;
const DAY_S = 86_400;

describe('the series of a batch', () => {
  useDatabase();

  async function batchWith(readings: ReadingInput[]) {
    const actor = await buildMember('guest');
    const batch = await buildBatch({ cellarId: actor.cellarId });
    const { sensor } = await buildSensor({ batch, fromAt: new Date(START) });
    await writeReadings(sensor.id, readings);
    return { actor, batch, sensor };
  }

  const quarterly = (count: number, gravity: (n: number) => number, temperature: (n: number) => number = () => 20) =>
    Array.from({ length: count }, (_, n) => ({ at: START + n * 15 * MINUTE_MS, gravity: gravity(n), temperature: temperature(n) }));

  it('gives every reading where there are no more than asked for', async () => {
    const readings = quarterly(50, (n) => 1.05 - n * 0.0001, (n) => 18 + n / 10);
    const { actor, batch } = await batchWith(readings);
    const series = await getSeries(actor, batch.id, { points: 50 });
    expect(series.count).toBe(50);
    expect(series.at).toEqual(readings.map((reading) => reading.at / 1000));
    expect(series.gravity).toEqual(readings.map((reading) => reading.gravity));
    expect(series.temperature.map((value) => value?.toFixed(3))).toEqual(readings.map((reading) => reading.temperature.toFixed(3)));
  });

  it('keeps a lone spike of gravity and one of temperature among 90 days of readings', async () => {
    const { actor, batch } = await batchWith(quarterly(90 * 96, (n) => (n === 4321 ? 1.1 : n === 5000 ? 0.975 : 1.0 + 0.05 * Math.exp(-n / 1000)), (n) => (n === 7777 ? 41.5 : n === 7000 ? 2.25 : 19)));
    const series = await getSeries(actor, batch.id, { points: 400 });
    expect(series.count).toBe(90 * 96);
    expect(series.at.length).toBeLessThanOrEqual(400);
    expect(series.at.length).toBeGreaterThan(150);
    for (const [value, n, column] of [
      [1.1, 4321, series.gravity],
      [0.975, 5000, series.gravity],
      [41.5, 7777, series.temperature],
      [2.25, 7000, series.temperature],
    ] as const)
      expect(column[series.at.indexOf(START / 1000 + n * 900)]).toBeCloseTo(value, 5);
  });

  it('keeps readings and extremes of years in a handful of points', async () => {
    const days = 1_000;
    const readings = Array.from({ length: days }, (_, n) => ({ at: START + n * DAY_S * 1000, gravity: n === 333 ? 0.985 : 1 + 0.1 * Math.exp(-n / 90), temperature: n === 777 ? 35 : 12 }));
    const { actor, batch } = await batchWith(readings);
    const series = await getSeries(actor, batch.id, { points: 10 });
    expect(series.count).toBe(days);
    expect(series.at.length).toBeLessThanOrEqual(10);
    const taken = new Map(readings.map((reading) => [reading.at / 1000, reading]));
    for (const [index, at] of series.at.entries()) {
      expect(series.gravity[index]).toBeCloseTo(taken.get(at)?.gravity ?? NaN, 5);
      expect(series.temperature[index]).toBeCloseTo(taken.get(at)?.temperature ?? NaN, 2);
    }
    const at = (n: number) => START / 1000 + n * DAY_S;
    for (const n of [0, 333, 777, days - 1]) expect(series.at, `day ${n}`).toContain(at(n));
  });

  it('shows only readings that were taken, in time, with the latest among them, however few points are asked for', async () => {
    const { actor, batch, sensor } = await batchWith([]);
    await fc.assert(
      fc.asyncProperty(
        fc.uniqueArray(fc.record({ s: fc.integer({ min: 0, max: 60 * DAY_S }), g: fc.integer({ min: 97_000, max: 120_000 }), t: fc.integer({ min: -1000, max: 6000 }) }), { minLength: 61, maxLength: 150, selector: (item) => item.s }),
        fc.integer({ min: 10, max: 60 }),
        async (items, points) => {
          await database().query('delete from readings where sensor_id = $1', { bind: [sensor.id] });
          await writeReadings(sensor.id, items.map((item) => ({ at: START + item.s * 1000, gravity: item.g / 1e5, temperature: item.t / 100 })));
          const series = await getSeries(actor, batch.id, { points });
          expect(series.count).toBe(items.length);
          expect(series.at.length).toBeLessThanOrEqual(points);
          expect(series.at).toEqual([...new Set(series.at)].sort((a, b) => a - b));
          const taken = new Map(items.map((item) => [START / 1000 + item.s, item]));
          for (const [index, at] of series.at.entries()) {
            const item = taken.get(at);
            expect(item).toBeDefined();
            expect(series.gravity[index]).toBeCloseTo(item!.g / 1e5, 5);
            expect(series.temperature[index]).toBeCloseTo(item!.t / 100, 2);
          }
          expect(series.at.at(-1)).toBe(Math.max(...taken.keys()));
          const of = (pick: (item: { g: number; t: number }) => number) => [Math.min(...items.map(pick)), Math.max(...items.map(pick))];
          const [gLow, gHigh] = of((item) => item.g / 1e5);
          expect(Math.min(...series.gravity.map((value) => value ?? NaN))).toBeCloseTo(gLow!, 5);
          expect(Math.max(...series.gravity.map((value) => value ?? NaN))).toBeCloseTo(gHigh!, 5);
          const [tLow, tHigh] = of((item) => item.t / 100);
          expect(Math.min(...series.temperature.map((value) => value ?? NaN))).toBeCloseTo(tLow!, 2);
          expect(Math.max(...series.temperature.map((value) => value ?? NaN))).toBeCloseTo(tHigh!, 2);
        },
      ),
      { numRuns: 15 },
    );
  });

  it('shows the temperature of readings that have no gravity yet', async () => {
    const { actor, batch } = await batchWith(Array.from({ length: 200 }, (_, n) => ({ at: START + n * MINUTE_MS, gravity: null, temperature: 15 + n / 100 })));
    const series = await getSeries(actor, batch.id, { points: 20 });
    expect(series.count).toBe(200);
    expect(new Set(series.gravity)).toEqual(new Set([null]));
    expect(Math.max(...series.temperature.map((value) => value ?? NaN))).toBeCloseTo(16.99, 2);
  });

  it('follows the sensors through a batch: what one measured before it came and after it left belongs elsewhere', async () => {
    const actor = await buildMember('guest');
    const [batch, other] = [await buildBatch({ cellarId: actor.cellarId }), await buildBatch({ cellarId: actor.cellarId })];
    const at = (hour: number) => START + hour * 60 * MINUTE_MS;
    const first = await buildSensor({ batch, fromAt: new Date(at(10)) });
    await Assignment.update({ toAt: new Date(at(20)) }, { where: { sensorId: first.sensor.id } });
    await Assignment.create({ cellarId: actor.cellarId, sensorId: first.sensor.id, batchId: other.id, fromAt: new Date(at(20)) });
    const second = await buildSensor({ batch, fromAt: new Date(at(20)) });
    const hourly = (gravity: number) => Array.from({ length: 40 }, (_, hour) => ({ at: at(hour), gravity }));
    await writeReadings(first.sensor.id, hourly(1.05));
    await writeReadings(second.sensor.id, hourly(1.02));
    const series = await getSeries(actor, batch.id, { points: 100 });
    expect(series.at).toEqual(Array.from({ length: 30 }, (_, n) => at(10 + n) / 1000));
    expect(series.gravity).toEqual([...Array(10).fill(1.05), ...Array(20).fill(1.02)]);
    expect((await getSeries(actor, other.id, { points: 100 })).count).toBe(20);
  });

  it('stands at the present where there is no reading yet', async () => {
    const { actor, batch } = await batchWith([]);
    const now = new Date(START + DAY_S * 1000).toISOString();
    expect(await getSeries(actor, batch.id, { points: 100 }, new ManualClock(Date.parse(now)))).toMatchObject({ from: now, to: now, count: 0 });
  });

  it('cuts out a span', async () => {
    const { actor, batch } = await batchWith(quarterly(96 * 4, () => 1.03));
    const day = (n: number) => new Date(START + n * DAY_S * 1000).toISOString();
    const series = await getSeries(actor, batch.id, { from: day(1), to: day(2), points: 200 });
    expect(series).toMatchObject({ from: day(1), to: day(2), count: 96 });
    expect(series.at[0]).toBe(START / 1000 + DAY_S);
    expect(series.at.at(-1)).toBe(START / 1000 + 2 * DAY_S - 900);
    expect(await getSeries(actor, batch.id, { from: day(100), to: day(101), points: 200 })).toMatchObject({ count: 0, at: [], gravity: [], temperature: [] });
  });

  it('tells its times to programs as RFC 3339 in UTC', async () => {
    const { actor, batch } = await batchWith(quarterly(3, () => 1.05));
    const { cookie } = await sessionCookie(actor.personId);
    const answer = await GET(new NextRequest(`http://127.0.0.1/api/v1/batches/${batch.id}/series`, { headers: { cookie } }), { params: Promise.resolve({ id: batch.id }) });
    expect(await answer.json()).toMatchObject({ from: '2026-03-01T00:00:00.000Z', count: 3, at: ['2026-03-01T00:00:00.000Z', '2026-03-01T00:15:00.000Z', '2026-03-01T00:30:00.000Z'], gravity: [1.05, 1.05, 1.05] });
  });

  it('is not found in another cellar', async () => {
    const { batch } = await batchWith(quarterly(5, () => 1.05));
    const stranger = await buildMember('keeper');
    await expect(getSeries(stranger, batch.id, { points: 400 })).rejects.toBeInstanceOf(NotFoundError);
  });
});
