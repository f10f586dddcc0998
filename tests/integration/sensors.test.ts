import { QueryTypes } from 'sequelize';
import { describe, expect, it } from 'vitest';
import { Assignment, AuditRow, CalibrationRow, Sensor } from '@/db/models';
import { SensorDirectory, revokedSensors, hashSensorSecret, type SensorIdentity } from '@/lib/auth/sensors';
import type { Actor } from '@/lib/auth/policies';
import { ManualClock } from '@/lib/clock';
import { at20 } from '@/lib/core/calibration/apply';
import { createBatch as createBatchForm } from '@/lib/contracts/batches';
import { createBatch } from '@/lib/services/batches/create';
import { recalculate } from '@/lib/services/readings/recalculate';
import { receiveReadings } from '@/lib/services/readings/receive';
import { recordMessages } from '@/lib/services/readings/record';
import { forgetNotes } from '@/lib/services/readings/sensor-book';
import { getCalibration } from '@/lib/services/sensors/calibration/get';
import { addPoint, pairPoint, removePoint } from '@/lib/services/sensors/calibration/points';
import { calibrate, offsetSensor, removeVersion } from '@/lib/services/sensors/calibration/versions';
import { createSensor } from '@/lib/services/sensors/create';
import { getSensor } from '@/lib/services/sensors/get';
import { getSensorHealth } from '@/lib/services/sensors/health';
import { setSensorLimits } from '@/lib/services/sensors/limits';
import { listRawReadings, listStays } from '@/lib/services/sensors/look';
import { removeSensor } from '@/lib/services/sensors/remove';
import { rotateSensor } from '@/lib/services/sensors/rotate';
import { setSensor } from '@/lib/services/sensors/set';
import { updateSensor } from '@/lib/services/sensors/update';
import { useDatabase } from '../support/database';
import { buildBatch, buildEntry, buildMember, buildSensor } from '../support/factories';

const db = useDatabase();
const HOUR = 3_600_000;
const DAY = 24 * HOUR;
const NOW = Date.parse('2026-03-20T12:00:00Z');
const clock = new ManualClock(NOW);
const iso = (at: number) => new Date(at).toISOString();

const identityOf = (sensor: Sensor): SensorIdentity => ({ id: sensor.id, cellarId: sensor.cellarId, identifier: sensor.identifier });
const send = (sensor: Sensor, bodies: object[], arrivedAt = NOW) => recordMessages([{ sensor: identityOf(sensor), road: 'mqtt', body: Buffer.from(JSON.stringify(bodies)), arrivedAt }]);
const rowOf = (identifier: string) => Sensor.findOne({ where: { identifier }, rejectOnEmpty: true });

/** The float leans by 0.001 SG a degree. */
const FELT = (inclination: number) => 0.99 + 0.001 * inclination;

async function calibratedFloat(actor: Actor, identifier: string, appliesFrom = NOW - 10 * DAY) {
  const points = [];
  for (const [inclination, temperature] of [[10, 20], [30, 16], [50, 22], [70, 20]] as const) {
    points.push(await addPoint(actor, identifier, { source: 'hydrometer', inclination, gravity: at20(FELT(inclination), temperature), sugar_g_per_l: null, temperature }, clock));
  }
  return calibrate(actor, identifier, { degree: 1, corrects_temperature: true, points: points.map((point) => point.id), applies_from: iso(appliesFrom), note: null }, clock);
}

