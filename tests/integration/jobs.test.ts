import { describe, expect, it } from 'vitest';
import { Alert, Batch, Entry, FiningRun, Job, Membership, OutboxMail } from '@/db/models';
import { inTransaction } from '@/db/client';
import { batchState } from '@/db/queries/batch-states';
import type { AssessmentBody } from '@/lib/contracts/assessment';
import { createEntry as entryForm } from '@/lib/contracts/batches';
import { finingForm, secondDoseForm } from '@/lib/contracts/family';
import { createJob as jobForm, jobQuery } from '@/lib/contracts/jobs';
import { CALL_NAMES, type Assessment, type Call, type CallName } from '@/lib/core/types';
import type { Actor } from '@/lib/auth/policies';
import { ConflictError, ForbiddenError, InvalidError, NotFoundError } from '@/lib/errors';
import { endCalendar, getCalendar, makeCalendar } from '@/lib/services/calendar/own';
import { readCalendar } from '@/lib/services/calendar/read';
import { assessBatch } from '@/lib/services/batches/assess';
import { createEntry } from '@/lib/services/entries/create';
import { listFinings } from '@/lib/services/finings/list';
import { secondDose } from '@/lib/services/finings/second';
import { startFining } from '@/lib/services/finings/start';
import { dropJob, snoozeJob, updateJob } from '@/lib/services/jobs/change';
import { createJob } from '@/lib/services/jobs/create';
import { doJob, undoJob } from '@/lib/services/jobs/done';
import { jobsFromCalls } from '@/lib/services/jobs/from-calls';
import { listJobs } from '@/lib/services/jobs/list';
import { takeJob } from '@/lib/services/jobs/take';
import { clockAt, ciderAt, DAY, HOUR, isoAt, NOON } from '../support/cellar';
import { useDatabase } from '../support/database';
import { buildBatch, buildMember } from '../support/factories';

useDatabase();

const MINUTE = 60_000;
const open = jobQuery.parse({});
const quiet: Call = { verdict: 'no', kind: null, since: null, expectedAt: null, headline: '', reason: '', act: null, changesIt: null, evidence: [] };

const judged = (calls: Partial<Record<CallName, Partial<Call>>>, over: Partial<Assessment> = {}): Assessment => ({
  at: NOON, stage: 'slowing', gravity: null, lastGravity: null, temperatureC: null, lastReadingAt: NOON, ratePointsPerDay: null, gasLPerH: null, finalGravity: null, terminalAt: null, abvPercent: null, expectedAbvPercent: null, attenuationPercent: null,
  calls: Object.fromEntries(CALL_NAMES.map((name) => [name, { ...quiet, ...calls[name] }])) as Assessment['calls'],
  ...over,
});

const sync = (batch: Batch, assessment: Assessment | null, at = NOON) => inTransaction(async (transaction) => jobsFromCalls(batch, assessment, await Entry.findAll({ where: { batchId: batch.id }, transaction }), at, transaction));
const titles = async (actor: Actor, at = NOON) => (await listJobs(actor, open, clockAt(at))).items.map((job) => job.title);
const RACK = { rack: { verdict: 'yes', since: NOON - HOUR, reason: 'It lies on its bed.', act: 'Rack it.' } } as const;

