import { describe, expect, it } from 'vitest';
import { Batch } from '@/db/models';
import { createBatch as batchForm } from '@/lib/contracts/batches';
import { catalogueForm } from '@/lib/contracts/catalogue';
import { copyMust as copyForm } from '@/lib/contracts/musts';
import { ConflictError, ForbiddenError, InvalidError, NotFoundError } from '@/lib/errors';
import { createBatch } from '@/lib/services/batches/create';
import { addToCatalogue } from '@/lib/services/catalogue/add';
import { removeFromCatalogue, updateCatalogue } from '@/lib/services/catalogue/change';
import { getCatalogue } from '@/lib/services/catalogue/get';
import { archiveMust } from '@/lib/services/musts/archive';
import { copyMust } from '@/lib/services/musts/copy';
import { createMust } from '@/lib/services/musts/create';
import { getMust } from '@/lib/services/musts/get';
import { listMusts } from '@/lib/services/musts/list';
import { proposeBatch } from '@/lib/services/musts/propose-batch';
import { reckonSheet, scaleSheetTo, solveSheet } from '@/lib/services/musts/reckon';
import { updateMust } from '@/lib/services/musts/update';
import { bottleBatch } from '@/lib/services/bench/bottle';
import { createTasting } from '@/lib/services/tastings/write';
import { createTasting as tastingForm } from '@/lib/contracts/tastings';
import { updateLot } from '@/lib/services/lots/update';
import { aLine, aSheet, bottleForm, ciderAt, clockAt, isoAt, NOON } from '../support/cellar';
import { useDatabase } from '../support/database';
import { buildMember } from '../support/factories';

useDatabase();

const clock = clockAt();
const list = { archived: 'no', limit: 50 } as const;

