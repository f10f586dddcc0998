import type { Sequelize, Transaction } from 'sequelize';
import { Assignment, Batch, Cellar, Entry, Membership, Person, Sensor } from '@/db/models';
import { ensurePartitions, monthOf, type Month } from '@/db/queries/partitions';
import { recordReadings, type ReadingRow } from '@/db/queries/record-readings';
import { DEMO_BATCHES, DEMO_CELLAR_NAME, DEMO_PASSPHRASE, DEMO_PEOPLE, type DemoBatch } from '@/db/seed/demo';
import { generate, type SimulatedBatch } from '@/devices/simulator/generate';
import { scenarioNamed } from '@/devices/simulator/scenarios';
import type { SimulatedSensor } from '@/devices/simulator/sensors-file';
import { hashPassword } from '@/lib/auth/passwords';
import { hashSensorSecret, makeSensorIdentifier, makeSensorSecret } from '@/lib/auth/sensors';

const HOUR = 3_600_000;
const INTERVAL_S = 900;
const ROWS_AT_ONCE = 2_000;

interface Seeded {
  batches: number;
  /** For the simulators, which go on where the back-fill ends. */
  simulators: SimulatedSensor[];
}

/**
 * Fills an empty house with the demo cellar, its ferments hours to months old.
 * All of it in one transaction: a start that was cut off seeds again, one that
 * was not never does.
 * @param now when the demo opens, ms since 1970
 */
export async function seedDemo(sequelize: Sequelize, now: number): Promise<Seeded> {
  const passwordHash = await hashPassword(DEMO_PASSPHRASE);
  const timeZone = Intl.DateTimeFormat().resolvedOptions().timeZone;
  const simulators: SimulatedSensor[] = [];
  const backfill: ReadingRow[] = [];

  const oldest = Math.max(...DEMO_BATCHES.map((demo) => scenarioNamed(demo.scenario).ageH));
  await ensurePartitions(sequelize, monthsFrom(now - (oldest + 24) * HOUR, now));

  await sequelize.transaction(async (transaction) => {
    const cellar = await Cellar.create({ name: DEMO_CELLAR_NAME, timeZone }, { transaction });
    const people = new Map<string, string>();
    for (const { name, email, role } of DEMO_PEOPLE) {
      const person = await Person.create({ name, email, passwordHash, timeZone }, { transaction });
      await Membership.create({ cellarId: cellar.id, personId: person.id, role }, { transaction });
      people.set(name, person.id);
    }

    for (const demo of DEMO_BATCHES) {
      const scenario = scenarioNamed(demo.scenario);
      // Whole seconds, since the simulators read the pitch back from text; apart, since sensors do not speak in chorus.
      const start = Math.floor((now - scenario.ageH * HOUR) / 1000 - demo.tag * 83) * 1000;
      const batch = generate(scenario, { seed: demo.seed, start, end: now, intervalMin: INTERVAL_S / 60 });
      const batchId = await writeBatch(cellar.id, demo, batch, people, transaction);

      const secret = makeSensorSecret();
      const sensor = await Sensor.create(
        { cellarId: cellar.id, identifier: makeSensorIdentifier(), secretHash: hashSensorSecret(secret), name: `Float ${String(demo.tag).padStart(2, '0')}`, intervalS: INTERVAL_S, createdAt: new Date(start - 24 * HOUR) },
        { transaction },
      );
      // From a little before the pitch: a sensor's clock may be behind.
      await Assignment.create({ cellarId: cellar.id, sensorId: sensor.id, batchId, fromAt: new Date(start - HOUR) }, { transaction });
      simulators.push({ sensor: sensor.identifier, secret, scenario: demo.scenario, seed: demo.seed, startedAt: new Date(start).toISOString(), interval_s: INTERVAL_S });
      for (const { at, arrivesAt, body } of batch.readings) {
        if (arrivesAt > now) continue;
        const { gravity = null, temperature, battery = null, signal = null, inclination = null, foam = null, sequence = null } = body;
        backfill.push({ sensorId: sensor.id, receivedAt: arrivesAt, reading: { measuredAt: at, gravity, temperature, battery, signal, inclination, foam, sequence } });
      }
    }
    for (let from = 0; from < backfill.length; from += ROWS_AT_ONCE) await recordReadings(sequelize, backfill.slice(from, from + ROWS_AT_ONCE), [], [], transaction);
  });
  return { batches: DEMO_BATCHES.length, simulators };
}

/** Every month that the span touches. */
function monthsFrom(first: number, last: number): Month[] {
  return Array.from({ length: monthOf(last) - monthOf(first) + 1 }, (_, index) => monthOf(first) + index);
}

/** The batch with its log as people would have written it: each entry made when it happened. */
async function writeBatch(cellarId: string, demo: DemoBatch, { scenario, setup, events }: SimulatedBatch, people: Map<string, string>, transaction: Transaction): Promise<string> {
  const pitchedAt = new Date(setup.pitchedAt!);
  const [keeper, brewer, hand] = DEMO_PEOPLE.map((person) => people.get(person.name)!);
  const lastNeck = events.findLast((event) => event.kind === 'neck')?.neck;
  const batch = await Batch.create(
    {
      cellarId,
      name: scenario.title,
      kind: setup.kind,
      drinkColour: scenario.colour,
      vesselKind: scenario.vessel.kind,
      tag: demo.tag,
      place: demo.place,
      volumeL: setup.volumeL,
      vesselL: setup.vesselL,
      neck: lastNeck ?? scenario.neck,
      pitchedAt,
      originalGravity: setup.originalGravity,
      yeast: demo.yeast,
      attenuationMinPercent: setup.attenuation ? Math.round(setup.attenuation.min * 1000) / 10 : null,
      attenuationMaxPercent: setup.attenuation ? Math.round(setup.attenuation.max * 1000) / 10 : null,
      alcoholToleranceAbv: setup.alcoholToleranceAbv,
      temperatureMinC: setup.temperature?.minC ?? null,
      temperatureMaxC: setup.temperature?.maxC ?? null,
      createdBy: brewer,
      createdAt: pitchedAt,
      updatedAt: pitchedAt,
    },
    { transaction },
  );

  const entries: Array<{ at: number; kind: string; text: string | null; gravity?: number | null; personId: string | undefined }> = [
    { at: pitchedAt.getTime(), kind: 'pitch', text: demo.yeast ? `${demo.yeast[0]!.toUpperCase()}${demo.yeast.slice(1)}, rehydrated.` : null, gravity: setup.originalGravity, personId: brewer },
    // The log shows an entry's kind by itself; the text says what is more.
    ...events.map((event, index) => ({ ...event, text: event.text.replace(/^Hydrometer[.,]?\s*/, '').replace(/^./, (letter) => letter.toUpperCase()) || null, personId: index % 2 === 0 ? brewer : hand })),
    ...(demo.notes ?? []).map((note) => ({ at: pitchedAt.getTime() + note.atH * HOUR, kind: 'observation', text: note.text, personId: people.get(note.by) ?? keeper })),
  ];
  for (const entry of entries) {
    const at = new Date(entry.at);
    await Entry.create({ ...entry, cellarId, batchId: batch.id, at, gravityRead: entry.kind === 'reading' ? (entry.gravity ?? null) : null, createdAt: at }, { transaction });
  }
  return batch.id;
}
