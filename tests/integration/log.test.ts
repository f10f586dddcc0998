import { describe, expect, it } from 'vitest';
import { Batch, Entry } from '@/db/models';
import { createEntry as entryForm, updateEntry as updateForm } from '@/lib/contracts/batches';
import { updateBatch } from '@/lib/services/batches/update';
import { createEntry } from '@/lib/services/entries/create';
import { listEntries } from '@/lib/services/entries/list';
import { removeEntry } from '@/lib/services/entries/remove';
import { updateEntry } from '@/lib/services/entries/update';
import { clockAt, isoAt, NOON } from '../support/cellar';
import { useDatabase } from '../support/database';
import { buildBatch, buildMember } from '../support/factories';

useDatabase();

const HOUR = 3_600_000;
const clock = clockAt();
const log = (input: Record<string, unknown>) => entryForm.parse({ at: isoAt(NOON), ...input });

async function untold(pitchedHoursAgo: number) {
  const brewer = await buildMember('brewer');
  const batch = await buildBatch({ cellarId: brewer.cellarId, pitchedAt: new Date(NOON - pitchedHoursAgo * HOUR), originalGravity: null });
  const og = async () => (await Batch.findByPk(batch.id, { rejectOnEmpty: true })).originalGravity;
  return { brewer, batch, og };
}

describe('an original gravity that nobody told', () => {
  it('is taken from a hydrometer reading of the first day, which says so', async () => {
    const { brewer, batch, og } = await untold(6);
    const entry = await createEntry(brewer, batch.id, log({ kind: 'reading', gravity: 1.052 }), clock);
    expect(await og()).toBe(1.052);
    expect(entry.detail).toMatchObject({ as_original_gravity: true });
    const later = await createEntry(brewer, batch.id, log({ kind: 'reading', gravity: 1.048 }), clock);
    expect(await og()).toBe(1.052);
    expect(later.detail).toBeNull();
  });

  it('follows the correction of that reading, and goes with it', async () => {
    const { brewer, batch, og } = await untold(6);
    const entry = await createEntry(brewer, batch.id, log({ kind: 'reading', gravity: 1.062 }), clock);
    await updateEntry(brewer, batch.id, entry.id, updateForm.parse({ gravity: 1.052, detail: { ph: 3.6 } }), clock);
    expect(await og()).toBe(1.052);
    expect((await listEntries(brewer, batch.id, { limit: 5 })).items[0]?.detail).toEqual({ ph: 3.6, as_original_gravity: true });
    await removeEntry(brewer, batch.id, entry.id, clock);
    expect(await og()).toBeNull();
  });

  it('is not taken from a late reading, from a refractometer, or over one that was told', async () => {
    const late = await untold(40);
    await createEntry(late.brewer, late.batch.id, log({ kind: 'reading', gravity: 1.03 }), clock);
    expect(await late.og()).toBeNull();
    const told = await untold(6);
    await told.batch.update({ originalGravity: 1.06 });
    const entry = await createEntry(told.brewer, told.batch.id, log({ kind: 'reading', gravity: 1.052, detail: { as_original_gravity: true } }), clock);
    expect(await told.og()).toBe(1.06);
    expect(entry.detail).not.toMatchObject({ as_original_gravity: true });
  });
});

describe('a change of neck', () => {
  it('that is taken back leaves what closed the neck before, though the log does not tell of that', async () => {
    const brewer = await buildMember('brewer');
    const batch = await buildBatch({ cellarId: brewer.cellarId, pitchedAt: new Date(NOON - 9 * 24 * HOUR), neck: 'airlock' });
    const neck = async () => (await Batch.findByPk(batch.id, { rejectOnEmpty: true })).neck;
    const swap = (to: string, hoursAgo: number) => createEntry(brewer, batch.id, log({ kind: 'neck', neck: to, at: isoAt(NOON - hoursAgo * HOUR), detail: { neck_before: 'open' } }), clock);
    const bung = await swap('bung', 2);
    await updateEntry(brewer, batch.id, bung.id, updateForm.parse({ text: 'by mistake', detail: {} }), clock);
    const tube = await swap('blow_off', 1);
    expect(await neck()).toBe('blow_off');
    await removeEntry(brewer, batch.id, bung.id, clock);
    expect(await neck()).toBe('blow_off');
    await removeEntry(brewer, batch.id, tube.id, clock);
    expect(await neck()).toBe('airlock');
    // As from the set-up.
    await updateBatch(brewer, batch.id, { neck: 'open' }, clock);
    await updateBatch(brewer, batch.id, { neck: 'blow_off' }, clock);
    const { items } = await listEntries(brewer, batch.id, { limit: 2 });
    expect(items.map(({ detail }) => detail).toSorted((a) => (a === null ? 1 : -1))).toEqual([{ neck_before: 'airlock' }, null]);
    for (const { id } of items) await removeEntry(brewer, batch.id, id, clock);
    expect(await neck()).toBe('airlock');
  });
});

describe('sugar that is reckoned from what was weighed', () => {
  it('is reckoned anew with another weight, and gone with another substance', async () => {
    const { brewer, batch } = await untold(6);
    const entry = await createEntry(brewer, batch.id, log({ kind: 'addition', detail: { substance: 'honey', ingredient: 'honey', grams: 300 } }), clock);
    expect(entry.sugar_g).toBeGreaterThan(200);
    const heavier = await updateEntry(brewer, batch.id, entry.id, updateForm.parse({ detail: { substance: 'honey', ingredient: 'honey', grams: 600 } }), clock);
    expect(heavier.sugar_g).toBeCloseTo(2 * entry.sugar_g!, 6);
    await updateEntry(brewer, batch.id, entry.id, updateForm.parse({ detail: { substance: 'acid', grams: 6 } }), clock);
    expect(await Entry.findByPk(entry.id)).toMatchObject({ sugarG: null, fruitG: null });
  });
});

describe('a hydrometer in a drink with alcohol', () => {
  it('is corrected for how that drink widens, more than for the must it was', async () => {
    const brewer = await buildMember('brewer');
    const working = await buildBatch({ cellarId: brewer.cellarId, pitchedAt: new Date(NOON - 720 * HOUR), originalGravity: 1.1 });
    const unpitched = await buildBatch({ cellarId: brewer.cellarId, pitchedAt: null, originalGravity: 1.1 });
    const cold = log({ kind: 'reading', gravity: 0.998, temperature_c: 10 });
    const inDrink = (await createEntry(brewer, working.id, cold, clock)).gravity!;
    const asMust = (await createEntry(brewer, unpitched.id, cold, clock)).gravity!;
    // From 10 to 20 °C water loses 0.0015 g/mL and 10 % by mass of ethanol in water 0.0021 (CRC Handbook of Chemistry and Physics; from memory); this drink has 11 % and some extract.
    expect(asMust - inDrink).toBeGreaterThan(0.0005);
    expect(asMust - inDrink).toBeLessThan(0.0012);
  });
});
