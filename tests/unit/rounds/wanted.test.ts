import { describe, expect, it } from 'vitest';
import { wantedJobs, type RoundsInput } from '@/lib/core/rounds/wanted';
import { CALL_NAMES, type Call, type CallName } from '@/lib/core/types';

const HOUR = 3_600_000;
const DAY = 24 * HOUR;
const AT = Date.UTC(2026, 2, 4, 12);
const quiet: Call = { verdict: 'no', kind: null, since: null, expectedAt: null, headline: '', reason: '', act: null, changesIt: null, evidence: [] };

const input = (calls: Partial<Record<CallName, Partial<Call>>> = {}, over: Partial<RoundsInput> = {}): RoundsInput => ({
  name: 'Perry', neck: 'blow_off', stage: 'slowing', pitchedAt: AT - 5 * DAY, parted: null, floatAt: AT, readAt: null, airlockAt: null, feed: null, clearing: false, at: AT,
  calls: Object.fromEntries(CALL_NAMES.map((name) => [name, { ...quiet, ...calls[name] }])) as Record<CallName, Call>,
  ...over,
});
const titles = (...args: Parameters<typeof input>) => wantedJobs(input(...args)).map((job) => job.title);

describe('the jobs a batch wants', () => {
  it('are none while it works by itself under a sensor', () => {
    expect(titles()).toEqual([]);
  });

  it('say what to do about a neck, and when', () => {
    expect(titles({ neck: { verdict: 'hold', since: AT } }, { neck: 'airlock' })).toEqual(['Put the tube on Perry']);
    expect(titles({ neck: { verdict: 'hold', since: AT } }, { neck: 'bung' })).toEqual(['Take the bung out of Perry']);
    // A tube is made for foam.
    expect(titles({ neck: { verdict: 'hold', since: AT } })).toEqual([]);
    expect(wantedJobs(input({ neck: { verdict: 'soon', expectedAt: AT + DAY } }))).toMatchObject([{ title: 'Swap the tube on Perry for an airlock', dueAt: AT + DAY, exact: false }]);
    expect(titles({ neck: { verdict: 'soon' } })).toEqual([]);
  });

  it('warm and cool while it works, and not when it is finished', () => {
    expect(titles({ temperature: { verdict: 'yes', kind: 'low' } })).toEqual(['Warm Perry']);
    expect(titles({ temperature: { verdict: 'yes', kind: 'high' } })).toEqual(['Cool Perry']);
    expect(titles({ temperature: { verdict: 'yes', kind: 'high' } }, { stage: 'terminal' })).toEqual([]);
  });

  it('have what was split off or blended read within a day of it, not late since a pitch of old', () => {
    const old = { pitchedAt: AT - 40 * DAY, floatAt: null, stage: 'terminal' as const };
    expect(wantedJobs(input({}, { ...old, parted: AT - HOUR }))).toMatchObject([{ kind: 'reading', dueAt: AT + 23 * HOUR }]);
    // Once it was read it is a batch like any other.
    expect(wantedJobs(input({}, { ...old, parted: AT - 9 * DAY, readAt: AT - 8 * DAY }))).toMatchObject([{ kind: 'reading', dueAt: AT - DAY }]);
    expect(titles({}, { ...old, parted: AT - 2 * DAY, readAt: AT - DAY })).toEqual([]);
  });

  it('never say to bottle what works again', () => {
    expect(titles({ bottle: { verdict: 'hold', kind: 'refermentation' } })).toEqual(['Perry works again: keep it under an airlock']);
    expect(titles({ bottle: { verdict: 'yes' } })).toEqual(['Bottle Perry']);
    expect(titles({ bottle: { verdict: 'soon', expectedAt: AT } })).toEqual([]);
  });

  it('say bottle or rack, not both, and neither while a fining falls', () => {
    expect(titles({ rack: { verdict: 'yes' } })).toEqual(['Rack Perry']);
    expect(titles({ rack: { verdict: 'yes' }, bottle: { verdict: 'yes' } })).toEqual(['Bottle Perry']);
    expect(titles({ rack: { verdict: 'yes' }, bottle: { verdict: 'yes' } }, { clearing: true })).toEqual([]);
    expect(titles({ rack: { verdict: 'yes' } }, { clearing: true })).toEqual([]);
    // That it works again is told at any time.
    expect(titles({ bottle: { verdict: 'hold', kind: 'refermentation' } }, { clearing: true })).toHaveLength(1);
  });

  it('ask for a reading by hand only where no sensor was heard for a day, and a day before it is due', () => {
    const silent = { floatAt: null } as const;
    expect(titles({}, { ...silent, readAt: AT - 1.9 * DAY })).toEqual([]);
    expect(wantedJobs(input({}, { ...silent, readAt: AT - 2.5 * DAY }))).toMatchObject([{ kind: 'reading', dueAt: AT + 0.5 * DAY }]);
    expect(titles({}, { floatAt: AT - 0.9 * DAY })).toEqual([]);
    // A finished batch is read once a week.
    expect(titles({}, { ...silent, stage: 'terminal', pitchedAt: AT - 30 * DAY, readAt: AT - 5 * DAY })).toEqual([]);
    expect(titles({}, { ...silent, stage: 'terminal', pitchedAt: AT - 30 * DAY, readAt: AT - 6.5 * DAY })).toEqual(['Read Perry by hand']);
    expect(titles({}, { ...silent, pitchedAt: null })).toEqual([]);
  });

  it('look after the water of an airlock, a fortnight after somebody did', () => {
    expect(titles({}, { neck: 'airlock', pitchedAt: AT - 20 * DAY, airlockAt: AT - 10 * DAY })).toEqual([]);
    expect(titles({}, { neck: 'airlock', pitchedAt: AT - 20 * DAY, airlockAt: AT - 13.5 * DAY })).toEqual(['Look at the water in Perry’s airlock']);
    expect(wantedJobs(input({}, { neck: 'airlock', pitchedAt: AT - 16 * DAY }))).toMatchObject([{ dueAt: AT - 2 * DAY }]);
    // After months without a word it is late since the last fortnight, not since the first.
    expect(wantedJobs(input({}, { neck: 'airlock', pitchedAt: AT - 87 * DAY }))).toMatchObject([{ dueAt: AT - 3 * DAY }]);
  });

  it('are at most one of a kind and the same for the same judgement', () => {
    const all = input({ started: { verdict: 'hold' }, stalled: { verdict: 'yes' }, sensor: { verdict: 'yes', kind: 'drifting' }, rack: { verdict: 'yes' }, bottle: { verdict: 'yes' }, temperature: { verdict: 'hold' } }, { neck: 'airlock', floatAt: null });
    const jobs = wantedJobs(all);
    expect(new Set(jobs.map((job) => job.kind)).size).toBe(jobs.length);
    expect(wantedJobs(all)).toEqual(jobs);
  });
});