describe('the program’s jobs', () => {
  it('come from the calls, one an occasion however often it is judged, and leave when the reason is gone for good', async () => {
    const hand = await buildMember('hand');
    const batch = await buildBatch({ cellarId: hand.cellarId, name: 'Perry', pitchedAt: new Date(NOON - 5 * DAY), neck: 'blow_off' });
    for (let i = 0; i < 4; i += 1) await sync(batch, judged(RACK), NOON + i * MINUTE);
    expect(await titles(hand)).toEqual(['Rack Perry']);
    // A call that flickers keeps its job; one that is gone for hours does not.
    await sync(batch, judged({}), NOON + 5 * MINUTE);
    expect(await titles(hand)).toEqual(['Rack Perry']);
    await sync(batch, judged({}), NOON + 4 * HOUR);
    expect(await titles(hand)).toEqual([]);
    await sync(batch, judged(RACK), NOON + 5 * HOUR);
    expect(await titles(hand)).toEqual(['Rack Perry']);
    await sync(batch, null, NOON + 6 * HOUR);
    expect(await titles(hand)).toEqual([]);
  });

  it('leave at once when a reading was logged that refutes their call', async () => {
    const hand = await buildMember('hand');
    const batch = await buildBatch({ cellarId: hand.cellarId, name: 'Perry', pitchedAt: new Date(NOON - 5 * DAY), neck: 'blow_off' });
    await sync(batch, judged({ started: { verdict: 'hold', kind: 'overdue', since: NOON - HOUR } }));
    expect(await titles(hand)).toEqual(['Look at Perry: it should work by now']);
    await Entry.create({ cellarId: hand.cellarId, batchId: batch.id, kind: 'note', at: new Date(NOON), text: 'Cold in here.', createdAt: new Date(NOON + MINUTE) });
    await sync(batch, judged({}), NOON + 2 * MINUTE);
    expect(await titles(hand)).toHaveLength(1);
    await Entry.create({ cellarId: hand.cellarId, batchId: batch.id, kind: 'reading', at: new Date(NOON - HOUR), gravity: 1.03, createdAt: new Date(NOON + 3 * MINUTE) });
    await sync(batch, judged({}), NOON + 4 * MINUTE);
    expect(await titles(hand)).toEqual([]);
  });

  it('bring what their call was held to, as it was last judged, and nothing of another call', async () => {
    const brewer = await buildMember('brewer');
    const batch = await ciderAt(brewer, { now: Date.now(), readDaysAgo: [30, 20, 12, 9, 5, 1] });
    await assessBatch(batch.id);
    const kept = (await batchState<AssessmentBody>(batch.id))!.assessment;
    const bottle = (await listJobs(brewer, open)).items.find((job) => job.kind === 'bottle');
    expect(bottle?.evidence?.length).toBeGreaterThan(0);
    expect(bottle?.evidence).toEqual(kept.calls.bottle.evidence);
    await createJob(brewer, jobForm.parse({ title: 'Rack it', kind: 'rack', batch_id: batch.id, due_at: isoAt(NOON) }));
    expect((await listJobs(brewer, open)).items.find((job) => job.title === 'Rack it')?.evidence).toBeNull();
  });

  it('leave rack and bottle aside until a fining has settled', async () => {
    const brewer = await buildMember('brewer');
    const batch = await ciderAt(brewer, { batch: { neck: 'blow_off' } });
    await startFining(brewer, batch.id, finingForm.parse({ at: isoAt(NOON - HOUR), fining: 'bentonite', settle_days: 5 }), clockAt(NOON));
    await sync(batch, judged({ ...RACK, bottle: { verdict: 'yes', since: NOON } }));
    expect(await titles(brewer)).toEqual([`See whether ${batch.name} is bright`]);
    await sync(batch, judged(RACK), NOON + 5 * DAY);
    expect(await titles(brewer, NOON + 5 * DAY)).toContain(`Rack ${batch.name}`);
  });

  it('are not asked again once they were ticked, until their reason was gone', async () => {
    const hand = await buildMember('hand');
    const batch = await buildBatch({ cellarId: hand.cellarId, name: 'Perry', pitchedAt: new Date(NOON - 5 * DAY), neck: 'blow_off' });
    await sync(batch, judged(RACK));
    const [job] = (await listJobs(hand, open, clockAt())).items;
    await doJob(hand, job!.id, null, clockAt());
    await sync(batch, judged(RACK), NOON + HOUR);
    expect(await titles(hand)).toEqual([]);
    await sync(batch, judged({}), NOON + 2 * HOUR);
    await sync(batch, judged(RACK), NOON + DAY);
    expect(await titles(hand)).toEqual(['Rack Perry']);
  });

  it('ask for a reading by hand where no sensor tells, and are answered by it', async () => {
    const hand = await buildMember('hand');
    const batch = await ciderAt(hand, { readDaysAgo: [4] });
    await sync(batch, judged({}, { lastReadingAt: null }));
    expect(await titles(hand)).toContain('Read Orchard cider by hand');
    await createEntry(hand, batch.id, entryForm.parse({ kind: 'reading', at: isoAt(NOON), gravity: 1.002 }), clockAt());
    expect(await titles(hand)).not.toContain('Read Orchard cider by hand');
    await sync(batch, judged({}, { lastReadingAt: null }), NOON + HOUR);
    expect(await titles(hand)).not.toContain('Read Orchard cider by hand');
    await sync(batch, judged({}, { lastReadingAt: null }), NOON + 4 * DAY);
    expect(await titles(hand)).toContain('Read Orchard cider by hand');
  });

  it('look after the water in an airlock every fortnight', async () => {
    const hand = await buildMember('hand');
    const batch = await buildBatch({ cellarId: hand.cellarId, name: 'Perry', pitchedAt: new Date(NOON - 14 * DAY), neck: 'airlock' });
    await sync(batch, judged({}));
    const [job] = (await listJobs(hand, open, clockAt())).items;
    expect(job).toMatchObject({ kind: 'airlock', source: 'schedule' });
    await doJob(hand, job!.id, null, clockAt());
    await sync(batch, judged({}), NOON + HOUR);
    expect(await titles(hand)).toEqual([]);
    await sync(batch, judged({}, { lastReadingAt: NOON + 14 * DAY }), NOON + 14 * DAY);
    expect(await titles(hand)).toHaveLength(1);
  });

  it('go with their alert: whoever takes the one has the other', async () => {
    const hand = await buildMember('hand');
    const batch = await buildBatch({ cellarId: hand.cellarId, name: 'Perry', pitchedAt: new Date(NOON - 5 * DAY), neck: 'blow_off' });
    const cold = { stalled: { verdict: 'yes', kind: 'cold', since: NOON } } as const;
    const alert = await Alert.create({ cellarId: hand.cellarId, batchId: batch.id, call: 'stalled', kind: 'cold', level: 'check', state: 'open', since: new Date(NOON), openedAt: new Date(NOON), evidence: quiet });
    await sync(batch, judged(cold));
    const [job] = (await listJobs(hand, open, clockAt())).items;
    expect(await takeJob(hand, job!.id, true, clockAt())).toMatchObject({ taken_by: { id: hand.personId } });
    expect(await Alert.findByPk(alert.id)).toMatchObject({ state: 'acknowledged', acknowledgedBy: hand.personId, acknowledgedAt: new Date(NOON) });
    expect(await takeJob(hand, job!.id, false, clockAt())).toMatchObject({ taken_by: null });
    await sync(batch, judged(cold), NOON + HOUR);
    expect((await listJobs(hand, open, clockAt())).items[0]).toMatchObject({ taken_by: { id: hand.personId } });
  });

  it('keep the program’s words, and are dropped only by a brewer', async () => {
    const brewer = await buildMember('brewer');
    const hand = await buildMember('hand', { cellarId: brewer.cellarId });
    const batch = await buildBatch({ cellarId: brewer.cellarId, name: 'Perry', pitchedAt: new Date(NOON - DAY), neck: 'blow_off' });
    await sync(batch, judged(RACK));
    const [job] = (await listJobs(hand, open, clockAt())).items;
    await expect(updateJob(brewer, job!.id, { title: 'x' })).rejects.toBeInstanceOf(ConflictError);
    await expect(dropJob(hand, job!.id, clockAt())).rejects.toBeInstanceOf(ForbiddenError);
    await dropJob(brewer, job!.id, clockAt());
    await sync(batch, judged(RACK), NOON + HOUR);
    expect(await titles(hand)).toEqual([]);
  });
});