describe('a sensor’s credential', () => {
  it('is shown once, kept as a hash, and replaced by a new one that ends the old', async () => {
    const keeper = await buildMember('keeper');
    const made = await createSensor(keeper, { name: 'Float', kind: 'float', interval_s: 900 });
    const row = await rowOf(made.id);
    const old = row.secretHash;
    expect(old).toEqual(hashSensorSecret(made.secret));
    const rotated = await rotateSensor(keeper, made.id);
    expect(rotated.secret).not.toBe(made.secret);
    expect(await revokedSensors(new Map([[row.id, old]]))).toEqual([row.id]);
    const directory = new SensorDirectory();
    expect(await directory.authenticate(made.id, made.secret)).toBeNull();
    directory.forget(made.id);
    expect(await directory.authenticate(made.id, rotated.secret)).toMatchObject({ id: row.id });
    const audit = await AuditRow.findAll({ where: { cellarId: keeper.cellarId } });
    expect(audit.map((line) => line.action)).toContain('sensor.rotated');
    expect(JSON.stringify(audit)).not.toContain(rotated.secret);
  });

  it('opens nothing once the sensor is removed, and what it measured stays with its batch', async () => {
    const keeper = await buildMember('keeper');
    const batch = await buildBatch({ cellarId: keeper.cellarId });
    const { sensor, secret } = await buildSensor({ batch });
    await send(sensor, [{ at: iso(NOW - HOUR), gravity: 1.04, temperature: 20 }]);
    await removeSensor(keeper, sensor.identifier, clock);
    expect(await new SensorDirectory().authenticate(sensor.identifier, secret)).toBeNull();
    await expect(getSensor(keeper, sensor.identifier)).rejects.toThrow('no such sensor');
    const [{ count }] = (await db.sequelize.query('select count(*)::int from readings r join assignments a on a.sensor_id = r.sensor_id where a.batch_id = $id and r.measured_at >= a.from_at and r.measured_at < a.to_at', { bind: { id: batch.id }, type: QueryTypes.SELECT })) as [{ count: number }];
    expect(count).toBe(1);
  });
});

