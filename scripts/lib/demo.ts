import type { Sequelize, Transaction } from 'sequelize';
import { Assignment, Cellar, Membership, Person, Sensor } from '@/db/models';
import { saveMessageTimes } from '@/db/queries/messages';
import { ensurePartitions, monthOf, type Month } from '@/db/queries/partitions';
import { recordReadings, type ReadingRow } from '@/db/queries/record-readings';
import { DEMO_BATCHES, DEMO_CELLAR_NAME, DEMO_PASSPHRASE, DEMO_PEOPLE } from '@/db/seed/demo';
import { DEMO_PAST, type DemoPast } from '@/db/seed/past';
import { generate, type SimulatedBatch } from '@/devices/simulator/generate';
import { scenarioNamed } from '@/devices/simulator/scenarios';
import type { SimulatedSensor } from '@/devices/simulator/sensors-file';
import { hashPassword } from '@/lib/auth/passwords';
import type { Actor } from '@/lib/auth/policies';
import { hashSensorSecret, makeSensorIdentifier, makeSensorSecret } from '@/lib/auth/sensors';
import type { Role } from '@/lib/core/roles';
import { writeBatch, writeToday } from './demo-batch';
import { finishPast, writePlaces, type Household } from './demo-past';
import { writeOwnJobs } from './demo-rounds';

const HOUR = 3_600_000;
const INTERVAL_S = 900;
/** What is over needs no finer curve. */
const PAST_INTERVAL_S = 3600;
const ROWS_AT_ONCE = 2_000;

interface Seeded {
  batches: number;
  /** For the simulators, which go on where the back-fill ends. */
  simulators: SimulatedSensor[];
}

/**
 * Fills an empty house with the demo cellar: its ferments hours to months old with
 * the sheets they were made from, and what was bottled before. All of it in one
 * transaction: a start that was cut off seeds again, one that was not never does.
 * @param now when the demo opens, ms since 1970
 */
export async function seedDemo(sequelize: Sequelize, now: number): Promise<Seeded> {
  const passwordHash = await hashPassword(DEMO_PASSPHRASE);
  const timeZone = Intl.DateTimeFormat().resolvedOptions().timeZone;
  const simulators: SimulatedSensor[] = [];

  const oldest = Math.max(...DEMO_BATCHES.map((demo) => scenarioNamed(demo.scenario).ageH), ...DEMO_PAST.map((past) => past.pitchedDaysAgo * 24));
  await ensurePartitions(sequelize, monthsFrom(now - (oldest + 24) * HOUR, now));

  await sequelize.transaction(async (transaction) => {
    const house = await writeHousehold(timeZone, passwordHash, new Date(now - (oldest + 24) * HOUR), transaction);
    await writePasts(sequelize, house, now, transaction);
    await writeOwnJobs(house, now, transaction);
    const backfill: ReadingRow[] = [];
    for (const demo of DEMO_BATCHES) {
      const scenario = scenarioNamed(demo.scenario);
      // Whole seconds, since the simulators read the pitch back from text; apart, since sensors do not speak in chorus.
      const start = Math.floor((now - scenario.ageH * HOUR) / 1000 - demo.tag * 83) * 1000;
      const simulated = generate(scenario, { seed: demo.seed, start, end: now, intervalMin: INTERVAL_S / 60 });
      const batchId = await writeBatch(house, demo, simulated, transaction);
      await writeToday(house, demo, batchId, simulated, now, transaction);

      const { sensor, secret } = await writeSensor(house.cellarId, `Float ${String(demo.tag).padStart(2, '0')}`, INTERVAL_S, start, transaction);
      // From a little before the pitch: a sensor's clock may be behind.
      await Assignment.create({ cellarId: house.cellarId, sensorId: sensor.id, batchId, fromAt: new Date(start - HOUR) }, { transaction });
      simulators.push({ sensor: sensor.identifier, secret, scenario: demo.scenario, seed: demo.seed, startedAt: new Date(start).toISOString(), interval_s: INTERVAL_S });
      backfill.push(...readingRows(sensor.id, simulated, now));
    }
    await record(sequelize, backfill, transaction);
  });
  return { batches: DEMO_BATCHES.length + DEMO_PAST.length, simulators };
}

