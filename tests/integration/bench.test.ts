import { describe, expect, it } from 'vitest';
import { Assignment, AuditRow, Batch, Entry, Lot, LotBottle } from '@/db/models';
import { inTransaction } from '@/db/client';
import { saveBatchState } from '@/db/queries/batch-states';
import type { Actor } from '@/lib/auth/policies';
import { bottleBatch } from '@/lib/services/bench/bottle';
import { getBench } from '@/lib/services/bench/get';
import { judge } from '@/lib/services/bench/judge';
import { createEntry } from '@/lib/services/entries/create';
import { createEntry as entryForm } from '@/lib/contracts/batches';
import { createMust } from '@/lib/services/musts/create';
import { moveBottles } from '@/lib/services/lots/move';
import { updateLot } from '@/lib/services/lots/update';
import { createPlace, updatePlace } from '@/lib/services/places/write';
import { presentAssessment } from '@/lib/contracts/assessment';
import { assess } from '@/lib/core/assess';
import { ConflictError, ForbiddenError, InvalidError } from '@/lib/errors';
import { aLine, aSheet, beerBottle, bottleForm, ciderAt, clockAt, DAY, HOUR, isoAt, NOON, readAt, sparklingBottle, stillBottle } from '../support/cellar';
import { useDatabase } from '../support/database';
import { buildMember, buildSensor, writeReadings } from '../support/factories';

useDatabase();

const REASON = 'These are champagne bottles of my own, tested last year to seven bar.';
const lotsOf = (batch: Batch) => Lot.count({ where: { batchId: batch.id } });
/** Everything in an answer, names and values, to look for what must not be there. */
const said = (value: unknown) => JSON.stringify(value);

const bottle = (actor: Actor, batch: Batch, form: Parameters<typeof bottleForm>[0] = {}) => bottleBatch(actor, batch.id, bottleForm(form), clockAt());

describe('a finished cider', () => {
  it('is bottled: the lot keeps the dose, the pressures and where it stands; the batch is over', async () => {
    const brewer = await buildMember('brewer');
    const batch = await ciderAt(brewer);
    const { sensor } = await buildSensor({ batch });
    const place = await createPlace(brewer, { name: 'warm shelf', capacity: 12, temperature_c: 20 });
    const lot = await bottle(brewer, batch, { place_id: place.id, other_cost: 3 });
    expect(lot).toMatchObject({ code: '26-001', name: 'Orchard cider', sparkle: 'sparkling', overridden: false, override: null, caution: null, counts: { bottled: 5, left: 5 } });
    expect(lot.bench).toMatchObject({ verdict: 'safe', dose: { way: 'weighed' }, wanted_volumes: 2.5 });
    expect(lot.bottles[0]).toMatchObject({ rating: 6, rating_confirmed: true, stands: [{ place: { id: place.id }, count: 5 }] });
    expect(lot.bottles[0]!.worst_bar).toBeGreaterThan(lot.bottles[0]!.cellar_bar);
    expect(lot.bottles[0]!.worst_bar).toBeLessThanOrEqual(6);
    // OG 1.048 to 1.000 is 6.3 % by the 131.25 rule; the bench reckons by Balling and adds the priming's.
    expect(lot.abv_percent!.value).toBeGreaterThan(6.2);
    expect(lot.abv_percent!.value).toBeLessThan(7.2);
    const after = await Batch.findByPk(batch.id, { rejectOnEmpty: true });
    expect(after.state).toBe('ended');
    expect(await Entry.count({ where: { batchId: batch.id, kind: 'bottling' } })).toBe(1);
    expect(await AuditRow.count({ where: { action: 'lot.bottled', subject: lot.id } })).toBe(1);
    // Its sensor came out with the drink.
    expect((await Assignment.findOne({ where: { sensorId: sensor.id }, rejectOnEmpty: true })).toAt).toEqual(new Date(NOON));
  });

  it('makes one lot however often it is sent', async () => {
    const brewer = await buildMember('brewer');
    const batch = await ciderAt(brewer);
    const client_id = crypto.randomUUID();
    const [a, b] = await Promise.all([bottle(brewer, batch, { client_id }), bottle(brewer, batch, { client_id })]);
    expect(a.id).toBe(b.id);
    expect(await lotsOf(batch)).toBe(1);
    await expect(bottle(brewer, batch)).rejects.toThrow(/over/);
  });

  it('goes on with what is left where not all of it is bottled', async () => {
    const brewer = await buildMember('brewer');
    const batch = await ciderAt(brewer, { volumeL: 9, vesselL: 10 });
    await bottle(brewer, batch, { ends_batch: false, bottles: [sparklingBottle({ at_hand: 4 })], losses_l: 0 });
    const after = await Batch.findByPk(batch.id, { rejectOnEmpty: true });
    expect(after.state).toBe('working');
    expect(after.volumeL).toBeCloseTo(6, 6);
  });
});

