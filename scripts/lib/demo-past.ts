import type { Transaction } from 'sequelize';
import { Batch, Entry, Job, Lot, Must, MustVersion, Opening, Place } from '@/db/models';
import { addBottles, takeBottles, writeMove } from '@/db/queries/lots';
import { DEMO_PLACES, type DemoPast } from '@/db/seed/past';
import type { SimulatedBatch } from '@/devices/simulator/generate';
import type { Actor } from '@/lib/auth/policies';
import type { BottleBatchForm } from '@/lib/contracts/bench';
import type { CreateTasting } from '@/lib/contracts/tastings';
import type { LotBody } from '@/lib/contracts/lots';
import { bottleIn } from '@/lib/services/bench/bottle';
import { finingIn } from '@/lib/services/finings/start';
import { giveSecond } from '@/lib/services/finings/dose';
import { keptSheet } from '@/lib/services/musts/sheet';
import { writeMust } from '@/lib/services/musts/write';
import { shareIn } from '@/lib/services/shares/manage';
import { writeTasting } from '@/lib/services/tastings/write';

const HOUR = 3_600_000;
const DAY = 24 * HOUR;

export interface Household {
  cellarId: string;
  /** By name. */
  people: ReadonlyMap<string, string>;
  brewer: Actor;
  hand: Actor;
  /** By name. */
  places: ReadonlyMap<string, string>;
}

export async function writePlaces(cellarId: string, createdAt: Date, transaction: Transaction): Promise<Map<string, string>> {
  const places = new Map<string, string>();
  for (const place of DEMO_PLACES) places.set(place.name, (await Place.create({ cellarId, ...place, createdAt }, { transaction })).id);
  return places;
}

/** What a hydrometer showed at that hour, by the simulated truth, to the thousandth. */
export function readAt({ readings }: SimulatedBatch, at: number): number {
  const nearest = readings.reduce((best, reading) => (Math.abs(reading.measuredAt - at) < Math.abs(best.measuredAt - at) ? reading : best));
  return Number(nearest.truth.gravity.toFixed(3));
}

/** The log from the first racking on, as three people wrote it. */
async function writeCellarWork({ cellarId, brewer, hand }: Household, past: DemoPast, batch: Batch, simulated: SimulatedBatch, transaction: Transaction): Promise<void> {
  const start = batch.pitchedAt!.getTime();
  const write = (at: number, personId: string, more: Partial<Entry> & Pick<Entry, 'kind'>) => Entry.create({ ...more, cellarId, batchId: batch.id, at: new Date(at), createdAt: new Date(at), personId }, { transaction });
  for (const [index, atH] of past.readAtH.entries()) {
    const gravity = readAt(simulated, start + atH * HOUR);
    await write(start + atH * HOUR, index % 2 === 0 ? hand.personId : brewer.personId, { kind: 'reading', gravity, gravityRead: gravity, text: 'From the thief, gas stirred out.' });
  }
  const racked = start + past.rack.atH * HOUR + 20 * 60_000;
  const over = batch.volumeL - past.rack.leftL;
  await write(racked, brewer.personId, { kind: 'rack', volumeL: over, neck: 'airlock', text: 'Off the lees, hose to the bottom.', detail: { left_l: past.rack.leftL } });
  await write(racked + 60_000, brewer.personId, { kind: 'addition', detail: { substance: 'sulphite', ingredient: 'potassium-metabisulphite', name: 'potassium metabisulphite', grams: past.rack.sulphiteG } });
  if (past.rack.topUpL > 0) await write(racked + 120_000, brewer.personId, { kind: 'top_up', volumeL: past.rack.topUpL, text: 'Water, boiled and cooled.', detail: { substance: 'water' } });
  await batch.update({ volumeL: over + past.rack.topUpL, neck: 'airlock' }, { transaction });
  if (past.fining) {
    const at = start + past.fining.atH * HOUR;
    const run = await finingIn(brewer, batch.id, { at: new Date(at).toISOString(), text: null, client_id: null, fining: past.fining.fining, dose: past.fining.dose, interval_min: null, settle_days: null }, { now: () => at }, transaction);
    await giveSecond(hand, run.id, { at: new Date(at + 64 * 60_000), text: null, dose: past.fining.dose, clientId: null }, transaction);
    await Job.update({ doneAt: new Date(at + 6 * DAY), doneBy: hand.personId }, { where: { batchId: batch.id, kind: 'settle' }, transaction });
  }
  if (past.stabiliseAtH !== null) await write(start + past.stabiliseAtH * HOUR, brewer.personId, { kind: 'stabilise', text: 'Half a gram of metabisulphite and one of sorbate.', detail: { substance: 'sorbate', ingredient: 'potassium-sorbate', name: 'potassium sorbate', grams: 1 } });
}