describe('a tick', () => {
  it('can be taken back for ten seconds by who made it, and a repeating job comes again once', async () => {
    const hand = await buildMember('hand');
    const other = await buildMember('hand', { cellarId: hand.cellarId });
    const job = await createJob(hand, jobForm.parse({ title: 'Top up the airlocks', due_at: isoAt(NOON), repeat_days: 7 }));
    const clock = clockAt();
    await doJob(hand, job.id, null, clock);
    await doJob(hand, job.id, null, clock);
    expect((await listJobs(hand, open, clock)).items.map((item) => item.due_at)).toEqual([isoAt(NOON + 7 * DAY)]);
    clock.advance(9_000);
    await expect(undoJob(other, job.id, clock)).rejects.toBeInstanceOf(ForbiddenError);
    await undoJob(hand, job.id, clock);
    expect((await listJobs(hand, open, clock)).items.map((item) => item.id)).toEqual([job.id]);
    await doJob(hand, job.id, null, clock);
    clock.advance(20_000);
    await expect(undoJob(hand, job.id, clock)).rejects.toBeInstanceOf(ConflictError);
  });

  it('that waited for the network counts from when it was made, never from before the job or after now', async () => {
    const hand = await buildMember('hand');
    const clock = clockAt(NOON + 3 * HOUR);
    const tickedAt = async (at: number) => {
      const job = await createJob(hand, jobForm.parse({ title: 'Top up the airlocks', due_at: isoAt(NOON + HOUR), repeat_days: 7 }));
      await Job.update({ createdAt: new Date(NOON) }, { where: { id: job.id } });
      return (await doJob(hand, job.id, isoAt(at), clock)).done_at;
    };
    expect(await tickedAt(NOON + 2 * HOUR)).toBe(isoAt(NOON + 2 * HOUR));
    expect(await tickedAt(NOON - DAY)).toBe(isoAt(NOON));
    expect(await tickedAt(NOON + 9 * DAY)).toBe(isoAt(NOON + 3 * HOUR));
    // Each comes again a week after it was done.
    expect((await listJobs(hand, open, clock)).items.map((item) => item.due_at)).toEqual([isoAt(NOON + HOUR + 7 * DAY), isoAt(NOON + 2 * HOUR + 7 * DAY), isoAt(NOON + 3 * HOUR + 7 * DAY)]);
  });

  it('is snoozed into the future only', async () => {
    const hand = await buildMember('hand');
    const job = await createJob(hand, jobForm.parse({ title: 'Look at the lees', due_at: isoAt(NOON) }));
    await expect(snoozeJob(hand, job.id, isoAt(NOON - HOUR), clockAt())).rejects.toBeInstanceOf(InvalidError);
    expect(await snoozeJob(hand, job.id, isoAt(NOON + HOUR), clockAt())).toMatchObject({ due_at: isoAt(NOON + HOUR), snoozed_until: isoAt(NOON + HOUR) });
  });

  it('is of one cellar', async () => {
    const [mine, theirs] = [await buildMember('hand'), await buildMember('hand')];
    const job = await createJob(theirs, jobForm.parse({ title: 'Theirs', due_at: isoAt(NOON) }));
    const attempts = [() => doJob(mine, job.id), () => undoJob(mine, job.id), () => takeJob(mine, job.id, true), () => snoozeJob(mine, job.id, isoAt(Date.now() + DAY)), () => dropJob(mine, job.id)];
    for (const attempt of attempts) await expect(attempt()).rejects.toBeInstanceOf(NotFoundError);
    await expect(createJob(mine, jobForm.parse({ title: 'x', due_at: isoAt(NOON), batch_id: (await buildBatch()).id }))).rejects.toBeInstanceOf(NotFoundError);
    expect(await titles(mine)).toEqual([]);
  });
});

