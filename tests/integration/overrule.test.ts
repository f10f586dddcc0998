import { describe, expect, it } from 'vitest';
import { QueryTypes } from 'sequelize';
import { database } from '@/db/client';
import { Alert, Entry, Job } from '@/db/models';
import { lockAlertStates } from '@/db/queries/alert-states';
import { ManualClock } from '@/lib/clock';
import { createEntry as entryForm } from '@/lib/contracts/batches';
import { ConflictError, ForbiddenError } from '@/lib/errors';
import { assessBatch } from '@/lib/services/batches/assess';
import { getBatch } from '@/lib/services/batches/get';
import { createEntry } from '@/lib/services/entries/create';
import { removeEntry } from '@/lib/services/entries/remove';
import { useDatabase } from '../support/database';
import { buildBatch, buildMember, buildSensor, writeReadings } from '../support/factories';
import { until } from '../support/processes';

useDatabase();

const HOUR = 3_600_000;

/** A cider that has stood far above its end for two days, called stalled and alerted. */
async function stalled() {
  const keeper = await buildMember('keeper', { name: 'Una' });
  const clock = new ManualClock(Date.now());
  const start = clock.now() - 12 * 24 * HOUR;
  const batch = await buildBatch({ cellarId: keeper.cellarId, kind: 'cider', pitchedAt: new Date(start), originalGravity: 1.055, neck: 'airlock', attenuationMinPercent: 95, attenuationMaxPercent: 105 });
  const { sensor } = await buildSensor({ batch });
  const gravity = (h: number) => Math.max(1.025, 1 + 0.055 / (1 + Math.exp((h - 72) / 20))) + 0.0003 * Math.sin(h * 2.3);
  await writeReadings(sensor.id, Array.from({ length: 12 * 48 }, (_, n) => ({ at: start + (n * HOUR) / 2, gravity: gravity(n / 2) })));
  const judge = () => assessBatch(batch.id, { clock });
  // An alert waits for its condition to hold.
  for (let i = 0; i < 3; i += 1) {
    await judge();
    clock.advance(2 * HOUR);
    await writeReadings(sensor.id, Array.from({ length: 4 }, (_, n) => ({ at: clock.now() - (n * HOUR) / 2, gravity: gravity(288) })));
  }
  await judge();
  const open = () => Alert.count({ where: { batchId: batch.id, call: 'stalled', state: 'open' } });
  const overrule = (input: Record<string, unknown> = {}) => entryForm.parse({ kind: 'overrule', at: new Date(clock.now()).toISOString(), text: 'The hydrometer says 1.004.', detail: { call: 'stalled', instead: 'no' }, ...input });
  return { keeper, clock, batch, judge, open, overrule };
}

describe('a call that a person overrules', () => {
  it('is shown with what the person said, tells nobody, and leaves the rounds', async () => {
    const { keeper, clock, batch, judge, open, overrule } = await stalled();
    expect((await getBatch(keeper, batch.id)).assessment?.calls.stalled.verdict).toBe('yes');
    expect(await open()).toBe(1);
    expect(await Job.count({ where: { batchId: batch.id, kind: 'stalled', droppedAt: null } })).toBe(1);

    const entry = await createEntry(keeper, batch.id, overrule(), clock);
    expect(entry.detail?.said).toMatchObject({ verdict: 'yes' });
    const shown = await getBatch(keeper, batch.id);
    expect(shown.overruled).toEqual([expect.objectContaining({ call: 'stalled', by: 'Una', instead: 'no', reason: 'The hydrometer says 1.004.' })]);
    // The judgement itself is not touched: both stand.
    expect(shown.assessment?.calls.stalled.verdict).toBe('yes');
    expect(await open()).toBe(0);
    clock.advance(HOUR);
    await judge();
    expect(await open()).toBe(0);
    expect(await Job.count({ where: { batchId: batch.id, kind: 'stalled', droppedAt: null } })).toBe(0);
  });

  it('does not lock out the watch that judges the same batch, nor is locked out by it', async () => {
    const { keeper, clock, batch, open, overrule } = await stalled();
    // The watch has the states of the rules, and is about to open an alert.
    const watch = await database().transaction();
    await lockAlertStates(batch.id, watch);
    const overruling = createEntry(keeper, batch.id, overrule(), clock);
    await until('the person waits for the watch', async () => (await database().query(`select 1 from pg_locks l join pg_stat_activity a on a.pid = l.pid where not l.granted and a.datname = current_database()`, { type: QueryTypes.SELECT })).length > 0);
    const { evidence } = await Alert.findOne({ where: { batchId: batch.id }, rejectOnEmpty: true });
    await Alert.create({ cellarId: batch.cellarId, batchId: batch.id, call: 'temperature', kind: 'low', level: 'check', state: 'open', since: new Date(), openedAt: new Date(), evidence }, { transaction: watch });
    await watch.commit();
    await overruling;
    expect(await open()).toBe(0);
  });

  it('is heeded again when that is taken back', async () => {
    const { keeper, clock, batch, judge, overrule } = await stalled();
    const entry = await createEntry(keeper, batch.id, overrule(), clock);
    await removeEntry(keeper, batch.id, entry.id, clock);
    expect((await getBatch(keeper, batch.id)).overruled).toEqual([]);
    clock.advance(HOUR);
    await judge();
    expect(await Job.count({ where: { batchId: batch.id, kind: 'stalled', droppedAt: null } })).toBe(1);
  });

  it('is overruled by a brewer with a reason, once it is judged; what the program said is not the writer’s to tell', async () => {
    const { keeper, clock, batch, overrule } = await stalled();
    const hand = await buildMember('hand', { cellarId: keeper.cellarId });
    await expect(createEntry(hand, batch.id, overrule(), clock)).rejects.toBeInstanceOf(ForbiddenError);
    expect(() => overrule({ text: null })).toThrow('say why');
    expect(() => overrule({ detail: null })).toThrow('say which call');
    const forged = await createEntry(keeper, batch.id, overrule({ detail: { call: 'bottle', instead: 'yes', said: { verdict: 'yes', kind: null, headline: 'Made up.' } } }), clock);
    expect((await Entry.findByPk(forged.id, { rejectOnEmpty: true })).detail).not.toMatchObject({ said: { headline: 'Made up.' } });
    const fresh = await buildBatch({ cellarId: keeper.cellarId });
    await expect(createEntry(keeper, fresh.id, overrule(), clock)).rejects.toBeInstanceOf(ConflictError);
  });
});
