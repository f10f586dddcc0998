import { describe, expect, it } from 'vitest';
import { inTransaction } from '@/db/client';
import { saveBatchState } from '@/db/queries/batch-states';
import { createShare as shareForm } from '@/lib/contracts/shares';
import { createTasting as tastingForm, guestTasting } from '@/lib/contracts/tastings';
import { ForbiddenError, NotFoundError, ThrottledError } from '@/lib/errors';
import type { Actor } from '@/lib/auth/policies';
import { Entry, Job, Share } from '@/db/models';
import { bottleBatch } from '@/lib/services/bench/bottle';
import { getLot } from '@/lib/services/lots/get';
import { compareBatches } from '@/lib/services/compare/compare';
import { createShare, listShares, revokeShare } from '@/lib/services/shares/manage';
import { getShared, tasteShared } from '@/lib/services/shares/shared';
import { createTasting, listTastings, removeTasting } from '@/lib/services/tastings/write';
import { bottleForm, ciderAt, clockAt, DAY, HOUR, isoAt, NOON } from '../support/cellar';
import { useDatabase } from '../support/database';
import { buildMember, buildSensor, writeReadings } from '../support/factories';

useDatabase();

const clock = clockAt();
const tokenOf = (url: string | null) => /\/share\/([A-Za-z0-9_-]{32})$/.exec(url ?? '')![1]!;
const note = (more: Record<string, unknown>) => tastingForm.parse({ at: isoAt(NOON), ...more });

async function aLot(actor: Actor) {
  const batch = await ciderAt(actor, { batch: { name: 'Orchard cider', place: 'under the stairs at number 9' } });
  await Entry.create({ cellarId: actor.cellarId, batchId: batch.id, kind: 'note', at: new Date(NOON - DAY), text: 'Gave Petra a taste.' });
  return { batch, lot: await bottleBatch(actor, batch.id, bottleForm(), clock) };
}

describe('tasting notes', () => {
  it('are averaged over those who gave a figure, with their spread', async () => {
    const brewer = await buildMember('brewer');
    const guest = await buildMember('guest', { cellarId: brewer.cellarId });
    const { lot } = await aLot(brewer);
    await createTasting(brewer, lot.id, note({ score: 6, look: 4, sparkle: 'less' }), clock);
    await createTasting(guest, lot.id, note({ score: 8, words: 'Sharp, apple skin.' }), clock);
    await createTasting(guest, lot.id, note({ score: 7, look: 5, sparkle: 'as_planned' }), clock);
    const { summary, items } = await listTastings(guest, lot.id);
    // Sample standard deviation of 6, 8, 7 is 1.
    expect(summary.score).toEqual({ count: 3, mean: 7, spread: 1, lowest: 6, highest: 8 });
    expect(summary.look).toMatchObject({ count: 2, mean: 4.5 });
    expect(summary.smell).toBeNull();
    expect(summary.sparkle).toMatchObject({ less: 1, as_planned: 1, gushing: 0 });
    const own = items.find((item) => item.by.id === guest.personId)!;
    const other = items.find((item) => item.by.id === brewer.personId)!;
    expect([own.mine, other.mine]).toEqual([true, false]);
    await expect(removeTasting(guest, other.id, clock)).rejects.toBeInstanceOf(ForbiddenError);
    await removeTasting(guest, own.id, clock);
    expect((await listTastings(guest, lot.id)).summary.count).toBe(2);
  });

  it('that it gushed, by whom ever, are a caution on the whole lot and one job for now', async () => {
    const brewer = await buildMember('brewer');
    const guest = await buildMember('guest', { cellarId: brewer.cellarId });
    const { batch, lot } = await aLot(brewer);
    await createTasting(guest, lot.id, note({ sparkle: 'more' }), clock);
    expect((await getLot(brewer, lot.id, clock)).caution).toBeNull();
    await createTasting(guest, lot.id, note({ sparkle: 'gushing' }), clock);
    expect((await getLot(brewer, lot.id, clock)).caution).toContain('gushed');
    const share = await createShare(brewer, batch.id, shareForm.parse({}), clock);
    await tasteShared(tokenOf(share.url), guestTasting.parse({ lot_id: lot.id, sparkle: 'gushing' }), '203.0.113.9', clock);
    expect(await Job.count({ where: { lotId: lot.id, kind: 'pressure', doneAt: null } })).toBe(1);
    expect((await getShared(tokenOf(share.url), { clock })).lots[0]).toMatchObject({ caution: true });
  });

  it('say something, in the ranges of the sheet', () => {
    for (const bad of [{}, { score: 11 }, { score: 0.5 }, { score: 7.3 }, { look: 6 }, { words: '   ' }, { sparkle: 'fizzy' }]) expect(tastingForm.safeParse({ at: isoAt(NOON), ...bad }).success, JSON.stringify(bad)).toBe(false);
  });
});

