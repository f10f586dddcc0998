import { describe, expect, it } from 'vitest';
import { nothingDue, todaysJobs } from '@/components/shelf/jobs';
import type { JobBody } from '@/lib/contracts/jobs';
import { at, NOW } from './make';

const BATCH = { id: '00000000-0000-4000-8000-000000000001', name: 'Perry', tag: 4, place: null, vessel_kind: 'demijohn', drink_colour: 'straw', neck: 'airlock', volume_l: 4, vessel_l: 5 };
const job = (id: string, due: string, change: Partial<JobBody> = {}): JobBody => ({
  id,
  kind: 'reading',
  title: `Read Perry by hand (${id})`,
  note: null,
  source: 'person',
  evidence: null,
  state: 'open',
  due_at: at(due),
  exact: true,
  batch: BATCH,
  lot: null,
  taken_by: null,
  snoozed_until: null,
  done_at: null,
  done_by: null,
  repeat_days: null,
  created_by: null,
  ...change,
});
const ids = (jobs: readonly JobBody[], kept: ReadonlyMap<string, JobBody> = new Map()) => todaysJobs(jobs, kept, NOW, 'UTC').map((row) => row.job.id);

describe('today’s strip', () => {
  it('puts late ones first, then those nobody has, then by time', () => {
    const jobs = [
      job('evening', '2026-10-15T19:30Z'),
      job('taken', '2026-10-15T15:00Z', { taken_by: { id: BATCH.id, name: 'Ines Varga' } }),
      job('soon', '2026-10-15T14:54Z'),
      job('late', '2026-10-15T12:00Z'),
    ];
    expect(ids(jobs)).toEqual(['late', 'soon', 'evening', 'taken']);
    expect(todaysJobs(jobs, new Map(), NOW, 'UTC')[1]).toMatchObject({ late: false, time: '14:54', note: 'in 22 min' });
  });

  it('holds what falls due today, nothing of tomorrow, and nothing that may be done any day', () => {
    const jobs = [job('tonight', '2026-10-15T23:30Z'), job('tomorrow', '2026-10-16T00:30Z'), job('rack', '2026-10-10T12:00Z', { kind: 'rack', source: 'call', exact: false })];
    expect(ids(jobs)).toEqual(['tonight']);
  });

  it('late in the evening holds the first hours after midnight too: a clock of an hour stays in sight', () => {
    const late = Date.parse('2026-10-15T23:10Z') / 1000;
    const jobs = [job('second dose', '2026-10-16T00:10Z'), job('morning', '2026-10-16T09:00Z')];
    expect(todaysJobs(jobs, new Map(), late, 'UTC').map((row) => row.job.id)).toEqual(['second dose']);
    expect(nothingDue(jobs, late, 'UTC')).toBe('Nothing due today. Next: Fri 09:00.');
  });

  it('keeps a job in its place for as long as its tick can be taken back', () => {
    const [first, second] = [job('a', '2026-10-15T13:00Z'), job('b', '2026-10-15T13:30Z')];
    expect(ids([second], new Map([['a', first]]))).toEqual(['a', 'b']);
  });

  it('says on an empty day when the next one comes', () => {
    expect(nothingDue([job('a', '2026-10-16T14:00Z')], NOW, 'UTC')).toBe('Nothing due today. Next: Fri 14:00.');
    expect(nothingDue([job('a', '2026-10-15T12:00Z')], NOW, 'UTC')).toBe('Nothing due today.');
  });
});