/** Every way in which a batch is not known to be done. */
const NOT_DONE: Array<[string, (actor: Actor) => Promise<Batch>]> = [
  ['was never read by hand', (actor) => ciderAt(actor, { readDaysAgo: [] })],
  ['was read once', (actor) => ciderAt(actor, { readDaysAgo: [0.1] })],
  ['was read twice, hours apart', (actor) => ciderAt(actor, { readDaysAgo: [0.4, 0.1] })],
  ['was last read three weeks ago', (actor) => ciderAt(actor, { readDaysAgo: [30, 21] })],
  ['stopped high without a reason', (actor) => ciderAt(actor, { fg: 1.015 })],
  ['still falls by hand', async (actor) => {
    const batch = await ciderAt(actor, { readDaysAgo: [] });
    await readAt(batch, 1.006, NOON - 8 * DAY);
    await readAt(batch, 1.0, NOON - HOUR);
    return batch;
  }],
  ['had sugar yesterday', async (actor) => {
    const batch = await ciderAt(actor);
    await Entry.create({ cellarId: actor.cellarId, batchId: batch.id, kind: 'addition', at: new Date(NOON - DAY), sugarG: 100 });
    await readAt(batch, 1.008, NOON - HOUR);
    return batch;
  }],
  ['was read by refractometer only', async (actor) => {
    const batch = await ciderAt(actor, { readDaysAgo: [] });
    for (const days of [9, 0.1]) await Entry.create({ cellarId: actor.cellarId, batchId: batch.id, kind: 'reading', at: new Date(NOON - days * DAY), gravity: 1.0, detail: { instrument: 'refractometer', brix: 5 } });
    return batch;
  }],
  ['is called beer, but for its yeast and its must of juice stopped high', async (actor) => {
    const must = await createMust(actor, aSheet({ lines: [aLine('apple-juice', 4.5, 'L')] }), clockAt());
    return ciderAt(actor, { fg: 1.012, batch: { kind: 'beer', attenuationMinPercent: 70, attenuationMaxPercent: 80, mustVersionId: must.version_id } });
  }],
  ['has no original gravity and no yeast told', (actor) => ciderAt(actor, { batch: { originalGravity: null, attenuationMinPercent: null, attenuationMaxPercent: null }, fg: 1.01 })],
];