describe('calibrating a float', () => {
  it('turns what it sent since the chosen time, and the figures of its batch follow', async () => {
    const brewer = await buildMember('brewer');
    const batch = await buildBatch({ cellarId: brewer.cellarId });
    const { sensor } = await buildSensor({ batch });
    await send(sensor, [{ at: iso(NOW - 3 * DAY), inclination: 60, temperature: 20 }, { at: iso(NOW - 12 * DAY), inclination: 65, temperature: 20 }]);
    expect((await getCalibration(brewer, sensor.identifier)).waiting).toBe(2);
    const version = await calibratedFloat(brewer, sensor.identifier);
    expect(version).toMatchObject({ version: 1, curve: { degree: 1, points: expect.arrayContaining([expect.objectContaining({ inclination: 10 })]) } });
    await recalculate(sensor.id, new Date(0));
    const { items } = await listRawReadings(brewer, sensor.identifier, 10);
    expect(items.map((item) => item.gravity)).toEqual([expect.closeTo(1.05, 6), null]);
    expect((await getCalibration(brewer, sensor.identifier)).waiting).toBe(1);
  });

  it('is refused with the reason where the curve turns back, and nothing is kept', async () => {
    const brewer = await buildMember('brewer');
    const { sensor } = await buildSensor({ cellarId: brewer.cellarId });
    const points = [];
    for (const inclination of [10, 20, 30, 40, 50]) points.push(await addPoint(brewer, sensor.identifier, { source: 'hydrometer', inclination, gravity: 1.06 - ((inclination - 30) / 100) ** 2, sugar_g_per_l: null, temperature: 20 }, clock));
    const form = { degree: 2 as const, corrects_temperature: false, points: points.map((point) => point.id), applies_from: iso(NOW), note: null };
    await expect(calibrate(brewer, sensor.identifier, form, clock)).rejects.toThrow(/turns back near/);
    expect(await CalibrationRow.count({ where: { sensorId: sensor.id } })).toBe(0);
    await removePoint(brewer, sensor.identifier, points[0]!.id, clock);
    await expect(calibrate(brewer, sensor.identifier, form, clock)).rejects.toThrow('A point is gone.');
  });

  it('knows the gravity of water and of sugar in water', async () => {
    const brewer = await buildMember('brewer');
    const { sensor } = await buildSensor({ cellarId: brewer.cellarId });
    expect(await addPoint(brewer, sensor.identifier, { source: 'water', inclination: 11, gravity: null, sugar_g_per_l: null, temperature: 20 }, clock)).toMatchObject({ gravity: 1 });
    expect((await addPoint(brewer, sensor.identifier, { source: 'sugar', inclination: 33, gravity: null, sugar_g_per_l: 100, temperature: 20 }, clock)).gravity).toBeCloseTo(1.0386, 3);
  });

  it('takes a reading by hand with what the float leaned like then, once', async () => {
    const brewer = await buildMember('brewer');
    const batch = await buildBatch({ cellarId: brewer.cellarId });
    const { sensor } = await buildSensor({ batch });
    await send(sensor, [-1, 0, 1].map((hours) => ({ at: iso(NOW - DAY + hours * HOUR), inclination: 40 + hours, temperature: 18 })));
    const entry = await buildEntry(batch, { kind: 'reading', gravity: 1.031, at: new Date(NOW - DAY) });
    expect((await getCalibration(brewer, sensor.identifier)).candidates).toMatchObject([{ entry_id: entry.id, inclination: 40, gravity: 1.031 }]);
    expect(await pairPoint(brewer, sensor.identifier, entry.id)).toMatchObject({ inclination: 40, gravity: 1.031, source: 'hydrometer' });
    expect((await getCalibration(brewer, sensor.identifier)).candidates).toEqual([]);
    await expect(pairPoint(brewer, sensor.identifier, entry.id)).rejects.toThrow();
  });

  it('never takes another cellar’s reading as a point', async () => {
    const [mine, theirs] = [await buildMember('brewer'), await buildMember('brewer')];
    const { sensor } = await buildSensor({ cellarId: mine.cellarId });
    const batch = await buildBatch({ cellarId: theirs.cellarId });
    const entry = await buildEntry(batch, { kind: 'reading', gravity: 1.031 });
    await expect(pairPoint(mine, sensor.identifier, entry.id)).rejects.toThrow('no such');
    const foreign = await buildSensor({ batch });
    await expect(addPoint(mine, foreign.sensor.identifier, { source: 'water', inclination: 10, gravity: null, sugar_g_per_l: null, temperature: 20 }, clock)).rejects.toThrow('no such sensor');
  });

  it('keeps every version, and goes back to the one before when one is taken back', async () => {
    const brewer = await buildMember('brewer');
    const { sensor } = await buildSensor({ cellarId: brewer.cellarId });
    await calibratedFloat(brewer, sensor.identifier);
    const moved = await offsetSensor(brewer, sensor.identifier, { offset: -0.003, applies_from: iso(NOW - 2 * DAY), note: null }, clock);
    expect(moved).toMatchObject({ version: 2, offset: -0.003, curve: { degree: 1 } });
    forgetNotes(sensor.id);
    await send(sensor, [{ at: iso(NOW - DAY), inclination: 60, temperature: 20 }]);
    const gravity = async () => (await listRawReadings(brewer, sensor.identifier, 1)).items[0]!.gravity;
    expect(await gravity()).toBeCloseTo(1.047, 6);
    await removeVersion(brewer, sensor.identifier, 2, clock);
    await recalculate(sensor.id, new Date(0));
    expect(await gravity()).toBeCloseTo(1.05, 6);
    const { versions } = await getCalibration(brewer, sensor.identifier);
    expect(versions.map((version) => [version.version, version.removed_at !== null])).toEqual([[2, true], [1, false]]);
    await expect(removeVersion(brewer, sensor.identifier, 2, clock)).rejects.toThrow('no such calibration');
  });

  it('proposes an offset from the log, and applies none by itself', async () => {
    const brewer = await buildMember('brewer');
    const batch = await buildBatch({ cellarId: brewer.cellarId });
    const { sensor } = await buildSensor({ batch, fromAt: new Date(NOW - 9 * DAY) });
    await send(sensor, Array.from({ length: 200 }, (_, index) => ({ at: iso(NOW - 8 * DAY + index * HOUR), gravity: 1.023, temperature: 20 })));
    for (const day of [6, 4, 2]) await buildEntry(batch, { kind: 'reading', gravity: 1.02, at: new Date(NOW - day * DAY) });
    const { suggestion, versions } = await getCalibration(brewer, sensor.identifier);
    expect(suggestion).toMatchObject({ offset: -0.003, since: iso(NOW - 6 * DAY) });
    expect(versions).toEqual([]);
    await offsetSensor(brewer, sensor.identifier, { offset: suggestion!.offset, applies_from: suggestion!.since, note: null }, clock);
    await recalculate(sensor.id, new Date(0));
    expect((await getCalibration(brewer, sensor.identifier)).suggestion).toBeNull();
    const { items } = await listRawReadings(brewer, sensor.identifier, 200);
    expect(items[0]).toMatchObject({ gravity: expect.closeTo(1.02, 9), gravity_sent: 1.023 });
    expect(items.at(-1)).toMatchObject({ gravity: 1.023, gravity_sent: null });
  });

  it('does not count from a time that lies ahead, and not for a probe', async () => {
    const brewer = await buildMember('brewer');
    const { sensor } = await buildSensor({ cellarId: brewer.cellarId });
    await expect(offsetSensor(brewer, sensor.identifier, { offset: 0.001, applies_from: iso(NOW + DAY), note: null }, clock)).rejects.toThrow('lies ahead');
    const probe = await buildSensor({ cellarId: brewer.cellarId, kind: 'room' });
    await expect(offsetSensor(brewer, probe.sensor.identifier, { offset: 0.001, applies_from: iso(NOW), note: null }, clock)).rejects.toThrow('Only a float');
  });
});

