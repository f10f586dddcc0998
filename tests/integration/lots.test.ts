import { describe, expect, it } from 'vitest';
import { Job } from '@/db/models';
import { lotQuery, openBottles as openForm } from '@/lib/contracts/lots';
import { updateCellar as updateCellarForm } from '@/lib/contracts/people';
import { ConflictError, ForbiddenError, InvalidError, NotFoundError } from '@/lib/errors';
import { updateCellar } from '@/lib/services/cellars/own';
import { getMe } from '@/lib/services/people/get-me';
import { bottleBatch } from '@/lib/services/bench/bottle';
import { cell, exportLots } from '@/lib/services/lots/export';
import { getLot } from '@/lib/services/lots/get';
import { liftCaution } from '@/lib/services/lots/lift';
import { listLots } from '@/lib/services/lots/list';
import { moveBottles } from '@/lib/services/lots/move';
import { openBottles, undoOpening } from '@/lib/services/lots/open';
import { updateLot } from '@/lib/services/lots/update';
import { createPlace, listPlaces, removePlace, updatePlace } from '@/lib/services/places/write';
import { createMust } from '@/lib/services/musts/create';
import type { Actor } from '@/lib/auth/policies';
import { aLine, aSheet, bottleForm, ciderAt, clockAt, DAY, isoAt, NOON, sparklingBottle } from '../support/cellar';
import { useDatabase } from '../support/database';
import { buildMember } from '../support/factories';

useDatabase();

const clock = clockAt();
const bottled = async (actor: Actor, form: Parameters<typeof bottleForm>[0] = {}, story: Parameters<typeof ciderAt>[1] = {}) => bottleBatch(actor, (await ciderAt(actor, story)).id, bottleForm(form), clock);
const opened = (bottleId: string, more: Record<string, unknown> = {}) => openForm.parse({ at: isoAt(NOON), kind: 'opened', bottle_id: bottleId, place_id: null, ...more });

describe('where bottles stand', () => {
  it('has room for so many and no more, however many people carry at once', async () => {
    const brewer = await buildMember('brewer');
    const lot = await bottled(brewer);
    const shelf = await createPlace(brewer, { name: 'warm shelf', capacity: 4, temperature_c: 20 });
    const carry = (count: number) => moveBottles(brewer, lot.id, { bottle_id: lot.bottles[0]!.id, from_place_id: null, to_place_id: shelf.id, count, override_reason: null }, clock);
    await expect(carry(5)).rejects.toThrow(/room for 4 more bottles, not for 5/);
    const done = await Promise.allSettled([carry(3), carry(2)]);
    expect(done.map((item) => item.status).sort()).toEqual(['fulfilled', 'rejected']);
    await moveBottles(brewer, lot.id, { bottle_id: lot.bottles[0]!.id, from_place_id: null, to_place_id: shelf.id, count: 1, override_reason: null }, clock);
    const places = await listPlaces(brewer);
    expect(places.items[0]!.bottles).toBeLessThanOrEqual(4);
    const now = await getLot(brewer, lot.id, clock);
    expect(now.bottles[0]!.stands.reduce((sum, stand) => sum + stand.count, 0)).toBe(5);
    expect(now.moves.length).toBe(2);
  });

  it('is not filled from the bench beyond its room, nor made smaller than what stands there, nor taken away under it', async () => {
    const brewer = await buildMember('brewer');
    const shelf = await createPlace(brewer, { name: 'warm shelf', capacity: 6, temperature_c: 20 });
    await bottled(brewer, { place_id: shelf.id });
    await expect(bottled(brewer, { place_id: shelf.id })).rejects.toThrow(/room for 1 more/);
    await expect(updatePlace(brewer, shelf.id, { capacity: 3 })).rejects.toBeInstanceOf(InvalidError);
    await expect(removePlace(brewer, shelf.id, clock)).rejects.toBeInstanceOf(ConflictError);
    await expect(createPlace(brewer, { name: 'Warm Shelf', capacity: null, temperature_c: null })).rejects.toBeInstanceOf(InvalidError);
  });
});