describe('an unfinished batch', () => {
  for (const [how, make] of NOT_DONE) {
    it(`that ${how} is neither primed nor filled, whatever is asked, and its stop holds no dose`, async () => {
      const keeper = await buildMember('keeper');
      const batch = await make(keeper);
      const forms: Array<Parameters<typeof bottleForm>[0]> = [
        {},
        { priming: { way: 'drops', grams_each: { lo: 2, value: 2.5, hi: 3 } }, bottles: [sparklingBottle({ drops: 3 })] },
        { priming: { way: 'none' } },
        { bottles: [beerBottle()], priming: { way: 'weighed', sugar: 'honey', wanted_volumes: 1.5 } },
        { bottles: [{ key: 'keg', kind: 'keg', closure: 'keg_lid', size_ml: 5000, confirmed_bar: 6 }], volume_l: 5 },
        { bottles: [{ key: 'pet', kind: 'pet', closure: 'pet_cap', size_ml: 1000, confirmed_bar: 6 }], priming: { way: 'weighed', sugar: 'syrup', syrup_share: 0.65, wanted_volumes: 2 } },
      ];
      for (const form of forms) {
        const verdict = await judge(keeper, batch.id, bottleForm(form), clockAt());
        expect(verdict.verdict, said(form)).toBe('stop');
        expect(verdict).not.toHaveProperty('dose');
        expect(said(verdict)).not.toMatch(/"(total_g|g_per_l|total_drops|dose)"/);
        await expect(bottle(keeper, batch, form)).rejects.toBeInstanceOf(ConflictError);
      }
      expect(await lotsOf(batch)).toBe(0);
      expect((await Batch.findByPk(batch.id))?.state).toBe('working');
    });
  }

  it('is stopped by a float that still falls, though the hydrometer says twice the same', async () => {
    const brewer = await buildMember('brewer');
    const batch = await ciderAt(brewer);
    const readings = Array.from({ length: 400 }, (_, i) => ({ at: NOON - (400 - i) * HOUR, gravity: 1.018 - i * 0.00004, temperature: 18, receivedAt: NOON - (400 - i) * HOUR }));
    const judged = assess({ kind: 'cider', pitchedAt: batch.pitchedAt!.getTime(), originalGravity: 1.048, volumeL: 4.5, vesselL: 5, attenuation: { min: 0.95, max: 1.04 }, alcoholToleranceAbv: 12, temperature: null, neck: 'airlock', events: [] }, readings, NOON);
    const assessment = presentAssessment(judged.assessment);
    expect(assessment.rate_points_per_day!.hi).toBeGreaterThan(0.5);
    await inTransaction((transaction) => saveBatchState({ batchId: batch.id, cellarId: batch.cellarId, at: new Date(NOON), assessment, curve: [], expected: [] }, transaction));
    await expect(bottle(brewer, batch)).rejects.toThrow(/float may still fall/);
  });

  it('cannot be told otherwise by the form: what the drink is, and whether it is done, are not among its fields', async () => {
    const keeper = await buildMember('keeper');
    const batch = await ciderAt(keeper, { fg: 1.015 });
    const forged = { ...bottleForm(), done: { verdict: 'done' }, drink: { abvPercent: 0, sugarGPerL: 0 }, remaining: 0, stabilised: true } as ReturnType<typeof bottleForm>;
    await expect(bottleBatch(keeper, batch.id, forged, clockAt())).rejects.toBeInstanceOf(ConflictError);
  });

  it('is bottled against the stop by a brewer’s written reason alone, which stays on the lot for good', async () => {
    const brewer = await buildMember('brewer', { name: 'Ada' });
    const batch = await ciderAt(brewer, { fg: 1.015 });
    await expect(bottle(brewer, batch, { override_reason: 'ok' })).rejects.toBeInstanceOf(InvalidError);
    const lot = await bottle(brewer, batch, { override_reason: REASON });
    expect(lot).toMatchObject({ overridden: true, override: { reason: REASON, by: { id: brewer.personId, name: 'Ada' } } });
    expect(lot.caution).toMatch(/against a stop/);
    expect(lot.bench.verdict).toBe('overridden');
    expect(lot.bench.problems.join(' ')).toMatch(/stopped above/);
    const audit = await AuditRow.findOne({ where: { action: 'lot.bottled-against-a-stop', subject: lot.id }, rejectOnEmpty: true });
    expect(audit).toMatchObject({ personId: brewer.personId, detail: { reason: REASON } });
    const kept = await Lot.findByPk(lot.id, { rejectOnEmpty: true });
    expect(kept.overrideBy).toBe(brewer.personId);
  });

  it('is not bottled by a hand or a guest at all, with a reason or without', async () => {
    const keeper = await buildMember('keeper');
    const batch = await ciderAt(keeper, { fg: 1.015 });
    for (const role of ['hand', 'guest'] as const) {
      const other = await buildMember(role, { cellarId: keeper.cellarId });
      await expect(bottle(other, batch)).rejects.toBeInstanceOf(ForbiddenError);
      await expect(bottle(other, batch, { override_reason: REASON })).rejects.toBeInstanceOf(ForbiddenError);
      await expect(createEntry(other, batch.id, entryForm.parse({ kind: 'stabilise', at: isoAt(NOON), text: 'x' }), clockAt())).rejects.toBeInstanceOf(ForbiddenError);
    }
    expect(await lotsOf(batch)).toBe(0);
  });
});