describe('a share link', () => {
  it('shows one batch and nothing of who, where or what was written about it', async () => {
    const brewer = await buildMember('brewer', { name: 'Ada Kessel' });
    const { batch, lot } = await aLot(brewer);
    await createTasting(brewer, lot.id, note({ score: 7, words: 'Clean.', next_time: 'Rack sooner.' }), clock);
    const share = await createShare(brewer, batch.id, shareForm.parse({}), clock);
    const page = await getShared(tokenOf(share.url), { clock });
    expect(page).toMatchObject({ name: 'Orchard cider', called: 'cider', by: null, takes_tastings: true, lots: [{ code: lot.code, tastings: { count: 1 } }] });
    const text = JSON.stringify(page);
    for (const secret of ['Ada', 'Kessel', 'Petra', 'stairs', 'Rack sooner', brewer.personId, brewer.cellarId, batch.id]) expect(text).not.toContain(secret);
    expect((await listShares(brewer, batch.id, clock)).items[0]).toMatchObject({ looked_at: 1, open: true });
    // A page that is left open asks again by itself, and nobody looks.
    for (let minute = 2; minute < 5; minute += 1) await getShared(tokenOf(share.url), { clock: clockAt(NOON + minute * 60_000), again: true });
    expect((await listShares(brewer, batch.id, clock)).items[0]).toMatchObject({ looked_at: 1 });
  });

  it('names the sharer where they chose it, and of the tasters those who chose it', async () => {
    const brewer = await buildMember('brewer', { name: 'Ada Kessel' });
    const shy = await buildMember('guest', { cellarId: brewer.cellarId, name: 'Shy One' });
    const { batch, lot } = await aLot(brewer);
    await createTasting(shy, lot.id, note({ words: 'Good.' }), clock);
    await createTasting(brewer, lot.id, note({ words: 'Better.', show_name: true }), clock);
    const share = await createShare(brewer, batch.id, shareForm.parse({ show_people: true }), clock);
    const page = await getShared(tokenOf(share.url), { clock });
    expect(page.by).toBe('Ada Kessel');
    expect(page.lots[0]!.words.map((item) => item.by).sort()).toEqual(['Ada Kessel', null]);
    expect(JSON.stringify(page)).not.toContain('Shy');
  });

  it('opens nothing once it has expired or was revoked, as if it had never been', async () => {
    const brewer = await buildMember('brewer');
    const { batch } = await aLot(brewer);
    const share = await createShare(brewer, batch.id, shareForm.parse({ expires_in_days: 2 }), clock);
    const token = tokenOf(share.url);
    await expect(getShared(token, { clock: clockAt(NOON + 2 * DAY - HOUR) })).resolves.toBeTruthy();
    await expect(getShared(token, { clock: clockAt(NOON + 2 * DAY + HOUR) })).rejects.toBeInstanceOf(NotFoundError);
    expect((await listShares(brewer, null, clockAt(NOON + 3 * DAY))).items[0]).toMatchObject({ open: false, url: null });
    const again = await createShare(brewer, batch.id, shareForm.parse({}), clock);
    await revokeShare(brewer, again.id, clock);
    await expect(getShared(tokenOf(again.url), { clock })).rejects.toBeInstanceOf(NotFoundError);
    await expect(tasteShared(tokenOf(again.url), guestTasting.parse({ lot_id: crypto.randomUUID(), score: 5 }), 'x', clock)).rejects.toBeInstanceOf(NotFoundError);
    // The database alone does not give the address away.
    const row = await Share.findByPk(again.id, { rejectOnEmpty: true });
    expect(JSON.stringify(row)).not.toContain(tokenOf(again.url));
  });

  it('takes guests’ notes: once each, for its own lots, and not without end', async () => {
    const brewer = await buildMember('brewer');
    const { batch, lot } = await aLot(brewer);
    const other = await aLot(brewer);
    const token = tokenOf((await createShare(brewer, batch.id, shareForm.parse({}), clock)).url);
    const form = guestTasting.parse({ lot_id: lot.id, score: 8, guest_name: 'Oda', words: 'Dry.', client_id: crypto.randomUUID() });
    await tasteShared(token, form, '192.0.2.1', clock);
    await tasteShared(token, form, '192.0.2.1', clock);
    const { items } = await listTastings(brewer, lot.id);
    expect(items).toMatchObject([{ by: { id: null, name: 'Oda', guest: true }, score: 8 }]);
    await expect(tasteShared(token, guestTasting.parse({ lot_id: other.lot.id, score: 1 }), '192.0.2.1', clock)).rejects.toBeInstanceOf(NotFoundError);
    const flood = await Promise.allSettled(Array.from({ length: 40 }, () => tasteShared(token, guestTasting.parse({ lot_id: lot.id, score: 1 }), '192.0.2.9', clock)));
    expect(flood.some((item) => item.status === 'rejected' && item.reason instanceof ThrottledError)).toBe(true);
    const closed = tokenOf((await createShare(brewer, batch.id, shareForm.parse({ takes_tastings: false }), clock)).url);
    await expect(tasteShared(closed, form, '192.0.2.1', clock)).rejects.toBeInstanceOf(ForbiddenError);
  });

  it('is made and revoked by brewers of its own cellar', async () => {
    const brewer = await buildMember('brewer');
    const hand = await buildMember('hand', { cellarId: brewer.cellarId });
    const stranger = await buildMember('keeper');
    const { batch } = await aLot(brewer);
    await expect(createShare(hand, batch.id, shareForm.parse({}), clock)).rejects.toBeInstanceOf(ForbiddenError);
    await expect(createShare(stranger, batch.id, shareForm.parse({}), clock)).rejects.toBeInstanceOf(NotFoundError);
    const share = await createShare(brewer, batch.id, shareForm.parse({}), clock);
    await expect(revokeShare(stranger, share.id, clock)).rejects.toBeInstanceOf(NotFoundError);
    expect((await listShares(stranger, null, clock)).items).toEqual([]);
  });
});