describe('finings in two doses', () => {
  it('put the second dose on the rounds to the minute; ticking it logs it and begins the wait, and taking the tick back undoes both', async () => {
    const brewer = await buildMember('brewer');
    const hand = await buildMember('hand', { cellarId: brewer.cellarId });
    const batch = await ciderAt(brewer);
    const clock = clockAt();
    const form = finingForm.parse({ at: isoAt(NOON), fining: 'two-part', dose: 'a teaspoon', client_id: crypto.randomUUID() });
    const run = await startFining(brewer, batch.id, form, clock);
    expect((await startFining(brewer, batch.id, form, clock)).id).toBe(run.id);
    // Common practice: an hour apart.
    expect(run).toMatchObject({ state: 'waiting_for_second', due_at: isoAt(NOON + HOUR), parts: ['silica sol', 'gelatine or chitosan'] });
    clock.advance(HOUR + 4 * MINUTE);
    const [timer] = (await listJobs(hand, open, clock)).items;
    expect(timer).toMatchObject({ kind: 'fining_b', exact: true, due_at: isoAt(NOON + HOUR) });
    expect((await listFinings(hand, batch.id, clock)).items[0]).toMatchObject({ state: 'second_due', late_min: 4 });
    await doJob(hand, timer!.id, null, clock);
    const doses = () => Entry.count({ where: { batchId: batch.id, kind: 'fining', removedAt: null } });
    expect(await doses()).toBe(2);
    expect((await listJobs(hand, open, clock)).items).toMatchObject([{ kind: 'settle', due_at: isoAt(clock.now() + 5 * DAY) }]);
    await undoJob(hand, timer!.id, clock);
    expect(await doses()).toBe(1);
    expect((await listJobs(hand, open, clock)).items).toMatchObject([{ kind: 'fining_b' }]);
    await secondDose(hand, run.id, secondDoseForm.parse({ at: isoAt(clock.now()) }), clock);
    await secondDose(hand, run.id, secondDoseForm.parse({ at: isoAt(clock.now()) }), clock);
    expect(await doses()).toBe(2);
    expect(await Job.count({ where: { finingId: run.id, kind: 'settle' } })).toBe(1);
    expect((await FiningRun.findByPk(run.id))?.secondAt).not.toBeNull();
  });

  it('take their clock off the rounds when the batch is over, and do not ring', async () => {
    const brewer = await buildMember('brewer');
    const batch = await ciderAt(brewer);
    await startFining(brewer, batch.id, finingForm.parse({ at: isoAt(NOON), fining: 'two-part' }), clockAt());
    expect(await OutboxMail.count({ where: { cellarId: brewer.cellarId } })).toBe(1);
    await sync(batch, judged({}), NOON + MINUTE);
    const clocks = async () => (await listJobs(brewer, open, clockAt())).items.filter((job) => job.kind === 'fining_b').length;
    expect(await clocks()).toBe(1);
    await sync(batch, null, NOON + 2 * MINUTE);
    expect(await clocks()).toBe(0);
    expect(await OutboxMail.count({ where: { cellarId: brewer.cellarId } })).toBe(0);
  });

  it('of one dose begin their wait at once', async () => {
    const brewer = await buildMember('brewer');
    const batch = await ciderAt(brewer);
    expect(await startFining(brewer, batch.id, finingForm.parse({ at: isoAt(NOON), fining: 'bentonite', settle_days: 6 }), clockAt())).toMatchObject({ state: 'settling', bright_from: isoAt(NOON + 6 * DAY) });
    await expect(startFining(brewer, batch.id, finingForm.parse({ at: isoAt(NOON), fining: 'magic' }), clockAt())).rejects.toBeInstanceOf(InvalidError);
  });
});