describe('where a sensor was', () => {
  it('decides where its readings go, however late they come', async () => {
    const brewer = await buildMember('brewer');
    const [first, second] = [await buildBatch({ cellarId: brewer.cellarId }), await buildBatch({ cellarId: brewer.cellarId })];
    const { sensor } = await buildSensor({ batch: first, fromAt: new Date(NOW - 5 * DAY) });
    await updateSensor(brewer, sensor.identifier, { batch_id: second.id, since: iso(NOW - 2 * DAY) }, clock);
    // All of it arrives after the move.
    await send(sensor, [4, 3, 2.5, 1].map((days) => ({ at: iso(NOW - days * DAY), gravity: 1.03, temperature: 20 })));
    const { items } = await listStays(brewer, sensor.identifier);
    expect(items).toMatchObject([
      { batch: { id: second.id }, from: iso(NOW - 2 * DAY), to: null, readings: 1 },
      { batch: { id: first.id }, from: iso(NOW - 5 * DAY), to: iso(NOW - 2 * DAY), readings: 3 },
    ]);
  });

  it('leaves the float that gives way in its batch until the other one comes', async () => {
    const brewer = await buildMember('brewer');
    const [elsewhere, batch] = [await buildBatch({ cellarId: brewer.cellarId }), await buildBatch({ cellarId: brewer.cellarId })];
    const { sensor: here } = await buildSensor({ batch, fromAt: new Date(NOW - 5 * DAY) });
    const { sensor: comes } = await buildSensor({ batch: elsewhere, fromAt: new Date(NOW - 4 * DAY) });
    await updateSensor(brewer, comes.identifier, { batch_id: null, since: iso(NOW - DAY) }, clock);
    await updateSensor(brewer, comes.identifier, { batch_id: batch.id, since: iso(NOW - DAY) }, clock);
    expect((await listStays(brewer, comes.identifier)).items[0]).toMatchObject({ batch: { id: batch.id }, from: iso(NOW - DAY), to: null });
    expect((await listStays(brewer, here.identifier)).items).toMatchObject([{ batch: { id: batch.id }, from: iso(NOW - 5 * DAY), to: iso(NOW - DAY) }]);
  });

  it('is not forgotten or shifted by a time that does not go with it: that is said at its field', async () => {
    const brewer = await buildMember('brewer');
    const [first, batch] = [await buildBatch({ cellarId: brewer.cellarId, name: 'Oat stout' }), await buildBatch({ cellarId: brewer.cellarId, name: 'Crab cider' })];
    const { sensor: here } = await buildSensor({ batch, fromAt: new Date(NOW - 2 * DAY), name: 'North float' });
    const { sensor: comes } = await buildSensor({ batch: first, fromAt: new Date(NOW - 4 * DAY) });
    const kept = async () => [...(await listStays(brewer, here.identifier)).items, ...(await listStays(brewer, comes.identifier)).items].map(({ batch: { name }, from, to }) => [name, from, to]);
    const refused = async (batchId: string | null, since: number, says: string) => {
      const before = await kept();
      await expect(updateSensor(brewer, comes.identifier, { batch_id: batchId, since: iso(since) }, clock)).rejects.toMatchObject({ fields: { since: [says] } });
      expect(await kept()).toEqual(before);
    };
    // Before it came to where it is.
    await refused(null, NOW - 5 * DAY, 'came into Oat stout Mon 16 Mar 12:00: choose a later time');
    await refused(batch.id, NOW - 5 * DAY, 'came into Oat stout Mon 16 Mar 12:00: choose a later time');
    // Before the other float came, whose stay would be gone.
    await refused(batch.id, NOW - 3 * DAY, 'North float came into Crab cider Wed 18 Mar 12:00: choose a later time');
    // Before it came out of where it was last.
    await updateSensor(brewer, comes.identifier, { batch_id: null, since: iso(NOW - DAY + 20_000) }, clock);
    await refused(batch.id, NOW - 1.5 * DAY, 'was in Oat stout until Thu 19 Mar 12:00: choose that or later');
    // The minute in which it came out is when it came out.
    await updateSensor(brewer, comes.identifier, { batch_id: batch.id, since: iso(NOW - DAY) }, clock);
    expect(await kept()).toEqual([
      ['Crab cider', iso(NOW - 2 * DAY), iso(NOW - DAY + 20_000)],
      ['Crab cider', iso(NOW - DAY + 20_000), null],
      ['Oat stout', iso(NOW - 4 * DAY), iso(NOW - DAY + 20_000)],
    ]);
  });

  it('may be told anew where it began too late or was never', async () => {
    const brewer = await buildMember('brewer');
    const batch = await buildBatch({ cellarId: brewer.cellarId });
    const { sensor } = await buildSensor({ batch, fromAt: new Date(NOW - DAY) });
    await updateSensor(brewer, sensor.identifier, { batch_id: batch.id, since: iso(NOW - 2 * DAY) }, clock);
    expect((await listStays(brewer, sensor.identifier)).items).toMatchObject([{ from: iso(NOW - 2 * DAY), to: null }]);
    await updateSensor(brewer, sensor.identifier, { batch_id: null, since: iso(NOW - 2 * DAY) }, clock);
    expect((await listStays(brewer, sensor.identifier)).items).toEqual([]);
  });

  it('is kept where a batch is begun with its float, pitched before the float came to the other one', async () => {
    const brewer = await buildMember('brewer');
    const other = await buildBatch({ cellarId: brewer.cellarId });
    const { sensor } = await buildSensor({ batch: other, fromAt: new Date(NOW - DAY) });
    const begun = await createBatch(brewer, createBatchForm.parse({ name: 'Crab cider', kind: 'cider', vessel_kind: 'demijohn', volume_l: 4, vessel_l: 5, pitched_at: iso(NOW - 3 * DAY), original_gravity: 1.05, sensor: sensor.identifier }), clock);
    expect((await listStays(brewer, sensor.identifier)).items).toMatchObject([
      { batch: { id: begun.id }, from: iso(NOW), to: null },
      { batch: { id: other.id }, from: iso(NOW - DAY), to: iso(NOW) },
    ]);
  });

  it('is one batch at a time, whatever is asked at once', async () => {
    const brewer = await buildMember('brewer');
    const batches = await Promise.all(Array.from({ length: 4 }, () => buildBatch({ cellarId: brewer.cellarId })));
    const { sensor } = await buildSensor({ cellarId: brewer.cellarId });
    await Promise.allSettled(batches.map((batch) => updateSensor(brewer, sensor.identifier, { batch_id: batch.id }, clock)));
    expect(await Assignment.count({ where: { sensorId: sensor.id, toAt: null } })).toBe(1);
  });

  it('lies never ahead', async () => {
    const brewer = await buildMember('brewer');
    const batch = await buildBatch({ cellarId: brewer.cellarId });
    const { sensor } = await buildSensor({ cellarId: brewer.cellarId });
    await expect(updateSensor(brewer, sensor.identifier, { batch_id: batch.id, since: iso(NOW + HOUR) }, clock)).rejects.toThrow('lies ahead');
    // A clock that runs a little fast means now.
    await updateSensor(brewer, sensor.identifier, { batch_id: batch.id, since: iso(NOW + 30_000) }, clock);
    expect((await listStays(brewer, sensor.identifier)).items).toMatchObject([{ from: iso(NOW), to: null }]);
  });
});

