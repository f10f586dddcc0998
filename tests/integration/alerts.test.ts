import { beforeEach, describe, expect, it } from 'vitest';
import { inTransaction } from '@/db/client';
import { Alert, AuditRow, Batch, Cellar, Membership, OutboxMail } from '@/db/models';
import { ManualClock } from '@/lib/clock';
import type { Call } from '@/lib/core/types';
import { ConflictError, ForbiddenError, InvalidError, NotFoundError } from '@/lib/errors';
import { acknowledgeAlert } from '@/lib/services/alerts/acknowledge';
import { evaluateAlerts } from '@/lib/services/alerts/evaluate';
import { listAlerts } from '@/lib/services/alerts/list';
import { resolveAlert } from '@/lib/services/alerts/resolve';
import { updateRule } from '@/lib/services/messages/update';
import { changeRole, removeMember } from '@/lib/services/cellars/members';
import { useDatabase } from '../support/database';
import { buildBatch, buildCellar, buildMember } from '../support/factories';
import { assessmentWith, callWith } from '../unit/alerts/assessments';

useDatabase();

const MINUTE = 60_000;
const HOUR = 60 * MINUTE;
const START = Date.UTC(2026, 4, 1, 8);

/** A cellar with a keeper, a hand and a guest, and a batch whose calls a test sets. */
async function house() {
  const cellar = await buildCellar({ name: 'Low barn', timeZone: 'Europe/Berlin' });
  const keeper = await buildMember('keeper', { cellarId: cellar.id });
  const hand = await buildMember('hand', { cellarId: cellar.id });
  const guest = await buildMember('guest', { cellarId: cellar.id });
  const batch = await buildBatch({ cellarId: cellar.id, name: 'Oat stout', tag: 5 });
  const clock = new ManualClock(START);
  const look = (calls: Partial<Record<'stalled' | 'temperature' | 'bottle' | 'neck' | 'sensor' | 'rack' | 'started', Call>>, silenceCounts = true) =>
    inTransaction((transaction) =>
      evaluateAlerts({ batch, cellar, assessment: assessmentWith(clock.now(), { calls }), context: { neck: batch.neck, events: [], silenceCounts }, at: clock.now() }, transaction),
    );
  const stalled = () => look({ stalled: callWith('yes', { kind: 'cold', since: clock.now() - 5 * HOUR, headline: 'Stopped at 1.041: flat for 31 h.' }) });
  const mails = () => OutboxMail.findAll({ where: { cellarId: cellar.id }, order: ['id'] });
  return { cellar, keeper, hand, guest, batch, clock, look, stalled, mails };
}
type House = Awaited<ReturnType<typeof house>>;
const list = (who: House['keeper'], query: Partial<Parameters<typeof listAlerts>[1]> = {}) => listAlerts(who, { limit: 50, ...query });

let h: House;
beforeEach(async () => {
  h = await house();
});