async function writeHousehold(timeZone: string, passwordHash: string, since: Date, transaction: Transaction): Promise<Household> {
  const cellar = await Cellar.create({ name: DEMO_CELLAR_NAME, timeZone, currency: 'EUR' }, { transaction });
  const people = new Map<string, string>();
  const actors = new Map<Role, Actor>();
  for (const { name, email, role } of DEMO_PEOPLE) {
    const person = await Person.create({ name, email, passwordHash, timeZone }, { transaction });
    await Membership.create({ cellarId: cellar.id, personId: person.id, role }, { transaction });
    people.set(name, person.id);
    actors.set(role, { cellarId: cellar.id, personId: person.id, role });
    // The keeper sleeps, and reads how everything stands in the morning.
    if (role === 'keeper') await saveMessageTimes(person.id, { quiet: { fromMin: 0, toMin: 6 * 60 }, digestMin: 7 * 60 }, transaction);
  }
  return { cellarId: cellar.id, people, brewer: actors.get('brewer')!, hand: actors.get('hand')!, places: await writePlaces(cellar.id, since, transaction) };
}

async function writeSensor(cellarId: string, name: string, intervalS: number, start: number, transaction: Transaction): Promise<{ sensor: Sensor; secret: string }> {
  const secret = makeSensorSecret();
  const sensor = await Sensor.create({ cellarId, identifier: makeSensorIdentifier(), secretHash: hashSensorSecret(secret), name, intervalS, createdAt: new Date(start - 24 * HOUR) }, { transaction });
  return { sensor, secret };
}

/** Last season's batches, one after the other on one float that lies idle now. */
async function writePasts(sequelize: Sequelize, house: Household, now: number, transaction: Transaction): Promise<void> {
  const startOf = (past: DemoPast) => Math.floor((now - past.pitchedDaysAgo * 24 * HOUR) / 1000) * 1000;
  const { sensor } = await writeSensor(house.cellarId, `Float ${DEMO_BATCHES.length + 1}`, PAST_INTERVAL_S, Math.min(...DEMO_PAST.map(startOf)), transaction);
  for (const past of DEMO_PAST) {
    const start = startOf(past);
    const end = start + past.bottledAfterDays * 24 * HOUR;
    const simulated = generate(scenarioNamed(past.scenario), { seed: past.seed, start, end, intervalMin: PAST_INTERVAL_S / 60 });
    const batchId = await writeBatch(house, { ...past, tag: null, place: 'long shelf', notes: [] }, simulated, transaction);
    await Assignment.create({ cellarId: house.cellarId, sensorId: sensor.id, batchId, fromAt: new Date(start - HOUR), toAt: new Date(end) }, { transaction });
    await record(sequelize, readingRows(sensor.id, simulated, end), transaction);
    await finishPast(house, past, batchId, simulated, now, transaction);
  }
}

const readingRows = (sensorId: number, { readings }: SimulatedBatch, until: number): ReadingRow[] =>
  readings.flatMap(({ at, arrivesAt, body }) => {
    if (arrivesAt > until) return [];
    const { gravity = null, temperature, battery = null, signal = null, inclination = null, foam = null, sequence = null } = body;
    return [{ sensorId, receivedAt: arrivesAt, reading: { measuredAt: at, gravity, temperature, battery, signal, inclination, foam, sequence } }];
  });

async function record(sequelize: Sequelize, rows: readonly ReadingRow[], transaction: Transaction): Promise<void> {
  for (let from = 0; from < rows.length; from += ROWS_AT_ONCE) await recordReadings(sequelize, rows.slice(from, from + ROWS_AT_ONCE), [], [], transaction);
}

/** Every month that the span touches. */
function monthsFrom(first: number, last: number): Month[] {
  return Array.from({ length: monthOf(last) - monthOf(first) + 1 }, (_, index) => monthOf(first) + index);
}
