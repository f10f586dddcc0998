import { describe, expect, it } from 'vitest';
import { countdown, rowOf, walk } from '@/components/rounds/rows';
import type { JobBody } from '@/lib/contracts/jobs';

const NOW = Date.parse('2026-10-15T14:32:00Z') / 1000;

function job(id: string, change: Partial<JobBody> & { place?: string | null; tag?: number | null } = {}): JobBody {
  const { place = 'back row', tag = 1, ...rest } = change;
  return {
    id,
    kind: 'other',
    title: id,
    note: null,
    source: 'person',
    evidence: null,
    state: 'open',
    due_at: '2026-10-15T12:00:00Z',
    exact: false,
    batch: { id: `batch ${id}`, name: id, tag, place, vessel_kind: 'demijohn', drink_colour: 'gold', neck: 'airlock', volume_l: 4, vessel_l: 5 },
    lot: null,
    taken_by: null,
    snoozed_until: null,
    done_at: null,
    done_by: null,
    repeat_days: null,
    created_by: null,
    ...rest,
  };
}

describe('the rounds', () => {
  it('go place by place and by the tag within one; what stands nowhere comes last', () => {
    const stops = walk([job('d', { place: null }), job('c', { place: 'shed' }), job('b', { tag: 4 }), job('a', { tag: 2 })], NOW, 'UTC');
    expect(stops.map((stop) => stop.rows.map((row) => row.job.id))).toEqual([['a', 'b'], ['c'], ['d']]);
  });

  it('call late what was due on an earlier day, or at an hour that has passed', () => {
    expect(rowOf(job('day'), NOW, 'UTC').late).toBe(false);
    expect(rowOf(job('day', { due_at: '2026-10-14T23:00:00Z' }), NOW, 'UTC').late).toBe(true);
    expect(rowOf(job('hour', { exact: true }), NOW, 'UTC')).toMatchObject({ late: true, time: 'late' });
  });

  it('never call a drink late that may wait', () => {
    expect(rowOf(job('rack', { kind: 'rack', source: 'call', due_at: '2026-09-01T12:00:00Z' }), NOW, 'UTC')).toMatchObject({ late: false, time: 'any day' });
  });

  it('run a clock down to the second, and past it', () => {
    expect(countdown(2527)).toBe('42:07');
    expect(countdown(-190)).toBe('−3:10');
    expect(rowOf(job('dose', { exact: true, due_at: '2026-10-15T15:00:00Z' }), NOW, 'UTC').left).toBe(28 * 60);
  });
});