describe('probes', () => {
  it('stand beside the float of a batch, and their readings are no gravity of it', async () => {
    const brewer = await buildMember('brewer');
    const batch = await buildBatch({ cellarId: brewer.cellarId });
    const { sensor: float } = await buildSensor({ batch });
    const { sensor: room } = await buildSensor({ cellarId: brewer.cellarId, kind: 'room' });
    const { sensor: foam } = await buildSensor({ cellarId: brewer.cellarId, kind: 'foam' });
    for (const probe of [room, foam]) await updateSensor(brewer, probe.identifier, { batch_id: batch.id }, clock);
    expect(await getSensor(brewer, float.identifier)).toMatchObject({ batch: { id: batch.id } });
    expect(await getSensor(brewer, room.identifier)).toMatchObject({ kind: 'room', batch: { id: batch.id } });
    expect(await send(room, [{ at: iso(NOW), temperature: 14.5, gravity: 1.05 }, { at: iso(NOW - 1), temperature: 99 }])).toMatchObject({ stored: 1, refused: [[{ index: 1 }]] });
    expect(await send(foam, [{ at: iso(NOW), temperature: 18, foam: 42 }, { at: iso(NOW - 1), temperature: 18 }])).toMatchObject({ stored: 1, refused: [[{ reason: 'foam is required' }]] });
    expect((await listRawReadings(brewer, room.identifier, 5)).items).toMatchObject([{ temperature: 14.5, gravity: null }]);
    expect(await Assignment.count({ where: { batchId: batch.id, toAt: null } })).toBe(1);
  });
});