describe('a bottle', () => {
  it('is opened, given away or broken once, and can be put back', async () => {
    const hand = await buildMember('hand');
    const brewer = await buildMember('brewer', { cellarId: hand.cellarId });
    const lot = await bottled(brewer);
    const id = lot.bottles[0]!.id;
    const client_id = crypto.randomUUID();
    await openBottles(hand, lot.id, opened(id, { client_id }), clock);
    await openBottles(hand, lot.id, opened(id, { client_id }), clock);
    await openBottles(hand, lot.id, opened(id, { kind: 'given', count: 2, to: 'the neighbours' }), clock);
    const now = await openBottles(hand, lot.id, opened(id, { kind: 'broken' }), clock);
    expect(now.counts).toEqual({ bottled: 5, left: 1, opened: 1, given: 2, broken: 1, gushed: 0 });
    await expect(openBottles(hand, lot.id, opened(id, { count: 2 }), clock)).rejects.toBeInstanceOf(InvalidError);
    await undoOpening(hand, lot.id, now.openings.find((item) => item.kind === 'broken')!.id, clock);
    expect((await getLot(hand, lot.id, clock)).counts).toMatchObject({ left: 2, broken: 0 });
    // Whom it was given to is not a guest's to read.
    const guest = await buildMember('guest', { cellarId: hand.cellarId });
    expect(JSON.stringify(await getLot(guest, lot.id, clock))).not.toContain('neighbours');
    await expect(openBottles(guest, lot.id, opened(id), clock)).rejects.toBeInstanceOf(ForbiddenError);
  });

  it('that gushes puts a caution on its lot and a job on the rounds, once, and the caution stays', async () => {
    const brewer = await buildMember('brewer');
    const lot = await bottled(brewer);
    const id = lot.bottles[0]!.id;
    const gushed = await openBottles(brewer, lot.id, opened(id, { kind: 'gushed' }), clock);
    expect(gushed.caution).toMatch(/protection/);
    await openBottles(brewer, lot.id, opened(id, { kind: 'gushed' }), clock);
    expect(await Job.count({ where: { lotId: lot.id, kind: 'pressure', doneAt: null } })).toBe(1);
    await undoOpening(brewer, lot.id, gushed.openings[0]!.id, clock);
    expect((await getLot(brewer, lot.id, clock)).caution).toMatch(/gushed/);
    expect((await listLots(brewer, lotQuery.parse({ state: 'caution' }), clock)).items).toHaveLength(1);
  });

  it('loses its caution to a brewer’s written reason alone; what was lifted stays in its history, and the next gush sets it anew', async () => {
    const brewer = await buildMember('brewer', { name: 'Ada' });
    const hand = await buildMember('hand', { cellarId: brewer.cellarId });
    const lot = await bottled(brewer);
    const why = 'All vented and chilled; three test bottles since were calm.';
    const gush = () => openBottles(brewer, lot.id, opened(lot.bottles[0]!.id, { kind: 'gushed' }), clock);
    await expect(liftCaution(brewer, lot.id, { reason: why }, clock)).rejects.toBeInstanceOf(ConflictError);
    const cautioned = await gush();
    await expect(liftCaution(hand, lot.id, { reason: why }, clock)).rejects.toBeInstanceOf(ForbiddenError);
    await expect(liftCaution(brewer, lot.id, { reason: 'fine.....................' }, clock)).rejects.toBeInstanceOf(InvalidError);
    const lifted = await liftCaution(brewer, lot.id, { reason: why }, clock);
    expect(lifted.caution).toBeNull();
    expect(lifted.lifted).toEqual([{ caution: cautioned.caution, reason: why, by: { id: brewer.personId, name: 'Ada' }, at: expect.any(String) }]);
    expect((await gush()).caution).toMatch(/gushed/);
    expect((await getLot(hand, lot.id, clock)).lifted).toHaveLength(1);
    const other = await buildMember('keeper');
    await expect(liftCaution(other, lot.id, { reason: why }, clock)).rejects.toBeInstanceOf(NotFoundError);
  });

  it('filled against a stop keeps that, and why, when its caution is lifted', async () => {
    const brewer = await buildMember('brewer');
    const reason = 'Tested glass of my own, kept at four degrees.';
    const lot = await bottled(brewer, { override_reason: reason }, { fg: 1.015 });
    const lifted = await liftCaution(brewer, lot.id, { reason: 'Every bottle was opened, vented and closed again.' }, clock);
    expect(lifted).toMatchObject({ caution: null, overridden: true, override: { reason }, bench: { verdict: 'overridden' } });
  });

  it('of another cellar is nowhere', async () => {
    const [mine, theirs] = [await buildMember('brewer'), await buildMember('brewer')];
    const foreign = await bottled(theirs);
    const place = await createPlace(theirs, { name: 'theirs', capacity: null, temperature_c: null });
    const own = await bottled(mine);
    await expect(getLot(mine, foreign.id, clock)).rejects.toBeInstanceOf(NotFoundError);
    await expect(openBottles(mine, foreign.id, opened(foreign.bottles[0]!.id), clock)).rejects.toBeInstanceOf(NotFoundError);
    await expect(openBottles(mine, own.id, opened(foreign.bottles[0]!.id), clock)).rejects.toBeInstanceOf(InvalidError);
    await expect(moveBottles(mine, own.id, { bottle_id: own.bottles[0]!.id, from_place_id: null, to_place_id: place.id, count: 1, override_reason: null }, clock)).rejects.toBeInstanceOf(NotFoundError);
    await expect(bottled(mine, { place_id: place.id })).rejects.toBeInstanceOf(NotFoundError);
  });
});

