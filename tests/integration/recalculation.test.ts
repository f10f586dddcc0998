import { QueryTypes } from 'sequelize';
import { describe, expect, it } from 'vitest';
import { inTransaction } from '@/db/client';
import { CalibrationRow, type Sensor } from '@/db/models';
import { askRecalculation } from '@/db/queries/recalculations';
import type { SensorIdentity } from '@/lib/auth/sensors';
import { recalculate, recalculateNext } from '@/lib/services/readings/recalculate';
import { recordMessages } from '@/lib/services/readings/record';
import { forgetNotes } from '@/lib/services/readings/sensor-book';
import { useDatabase } from '../support/database';
import { buildSensor } from '../support/factories';

const db = useDatabase();
const HOUR = 3_600_000;
const START = Date.parse('2026-03-01T00:00:00Z');

const identityOf = (sensor: Sensor): SensorIdentity => ({ id: sensor.id, cellarId: sensor.cellarId, identifier: sensor.identifier });
const rowsOf = (sensor: Sensor) =>
  db.sequelize.query<{ gravity: number | null; gravity_sent: number | null; calibration_id: number | null }>('select gravity, gravity_sent, calibration_id from readings where sensor_id = $id order by measured_at', {
    bind: { id: sensor.id },
    type: QueryTypes.SELECT,
  });

let version = 0;
const calibrate = (sensor: Sensor, overrides: Partial<CalibrationRow> = {}) => {
  forgetNotes(sensor.id);
  return CalibrationRow.create({ cellarId: sensor.cellarId, sensorId: sensor.id, version: ++version, appliesFrom: new Date(START), coefficients: [1, 0.001], lowDeg: 0, highDeg: 80, correctsTemperature: false, ...overrides });
};
const send = (sensor: Sensor, bodies: object[]) => recordMessages([{ sensor: identityOf(sensor), road: 'mqtt', body: Buffer.from(JSON.stringify(bodies)), arrivedAt: START + 1_000 * HOUR }]);
const tilted = (hour: number, inclination: number) => ({ at: new Date(START + hour * HOUR).toISOString(), inclination, temperature: 20 });

describe('readings of a float that sends its inclination', () => {
  it('wait without a calibration, and turn into gravity when there is one', async () => {
    const { sensor } = await buildSensor();
    expect(await send(sensor, [tilted(0, 50), tilted(1, 49)])).toMatchObject({ stored: 2 });
    expect((await rowsOf(sensor)).map((row) => row.gravity)).toEqual([null, null]);
    await calibrate(sensor);
    expect(await recalculate(sensor.id, new Date(START))).toBe(2);
    expect((await rowsOf(sensor)).map((row) => row.gravity)).toEqual([expect.closeTo(1.05, 9), expect.closeTo(1.049, 9)]);
    expect(await recalculate(sensor.id, new Date(START))).toBe(0);
  });

  it('are turned as they come once there is one, each by the version in force when it was measured', async () => {
    const { sensor } = await buildSensor();
    const first = await calibrate(sensor);
    const second = await calibrate(sensor, { appliesFrom: new Date(START + 10 * HOUR), coefficients: [1, 0.002] });
    await send(sensor, [tilted(20, 30), tilted(5, 30), tilted(10, 30), tilted(-1, 30)]);
    expect(await rowsOf(sensor)).toEqual([
      { gravity: null, gravity_sent: null, calibration_id: null },
      { gravity: expect.closeTo(1.03, 9), gravity_sent: null, calibration_id: first.id },
      { gravity: expect.closeTo(1.06, 9), gravity_sent: null, calibration_id: second.id },
      { gravity: expect.closeTo(1.06, 9), gravity_sent: null, calibration_id: second.id },
    ]);
  });

  it('go back to what they were when a version is taken back, and the latest of the sensor with them', async () => {
    const { sensor } = await buildSensor();
    const made = await calibrate(sensor, { coefficients: null, lowDeg: null, highDeg: null, offsetSg: -0.003 });
    await send(sensor, [{ at: new Date(START).toISOString(), gravity: 1.05, temperature: 20 }]);
    expect(await rowsOf(sensor)).toEqual([{ gravity: expect.closeTo(1.047, 9), gravity_sent: 1.05, calibration_id: made.id }]);
    await made.update({ removedAt: new Date() });
    expect(await recalculate(sensor.id, new Date(START))).toBe(1);
    expect(await rowsOf(sensor)).toEqual([{ gravity: 1.05, gravity_sent: null, calibration_id: null }]);
    const [latest] = await db.sequelize.query<{ gravity: number }>('select gravity from sensor_latest where sensor_id = $id', { bind: { id: sensor.id }, type: QueryTypes.SELECT });
    expect(latest?.gravity).toBe(1.05);
  });

  it('are all turned, however many, and only from the time that was asked for', async () => {
    const { sensor } = await buildSensor();
    for (let from = 0; from < 12_000; from += 500) await send(sensor, Array.from({ length: 500 }, (_, index) => tilted((from + index) / 60, 40)));
    await calibrate(sensor);
    expect(await recalculate(sensor.id, new Date(START + 100 * HOUR))).toBe(6_000);
    expect(await recalculate(sensor.id, new Date(START))).toBe(6_000);
  });
});

describe('a recalculation that was asked for', () => {
  const ask = (sensor: Sensor) => inTransaction((transaction) => askRecalculation(sensor.cellarId, sensor.id, new Date(START), transaction));
  const open = async (sensor: Sensor) => (await db.sequelize.query('select 1 from recalculations where sensor_id = $id and done_at is null', { bind: { id: sensor.id }, type: QueryTypes.SELECT })).length;
  const due = () => db.sequelize.query('update recalculations set next_at = now()');

  it('is looked at again after ingests that did not know of it have ended, and then is done', async () => {
    const { sensor } = await buildSensor();
    await send(sensor, [tilted(0, 50)]);
    await calibrate(sensor);
    await ask(sensor);
    expect(await recalculateNext(Date.now())).toBe(true);
    expect((await rowsOf(sensor))[0]?.gravity).toBeCloseTo(1.05, 9);
    // An ingest with old notes writes once more.
    await db.sequelize.query(`insert into readings (sensor_id, measured_at, inclination, temperature) values ($id, $at, 30, 20)`, { bind: { id: sensor.id, at: new Date(START + HOUR) } });
    await due();
    expect(await recalculateNext(Date.now() + 60_000)).toBe(true);
    expect((await rowsOf(sensor))[1]?.gravity).toBeCloseTo(1.03, 9);
    expect(await open(sensor)).toBe(1);
    await due();
    expect(await recalculateNext(Date.now() + 60_000)).toBe(true);
    expect(await open(sensor)).toBe(0);
    expect(await recalculateNext(Date.now() + 60_000)).toBe(false);
  });

  it('is done by one worker at a time', async () => {
    const { sensor } = await buildSensor();
    await ask(sensor);
    const done = await Promise.all([recalculateNext(Date.now()), recalculateNext(Date.now()), recalculateNext(Date.now())]);
    expect(done.filter(Boolean)).toHaveLength(1);
  });
});