describe('settings sent down', () => {
  it('count as taken when the sensor says so, and its interval with them', async () => {
    const keeper = await buildMember('keeper');
    const { sensor } = await buildSensor({ cellarId: keeper.cellarId });
    const sent = await setSensor(keeper, sensor.identifier, { interval_s: 300 }, clock);
    expect(sent).toMatchObject({ interval_s: 900, settings: { version: 1, interval_s: 300, confirmed_at: null } });
    forgetNotes(sensor.id);
    // Over HTTP the answer carries them, until they are confirmed.
    expect(await receiveReadings(identityOf(sensor), Buffer.from(JSON.stringify({ gravity: 1.04, temperature: 20 })), 'json', { clock })).toMatchObject({ settings: { version: 1, interval_s: 300 } });
    await send(sensor, [{ at: iso(NOW - 1), gravity: 1.04, temperature: 20, settings: 1 }]);
    expect(await getSensor(keeper, sensor.identifier)).toMatchObject({ interval_s: 300, settings: { confirmed_at: iso(NOW) } });
    forgetNotes(sensor.id);
    expect((await receiveReadings(identityOf(sensor), Buffer.from(JSON.stringify({ at: iso(NOW - 2), gravity: 1.04, temperature: 20 })), 'json', { clock })).settings).toBeUndefined();
  });

  it('are not confirmed by an older word, nor by one of settings that were never sent', async () => {
    const keeper = await buildMember('keeper');
    const { sensor } = await buildSensor({ cellarId: keeper.cellarId });
    for (const interval_s of [300, 600]) await setSensor(keeper, sensor.identifier, { interval_s }, clock);
    forgetNotes(sensor.id);
    await send(sensor, [{ at: iso(NOW - 5), gravity: 1.04, temperature: 20, settings: 1 }]);
    expect(await getSensor(keeper, sensor.identifier)).toMatchObject({ interval_s: 900, settings: { version: 2, confirmed_at: null } });
    forgetNotes(sensor.id);
    await send(sensor, [{ at: iso(NOW - 4), gravity: 1.04, temperature: 20, settings: 99 }]);
    expect(await getSensor(keeper, sensor.identifier)).toMatchObject({ settings: { version: 2, confirmed_at: null } });
  });
});