describe('a bottle', () => {
  it('that would pass its rating is not filled; the ways out each say their worst case, and using one is safe', async () => {
    const brewer = await buildMember('brewer');
    const batch = await ciderAt(brewer);
    const form = bottleForm({ bottles: [beerBottle()], priming: { way: 'weighed', sugar: 'sucrose', wanted_volumes: 4 } });
    const verdict = await judge(brewer, batch.id, form, clockAt());
    if (verdict.verdict !== 'stop') throw new Error('should have been stopped');
    expect(verdict.problems.map((problem) => problem.kind)).toContain('over_rating');
    const usable = verdict.ways.filter((way) => way.change !== null && way.kind !== 'other_bottles');
    expect(usable.length).toBeGreaterThan(0);
    for (const way of usable) {
      expect(way.worst_bar).toBeLessThanOrEqual(way.rated === 'never' ? 1 : way.rated);
      expect((await judge(brewer, batch.id, { ...form, ...way.change! }, clockAt())).verdict, way.title).toBe('safe');
    }
    await expect(bottle(brewer, batch, form)).rejects.toBeInstanceOf(ConflictError);
    expect(await lotsOf(batch)).toBe(0);
  });

  it('that nobody has looked up is not filled under pressure', async () => {
    const brewer = await buildMember('brewer');
    const batch = await ciderAt(brewer);
    await expect(bottle(brewer, batch, { bottles: [sparklingBottle({ confirmed_bar: null })] })).rejects.toThrow(/confirmed/);
  });

  it('of still-wine glass is never primed, for any reason whatever', async () => {
    const keeper = await buildMember('keeper');
    const batch = await ciderAt(keeper);
    for (const bottles of [[stillBottle({ confirmed_bar: 12 })], [stillBottle({ kind: 'sparkling_wine', confirmed_bar: 8 })], [stillBottle({ kind: 'odd_glass', closure: 'crown_26', confirmed_bar: 12 })], [sparklingBottle({ at_hand: 2 }), stillBottle()]]) {
      await expect(bottle(keeper, batch, { bottles, override_reason: REASON })).rejects.toThrow(/No reason puts this aside/);
    }
    expect(await lotsOf(batch)).toBe(0);
  });

  it('takes still drink in still-wine glass, where nothing is left to ferment', async () => {
    const brewer = await buildMember('brewer');
    const batch = await ciderAt(brewer, { fg: 0.997, batch: { attenuationMinPercent: 98, attenuationMaxPercent: 104 } });
    const still = bottleForm({ bottles: [stillBottle()], priming: { way: 'none' }, warmest_store_c: 18, cellar_c: 12, warmest_since_end_c: 22 });
    const verdict = await judge(brewer, batch.id, still, clockAt());
    if (verdict.verdict !== 'safe') throw new Error(verdict.sentence);
    expect(verdict.dose.way).toBe('none');
    expect(Math.max(...verdict.bottles.map((item) => item.worst.bar))).toBeLessThanOrEqual(1);
    expect((await bottle(brewer, batch, { ...still, override_reason: null })).sparkle).toBe('still');
  });

  it('is reckoned by the colder of what was measured and what was told, since cold drink holds more gas', async () => {
    const brewer = await buildMember('brewer');
    const batch = await ciderAt(brewer);
    const { sensor } = await buildSensor({ batch });
    await writeReadings(sensor.id, Array.from({ length: 24 }, (_, i) => ({ at: NOON - (24 - i) * HOUR, gravity: 1.0, temperature: 11 })));
    const facts = await getBench(brewer, batch.id, clockAt());
    expect(facts.warmest_since_end_c).toBeCloseTo(11, 3);
    const told = await judge(brewer, batch.id, bottleForm({ warmest_since_end_c: 30 }), clockAt());
    const measured = await judge(brewer, batch.id, bottleForm({ warmest_since_end_c: null }), clockAt());
    expect(told.residual.value.hi).toBe(measured.residual.value.hi);
    const colder = await judge(brewer, batch.id, bottleForm({ warmest_since_end_c: 5 }), clockAt());
    expect(colder.residual.value.hi).toBeGreaterThan(measured.residual.value.hi);
  });

  it('asks how warm it was where no sensor can tell', async () => {
    const brewer = await buildMember('brewer');
    await expect(judge(brewer, (await ciderAt(brewer)).id, bottleForm({ warmest_since_end_c: null }), clockAt())).rejects.toBeInstanceOf(InvalidError);
  });
});

