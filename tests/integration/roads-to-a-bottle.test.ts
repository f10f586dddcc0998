import { beforeEach, describe, expect, it } from 'vitest';
import { assumedWords } from '@/components/bench/words';
import { Batch, Lot } from '@/db/models';
import type { Actor } from '@/lib/auth/policies';
import { createEntry as entryForm, updateBatch as updateForm, updateEntry as entryUpdate } from '@/lib/contracts/batches';
import { blendForm, splitForm, topUpBatchForm } from '@/lib/contracts/family';
import { ConflictError } from '@/lib/errors';
import { bottleBatch } from '@/lib/services/bench/bottle';
import { getBench } from '@/lib/services/bench/get';
import { judge } from '@/lib/services/bench/judge';
import { updateBatch } from '@/lib/services/batches/update';
import { createEntry } from '@/lib/services/entries/create';
import { removeEntry } from '@/lib/services/entries/remove';
import { updateEntry } from '@/lib/services/entries/update';
import { blendBatches } from '@/lib/services/family/blend';
import { topUpBatch } from '@/lib/services/family/rack';
import { splitBatch } from '@/lib/services/family/split';
import { bottleForm, ciderAt, clockAt, DAY, isoAt, NOON, readAt, sparklingBottle } from '../support/cellar';
import { useDatabase } from '../support/database';
import { buildMember } from '../support/factories';

useDatabase();

const HOUR = 3_600_000;
const at = isoAt(NOON);
let brewer: Actor;

beforeEach(async () => {
  brewer = await buildMember('brewer');
});

/** What the bench says of it, and that it fills no bottle while it says stop. */
async function stoppedAt(batchId: string, now: number): Promise<string> {
  const clock = clockAt(now);
  const form = bottleForm({ at: isoAt(now) });
  const verdict = await judge(brewer, batchId, form, clock);
  expect(verdict.verdict).toBe('stop');
  expect(verdict).not.toHaveProperty('dose');
  await expect(bottleBatch(brewer, batchId, form, clock)).rejects.toBeInstanceOf(ConflictError);
  expect(await Lot.count({ where: { batchId } })).toBe(0);
  return (await getBench(brewer, batchId, clock)).done.verdict;
}

const part = async (from: Batch, litres: number) => (await splitBatch(brewer, from.id, splitForm.parse({ at, parts: [{ name: 'Second vessel', volume_l: litres, vessel_l: 5 }] }), clockAt())).parts[0]!;
const blend = async (parts: ReadonlyArray<[Batch, number]>) =>
  (await blendBatches(brewer, blendForm.parse({ at, parts: parts.map(([batch, litres]) => ({ batch_id: batch.id, volume_l: litres })), into: { name: 'Blend', vessel_l: 12 } }), clockAt())).batch;

/** Two equal readings a week apart, the last of them now. */
async function readTwice(batchId: string, gravity: number, now: number): Promise<void> {
  const batch = await Batch.findByPk(batchId, { rejectOnEmpty: true });
  await readAt(batch, gravity, now - 8 * DAY);
  await readAt(batch, gravity, now - HOUR);
}

describe('a split', () => {
  it('takes nobody past the bench: a part of an unfinished batch is stopped as the whole is', async () => {
    const working = await ciderAt(brewer, { fg: 1.02, readDaysAgo: [9, 0.1] });
    const split = await part(working, 2);
    await stoppedAt(working.id, NOON);
    await stoppedAt(split.id, NOON);
  });

  it('does not hand its readings down: a part of a finished batch is read anew in its own vessel', async () => {
    const finished = await ciderAt(brewer);
    const split = await part(finished, 2);
    expect(await stoppedAt(split.id, NOON)).toBe('unknown');
    // What is missing is a reading: the original gravity went along.
    expect(assumedWords(await getBench(brewer, split.id, clockAt()))).toMatch(/^Nobody has read what stands in this vessel/);
    const later = NOON + 9 * DAY;
    await readTwice(split.id, 1.0, later);
    expect((await judge(brewer, split.id, bottleForm({ at: isoAt(later) }), clockAt(later))).verdict).toBe('safe');
    expect(assumedWords(await getBench(brewer, split.id, clockAt(later)))).toBeNull();
    await Batch.update({ originalGravity: null }, { where: { id: split.id } });
    expect(assumedWords(await getBench(brewer, split.id, clockAt(later)))).toMatch(/^Nobody told the original gravity/);
  });

  it('does not make an unfinished batch look dry by a low reading of the part: high is high', async () => {
    const stuck = await ciderAt(brewer, { fg: 1.02, readDaysAgo: [] });
    const split = await part(stuck, 2);
    const later = NOON + 9 * DAY;
    await readTwice(split.id, 1.02, later);
    expect(await stoppedAt(split.id, later)).toBe('stopped_high');
  });
});

