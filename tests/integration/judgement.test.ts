import { describe, expect, it } from 'vitest';
import { Batch } from '@/db/models';
import { ManualClock } from '@/lib/clock';
import { judgementSchema } from '@/lib/contracts/assessment';
import { createEntry as entryForm } from '@/lib/contracts/batches';
import { createShare as createShareForm } from '@/lib/contracts/shares';
import { NotFoundError } from '@/lib/errors';
import { assessBatch } from '@/lib/services/batches/assess';
import { getAssessment, getJudgement } from '@/lib/services/batches/get-judgement';
import { updateBatch } from '@/lib/services/batches/update';
import { createEntry } from '@/lib/services/entries/create';
import { getBench } from '@/lib/services/bench/get';
import { getDrink } from '@/lib/services/drink/get';
import { createShare } from '@/lib/services/shares/manage';
import { getShared } from '@/lib/services/shares/shared';
import { readAt } from '../support/cellar';
import { useDatabase } from '../support/database';
import { buildBatch, buildMember, buildSensor, writeReadings } from '../support/factories';

const db = useDatabase();

const MINUTE = 60_000;
const DAY = 24 * 60 * MINUTE;

/** A cider six days in the fall, judged once by the watch. The database writes its own times, so that the clock starts at the real one. */
async function judged() {
  const keeper = await buildMember('keeper');
  const clock = new ManualClock(Date.now());
  const start = clock.now() - 6 * DAY;
  const batch = await buildBatch({ cellarId: keeper.cellarId, kind: 'cider', pitchedAt: new Date(start), originalGravity: 1.06, neck: 'blow_off' });
  const { sensor } = await buildSensor({ batch });
  const readings = Array.from({ length: 6 * 96 }, (_, n) => ({ at: start + n * 15 * MINUTE, gravity: 1.0 + 0.06 / (1 + Math.exp((n / 96 - 3) * 1.5)) }));
  await writeReadings(sensor.id, readings);
  expect(await assessBatch(batch.id, { clock })).toBe('assessed');
  const ask = () => getJudgement(keeper, batch.id, {}, clock);
  return { keeper, clock, batch, sensor, start, ask };
}

/** Leaves its mark in what is kept, so that an answer shows whether it was read from there. */
async function markKept(batchId: string): Promise<void> {
  await db.sequelize.query(`update batch_states set drawing = '{"curve":[],"expected":[],"gas":[{"at":"2000-01-01T00:00:00.000Z","value":7}]}' where batch_id = $1`, { bind: [batchId] });
}
const isKept = (judgement: { gas: readonly { value: number }[] }) => judgement.gas[0]?.value === 7;