describe('batches laid over each other', () => {
  it('begin at their pitch, whenever that was', async () => {
    const brewer = await buildMember('brewer');
    const [late, early] = [await ciderAt(brewer), await ciderAt(brewer, { now: NOON - 100 * DAY })];
    for (const batch of [late, early]) {
      const { sensor } = await buildSensor({ batch });
      await writeReadings(sensor.id, [0, 24, 48].map((h) => ({ at: batch.pitchedAt!.getTime() + h * HOUR, gravity: 1.048 - h * 0.0002, temperature: 18 })));
    }
    const { items } = await compareBatches(brewer, { batches: [late.id, early.id], points: 100 });
    expect(items.map((item) => item.hours)).toEqual([[0, 24, 48], [0, 24, 48]]);
    expect(items[0]!.gravity).toEqual(items[1]!.gravity);
    expect(items[1]!.by_hand.map((item) => item.hour)).toEqual([31 * 24, 957.6]);
    const { items: near } = await compareBatches(brewer, { batches: [late.id, early.id], points: 100, from_hour: 12, to_hour: 30 });
    expect(near.map((item) => item.hours)).toEqual([[24], [24]]);
    // Of a part each point that was judged, of the whole those that a lane has.
    const point = (h: number) => ({ at: isoAt(late.pitchedAt!.getTime() + h * HOUR), gravity: 1.048, lo: 1.047, hi: 1.049 });
    await inTransaction((transaction) => saveBatchState({ batchId: late.id, cellarId: brewer.cellarId, at: new Date(NOON), assessment: {}, curve: [point(0), point(96)], expected: [], drawing: { curve: Array.from({ length: 97 }, (_, h) => point(h)) } }, transaction));
    const curveHours = async (more: object) => (await compareBatches(brewer, { batches: [late.id], points: 100, ...more })).items[0]!.curve.map((item) => item.hour);
    expect(await curveHours({})).toEqual([0, 96]);
    expect(await curveHours({ from_hour: 12, to_hour: 14 })).toEqual([10, 11, 12, 13, 14, 15, 16]);
    const stranger = await buildMember('keeper');
    await expect(compareBatches(stranger, { batches: [late.id], points: 100 })).rejects.toBeInstanceOf(NotFoundError);
  });
});
