import { describe, expect, it } from 'vitest';
import { Batch, Entry } from '@/db/models';
import { createEntry as entryForm, updateEntry as updateForm } from '@/lib/contracts/batches';
import { ConflictError, ForbiddenError, InvalidError, NotFoundError } from '@/lib/errors';
import { createEntry } from '@/lib/services/entries/create';
import { listEntries } from '@/lib/services/entries/list';
import { listRevisions } from '@/lib/services/entries/list-revisions';
import { updateEntry } from '@/lib/services/entries/update';
import { startFining } from '@/lib/services/finings/start';
import { finingForm } from '@/lib/contracts/family';
import { ciderAt, clockAt, isoAt, NOON } from '../support/cellar';
import { useDatabase } from '../support/database';
import { buildMember } from '../support/factories';

useDatabase();

const clock = clockAt();
const log = (input: Record<string, unknown>) => entryForm.parse({ at: isoAt(NOON), ...input });
const correct = (input: Record<string, unknown>) => updateForm.parse(input);

describe('a correction of the log', () => {
  it('keeps what was there before, each time, with who and when', async () => {
    const hand = await buildMember('hand', { name: 'Bo' });
    const batch = await ciderAt(hand);
    const entry = await createEntry(hand, batch.id, log({ kind: 'reading', gravity: 1.012, temperature_c: 24 }), clock);
    expect(entry.revised).toBe(false);
    const first = await updateEntry(hand, batch.id, entry.id, correct({ gravity: 1.021 }), clock);
    // The correction for the sample's temperature is made anew.
    expect(first).toMatchObject({ gravity_read: 1.021, revised: true });
    expect(first.gravity).toBeGreaterThan(1.021);
    await updateEntry(hand, batch.id, entry.id, correct({ text: 'Read twice.', temperature_c: 20 }), clock);
    const { items } = await listRevisions(hand, batch.id, entry.id);
    expect(items.map((item) => [item.before.gravity_read, item.before.text])).toEqual([[1.021, null], [1.012, null]]);
    expect(items[0]).toMatchObject({ by: { id: hand.personId, name: 'Bo' }, at: isoAt(NOON) });
    const [shown] = (await listEntries(hand, batch.id, { limit: 1 })).items;
    expect(shown).toMatchObject({ text: 'Read twice.', gravity: 1.021, revised: true });
  });

  it('lets the batch stand as the corrected log says', async () => {
    const brewer = await buildMember('brewer');
    const batch = await ciderAt(brewer);
    const entry = await createEntry(brewer, batch.id, log({ kind: 'rack', volume_l: 4.2, neck: 'bung' }), clock);
    await updateEntry(brewer, batch.id, entry.id, correct({ volume_l: 3.9, neck: 'airlock' }), clock);
    expect(await Batch.findByPk(batch.id)).toMatchObject({ volumeL: 3.9, neck: 'airlock' });
    await expect(updateEntry(brewer, batch.id, entry.id, correct({ volume_l: 9 }), clock)).rejects.toBeInstanceOf(InvalidError);
    expect(await Batch.findByPk(batch.id)).toMatchObject({ volumeL: 3.9 });
  });

  it('is a hand’s for an own line only, and says enough afterwards', async () => {
    const brewer = await buildMember('brewer');
    const hand = await buildMember('hand', { cellarId: brewer.cellarId });
    const stranger = await buildMember('keeper');
    const batch = await ciderAt(brewer);
    const entry = await createEntry(brewer, batch.id, log({ kind: 'note', text: 'Smells of pears.' }), clock);
    await expect(updateEntry(hand, batch.id, entry.id, correct({ text: 'x' }), clock)).rejects.toBeInstanceOf(ForbiddenError);
    await expect(updateEntry(stranger, batch.id, entry.id, correct({ text: 'x' }), clock)).rejects.toBeInstanceOf(NotFoundError);
    await expect(listRevisions(stranger, batch.id, entry.id)).rejects.toBeInstanceOf(NotFoundError);
    await expect(updateEntry(brewer, batch.id, entry.id, correct({ text: null }), clock)).rejects.toBeInstanceOf(InvalidError);
    expect(await Entry.findByPk(entry.id)).toMatchObject({ text: 'Smells of pears.', revisedAt: null });
  });

  it('of a line that is part of a larger work touches its words alone', async () => {
    const brewer = await buildMember('brewer');
    const batch = await ciderAt(brewer);
    await startFining(brewer, batch.id, finingForm.parse({ at: isoAt(NOON), fining: 'bentonite' }), clock);
    const line = await Entry.findOne({ where: { batchId: batch.id, kind: 'fining' }, rejectOnEmpty: true });
    await expect(updateEntry(brewer, batch.id, line.id, correct({ at: isoAt(NOON - 1000) }), clock)).rejects.toBeInstanceOf(ConflictError);
    await expect(updateEntry(brewer, batch.id, line.id, correct({ text: 'Swollen overnight.' }), clock)).resolves.toMatchObject({ text: 'Swollen overnight.' });
  });

  it('takes more than a gravity: what was seen, smelt and measured', async () => {
    const hand = await buildMember('hand');
    const batch = await ciderAt(hand);
    const entry = await createEntry(hand, batch.id, log({ kind: 'observation', detail: { ph: 3.4, clarity: 'clearing', bubbles_per_minute: 6, foam: 'ring', smell: 'Apple skin.', titratable_acid_g_per_l: 6.1 } }), clock);
    expect(entry.detail).toEqual({ ph: 3.4, clarity: 'clearing', bubbles_per_minute: 6, foam: 'ring', smell: 'Apple skin.', titratable_acid_g_per_l: 6.1 });
    for (const detail of [{ ph: 1 }, { bubbles_per_minute: -1 }, { clarity: 'murky' }]) expect(entryForm.safeParse({ kind: 'observation', at: isoAt(NOON), detail }).success).toBe(false);
  });
});
