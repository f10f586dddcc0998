import { describe, expect, it } from 'vitest';
import { todaysJobs } from '@/components/shelf/jobs';
import { database } from '@/db/client';
import { Batch, Cellar, Membership } from '@/db/models';
import { ManualClock } from '@/lib/clock';
import { jobQuery } from '@/lib/contracts/jobs';
import { assessBatch } from '@/lib/services/batches/assess';
import { listJobs } from '@/lib/services/jobs/list';
import { seedDemo } from '@/scripts/lib/demo';
import { useDatabase } from '../support/database';

useDatabase();

/** A Tuesday morning. */
const OPENS = Date.UTC(2026, 2, 3, 8, 30);
const DAY = 86_400_000;

describe('the demo as it opens', () => {
  it('has a believable morning on its rounds: hardly anything late, and somebody did what was due before', async () => {
    const clock = new ManualClock(OPENS);
    await seedDemo(database(), OPENS);
    for (const batch of await Batch.findAll({ where: { endedAt: null } })) await assessBatch(batch.id, { clock, silenceCounts: true });
    // What its batches cost is said in a currency, as the cellar's settings have it.
    expect((await Cellar.findOne({ rejectOnEmpty: true })).currency).toBe('EUR');
    const { cellarId, personId, role } = await Membership.findOne({ where: { role: 'hand' }, rejectOnEmpty: true });
    const hand = { cellarId, personId, role };
    const { items } = await listJobs(hand, jobQuery.parse({ limit: '200' }), clock);
    const today = todaysJobs(items, new Map(), OPENS / 1000, 'UTC');

    // The cold stout and the silent float are what the demo tells of.
    const LATE = ['temperature', 'stalled', 'sensor'];
    expect(today.filter((row) => row.late && !LATE.includes(row.job.kind)).map((row) => row.job.title)).toEqual([]);
    expect(today.map((row) => row.job.kind)).toContain('fining_b');
    expect(today.filter((row) => row.job.kind === 'airlock')).toHaveLength(1);
    const done = await listJobs(hand, jobQuery.parse({ state: 'done', limit: '200' }), clock);
    const water = done.items.filter((job) => job.kind === 'airlock');
    expect(water.length).toBeGreaterThanOrEqual(8);
    expect(water.every((job) => job.done_by !== null && Date.parse(job.done_at ?? '') < OPENS - 3 * DAY)).toBe(true);
    // Nothing is both to be bottled and to be racked, nor either while it is being fined.
    const fined = items.find((job) => job.kind === 'fining_b')?.batch?.id;
    for (const job of items.filter((item) => item.kind === 'bottle')) {
      expect(job.batch?.id).not.toBe(fined);
      expect(items.some((item) => item.kind === 'rack' && item.batch?.id === job.batch?.id)).toBe(false);
    }
  }, 120_000);
});