describe('an alert', () => {
  it('opens with one mail owed to each who is told, and none to a guest', async () => {
    expect(await h.stalled()).toBe(true);
    const { items, counts } = await list(h.hand);
    expect(items).toMatchObject([{ call: 'stalled', kind: 'cold', level: 'check', state: 'open', batch: { name: 'Oat stout', tag: 5 }, evidence: { headline: 'Stopped at 1.041: flat for 31 h.' }, told: [{ state: 'waiting' }, { state: 'waiting' }] }]);
    expect(counts).toEqual({ open: 1, acknowledged: 0, resolved: 0 });
    expect((await h.mails()).map((mail) => mail.personId).toSorted()).toEqual([h.keeper.personId, h.hand.personId].toSorted());
  });

  it('is one, with one mail each, however often it is looked at', async () => {
    for (let index = 0; index < 30; index += 1) {
      await h.stalled();
      h.clock.advance(MINUTE);
    }
    expect((await list(h.keeper)).counts.open).toBe(1);
    expect(await h.mails()).toHaveLength(2);
  });

  it('of a silent sensor says how long, also while the house itself was just away and the silence proves nothing', async () => {
    const silent = (hours: number, counts: boolean) => h.look({ sensor: callWith('yes', { kind: 'silent', since: START - 7 * HOUR, headline: `Sensor silent ${hours} h.` }) }, counts);
    await silent(7, true);
    h.clock.advance(5 * HOUR);
    await silent(12, false);
    expect((await list(h.keeper)).items).toMatchObject([{ state: 'open', evidence: { headline: 'Sensor silent 12 h.' } }]);
    expect(await h.mails()).toHaveLength(2);
  });

  it('leaves nothing behind when its transaction fails', async () => {
    await expect(
      inTransaction(async (transaction) => {
        await evaluateAlerts(
          { batch: h.batch, cellar: h.cellar, assessment: assessmentWith(START, { calls: { stalled: callWith('yes', { since: START - 9 * HOUR }) } }), context: { neck: 'airlock', events: [], silenceCounts: true }, at: START },
          transaction,
        );
        throw new Error('the machine fell over');
      }),
    ).rejects.toThrow('fell over');
    expect((await list(h.keeper)).items).toEqual([]);
    expect(await h.mails()).toEqual([]);
    await h.stalled();
    expect(await h.mails()).toHaveLength(2);
  });

  it('resolves by itself after its keep-time and tells those who were told', async () => {
    await h.stalled();
    h.clock.advance(HOUR);
    await h.look({});
    expect((await list(h.keeper)).counts.open).toBe(1);
    h.clock.advance(6 * HOUR);
    await h.look({});
    expect(await list(h.keeper)).toMatchObject({ counts: { open: 0, resolved: 1 }, items: [{ state: 'resolved', resolved_by: null, resolved_at: new Date(h.clock.now()).toISOString() }] });
    expect((await h.mails()).map((mail) => (mail.payload as { event: string }).event)).toEqual(['opened', 'opened', 'resolved', 'resolved']);
  });

  it('says since when it is so no longer and until when it is kept, by its rule as the cellar set it', async () => {
    const cold = (headline: string) => h.look({ temperature: callWith('yes', { kind: 'low', since: START - 5 * HOUR, headline }) });
    await cold('Too cold: 15.5 °C.');
    h.clock.advance(HOUR);
    expect(await cold('Too cold: 14.9 °C.')).toBe(true);
    // The words are those of now, and nobody is told twice.
    expect((await list(h.keeper)).items).toMatchObject([{ gone: null, evidence: { headline: 'Too cold: 14.9 °C.' } }]);
    expect(await h.mails()).toHaveLength(2);
    h.clock.advance(HOUR);
    expect(await h.look({})).toBe(true);
    const back = h.clock.now();
    expect((await list(h.keeper)).items).toMatchObject([{ state: 'open', evidence: { headline: 'Too cold: 14.9 °C.' }, gone: { since: new Date(back).toISOString(), kept_until: new Date(back + 2 * HOUR).toISOString() } }]);
    await updateRule(h.keeper, null, { rule: 'temperature', batch_id: null, usual: false, enabled: true, for_min: null, keep_min: 300 }, { clock: h.clock });
    expect((await list(h.keeper)).items[0]!.gone).toEqual({ since: new Date(back).toISOString(), kept_until: new Date(back + 5 * HOUR).toISOString() });
    h.clock.advance(HOUR);
    await cold('Too cold: 15.1 °C.');
    expect((await list(h.keeper)).items).toMatchObject([{ gone: null, evidence: { headline: 'Too cold: 15.1 °C.' } }]);
  });

  it('shows the newer kind when a slow batch gets stuck, without a second mail', async () => {
    await h.look({ stalled: callWith('yes', { kind: 'sluggish', since: START - 5 * HOUR }) });
    h.clock.advance(HOUR);
    await h.look({ stalled: callWith('yes', { kind: 'stuck', since: START - 2 * HOUR, headline: 'Stopped.' }) });
    expect((await list(h.keeper)).items).toMatchObject([{ kind: 'stuck', evidence: { headline: 'Stopped.' } }]);
    expect(await h.mails()).toHaveLength(2);
  });

  it('is told at once where it is a matter of the hour, and else waits a moment for others', async () => {
    await h.look({ bottle: callWith('hold', { kind: 'refermentation' }), stalled: callWith('yes', { since: START - 5 * HOUR }) });
    const due = Object.fromEntries((await h.mails()).map((mail) => [(mail.payload as { alert: { rule: string } }).alert.rule, mail.nextAttemptAt.getTime() - START]));
    expect(due).toEqual({ refermentation: 0, stalled: 10_000 });
  });

  it('ends without a word when its batch ends', async () => {
    await h.stalled();
    await inTransaction((transaction) => evaluateAlerts({ batch: h.batch, cellar: h.cellar, assessment: null, context: { neck: 'airlock', events: [], silenceCounts: true }, at: h.clock.now() }, transaction));
    expect((await list(h.keeper)).counts).toEqual({ open: 0, acknowledged: 0, resolved: 1 });
    expect(await h.mails()).toHaveLength(2);
  });
});