describe('a blend', () => {
  it('of two finished drinks begins anew: no bottle for five days, whatever was read before', async () => {
    const [one, two] = [await ciderAt(brewer, { vesselL: 12 }), await ciderAt(brewer, { og: 1.06, fg: 1.002 })];
    const blended = await blend([[one, 2], [two, 2]]);
    await stoppedAt(blended.id, NOON);
    // Readings of the days before the blend say nothing of it.
    const batch = await Batch.findByPk(blended.id, { rejectOnEmpty: true });
    await readAt(batch, 1.001, NOON - 9 * DAY);
    await readAt(batch, 1.001, NOON - HOUR);
    await stoppedAt(blended.id, NOON + HOUR);
    const later = NOON + 4 * DAY;
    await readAt(batch, 1.001, NOON + HOUR);
    await readAt(batch, 1.001, later - HOUR);
    expect(await stoppedAt(blended.id, later)).toBe('not_yet');
  });

  it('with a sweet one in it is not called dry: what may still ferment counts all of its sugar', async () => {
    const [dry, sweet] = [await ciderAt(brewer, { vesselL: 12 }), await ciderAt(brewer, { og: 1.09, fg: 1.03 })];
    const blended = await blend([[dry, 2], [sweet, 2]]);
    const later = NOON + 16 * DAY;
    await readTwice(blended.id, 1.015, later);
    expect(await stoppedAt(blended.id, later)).toBe('stopped_high');
    expect((await getBench(brewer, blended.id, clockAt(later))).done.remaining!.value.hi).toBeGreaterThan(10);
  });

  it('into a batch that was done takes its being done away', async () => {
    const [done, other] = [await ciderAt(brewer, { vesselL: 12 }), await ciderAt(brewer, { og: 1.06, fg: 1.01 })];
    expect((await judge(brewer, done.id, bottleForm(), clockAt())).verdict).toBe('safe');
    await blendBatches(brewer, blendForm.parse({ at, parts: [{ batch_id: other.id, volume_l: 1 }], into_batch_id: done.id }), clockAt());
    await stoppedAt(done.id, NOON + HOUR);
  });
});

describe('a top-up', () => {
  it('with must takes the being done away; with water it leaves it', async () => {
    const [one, two] = [await ciderAt(brewer), await ciderAt(brewer)];
    await topUpBatch(brewer, one.id, topUpBatchForm.parse({ at, top_up: { what: 'must', volume_l: 0.2, gravity: 1.05 } }), clockAt());
    await stoppedAt(one.id, NOON + HOUR);
    await topUpBatch(brewer, two.id, topUpBatchForm.parse({ at, top_up: { what: 'water', volume_l: 0.05 } }), clockAt());
    expect((await judge(brewer, two.id, bottleForm({ at: isoAt(NOON + HOUR) }), clockAt(NOON + HOUR))).verdict).toBe('safe');
  });
});

describe('the log', () => {
  const log = (batchId: string, entry: Record<string, unknown>, now = NOON) => createEntry(brewer, batchId, entryForm.parse({ at: isoAt(now), ...entry }), clockAt(now));
  const sugar = (now: number) => ({ kind: 'addition', at: isoAt(now), sugar_g: 30, detail: { substance: 'sugar', ingredient: 'table-sugar', grams: 30 } });

  it('makes no lot: a bottling is not among what can be written', async () => {
    const batch = await ciderAt(brewer);
    expect(() => entryForm.parse({ kind: 'bottling', at, volume_l: 4 })).toThrow();
    expect(await Lot.count({ where: { batchId: batch.id } })).toBe(0);
  });

  it('takes sugar for fizz as an addition, and then the bench waits for it to be gone: nothing is filled on top of it', async () => {
    const batch = await ciderAt(brewer);
    await log(batch.id, sugar(NOON));
    const clock = clockAt(NOON + HOUR);
    for (const form of [bottleForm({ at: isoAt(NOON + HOUR) }), bottleForm({ at: isoAt(NOON + HOUR), priming: { way: 'none' } })]) {
      expect((await judge(brewer, batch.id, form, clock)).verdict).toBe('stop');
      await expect(bottleBatch(brewer, batch.id, form, clock)).rejects.toBeInstanceOf(ConflictError);
    }
    // Six days on, the readings from before it say nothing of it.
    await stoppedAt(batch.id, NOON + 6 * DAY);
  });

  it('is asked again at the moment of filling: what was safe an hour ago is not where something was logged since', async () => {
    const batch = await ciderAt(brewer);
    expect((await judge(brewer, batch.id, bottleForm(), clockAt())).verdict).toBe('safe');
    await log(batch.id, { kind: 'reading', gravity: 0.997 }, NOON);
    await stoppedAt(batch.id, NOON + 60_000);
  });

  it('corrected or taken back counts as it stands now', async () => {
    const [corrected, taken] = [await ciderAt(brewer, { readDaysAgo: [] }), await ciderAt(brewer, { readDaysAgo: [] })];
    for (const batch of [corrected, taken]) {
      await log(batch.id, { kind: 'reading', gravity: 1.0 }, NOON - 9 * DAY);
      const last = await log(batch.id, { kind: 'reading', gravity: 1.0 }, NOON - HOUR);
      expect((await judge(brewer, batch.id, bottleForm(), clockAt())).verdict).toBe('safe');
      if (batch === corrected) await updateEntry(brewer, batch.id, last.id, entryUpdate.parse({ gravity: 1.006 }), clockAt());
      else await removeEntry(brewer, batch.id, last.id, clockAt());
      await stoppedAt(batch.id, NOON);
    }
  });
});

