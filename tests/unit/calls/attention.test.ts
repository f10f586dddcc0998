import { describe, expect, it } from 'vitest';
import { attentionOf, compareAttention, STATE_WORDS, stateOfCall, type Attention, type AttentionInput, type CallSketch, type OpenAlert } from '@/lib/core/calls/attention';
import { CALL_NAMES, NECKS, VERDICTS, type CallName } from '@/lib/core/types';

const HOUR = 3_600_000;
const NOW = Date.UTC(2026, 9, 15, 14, 32);

const quiet: CallSketch = { verdict: 'no', kind: null, since: null, expectedAt: null };

function batch(calls: Partial<Record<CallName, Partial<CallSketch>>> = {}, more: Partial<AttentionInput> = {}): AttentionInput {
  return {
    calls: Object.fromEntries(CALL_NAMES.map((name) => [name, { ...quiet, ...calls[name] }])) as AttentionInput['calls'],
    alerts: [],
    stage: 'slowing',
    neck: 'airlock',
    ended: false,
    ...more,
  };
}

const alert = (call: CallName, more: Partial<OpenAlert> = {}): OpenAlert => ({ call, level: 'check', taken: false, since: NOW - HOUR, ...more });

describe('the word of one call', () => {
  it.each([
    ['foam under an airlock', 'neck', 'hold', null, 'airlock', 'Now'],
    ['foam under an open neck', 'neck', 'hold', null, 'open', 'Now'],
    ['gas under a bung, which can break the glass', 'neck', 'hold', null, 'bung', 'Stop'],
    ['foam in a blow-off tube, which is made for it', 'neck', 'hold', null, 'blow_off', 'Leave be'],
    ['a tube that can make way', 'neck', 'yes', null, 'blow_off', 'Due'],
    ['an airlock that is on already', 'neck', 'yes', null, 'airlock', 'Leave be'],
    ['a start that is overdue', 'started', 'hold', null, 'airlock', 'Check'],
    ['a start that was seen', 'started', 'yes', null, 'airlock', 'Done'],
    ['a stall', 'stalled', 'yes', 'cold', 'airlock', 'Check'],
    ['a temperature outside its range', 'temperature', 'yes', 'low', 'airlock', 'Check'],
    ['a racking that may be done', 'rack', 'yes', null, 'airlock', 'Ready'],
    ['a racking that is still to come', 'rack', 'soon', null, 'airlock', 'Leave be'],
    ['a bottling that may be done', 'bottle', 'yes', null, 'airlock', 'Ready'],
    ['a batch thought finished that falls again', 'bottle', 'hold', 'refermentation', 'airlock', 'Now'],
    ['a bottling held back by a stall', 'bottle', 'hold', null, 'airlock', 'Leave be'],
    ['a silent sensor', 'sensor', 'yes', 'silent', 'airlock', 'Silent'],
    ['a float that is stuck', 'sensor', 'yes', 'frozen', 'airlock', 'Check'],
    ['a sensor that speaks', 'sensor', 'no', null, 'airlock', 'Leave be'],
  ] as const)('of %s', (_, name, verdict, kind, neck, word) => {
    expect(stateOfCall(name, { ...quiet, verdict, kind }, neck)).toBe(word);
  });

  it('of a swap that is coming needs a time to be due', () => {
    expect(stateOfCall('neck', { ...quiet, verdict: 'soon', expectedAt: NOW + HOUR }, 'blow_off')).toBe('Due');
    expect(stateOfCall('neck', { ...quiet, verdict: 'soon' }, 'blow_off')).toBe('Leave be');
  });

  it('is one of the nine for every call, verdict and neck', () => {
    for (const name of CALL_NAMES) for (const verdict of VERDICTS) for (const neck of NECKS) expect(STATE_WORDS).toContain(stateOfCall(name, { ...quiet, verdict }, neck));
  });

  it('never asks a person to act on a call that is unknown', () => {
    for (const name of CALL_NAMES) for (const neck of NECKS) expect(stateOfCall(name, { ...quiet, verdict: 'unknown' }, neck)).toBe('Leave be');
  });
});