describe('the judgement of a batch', () => {
  it('is kept whole, and says the same as one worked out for that time', async () => {
    const { keeper, clock, batch, ask } = await judged();
    const kept = judgementSchema.parse(await ask());
    const worked = await getJudgement(keeper, batch.id, { at: new Date(clock.now()).toISOString() }, clock);
    expect(kept).toEqual(worked);
    expect(kept.curve.length).toBeGreaterThan(200);
    expect(kept.gas.length).toBeGreaterThan(10);
    expect(kept.pending).toBe(false);
  });

  it('is read, not worked out, for as long as nothing was logged and the watch is running', async () => {
    const { clock, batch, ask } = await judged();
    await markKept(batch.id);
    clock.advance(5 * MINUTE);
    expect(isKept(await ask())).toBe(true);
  });

  it('says for a moment after an entry that a newer one is on its way, and has it when the watch has judged', async () => {
    const { keeper, clock, batch, ask } = await judged();
    const before = await ask();
    await createEntry(keeper, batch.id, entryForm.parse({ kind: 'neck', at: new Date(clock.now() - 10 * MINUTE).toISOString(), neck: 'airlock' }), clock);
    const meanwhile = await ask();
    expect(meanwhile.pending).toBe(true);
    expect(meanwhile.calls).toEqual(before.calls);
    clock.advance(1_500);
    await assessBatch(batch.id, { clock });
    const after = await ask();
    expect(after.pending).toBe(false);
    expect(after.calls.neck).not.toEqual(before.calls.neck);
  });

  it('is worked out where the watch does not come round to an entry', async () => {
    const { keeper, clock, batch, ask } = await judged();
    const before = await ask();
    await createEntry(keeper, batch.id, entryForm.parse({ kind: 'neck', at: new Date(clock.now() - 10 * MINUTE).toISOString(), neck: 'airlock' }), clock);
    await markKept(batch.id);
    clock.advance(MINUTE);
    const anew = await ask();
    expect(isKept(anew)).toBe(false);
    expect(anew.calls.neck).not.toEqual(before.calls.neck);
    expect(anew.pending).toBe(false);
  });

  it('is worked out where the watch has not run for long, and where it was never judged', async () => {
    const { keeper, clock, batch, ask } = await judged();
    await markKept(batch.id);
    clock.advance(20 * MINUTE);
    expect(isKept(await ask())).toBe(false);
    const fresh = await buildBatch({ cellarId: keeper.cellarId });
    expect((await getAssessment(keeper, fresh.id, {}, clock)).stage).toBe('unknown');
  });

  it('stays as it was at the end of an ended batch, however long ago', async () => {
    const { keeper, clock, batch, ask } = await judged();
    await updateBatch(keeper, batch.id, { state: 'ended' }, clock);
    const endedAt = clock.now();
    expect(await assessBatch(batch.id, { clock })).toBe('ended');
    await markKept(batch.id);
    clock.advance(30 * DAY);
    const later = await ask();
    expect(isKept(later)).toBe(true);
    expect(Date.parse(later.at)).toBe(endedAt);
    expect(await Batch.findByPk(batch.id)).toMatchObject({ state: 'ended' });
  });

  it('does not exist for another cellar', async () => {
    const { clock, batch } = await judged();
    const stranger = await buildMember('keeper');
    await expect(getJudgement(stranger, batch.id, {}, clock)).rejects.toBeInstanceOf(NotFoundError);
    await expect(getJudgement(stranger, batch.id, { at: new Date(clock.now()).toISOString() }, clock)).rejects.toBeInstanceOf(NotFoundError);
  });
});

describe('the gravity that is told of a batch', () => {
  it('is the later word of float and hydrometer, alike on its page, at the bench and behind its link', async () => {
    const { keeper, clock, batch } = await judged();
    const page = async () => (await getAssessment(keeper, batch.id, {}, clock)).last_gravity!.value;
    const link = await createShare(keeper, batch.id, createShareForm.parse({}), clock);
    const token = link.url!.split('/').at(-1)!;
    const told = async () => {
      await assessBatch(batch.id, { clock });
      const [drink, bench, shared] = [await getDrink(keeper, batch.id, clock), (await getBench(keeper, batch.id, clock)).drink, await getShared(token, { clock })];
      expect(bench.gravity).toBe(drink.gravity);
      expect(shared.gravity).toBe(drink.gravity);
      expect(drink.gravity).toBeCloseTo(await page(), 5);
      return drink;
    };
    // Read a day ago, fallen since, and the float speaks.
    await readAt(batch, 1.0027, clock.now() - DAY);
    const speaking = await told();
    expect(speaking.gravity_by).toBe('float');
    expect(speaking.gravity).toBeLessThan(1.002);
    // Silent, what it said last still is the latest word.
    clock.advance(2 * DAY);
    const silent = await told();
    expect((await getAssessment(keeper, batch.id, {}, clock)).gravity).toBeNull();
    expect(silent.gravity_by).toBe('float');
    expect(silent.gravity).toBeCloseTo(speaking.gravity!, 3);
    // Until somebody reads.
    await readAt(batch, 0.999, clock.now() - 60 * MINUTE);
    expect(await told()).toMatchObject({ gravity: 0.999, gravity_by: 'hydrometer' });
  });
});