describe('taking it in hand', () => {
  it('names who has it and when they look again, and stops the repeats', async () => {
    await h.stalled();
    const [alert] = (await list(h.hand)).items;
    const body = await acknowledgeAlert(h.hand, alert!.id, { note: 'Moved it to the stove.', look_again_at: null }, { clock: h.clock });
    expect(body).toMatchObject({ state: 'acknowledged', note: 'Moved it to the stove.', acknowledged_by: { id: h.hand.personId }, acknowledged_at: new Date(START).toISOString() });
    for (let day = 0; day < 5; day += 1) {
      h.clock.advance(24 * HOUR);
      await h.stalled();
    }
    expect(await h.mails()).toHaveLength(2);
    expect(await AuditRow.findAll({ where: { cellarId: h.cellar.id } })).toMatchObject([{ action: 'alert.acknowledge', personId: h.hand.personId, subject: alert!.id }]);
  });

  it('is said again each day, three times, where nobody takes it', async () => {
    await h.stalled();
    for (let day = 0; day < 6; day += 1) {
      h.clock.advance(24 * HOUR);
      await h.stalled();
    }
    expect((await h.mails()).map((mail) => mail.dedupeKey.split(':')[2])).toEqual(['opened', 'opened', 'repeated-1', 'repeated-1', 'repeated-2', 'repeated-2', 'repeated-3', 'repeated-3']);
  });

  it('reminds only the one who has it', async () => {
    await h.stalled();
    const [alert] = (await list(h.hand)).items;
    await acknowledgeAlert(h.hand, alert!.id, { note: null, look_again_at: new Date(START + 3 * HOUR).toISOString() }, { clock: h.clock });
    h.clock.advance(4 * HOUR);
    await h.stalled();
    await h.stalled();
    expect((await h.mails()).slice(2)).toMatchObject([{ personId: h.hand.personId, payload: { event: 'look_again' } }]);
  });

  it('is looked at again in time to come, and by nobody in the past', async () => {
    await h.stalled();
    const [alert] = (await list(h.hand)).items;
    await expect(acknowledgeAlert(h.hand, alert!.id, { note: null, look_again_at: new Date(h.clock.now()).toISOString() }, { clock: h.clock })).rejects.toMatchObject({ fields: { look_again_at: ['must lie ahead'] } });
    expect((await list(h.hand)).items).toMatchObject([{ state: 'open', acknowledged_by: null }]);
  });

  it('is open again when whoever has it leaves the cellar, and the others are told', async () => {
    await h.stalled();
    const [alert] = (await list(h.keeper)).items;
    await acknowledgeAlert(h.hand, alert!.id, { note: 'Mine.', look_again_at: new Date(START + 3 * HOUR).toISOString() }, { clock: h.clock });
    h.clock.advance(HOUR);
    await removeMember(h.keeper, h.hand.personId, h.clock);
    expect((await list(h.keeper)).items).toMatchObject([{ id: alert!.id, state: 'open', acknowledged_by: null, look_again_at: null, note: 'Mine.' }]);
    const told = (await h.mails()).filter((mail) => mail.dedupeKey.includes(':released-'));
    expect(told).toMatchObject([{ personId: h.keeper.personId }]);
    // Nobody has it: it is said again after a day, as one that nobody took.
    h.clock.advance(24 * HOUR);
    await h.stalled();
    expect((await h.mails()).filter((mail) => mail.dedupeKey.includes(':repeated-')).map((mail) => mail.personId)).toContain(h.keeper.personId);
  });

  it('is open again when whoever has it may only look from now on, and stays in hand through any other change of role', async () => {
    await h.stalled();
    const [alert] = (await list(h.keeper)).items;
    await acknowledgeAlert(h.hand, alert!.id, { note: null, look_again_at: null }, { clock: h.clock });
    await changeRole(h.keeper, h.hand.personId, 'brewer', h.clock);
    expect((await list(h.keeper)).items).toMatchObject([{ state: 'acknowledged' }]);
    await changeRole(h.keeper, h.hand.personId, 'guest', h.clock);
    expect((await list(h.keeper)).items).toMatchObject([{ state: 'open', acknowledged_by: null }]);
  });

  it('can be taken over by somebody else', async () => {
    await h.stalled();
    const [alert] = (await list(h.hand)).items;
    await acknowledgeAlert(h.hand, alert!.id, { note: null, look_again_at: null }, { clock: h.clock });
    expect(await acknowledgeAlert(h.keeper, alert!.id, { note: null, look_again_at: null }, { clock: h.clock })).toMatchObject({ acknowledged_by: { id: h.keeper.personId } });
  });

  it('is refused once it has passed', async () => {
    await h.stalled();
    const [alert] = (await list(h.hand)).items;
    await resolveAlert(h.keeper, alert!.id, { note: null }, { clock: h.clock });
    await expect(acknowledgeAlert(h.hand, alert!.id, { note: null, look_again_at: null })).rejects.toThrow(ConflictError);
    await expect(resolveAlert(h.hand, alert!.id, { note: null })).rejects.toThrow(ConflictError);
  });
});