async function serve({ cellarId, people, brewer, places }: Household, past: DemoPast, lot: LotBody, bottledAt: number, transaction: Transaction): Promise<void> {
  const at = (days: number) => new Date(bottledAt + days * DAY);
  const stood = places.get(past.place)!;
  const bottleOf = (key: string) => lot.bottles[past.bottling.bottles.findIndex((bottle) => bottle.key === key)]!.id;
  const where = new Map(past.bottling.bottles.map((bottle) => [bottle.key, stood]));
  const move = past.movedTo;
  if (move) {
    const to = places.get(move.place)!;
    await takeBottles({ lotBottleId: bottleOf(move.bottle), placeId: stood }, move.count, transaction);
    await addBottles({ cellarId, lotBottleId: bottleOf(move.bottle), placeId: to }, move.count, transaction);
    await writeMove({ cellarId, lotId: lot.id, lotBottleId: bottleOf(move.bottle), fromPlace: stood, toPlace: to, count: move.count, at: at(move.afterDays), personId: brewer.personId, overrideReason: null }, transaction);
    where.set(move.bottle, to);
  }
  for (const opening of past.openings) {
    const [lotBottleId, placeId] = [bottleOf(opening.bottle), where.get(opening.bottle)!];
    if (!(await takeBottles({ lotBottleId, placeId }, opening.count, transaction))) throw new Error(`The demo opens more ${opening.bottle} bottles of ${lot.name} than there are.`);
    await Opening.create({ cellarId, lotId: lot.id, lotBottleId, placeId, kind: opening.kind, count: opening.count, at: at(opening.afterDays), givenTo: opening.to ?? null, note: opening.note ?? null, personId: people.get(opening.by) ?? null }, { transaction });
  }
}

async function taste({ people, brewer }: Household, past: DemoPast, batchId: string, lot: Lot, bottledAt: number, transaction: Transaction): Promise<void> {
  const share = past.shared ? await shareIn(brewer, batchId, { expires_in_days: 730, show_people: true, takes_tastings: true }, { now: () => bottledAt + 30 * DAY }, transaction) : null;
  for (const { afterDays, by, guest, ...sheet } of past.tastings) {
    const at = new Date(bottledAt + afterDays * DAY + 19 * HOUR);
    const tasted: CreateTasting = { ...sheet, at: at.toISOString(), show_name: by !== null, client_id: null };
    const personId = by === null ? null : (people.get(by) ?? null);
    await writeTasting(lot, tasted, { at, personId, shareId: by === null ? (share?.id ?? null) : null, guestName: guest ?? null, showName: by !== null || guest !== undefined }, transaction);
  }
  if (past.nextTime) await lot.update({ nextTime: past.nextTime.note, nextTimeBy: people.get(past.nextTime.by) ?? null, nextTimeAt: new Date(bottledAt + 44 * DAY) }, { transaction });
  await lot.update({ note: past.note }, { transaction });
}

/** Copies the sheet with its one change, as somebody did after tasting. */
async function copySheet(brewer: Actor, past: DemoPast, versionId: string, at: Date, transaction: Transaction): Promise<void> {
  if (!past.copy) return;
  const source = await MustVersion.findByPk(versionId, { transaction, rejectOnEmpty: true });
  const sheet = keptSheet(source.body);
  const grams = past.copy.honeyG;
  const changed = { ...sheet, name: past.copy.name, lines: sheet.lines.map((line) => (line.ingredient.kind === 'honey' ? { ...line, amount: { ...line.amount, quantity: { lo: grams, value: grams, hi: grams } } } : line)) };
  const must: Must = await writeMust(brewer, { sheet: changed, changeNote: past.copy.note, copiedFrom: versionId }, at, transaction);
  await must.reload({ transaction });
}

/**
 * Takes a batch of the past from its first racking to what people said of it. It
 * is bottled by the same gate as any other: where the bench would stop it, the
 * demo does not start.
 */
export async function finishPast(house: Household, past: DemoPast, batchId: string, simulated: SimulatedBatch, now: number, transaction: Transaction): Promise<void> {
  const batch = await Batch.findByPk(batchId, { transaction, rejectOnEmpty: true });
  await writeCellarWork(house, past, batch, simulated, transaction);
  const bottledAt = batch.pitchedAt!.getTime() + past.bottledAfterDays * DAY;
  const form: BottleBatchForm = { ...past.bottling, volume_l: null, at: new Date(bottledAt).toISOString(), code: null, place_id: house.places.get(past.place)!, ends_batch: true, override_reason: null, client_id: null };
  const body = await bottleIn(house.brewer, batchId, form, { now: () => bottledAt }, transaction);
  const lot = await Lot.findByPk(body.id, { transaction, rejectOnEmpty: true });
  await serve(house, past, body, bottledAt, transaction);
  await taste(house, past, batchId, lot, bottledAt, transaction);
  // What the rounds asked for meanwhile, somebody did.
  for (const job of await Job.findAll({ where: { lotId: lot.id }, transaction })) if (job.dueAt.getTime() < now) await job.update({ doneAt: new Date(job.dueAt.getTime() + 9 * HOUR), doneBy: house.hand.personId }, { transaction });
  if (batch.mustVersionId) await copySheet(house.brewer, past, batch.mustVersionId, new Date(bottledAt + 60 * DAY), transaction);
}
