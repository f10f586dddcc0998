import { describe, expect, it } from 'vitest';
import { ProbeAssignment, Sensor } from '@/db/models';
import { ManualClock } from '@/lib/clock';
import { finingForm, secondDoseForm } from '@/lib/contracts/family';
import { getJudgement } from '@/lib/services/batches/get-judgement';
import { getSurroundings, surroundingsAt } from '@/lib/services/batches/surroundings';
import { recordMessages } from '@/lib/services/readings/record';
import { secondDose } from '@/lib/services/finings/second';
import { startFining } from '@/lib/services/finings/start';
import { getSensor } from '@/lib/services/sensors/get';
import { updateSensor } from '@/lib/services/sensors/update';
import { useDatabase } from '../support/database';
import { buildBatch, buildMember, buildSensor, writeReadings } from '../support/factories';

useDatabase();
const HOUR = 3_600_000;
const NOW = Date.parse('2026-03-20T12:00:00Z');
const clock = new ManualClock(NOW);

const say = (sensor: Sensor, bodies: object[], at = NOW) =>
  recordMessages([{ sensor: { id: sensor.id, cellarId: sensor.cellarId, identifier: sensor.identifier }, road: 'mqtt', body: Buffer.from(JSON.stringify(bodies)), arrivedAt: at }]);
const ago = (hours: number) => new Date(NOW - hours * HOUR).toISOString();

async function house() {
  const brewer = await buildMember('brewer');
  const batch = await buildBatch({ cellarId: brewer.cellarId, place: 'Back store' });
  const { sensor: room } = await buildSensor({ cellarId: brewer.cellarId, kind: 'room', name: 'Wall' });
  return { brewer, batch, room };
}

describe('a room probe', () => {
  it('shows on every batch that stands in its place, and on no other', async () => {
    const { brewer, batch, room } = await house();
    const beside = await buildBatch({ cellarId: brewer.cellarId, place: ' back STORE ' });
    const elsewhere = await buildBatch({ cellarId: brewer.cellarId, place: 'Attic' });
    const nowhere = await buildBatch({ cellarId: brewer.cellarId });
    const foreign = await buildBatch({ place: 'Back store' });
    expect(await updateSensor(brewer, room.identifier, { place: 'Back store' }, clock)).toMatchObject({ place: 'Back store' });
    await say(room, [{ at: ago(0.5), temperature: 13.4 }, { at: ago(1), temperature: 13 }, { at: ago(9), temperature: 30 }]);
    for (const one of [batch, beside]) {
      expect(await getSurroundings(brewer, one.id, clock)).toEqual({ probes: [{ sensor: room.identifier, name: 'Wall', kind: 'room', stands: 'place', at: ago(0.5), temperature_c: expect.closeTo(13.2, 3) as number, foam_mm: null, foam: null }] });
    }
    for (const one of [elsewhere, nowhere]) expect(await getSurroundings(brewer, one.id, clock)).toEqual({ probes: [] });
    expect((await surroundingsAt(foreign.id, NOW)).roomC).toBeNull();
    await expect(getSurroundings(brewer, foreign.id, clock)).rejects.toThrow('no such batch');
  });

  it('gives way to one that hangs at the vessel itself, and is empty once it is silent', async () => {
    const { brewer, batch, room } = await house();
    const { sensor: cupboard } = await buildSensor({ cellarId: brewer.cellarId, kind: 'room', name: 'Cupboard' });
    await updateSensor(brewer, room.identifier, { place: 'Back store' }, clock);
    await ProbeAssignment.create({ cellarId: brewer.cellarId, sensorId: cupboard.id, batchId: batch.id, fromAt: new Date(NOW - 48 * HOUR) });
    await say(room, [{ at: ago(1), temperature: 12 }]);
    await say(cupboard, [{ at: ago(1), temperature: 17 }]);
    expect((await surroundingsAt(batch.id, NOW)).roomC).toBeCloseTo(17, 3);
    expect((await surroundingsAt(batch.id, NOW + 24 * HOUR)).roomC).toBeNull();
    expect((await getSurroundings(brewer, batch.id, new ManualClock(NOW + 24 * HOUR))).probes).toMatchObject([{ name: 'Cupboard', at: null }, { name: 'Wall', at: null }]);
  });

  it('alone hangs in a place: a float does not', async () => {
    const { brewer } = await house();
    const { sensor: float } = await buildSensor({ cellarId: brewer.cellarId });
    await expect(updateSensor(brewer, float.identifier, { place: 'Attic' }, clock)).rejects.toThrow('Only a room probe');
    expect(await getSensor(brewer, float.identifier)).toMatchObject({ place: null });
  });
});

