import { beforeEach, describe, expect, it } from 'vitest';
import { Batch, Lot } from '@/db/models';
import type { Actor } from '@/lib/auth/policies';
import { blendForm, splitForm, topUpBatchForm } from '@/lib/contracts/family';
import { ConflictError } from '@/lib/errors';
import { bottleBatch } from '@/lib/services/bench/bottle';
import { getBench } from '@/lib/services/bench/get';
import { judge } from '@/lib/services/bench/judge';
import { blendBatches } from '@/lib/services/family/blend';
import { topUpBatch } from '@/lib/services/family/rack';
import { splitBatch } from '@/lib/services/family/split';
import { bottleForm, ciderAt, clockAt, DAY, isoAt, NOON, readAt } from '../support/cellar';
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
    const later = NOON + 9 * DAY;
    await readTwice(split.id, 1.0, later);
    expect((await judge(brewer, split.id, bottleForm({ at: isoAt(later) }), clockAt(later))).verdict).toBe('safe');
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