describe('a filled bottle', () => {
  /** Rated just above what it reaches at the bench's warmest place. */
  async function tight(actor: Actor) {
    const batch = await ciderAt(actor);
    const shape = { bottles: [beerBottle({ size_ml: 330, confirmed_bar: 4 })], priming: { way: 'weighed', sugar: 'sucrose', wanted_volumes: 2.4 }, cellar_c: 12, warmest_store_c: 18 } as const;
    return bottle(actor, batch, { ...shape, bottles: [...shape.bottles] });
  }

  it('is not moved to a place so warm that it passes its rating, unless a brewer writes why', async () => {
    const brewer = await buildMember('brewer');
    const hand = await buildMember('hand', { cellarId: brewer.cellarId });
    const lot = await tight(brewer);
    const attic = await createPlace(brewer, { name: 'attic', capacity: null, temperature_c: 38 });
    const move = (actor: Actor, override_reason: string | null) => moveBottles(actor, lot.id, { bottle_id: lot.bottles[0]!.id, from_place_id: null, to_place_id: attic.id, count: 2, override_reason }, clockAt());
    await expect(move(brewer, null)).rejects.toBeInstanceOf(ConflictError);
    await expect(move(hand, REASON)).rejects.toBeInstanceOf(ForbiddenError);
    await expect(move(brewer, 'ok')).rejects.toBeInstanceOf(InvalidError);
    const moved = await move(brewer, REASON);
    expect(moved).toMatchObject({ overridden: true, override: { reason: REASON } });
    expect(moved.caution).toMatch(/against a stop/);
  });

  it('keeps the place that it stands in from being called warmer than it bears, and is not put into one from the bench', async () => {
    const brewer = await buildMember('brewer');
    const cool = await createPlace(brewer, { name: 'cool corner', capacity: null, temperature_c: 15 });
    const lot = await tight(brewer);
    await moveBottles(brewer, lot.id, { bottle_id: lot.bottles[0]!.id, from_place_id: null, to_place_id: cool.id, count: 3, override_reason: null }, clockAt());
    await expect(updatePlace(brewer, cool.id, { temperature_c: 38 })).rejects.toThrow(/first/);
    await expect(updatePlace(brewer, cool.id, { temperature_c: 17 })).resolves.toMatchObject({ temperature_c: 17 });
    const hot = await createPlace(brewer, { name: 'boiler room', capacity: null, temperature_c: 32 });
    await expect(bottle(brewer, await ciderAt(brewer), { place_id: hot.id })).rejects.toThrow(/warmer/);
  });

  it('keeps the reason for which it was filled against a stop when it is moved against another; the move has its own', async () => {
    const brewer = await buildMember('brewer');
    const batch = await ciderAt(brewer, { fg: 1.012 });
    const lot = await bottle(brewer, batch, { bottles: [beerBottle({ confirmed_bar: 4 })], priming: { way: 'none' }, warmest_store_c: 14, override_reason: REASON });
    const attic = await createPlace(brewer, { name: 'attic', capacity: null, temperature_c: 30 });
    const other = 'The cool corner floods this week; two days only.';
    const moved = await moveBottles(brewer, lot.id, { bottle_id: lot.bottles[0]!.id, from_place_id: null, to_place_id: attic.id, count: 2, override_reason: other }, clockAt());
    expect(moved.override).toMatchObject({ reason: REASON });
    expect(moved.moves[0]).toMatchObject({ override_reason: other });
    expect(moved.caution).toMatch(/^Bottled against a stop.*Moved against a stop/s);
    // What was put aside once is no leave for more: the place does not get warmer under them.
    await expect(updatePlace(brewer, attic.id, { temperature_c: 35 })).rejects.toThrow(/first/);
    await expect(updatePlace(brewer, attic.id, { temperature_c: 28 })).resolves.toMatchObject({ temperature_c: 28 });
    const unsaid = await createPlace(brewer, { name: 'cupboard', capacity: null, temperature_c: null });
    await moveBottles(brewer, lot.id, { bottle_id: lot.bottles[0]!.id, from_place_id: null, to_place_id: unsaid.id, count: 1, override_reason: null }, clockAt());
    await expect(updatePlace(brewer, unsaid.id, { temperature_c: 35 })).rejects.toThrow(/first/);
  });

  it('keeps its rating: nothing that can be changed of a lot touches what was judged', async () => {
    const brewer = await buildMember('brewer');
    const lot = await tight(brewer);
    const before = await LotBottle.findAll({ where: { lotId: lot.id } });
    await updateLot(brewer, lot.id, { name: 'Other', rating: 99, bench: {}, bottles: [], override_reason: null } as Parameters<typeof updateLot>[2], clockAt());
    const after = await LotBottle.findAll({ where: { lotId: lot.id } });
    expect(after.map((row) => row.toJSON())).toEqual(before.map((row) => row.toJSON()));
  });
});