describe('a foam probe', () => {
  /** A cider whose fall is over, in a vessel with a tube on. */
  async function quiet() {
    const brewer = await buildMember('brewer');
    const pitchedAt = new Date(NOW - 14 * 24 * HOUR);
    const batch = await buildBatch({ cellarId: brewer.cellarId, kind: 'cider', neck: 'blow_off', originalGravity: 1.055, pitchedAt });
    const { sensor: float } = await buildSensor({ batch });
    const hours = Array.from({ length: 14 * 24 }, (_, hour) => hour);
    await writeReadings(float.id, hours.map((hour) => ({ at: pitchedAt.getTime() + hour * HOUR, gravity: 1 + (55 / (1 + Math.exp((hour - 96) / 30)) + 0.3 * Math.sin(hour)) / 1000, temperature: 19 })));
    const { sensor: foam } = await buildSensor({ cellarId: brewer.cellarId, kind: 'foam', name: 'Eye' });
    await ProbeAssignment.create({ cellarId: brewer.cellarId, sensorId: foam.id, batchId: batch.id, fromAt: pitchedAt });
    return { brewer, batch, foam, neckAt: async (at: number) => (await getJudgement(brewer, batch.id, { at: new Date(at).toISOString() }, new ManualClock(NOW + 48 * HOUR))).calls.neck };
  }

  it('keeps the tube on as long as it sees foam, and lets it go when that has sunk', async () => {
    const { brewer, batch, foam, neckAt } = await quiet();
    expect(await neckAt(NOW)).toMatchObject({ verdict: 'yes' });
    await say(foam, [{ at: ago(0.2), temperature: 18, foam: 40 }, { at: ago(1), temperature: 18, foam: 38 }, { at: ago(2), temperature: 18, foam: 44 }]);
    // Past judgements are remembered for as long as nothing was logged; another minute is judged anew.
    expect(await neckAt(NOW + 60_000)).toMatchObject({ verdict: 'hold', headline: 'Leave the tube on: foam stands high.' });
    expect((await getSurroundings(brewer, batch.id, clock)).probes).toMatchObject([{ name: 'Eye', kind: 'foam', stands: 'vessel', foam_mm: 40, foam: 'cover' }]);
    await say(foam, [{ at: new Date(NOW + 4 * HOUR).toISOString(), temperature: 18, foam: 2 }, { at: new Date(NOW + 4.5 * HOUR).toISOString(), temperature: 18, foam: 0 }], NOW + 5 * HOUR);
    expect(await neckAt(NOW + 6 * HOUR)).toMatchObject({ verdict: 'yes' });
  });

  it('says nothing of a time before its word had arrived', async () => {
    const { foam, batch } = await quiet();
    await say(foam, [{ at: ago(2), temperature: 18, foam: 40 }], NOW);
    expect((await surroundingsAt(batch.id, NOW - HOUR)).events).toEqual([]);
    expect((await surroundingsAt(batch.id, NOW)).events).toMatchObject([{ kind: 'note', foam: 'cover', at: NOW - 2 * HOUR, knownAt: NOW }]);
  });
});

describe('a fining', () => {
  it('is known to the judgement until it has settled, the second dose counted from when it went in', async () => {
    const brewer = await buildMember('brewer');
    const batch = await buildBatch({ cellarId: brewer.cellarId, kind: 'cider' });
    const at = (hours: number) => new ManualClock(NOW + hours * HOUR);
    const given = await startFining(brewer, batch.id, finingForm.parse({ at: new Date(NOW).toISOString(), fining: 'two-part', interval_min: 60, settle_days: 4 }), at(0));
    expect((await surroundingsAt(batch.id, NOW - HOUR)).events).toEqual([]);
    expect((await surroundingsAt(batch.id, NOW)).events).toMatchObject([{ kind: 'note', at: NOW, settlesAt: NOW + 97 * HOUR }]);
    await secondDose(brewer, given.id, secondDoseForm.parse({ at: new Date(NOW + 3 * HOUR).toISOString() }), at(3));
    expect((await surroundingsAt(batch.id, NOW + 4 * HOUR)).events).toMatchObject([{ at: NOW + 3 * HOUR, settlesAt: NOW + 99 * HOUR }]);
  });
});
