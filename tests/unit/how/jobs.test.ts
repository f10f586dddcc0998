import { describe, expect, it } from 'vitest';
import { howOfJob } from '@/lib/core/how/jobs';
import { CALL_OF_KIND } from '@/lib/core/rounds/wanted';
import { JOB_KINDS } from '@/lib/contracts/jobs';

const EVIDENCE = [{ name: 'gas', value: 0.61, threshold: 0.45, unit: 'L/h' }];

describe('how a job came on the rounds', () => {
  it.each(Object.keys(CALL_OF_KIND))('%s: by the rule of its call, with the figures and the limits that it was held to', (kind) => {
    expect(howOfJob({ kind, source: 'call', evidence: EVIDENCE })?.inputs).toEqual([{ name: 'gas', value: 0.61, unit: 'L/h' }, { name: 'gas, limit', value: 0.45, unit: 'L/h' }]);
  });

  it.each(JOB_KINDS.filter((kind) => !(kind in CALL_OF_KIND) && kind !== 'other'))('%s: by a clock whose rule is told', (kind) => {
    const told = howOfJob({ kind, source: 'timer', evidence: null });
    expect(told?.formula.length).toBeGreaterThan(15);
    expect(told?.source.length).toBeGreaterThan(5);
  });

  it('nobody is told the rule of what they put down themselves', () => {
    expect(howOfJob({ kind: 'reading', source: 'person', evidence: null })).toBeNull();
  });
});