describe('clearing it', () => {
  it('keeps quiet while the condition lasts, and speaks when it comes back', async () => {
    await h.stalled();
    const [alert] = (await list(h.keeper)).items;
    expect(await resolveAlert(h.keeper, alert!.id, { note: 'Lid was open.' }, { clock: h.clock })).toMatchObject({ state: 'resolved', note: 'Lid was open.', resolved_by: { id: h.keeper.personId } });
    for (let day = 0; day < 3; day += 1) {
      h.clock.advance(24 * HOUR);
      await h.stalled();
    }
    expect((await list(h.keeper)).counts).toEqual({ open: 0, acknowledged: 0, resolved: 1 });
    await h.look({});
    h.clock.advance(7 * HOUR);
    await h.look({});
    h.clock.advance(HOUR);
    await h.stalled();
    expect((await list(h.keeper)).counts).toEqual({ open: 1, acknowledged: 0, resolved: 1 });
  });

  it('does not wait for the worker, nor the worker for it, in a deadly embrace', async () => {
    await h.stalled();
    const [alert] = (await list(h.keeper)).items;
    await Promise.all(Array.from({ length: 12 }, (_, index) => (index % 2 ? h.stalled() : acknowledgeAlert(h.keeper, alert!.id, { note: null, look_again_at: null }, { clock: h.clock }))));
    expect((await list(h.keeper)).items).toHaveLength(1);
  });
});

describe('another cellar', () => {
  it('neither sees nor takes nor clears it', async () => {
    await h.stalled();
    const [alert] = (await list(h.keeper)).items;
    const stranger = await buildMember('keeper');
    expect(await list(stranger)).toMatchObject({ items: [], counts: { open: 0 } });
    expect((await list(stranger, { batch: h.batch.id })).items).toEqual([]);
    await expect(acknowledgeAlert(stranger, alert!.id, { note: null, look_again_at: null })).rejects.toThrow(NotFoundError);
    await expect(resolveAlert(stranger, alert!.id, { note: null })).rejects.toThrow(NotFoundError);
    expect((await list(h.keeper)).counts.open).toBe(1);
  });

  it('and a guest of the cellar is told that it is not theirs to see', async () => {
    await expect(list(h.guest)).rejects.toThrow(ForbiddenError);
    await expect(acknowledgeAlert(h.guest, h.batch.id, { note: null, look_again_at: null })).rejects.toThrow(ForbiddenError);
    await expect(resolveAlert(h.guest, h.batch.id, { note: null })).rejects.toThrow(ForbiddenError);
  });
});

describe('the list', () => {
  it('goes on page by page without losing or doubling one', async () => {
    for (let index = 0; index < 7; index += 1) {
      const other = await buildBatch({ cellarId: h.cellar.id });
      await Alert.create({ cellarId: h.cellar.id, batchId: other.id, call: 'rack', level: 'know', state: index % 2 ? 'resolved' : 'open', since: new Date(START), openedAt: new Date(START), evidence: callWith('yes') });
    }
    const seen: string[] = [];
    let cursor: string | undefined;
    do {
      const page = await list(h.keeper, { limit: 3, cursor });
      seen.push(...page.items.map((item) => item.id));
      cursor = page.next_cursor ?? undefined;
    } while (cursor);
    expect(new Set(seen).size).toBe(7);
    expect(seen).toHaveLength(7);
    expect((await list(h.keeper, { state: 'resolved' })).items).toHaveLength(3);
    await expect(list(h.keeper, { cursor: 'nonsense' })).rejects.toThrow(InvalidError);
  });

  it('shows that a mail failed, and why', async () => {
    await h.stalled();
    await OutboxMail.update({ failedAt: new Date(), lastError: '550 no such mailbox' }, { where: { personId: h.hand.personId } });
    expect((await list(h.keeper)).items[0]!.told).toContainEqual({ person: h.hand.person.name, means: 'mail', at: null, state: 'failed', held_by: null, due: null, error: '550 no such mailbox' });
  });
});

it('is gone with its batch, its cellar or its person, and blocks none of them', async () => {
  await h.stalled();
  await Membership.destroy({ where: { personId: h.hand.personId } });
  await h.hand.person.destroy();
  expect((await list(h.keeper)).items[0]!.told).toHaveLength(1);
  await Batch.destroy({ where: { id: h.batch.id } });
  expect((await list(h.keeper)).items).toEqual([]);
  await Cellar.destroy({ where: { id: h.cellar.id } });
});