describe('a lot', () => {
  it('puts a test bottle and the day it is ready on the rounds: two weeks warm', async () => {
    const brewer = await buildMember('brewer');
    const lot = await bottled(brewer, { cellar_c: 20, warmest_store_c: 22 });
    expect(lot.ready_from).toBe(isoAt(NOON + 14 * DAY));
    const jobs = await Job.findAll({ where: { lotId: lot.id }, order: [['dueAt', 'ASC']] });
    expect(jobs.map((job) => [job.kind, job.dueAt.getTime()])).toEqual([['test_bottle', NOON + 7 * DAY], ['condition', NOON + 14 * DAY]]);
  });

  it('costs what its must cost, with bottles and caps, by the litre; a part of a batch takes its part', async () => {
    const brewer = await buildMember('brewer');
    const must = await createMust(brewer, aSheet({ lines: [aLine('apple-juice', 4.5, 'L', { cost: 2 })] }), clock);
    const lot = await bottled(brewer, { other_cost: 3.5 }, { batch: { mustVersionId: must.version_id } });
    // 4.5 L at 2 and 3.5 for bottles: 12.5 for five bottles of 0.75 L.
    expect(lot.cost).toMatchObject({ known: true, other: 3.5 });
    expect(lot.cost.total!.value).toBeCloseTo(12.5, 9);
    expect(lot.bottles[0]!.cost_each!.value).toBeCloseTo(12.5 / 5, 9);
    const part = await bottled(brewer, { ends_batch: false, losses_l: 0, bottles: [sparklingBottle({ at_hand: 3 })] }, { batch: { mustVersionId: must.version_id } });
    expect(part.cost.total!.value).toBeCloseTo(9 * (2.25 / 4.5), 9);
    const plain = await bottled(brewer);
    expect(plain.cost).toEqual({ total: null, known: false, other: null });
  });

  it('has a code of its own in the cellar', async () => {
    const brewer = await buildMember('brewer');
    const first = await bottled(brewer, { code: 'OC-1' });
    await expect(bottled(brewer, { code: 'OC-1' })).rejects.toBeInstanceOf(InvalidError);
    const second = await bottled(brewer);
    await expect(updateLot(brewer, second.id, { code: 'oc-1' }, clock)).rejects.toBeInstanceOf(InvalidError);
    expect([first.code, second.code, (await bottled(brewer)).code]).toEqual(['OC-1', '26-001', '26-002']);
  });
});