describe('a second lot', () => {
  it('of what stayed in the vessel is judged anew, as if there had been no first', async () => {
    const batch = await ciderAt(brewer, { volumeL: 9, vesselL: 10 });
    const first = bottleForm({ ends_batch: false, losses_l: 0, bottles: [sparklingBottle({ at_hand: 4 })] });
    await bottleBatch(brewer, batch.id, first, clockAt());
    await createEntry(brewer, batch.id, entryForm.parse({ kind: 'addition', at: isoAt(NOON), sugar_g: 60, detail: { substance: 'sugar', ingredient: 'table-sugar', grams: 60 } }), clockAt());
    const later = NOON + DAY;
    await expect(bottleBatch(brewer, batch.id, bottleForm({ at: isoAt(later) }), clockAt(later))).rejects.toBeInstanceOf(ConflictError);
    expect(await Lot.count({ where: { batchId: batch.id } })).toBe(1);
  });
});

describe('the set-up', () => {
  it('cannot be written so that a cider that stopped high looks done: a yeast that leaves the sugar of fruit is not believed', async () => {
    const stuck = await ciderAt(brewer, { fg: 1.015 });
    await updateBatch(brewer, stuck.id, updateForm.parse({ attenuation_min_percent: 60, attenuation_max_percent: 70 }), clockAt());
    expect(await stoppedAt(stuck.id, NOON)).toBe('stopped_high');
    await updateBatch(brewer, stuck.id, updateForm.parse({ alcohol_tolerance_abv: 4 }), clockAt());
    // A tolerance explains that it stands still; the sugar is sugar all the same, and no bottle takes it.
    await stoppedAt(stuck.id, NOON);
  });

  it('opened again after it had ended fills nothing that is not judged', async () => {
    const batch = await ciderAt(brewer, { fg: 1.015 });
    await updateBatch(brewer, batch.id, updateForm.parse({ state: 'ended' }), clockAt());
    await expect(bottleBatch(brewer, batch.id, bottleForm(), clockAt())).rejects.toBeInstanceOf(ConflictError);
    await updateBatch(brewer, batch.id, updateForm.parse({ state: 'working' }), clockAt());
    await stoppedAt(batch.id, NOON);
  });
});

describe('an older sender', () => {
  it('may tell what the bench no longer asks; none of it is believed', async () => {
    const stuck = await ciderAt(brewer, { fg: 1.015 });
    const told = { ...bottleForm(), verdict: 'safe', override: true, overridden: true, force: true, done: true, dose: { way: 'weighed', total_g: 40 }, rating_bar: 12, holds: { rating: 12, confirmed: true } };
    await expect(bottleBatch(brewer, stuck.id, bottleForm(told as Parameters<typeof bottleForm>[0]), clockAt())).rejects.toBeInstanceOf(ConflictError);
    const finished = await ciderAt(brewer);
    const unread = { ...sparklingBottle({ confirmed_bar: null }), rating: 12, rating_confirmed: true } as ReturnType<typeof sparklingBottle>;
    await expect(bottleBatch(brewer, finished.id, bottleForm({ bottles: [unread] }), clockAt())).rejects.toThrow(/confirmed/);
  });
});