describe('a lane', () => {
  it('with nothing to do is left be until the next thing is expected', () => {
    const soon = NOW + 30 * HOUR;
    expect(attentionOf(batch({ rack: { verdict: 'soon', expectedAt: soon } }))).toEqual({ state: 'Leave be', group: 'leave', call: 'rack', at: soon });
  });

  it('in its lag says how the start stands', () => {
    expect(attentionOf(batch({}, { stage: 'lag' })).call).toBe('started');
  });

  it('read by hand alone says how it goes, not that it has no sensor', () => {
    const byHand = { sensor: { verdict: 'unknown' as const } };
    expect(attentionOf(batch({ ...byHand, started: { verdict: 'unknown' } }, { stage: 'unknown' })).call).toBe('started');
    expect(attentionOf(batch({ ...byHand, started: { verdict: 'yes' } }, { stage: 'unknown' })).call).toBe('stalled');
    expect(attentionOf(batch({ ...byHand, started: { verdict: 'yes' }, stalled: { verdict: 'unknown' } })).call).toBe('stalled');
    expect(attentionOf(batch({ ...byHand, started: { verdict: 'yes' } }, { stage: 'unknown', neck: 'blow_off' })).call).toBe('neck');
  });

  it('that was racked says when it may be bottled', () => {
    expect(attentionOf(batch({ rack: { verdict: 'no', since: NOW - HOUR } }, { stage: 'terminal' })).call).toBe('bottle');
  });

  it('that foams into its tube says that the tube stays', () => {
    expect(attentionOf(batch({ neck: { verdict: 'hold' } }, { stage: 'peak', neck: 'blow_off' }))).toEqual({ state: 'Leave be', group: 'leave', call: 'neck', at: null });
  });

  it('lets the call that wants a person most speak', () => {
    const input = batch({ rack: { verdict: 'yes' }, sensor: { verdict: 'yes', kind: 'silent', since: NOW - HOUR }, stalled: { verdict: 'yes', kind: 'stuck', since: NOW - 5 * HOUR } });
    expect(attentionOf(input)).toEqual({ state: 'Check', group: 'now', call: 'stalled', at: NOW - 5 * HOUR });
  });

  it('goes in hand, out of the Now group, when somebody says they have it', () => {
    const calls = { stalled: { verdict: 'yes', kind: 'stuck', since: NOW - 5 * HOUR } } as const;
    expect(attentionOf(batch(calls, { alerts: [alert('stalled')] })).state).toBe('Check');
    expect(attentionOf(batch(calls, { alerts: [alert('stalled', { taken: true })] }))).toMatchObject({ state: 'In hand', group: 'next', call: 'stalled' });
  });

  it('stays in the Now group when only one of two troubles is in hand', () => {
    const input = batch({ stalled: { verdict: 'yes', kind: 'stuck' }, temperature: { verdict: 'yes', kind: 'low' } }, { alerts: [alert('temperature', { taken: true }), alert('stalled')] });
    expect(attentionOf(input)).toMatchObject({ state: 'Check', call: 'stalled' });
  });

  it('keeps wanting a person while an alert is open, though its call has just passed', () => {
    expect(attentionOf(batch({}, { alerts: [alert('temperature')] }))).toEqual({ state: 'Check', group: 'now', call: 'temperature', at: NOW - HOUR });
    expect(attentionOf(batch({}, { alerts: [alert('neck', { level: 'act' })] })).state).toBe('Now');
    expect(attentionOf(batch({}, { alerts: [alert('rack', { level: 'know' })] })).state).toBe('Ready');
  });

  it('of a batch that was closed is done, whatever its last judgement was', () => {
    expect(attentionOf(batch({ stalled: { verdict: 'yes', kind: 'stuck' } }, { ended: true, alerts: [alert('stalled')] }))).toMatchObject({ state: 'Done', group: 'leave' });
  });

  it('with a swap ahead is due at that time', () => {
    const at = NOW + 24 * HOUR;
    expect(attentionOf(batch({ neck: { verdict: 'soon', expectedAt: at } }, { neck: 'blow_off' }))).toEqual({ state: 'Due', group: 'next', call: 'neck', at });
  });

  it('ready for both racking and bottling says bottling', () => {
    expect(attentionOf(batch({ rack: { verdict: 'yes' }, bottle: { verdict: 'yes' } }, { stage: 'terminal' }))).toMatchObject({ state: 'Ready', call: 'bottle' });
  });
});

describe('the order of lanes', () => {
  const lane = (state: Attention['state'], at: number | null = null): Attention => ({ state, group: 'now', call: 'rack', at });

  it('is Stop, Now, Check, Silent, then in hand, due, ready, then the rest', () => {
    const mixed = (['Done', 'Ready', 'Silent', 'Stop', 'Leave be', 'Due', 'Check', 'In hand', 'Now'] as const).map((state) => lane(state));
    expect(mixed.sort(compareAttention).map((item) => item.state)).toEqual(['Stop', 'Now', 'Check', 'Silent', 'In hand', 'Due', 'Ready', 'Leave be', 'Done']);
  });

  it('puts the longest waiting and the first due ahead, and what has no time last', () => {
    const due = [lane('Due', null), lane('Due', 30), lane('Due', 10)];
    expect(due.sort(compareAttention).map((item) => item.at)).toEqual([10, 30, null]);
    expect(compareAttention(lane('Due'), lane('Due'))).toBe(0);
  });
});