describe('the cellar book', () => {
  it('is searched, filtered, sorted and paged', async () => {
    const brewer = await buildMember('brewer');
    const shelf = await createPlace(brewer, { name: 'shelf', capacity: null, temperature_c: 15 });
    const a = await bottled(brewer, { name: 'Alder perry', place_id: shelf.id }, { batch: { kind: 'cider' } });
    const b = await bottled(brewer, { name: 'Bramble mead' }, { batch: { kind: 'mead' } });
    const c = await bottled(brewer, { name: '100 % crab' });
    await openBottles(brewer, c.id, opened(c.bottles[0]!.id, { count: 5 }), clock);
    const names = async (query: Record<string, unknown>) => (await listLots(brewer, lotQuery.parse(query), clock)).items.map((lot) => lot.name);
    expect(await names({ sort: 'name', order: 'asc' })).toEqual(['100 % crab', 'Alder perry', 'Bramble mead']);
    expect(await names({ q: 'bramble' })).toEqual(['Bramble mead']);
    // Whom one was given to is found by those who may read it, and by no guest.
    await openBottles(brewer, a.id, opened(a.bottles[0]!.id, { kind: 'given', to: 'Aunt Oda', place_id: shelf.id }), clock);
    expect(await names({ q: 'aunt oda' })).toEqual(['Alder perry']);
    const guest = await buildMember('guest', { cellarId: brewer.cellarId });
    expect((await listLots(guest, lotQuery.parse({ q: 'aunt oda' }), clock)).items).toEqual([]);
    // A sign of the pattern language is a letter like any other.
    expect(await names({ q: '%' })).toEqual(['100 % crab']);
    expect(await names({ kind: 'mead' })).toEqual(['Bramble mead']);
    expect(await names({ place: shelf.id })).toEqual(['Alder perry']);
    expect(await names({ state: 'empty' })).toEqual(['100 % crab']);
    expect(await names({ state: 'ready' })).toEqual([]);
    expect(await names({ sort: 'left', order: 'asc' })).toEqual(['100 % crab', a.name, b.name]);
    const first = await listLots(brewer, lotQuery.parse({ sort: 'name', order: 'asc', limit: 2 }), clock);
    expect(first.items).toHaveLength(2);
    expect(await names({ sort: 'name', order: 'asc', limit: 2, cursor: first.next_cursor })).toEqual(['Bramble mead']);
    await expect(listLots(brewer, lotQuery.parse({ cursor: 'nonsense' }), clock)).rejects.toBeInstanceOf(InvalidError);
  });

  it('counts its cost in what the cellar counts in, also where it is exported; figures alone where nobody told', async () => {
    const brewer = await buildMember('brewer');
    const keeper = await buildMember('keeper', { cellarId: brewer.cellarId });
    await bottled(brewer, { other_cost: 3.5 });
    const columns = async () => {
      const [head, line] = (await exportLots(brewer, lotQuery.parse({}), clock)).trimEnd().split('\r\n');
      return Object.fromEntries(head!.split(',').map((name, index) => [name, line!.split(',')[index]]));
    };
    expect(await columns()).toMatchObject({ currency: '', cost_known: 'no' });
    await updateCellar(keeper, { currency: 'DKK' });
    expect((await getMe(brewer)).cellar.currency).toBe('DKK');
    expect(await columns()).toMatchObject({ currency: 'DKK' });
    await updateCellar(keeper, { name: 'Renamed' });
    expect((await getMe(brewer)).cellar).toMatchObject({ name: 'Renamed', currency: 'DKK' });
    await updateCellar(keeper, { currency: null });
    expect((await getMe(brewer)).cellar.currency).toBeNull();
    expect(updateCellarForm.safeParse({ currency: 'XQQ' }).success).toBe(false);
    await expect(updateCellar(brewer, { currency: 'EUR' })).rejects.toThrow();
  });

  it('is exported so that no spreadsheet takes a name for a formula', async () => {
    const brewer = await buildMember('brewer');
    await bottled(brewer, { name: '=HYPERLINK("http://x.example","free")' });
    await bottled(brewer, { name: '@SUM(A1), "quoted"' });
    const csv = await exportLots(brewer, lotQuery.parse({ sort: 'name', order: 'asc' }), clock);
    const [head, ...lines] = csv.trimEnd().split('\r\n');
    expect(head).toMatch(/^code,name,batch,kind,bottled,/);
    expect(lines[0]).toContain(`"'=HYPERLINK(""http://x.example"",""free"")"`);
    expect(lines[1]).toContain(`"'@SUM(A1), ""quoted"""`);
    for (const start of ['=', '+', '-', '@', '\t', '\r']) expect(cell(`${start}1`).replace(/^"/, '')).toMatch(/^'/);
    expect(cell(-3)).toBe('-3');
  });
});