describe('the calendar', () => {
  const tokenOf = (url: string | null) => /calendars\/([^/]+)\/rounds\.ics$/.exec(url ?? '')![1]!;

  it('has a private address that opens by itself, until it is made anew, taken back, or its person leaves', async () => {
    const hand = await buildMember('hand');
    const batch = await buildBatch({ cellarId: hand.cellarId, name: 'Perry', tag: 3, place: 'shed' });
    await createJob(hand, jobForm.parse({ title: 'Rack; taste, smell', due_at: isoAt(NOON + 2 * DAY), batch_id: batch.id }));
    await createJob(hand, jobForm.parse({ title: 'Second dose', due_at: isoAt(NOON + HOUR), exact: true }));
    expect(await getCalendar(hand)).toMatchObject({ url: null });
    const first = tokenOf((await makeCalendar(hand, clockAt())).url);
    expect(tokenOf((await getCalendar(hand)).url)).toBe(first);
    const text = await readCalendar(first, clockAt());
    expect(text).toMatch(/^BEGIN:VCALENDAR\r\n/);
    expect(text).toContain('SUMMARY:Rack\\; taste\\, smell');
    expect(text).toContain('DTSTART;VALUE=DATE:20260306');
    expect(text).toContain('DTSTART:20260304T130000Z');
    expect(text.match(/BEGIN:VALARM/g)).toHaveLength(1);
    const second = tokenOf((await makeCalendar(hand, clockAt())).url);
    expect(second).not.toBe(first);
    await expect(readCalendar(first, clockAt())).rejects.toBeInstanceOf(NotFoundError);
    await endCalendar(hand, clockAt());
    await expect(readCalendar(second, clockAt())).rejects.toBeInstanceOf(NotFoundError);
    const third = tokenOf((await makeCalendar(hand, clockAt())).url);
    await Membership.update({ role: 'guest' }, { where: { personId: hand.personId } });
    await expect(readCalendar(third, clockAt())).rejects.toBeInstanceOf(NotFoundError);
    await Membership.destroy({ where: { personId: hand.personId } });
    await expect(readCalendar(third, clockAt())).rejects.toBeInstanceOf(NotFoundError);
    await expect(readCalendar('A'.repeat(32), clockAt())).rejects.toBeInstanceOf(NotFoundError);
  });
});