describe('a must sheet', () => {
  it('promises what its lines bring: 12 °Bx apple juice comes near 1.048', async () => {
    const brewer = await buildMember('brewer');
    const must = await createMust(brewer, aSheet(), clock);
    if (!must.result.ok) throw new Error('should have been reckoned');
    const { original_gravity: og, strength, cost, neck } = must.result.outcome;
    // ICUMSA: 12 °Bx is 1.0484; the catalogue's juice spreads from 10.5 to 13.5.
    expect(og.value.value).toBeCloseTo(1.0484, 3);
    expect(og.value.lo).toBeLessThan(1.045);
    expect(og.how.source).toMatch(/ICUMSA/);
    expect(strength.balling.value.value).toBeGreaterThan(5);
    expect(cost.value.value).toBeCloseTo(4.2 * 1.5, 9);
    expect(neck!.sentence).not.toBe('');
    expect(must).toMatchObject({ version: 1, copied_from: null, batches: [], archived: false });
  });

  it('is written in versions: a batch keeps the one it was made from', async () => {
    const brewer = await buildMember('brewer');
    const must = await createMust(brewer, aSheet(), clock);
    const batch = await createBatch(brewer, batchForm.parse({ name: 'First', kind: 'cider', volume_l: 4, vessel_l: 5, must_version_id: must.version_id }), clock);
    const next = await updateMust(brewer, must.id, { sheet: aSheet({ lines: [aLine('apple-juice', 4, 'L'), aLine('table-sugar', 200, 'g')] }), base_version: 1, change_note: 'stronger' }, clock);
    expect(next.version).toBe(2);
    expect(next.versions[0]!.changes).toEqual(['Less apple juice: 4.2 L → 4 L.', 'Added table sugar: 200 g.']);
    expect(batch.must).toMatchObject({ id: must.id, version: 1 });
    expect((await getMust(brewer, must.id, { version: 1 })).sheet.lines).toHaveLength(1);
    expect(next.batches).toMatchObject([{ id: batch.id, version: 1 }]);
    expect((await listMusts(brewer, list)).items).toMatchObject([{ id: must.id, version: 2, batches: 1, change_note: 'stronger' }]);
  });

  it('makes no version of what says the same, and does not write over what somebody else wrote', async () => {
    const brewer = await buildMember('brewer');
    const must = await createMust(brewer, aSheet(), clock);
    expect((await updateMust(brewer, must.id, { sheet: aSheet(), base_version: 1, change_note: null }, clock)).version).toBe(1);
    const write = (note: string) => updateMust(brewer, must.id, { sheet: aSheet({ method: note }), base_version: 1, change_note: note }, clock);
    const done = await Promise.allSettled([write('one'), write('two')]);
    expect(done.filter((item) => item.status === 'fulfilled')).toHaveLength(1);
    expect((done.find((item) => item.status === 'rejected') as PromiseRejectedResult).reason).toBeInstanceOf(ConflictError);
  });

  it('is copied with one change noted, and the notes for the next time go along', async () => {
    const brewer = await buildMember('brewer');
    const guest = await buildMember('guest', { cellarId: brewer.cellarId, name: 'Fen' });
    const must = await createMust(brewer, aSheet({ lines: [aLine('apple-juice', 4.2, 'L'), aLine('spice', 12, 'g')] }), clock);
    const batch = await ciderAt(brewer, { batch: { mustVersionId: must.version_id } });
    const lot = await bottleBatch(brewer, batch.id, bottleForm(), clock);
    await createTasting(guest, lot.id, tastingForm.parse({ at: isoAt(NOON), score: 7.5, next_time: 'Half the spice.' }), clock);
    await updateLot(brewer, lot.id, { next_time: 'Rack it a week earlier.' }, clock);
    const copy = await copyMust(brewer, must.id, copyForm.parse({ name: 'Orchard cider, milder', change_note: 'less of the spice', sheet: aSheet({ lines: [aLine('apple-juice', 4.2, 'L'), aLine('spice', 6, 'g')] }) }), clock);
    expect(copy).toMatchObject({ version: 1, copied_from: { id: must.id, version: 1 }, sheet: { name: 'Orchard cider, milder' } });
    expect(copy.versions[0]).toMatchObject({ change_note: 'less of the spice', changes: ['Less spice or herb: 12 g → 6 g.'] });
    expect(copy.next_time.map((item) => item.note).sort()).toEqual(['Half the spice.', 'Rack it a week earlier.']);
    expect(copy.next_time.find((item) => item.note.startsWith('Half'))).toMatchObject({ by: 'Fen', lot: { id: lot.id } });
  });

  it('scales to another vessel in proportion, and works back to a wanted gravity', async () => {
    const brewer = await buildMember('brewer');
    const sheet = aSheet({ lines: [aLine('honey', 1.2, 'kg'), aLine('water', 3.5, 'L')], kind: 'mead' });
    const before = await reckonSheet(brewer, sheet);
    const scaled = await scaleSheetTo(brewer, { sheet, fill_l: 9, vessel_l: 10 });
    if (!before.ok || !scaled.result.ok) throw new Error('should have been reckoned');
    expect(scaled.result.outcome.fill_l.value.value).toBeCloseTo(9, 6);
    expect(scaled.result.outcome.original_gravity.value.value).toBeCloseTo(before.outcome.original_gravity.value.value, 9);
    const factor = 9 / before.outcome.fill_l.value.value;
    expect(scaled.sheet.lines[0]!.amount.quantity.value).toBeCloseTo(1.2 * factor, 9);
    const solved = await solveSheet(brewer, { sheet, line: 'honey', wanted: { original: 1.1 } });
    if (!solved.result.ok) throw new Error('should have been reckoned');
    expect(solved.result.outcome.original_gravity.value.value).toBeCloseTo(1.1, 5);
    await expect(solveSheet(brewer, { sheet, line: 'water', wanted: { original: 1.9 as never } })).rejects.toBeInstanceOf(InvalidError);
  });

  it('proposes a batch: the vessel, the neck, the yeast’s ranges, and an attenuation also where the yeast has none of its own', async () => {
    const brewer = await buildMember('brewer');
    const must = await createMust(brewer, aSheet({ lines: [aLine('apple-juice', 4.9, 'L')] }), clock);
    const proposal = await proposeBatch(brewer, must.id, {});
    expect(proposal).toMatchObject({ must_version_id: must.version_id, vessel_l: 5, neck: 'blow_off', yeast: 'cider yeast', temperature_min_c: 12, temperature_max_c: 22, alcohol_tolerance_abv: 11 });
    expect(proposal.neck_reason).toMatch(/tube/);
    // 85 to 90 % of apple juice's extract ferments; in apparent terms that is about 100 %.
    expect(proposal.attenuation_min_percent!).toBeGreaterThan(90);
    expect(proposal.attenuation_max_percent!).toBeLessThan(115);
    const roomy = await proposeBatch(brewer, must.id, { vessel_l: 10 });
    expect(roomy.vessel_l).toBe(10);
    const made = await createBatch(brewer, batchForm.parse({ ...proposal, pitched_at: isoAt(NOON), original_gravity: 1.048 }), clock);
    expect(made.must?.version_id).toBe(must.version_id);
  });

  it('says why where it cannot be reckoned, and proposes nothing', async () => {
    const brewer = await buildMember('brewer');
    const must = await createMust(brewer, aSheet({ lines: [aLine('spice', 1, 'tsp')] }), clock);
    expect(must.result).toMatchObject({ ok: false, problems: [{ line: 'spice' }] });
    await expect(proposeBatch(brewer, must.id, {})).rejects.toBeInstanceOf(ConflictError);
  });

  it('is of one cellar: another finds it nowhere, by no road', async () => {
    const [mine, theirs] = [await buildMember('keeper'), await buildMember('keeper')];
    const foreign = await createMust(theirs, aSheet(), clock);
    await expect(getMust(mine, foreign.id)).rejects.toBeInstanceOf(NotFoundError);
    await expect(updateMust(mine, foreign.id, { sheet: aSheet(), base_version: 1, change_note: 'x' }, clock)).rejects.toBeInstanceOf(NotFoundError);
    await expect(copyMust(mine, foreign.id, { name: 'x', change_note: 'x' }, clock)).rejects.toBeInstanceOf(NotFoundError);
    await expect(createBatch(mine, batchForm.parse({ name: 'x', kind: 'cider', volume_l: 4, vessel_l: 5, must_version_id: foreign.version_id }), clock)).rejects.toBeInstanceOf(NotFoundError);
    expect(await Batch.count({ where: { cellarId: mine.cellarId } })).toBe(0);
    expect((await listMusts(mine, list)).items).toEqual([]);
  });

  it('is written by brewers and read by all; put away it leaves the list', async () => {
    const brewer = await buildMember('brewer');
    const guest = await buildMember('guest', { cellarId: brewer.cellarId });
    const must = await createMust(brewer, aSheet(), clock);
    await expect(createMust(guest, aSheet(), clock)).rejects.toBeInstanceOf(ForbiddenError);
    expect((await getMust(guest, must.id)).id).toBe(must.id);
    await archiveMust(brewer, must.id, clock);
    expect((await listMusts(brewer, list)).items).toEqual([]);
    expect((await listMusts(brewer, { ...list, archived: 'yes' })).items).toHaveLength(1);
    // Who writes on it wants it back.
    await updateMust(brewer, must.id, { sheet: aSheet({ name: 'Orchard cider, once more' }), base_version: 1, change_note: null }, clock);
    expect((await listMusts(brewer, list)).items).toMatchObject([{ id: must.id, version: 2, archived: false }]);
  });
});