describe('a sensor’s health', () => {
  it('tells silence, gaps, cell, signal and clock against the cellar’s limits', async () => {
    const keeper = await buildMember('keeper');
    const { sensor } = await buildSensor({ cellarId: keeper.cellarId });
    const hours = 20 * 24;
    for (let from = 0; from < hours; from += 240) {
      const part = Array.from({ length: 240 }, (_, index) => from + index);
      // Its clock is ten minutes fast, its cell loses 20 mV a day and stands at 3.4 V.
      await recordMessages(part.map((hour) => ({ sensor: identityOf(sensor), road: 'mqtt' as const, arrivedAt: NOW - (hours - hour) * HOUR, body: Buffer.from(JSON.stringify({ at: iso(NOW - (hours - hour) * HOUR + 599_000), gravity: 1.02, temperature: 20, battery: 3.4 + (0.02 * (hours - hour)) / 24, signal: -85, sequence: hour + Math.floor(hour / 10) })) })));
    }
    const health = await getSensorHealth(keeper, sensor.identifier, clock);
    expect(health.gaps).toMatchObject({ heard: 24, missed: 2, restarts: 0 });
    expect(health.battery!.days!.value).toBeGreaterThan(3);
    expect(health.battery!.days!.value).toBeLessThan(7);
    expect(health.clock_offset_s).toBeCloseTo(599, 0);
    expect(health.findings.map((finding) => finding.of)).toEqual(expect.arrayContaining(['battery', 'signal', 'clock']));
    await setSensorLimits(keeper, { low_battery_days: 1, weak_signal_dbm: -90, clock_offset_s: 3_600 });
    expect((await getSensorHealth(keeper, sensor.identifier, clock)).findings.map((finding) => finding.of)).not.toEqual(expect.arrayContaining(['battery', 'signal', 'clock']));
    const later = new ManualClock(NOW + 8 * HOUR);
    expect((await getSensorHealth(keeper, sensor.identifier, later)).findings[0]).toMatchObject({ of: 'silence' });
  });

  it('groups what was refused by its reason', async () => {
    const keeper = await buildMember('keeper');
    const { sensor } = await buildSensor({ cellarId: keeper.cellarId });
    await send(sensor, [{ gravity: 9, temperature: 20 }, { gravity: 1.04, temperature: 99 }, { gravity: 1.04, temperature: 99 }]);
    const { refused, findings } = await getSensorHealth(keeper, sensor.identifier, clock);
    expect(refused.map((group) => group.count).sort()).toEqual([1, 2]);
    expect(findings).toMatchObject([{ of: 'refused', says: '3 refused in 24 h.' }]);
  });
});
