import { describe, expect, it } from 'vitest';
import { Alert, Assignment, Batch, Sensor } from '@/db/models';
import { probesOf } from '@/db/queries/surroundings';
import type { Actor } from '@/lib/auth/policies';
import { SensorDirectory } from '@/lib/auth/sensors';
import { ManualClock } from '@/lib/clock';
import { importForm } from '@/lib/contracts/imports';
import { assessBatch } from '@/lib/services/batches/assess';
import { exportArchive } from '@/lib/services/exports/archive';
import { keepImport } from '@/lib/services/imports/keep';
import { undoImport } from '@/lib/services/imports/undo';
import { receiveReadings } from '@/lib/services/readings/receive';
import { removeSensor } from '@/lib/services/sensors/remove';
import { rotateSensor } from '@/lib/services/sensors/rotate';
import { useDatabase } from '../support/database';
import { buildBatch, buildEntry, buildMember, buildSensor, writeReadings } from '../support/factories';
import { useObjectStore } from '../support/object-store';

const db = useDatabase();
useObjectStore();
const HOUR = 3_600_000;
const DAY = 24 * HOUR;
const NOW = Date.now();
const signIn = (identifier: string, secret: string) => new SensorDirectory().authenticate(identifier, secret);

const out = async (actor: Actor, clock: ManualClock) => {
  let text = '';
  for await (const piece of await exportArchive(actor, null, clock)) text += piece;
  return text;
};
const bring = (actor: Actor, text: string, clock: ManualClock) => keepImport(actor, importForm.parse({ kind: 'archive', file_name: 'cellar.json', text }), clock);
const mails = async (cellarId: string) => (await db.sequelize.query(`select o.payload->>'event' as event, a.call from outbox o join alerts a on a.id = o.alert_id where o.cellar_id = $cellarId and not o.dedupe_key like 'brought:%'`, { bind: { cellarId } }))[0];
const alertsOf = async (cellarId: string) => (await Alert.findAll({ where: { cellarId } })).map(({ call, state, note }) => ({ call, state, note }));

/** A cider that works, with a float in it that was last heard `silentH` ago, and a room probe by its place. */
async function working(silentH: number) {
  const keeper = await buildMember('keeper', { name: 'Una' });
  const pitchedAt = new Date(NOW - 5 * DAY);
  const batch = await buildBatch({ cellarId: keeper.cellarId, kind: 'cider', place: 'back room', pitchedAt, originalGravity: 1.05 });
  await buildEntry(batch, { kind: 'pitch', at: pitchedAt, gravity: 1.05, gravityRead: 1.05, volumeL: 4.5 });
  const { sensor } = await buildSensor({ batch, cellarId: keeper.cellarId, name: 'float 4' });
  const until = NOW - silentH * HOUR;
  await writeReadings(sensor.id, Array.from({ length: 200 }, (_, index) => ({ at: until - index * 0.5 * HOUR, gravity: 1.02 + index * 0.0001, temperature: 18 })));
  const { sensor: probe } = await buildSensor({ cellarId: keeper.cellarId, kind: 'room', name: 'by the door', place: 'Back room' });
  await writeReadings(probe.id, [{ at: NOW - HOUR, gravity: null, temperature: 13.5 }]);
  return { keeper, batch };
}

async function brought(silentH: number) {
  const clock = new ManualClock(NOW);
  const there = await working(silentH);
  const here = await buildMember('keeper', { name: 'Una' });
  const run = await bring(here, await out(there.keeper, clock), clock);
  const batch = await Batch.findOne({ where: { cellarId: here.cellarId }, rejectOnEmpty: true });
  const floats = await Sensor.findOne({ where: { cellarId: here.cellarId, kind: 'float' }, rejectOnEmpty: true });
  return { clock, there, here, run, batch, float: floats };
}

describe('a working batch that came in', () => {
  it('shows what was so before, and wakes nobody for it', async () => {
    const { clock, there, here, batch } = await brought(12);
    // Where it comes from, the same silence is told.
    await assessBatch(there.batch.id, { clock });
    expect(await mails(there.keeper.cellarId)).toEqual([{ event: 'opened', call: 'sensor' }]);
    for (const hours of [0, 1, 7, 30]) {
      clock.set(NOW + hours * HOUR);
      await assessBatch(batch.id, { clock });
    }
    expect(await alertsOf(here.cellarId)).toEqual([{ call: 'sensor', state: 'open', note: null }]);
    expect(await mails(here.cellarId)).toEqual([]);
  });

  it('tells of what begins later', async () => {
    const { clock, here, batch } = await brought(0.2);
    await assessBatch(batch.id, { clock });
    expect(await alertsOf(here.cellarId)).toEqual([]);
    clock.set(NOW + 20 * HOUR);
    await assessBatch(batch.id, { clock });
    clock.advance(HOUR);
    await assessBatch(batch.id, { clock });
    expect(await mails(here.cellarId)).toEqual([{ event: 'opened', call: 'sensor' }]);
  });

  it('goes on with what somebody had in hand there, and does not say it again', async () => {
    const clock = new ManualClock(NOW);
    const there = await working(12);
    await assessBatch(there.batch.id, { clock });
    await Alert.update({ state: 'acknowledged', acknowledgedBy: there.keeper.personId, acknowledgedAt: new Date(NOW), note: 'new battery on its way' }, { where: { cellarId: there.keeper.cellarId } });
    const here = await buildMember('keeper', { name: 'Una' });
    await bring(here, await out(there.keeper, clock), clock);
    const batch = await Batch.findOne({ where: { cellarId: here.cellarId }, rejectOnEmpty: true });
    for (const hours of [0, 5, 40]) {
      clock.set(NOW + hours * HOUR);
      await assessBatch(batch.id, { clock });
    }
    expect(await alertsOf(here.cellarId)).toEqual([{ call: 'sensor', state: 'acknowledged', note: 'new battery on its way' }]);
    expect(await mails(here.cellarId)).toEqual([]);
  });
});

describe('a sensor that came in', () => {
  it('is where it was, and speaks again with a new secret', async () => {
    const { clock, here, batch, float } = await brought(1);
    expect(await Assignment.findAll({ where: { sensorId: float.id }, raw: true })).toMatchObject([{ batchId: batch.id, toAt: null }]);
    expect((await probesOf(batch.id, NOW)).map(({ name, kind, stands, temperatureC }) => ({ name, kind, stands, temperatureC }))).toEqual([{ name: 'by the door', kind: 'room', stands: 'place', temperatureC: 13.5 }]);
    const { secret } = await rotateSensor(here, float.identifier);
    const identity = await signIn(float.identifier, secret);
    expect(identity).toMatchObject({ id: float.id });
    await expect(receiveReadings(identity!, Buffer.from(JSON.stringify({ gravity: 1.019, temperature: 18 })), 'json', { clock })).resolves.toMatchObject({ stored: 1 });
  });

  it('keeps its import from being taken out once it was heard here, until it is removed', async () => {
    const { clock, here, run, float } = await brought(1);
    const { secret } = await rotateSensor(here, float.identifier);
    await receiveReadings((await signIn(float.identifier, secret))!, Buffer.from(JSON.stringify({ gravity: 1.019, temperature: 18 })), 'json', { clock });
    await expect(undoImport(here, run.id, clock)).rejects.toMatchObject({ code: 'conflict' });
    await removeSensor(here, float.identifier, clock);
    await expect(undoImport(here, run.id, clock)).resolves.toMatchObject({ undone_at: expect.any(String) });
    expect(await Sensor.count({ where: { cellarId: here.cellarId } })).toBe(0);
  });
});