describe('the catalogue', () => {
  const quince = catalogueForm.parse({
    sort: 'ingredient',
    ingredient: { name: 'quinces', kind: 'fruit', extract_share: { lo: 0.08, value: 0.1, hi: 0.12 }, insoluble_share: 0.1, fermentable_share: { lo: 0.7, value: 0.8, hi: 0.9 }, density_g_per_ml: null, each: null, releases_over_days: null, yan_mg_per_g: { lo: 0, value: 0.1, hi: 0.2 }, sulphite_mg_per_g: { lo: 0, value: 0, hi: 0 }, allergens: ['nuts'], preservative: null, mash: null, usual_g_per_l: null, caution: null },
  });

  it('grows by what the cellar adds, which other cellars do not see, and sheets keep what they were written with', async () => {
    const [mine, theirs] = [await buildMember('brewer'), await buildMember('brewer')];
    const made = await addToCatalogue(mine, quince);
    if (made.sort !== 'ingredient') throw new Error('an ingredient was added');
    const before = await getCatalogue(mine);
    expect(before.ingredients[0]).toMatchObject({ id: made.ingredient.id, name: 'quinces', status: 'told' });
    expect((await getCatalogue(theirs)).ingredients.every((item) => item.id === null)).toBe(true);
    const { id, ...ingredient } = made.ingredient;
    const must = await createMust(mine, aSheet({ lines: [aLine('apple-juice', 4, 'L'), { id: 'q', ingredient, amount: { quantity: { lo: 500, value: 500, hi: 500 }, unit: 'g' }, cost_per_unit: null, note: null }] }), clock);
    await removeFromCatalogue(mine, id, clock);
    expect((await getCatalogue(mine)).ingredients.some((item) => item.id !== null)).toBe(false);
    expect((await getMust(mine, must.id)).sheet.lines[1]!.ingredient.name).toBe('quinces');
    await expect(updateCatalogue(theirs, id, quince)).rejects.toBeInstanceOf(NotFoundError);
  });
});
