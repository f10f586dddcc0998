import { describe, expect, it } from 'vitest';
import { lookAt, type LookContext } from '@/lib/core/alerts/look';
import { ALERT_RULES, ruleNamed, type RuleName, ruleWords } from '@/lib/core/alerts/rules';
import type { BatchEvent } from '@/lib/core/types';
import { assessmentWith, callWith } from './assessments';

const NOW = Date.UTC(2026, 2, 4, 6);
const HOUR = 3_600_000;
const usual: LookContext = { neck: 'airlock', events: [], silenceCounts: true };
const look = (rule: RuleName, assessment: Parameters<typeof assessmentWith>[1], context: Partial<LookContext> = {}) => lookAt(ruleNamed(rule), assessmentWith(NOW, assessment), { ...usual, ...context }, NOW);

describe('what a judgement says about a rule', () => {
  it('is true with the time from which the call holds', () => {
    expect(look('stalled', { calls: { stalled: callWith('yes', { kind: 'cold', since: NOW - 5 * HOUR }) } })).toEqual({ type: 'true', since: NOW - 5 * HOUR });
  });

  it.each<[RuleName, Parameters<typeof callWith>]>([
    ['overdue', ['hold']],
    ['foam', ['hold']],
    ['stalled', ['yes', { kind: 'sluggish' }]],
    ['temperature', ['yes', { kind: 'high' }]],
    ['sensor', ['yes', { kind: 'frozen' }]],
    ['rack', ['yes']],
    ['bottle', ['yes']],
    ['refermentation', ['hold', { kind: 'refermentation' }]],
  ])('knows the verdict of %s', (rule, call) => {
    const name = ruleNamed(rule).call;
    expect(look(rule, { calls: { [name]: callWith(...call) } }).type).toBe('true');
    expect(look(rule, { calls: { [name]: callWith('no') } }).type).toBe('false');
    expect(look(rule, { calls: { [name]: callWith('soon') } }).type).toBe('false');
  });

  it('says nothing where the call does not know', () => {
    for (const rule of ALERT_RULES.filter((item) => item.name !== 'neck')) expect(look(rule.name, { calls: { [rule.call]: callWith('unknown') } })).toEqual({ type: 'silence' });
  });

  it('says nothing about now from old data: a backlog of last month raises no alarm', () => {
    for (const rule of ALERT_RULES.filter((item) => item.freshMs !== null && item.name !== 'neck')) {
      const call = callWith(rule.verdicts[0]!, { kind: rule.kinds?.[0] ?? null, since: NOW - 40 * 24 * HOUR });
      expect(look(rule.name, { lastReadingAt: NOW - 30 * 24 * HOUR, calls: { [rule.call]: call } })).toEqual({ type: 'silence' });
      expect(look(rule.name, { lastReadingAt: null, calls: { [rule.call]: call } })).toEqual({ type: 'silence' });
      expect(look(rule.name, { lastReadingAt: NOW - HOUR, calls: { [rule.call]: call } }).type).toBe('true');
    }
  });

  it('does not blame a sensor for a silence of the house', () => {
    const calls = { sensor: callWith('yes', { kind: 'silent', since: NOW - 9 * HOUR }) };
    expect(look('sensor', { calls }, { silenceCounts: false })).toEqual({ type: 'silence' });
    expect(look('sensor', { calls }).type).toBe('true');
    expect(look('sensor', { calls: { sensor: callWith('yes', { kind: 'frozen' }) } }, { silenceCounts: false }).type).toBe('true');
  });

  it('speaks of foam only where a neck can be blocked', () => {
    const calls = { neck: callWith('hold') };
    expect(look('foam', { calls }, { neck: 'airlock' }).type).toBe('true');
    expect(look('foam', { calls }, { neck: 'bung' }).type).toBe('true');
    expect(look('foam', { calls }, { neck: 'blow_off' })).toEqual({ type: 'gone' });
    expect(look('foam', { calls }, { neck: 'open' })).toEqual({ type: 'gone' });
  });

  it('asks for the airlock only while the tube is on, and is done when it was swapped', () => {
    const calls = { neck: callWith('yes', { since: NOW - HOUR }) };
    expect(look('neck', { calls }, { neck: 'blow_off' })).toEqual({ type: 'true', since: NOW - HOUR });
    expect(look('neck', { calls }, { neck: 'airlock' })).toEqual({ type: 'gone' });
  });

  it('is done with racking once one is logged, and not by one of long before', () => {
    const calls = { rack: callWith('yes', { since: NOW - 24 * HOUR }) };
    const racked = (at: number): BatchEvent[] => [{ at, kind: 'rack' }];
    expect(look('rack', { calls }, { events: racked(NOW - HOUR) })).toEqual({ type: 'gone' });
    expect(look('rack', { calls }, { events: racked(NOW - 48 * HOUR) })).toEqual({ type: 'gone' });
    expect(look('rack', { calls }, { events: racked(NOW - 20 * 24 * HOUR) }).type).toBe('true');
    expect(look('rack', { calls }, { events: [{ at: NOW - HOUR, kind: 'note' }] }).type).toBe('true');
  });

  it('does not tell of racking beside bottling: one vessel, one alert', () => {
    const rack = callWith('yes', { since: NOW - 24 * HOUR });
    expect(look('rack', { calls: { rack, bottle: callWith('yes') } })).toEqual({ type: 'gone' });
    for (const verdict of ['no', 'soon', 'unknown'] as const) expect(look('rack', { calls: { rack, bottle: callWith(verdict) } }).type).toBe('true');
  });

  it('lets a finished batch stand cold and a must wait hot', () => {
    const calls = { temperature: callWith('yes', { kind: 'low' }) };
    expect(look('temperature', { stage: 'terminal', calls })).toEqual({ type: 'gone' });
    expect(look('temperature', { stage: 'not_started', calls })).toEqual({ type: 'gone' });
    expect(look('temperature', { stage: 'lag', calls }).type).toBe('true');
  });

  it('does not call it ready to bottle while it ferments again', () => {
    const calls = { bottle: callWith('yes', { kind: 'refermentation' }) };
    expect(look('bottle', { calls }).type).toBe('false');
    expect(look('refermentation', { calls }).type).toBe('true');
  });
});

describe('the rules', () => {
  it('each have a sentence, a first thing to do, and spans that make sense', () => {
    for (const rule of ALERT_RULES) {
      const words = ruleWords(rule);
      expect(words.begins).toMatch(/^Told .+\.$/);
      expect(words.ends).toMatch(/^Over .+\.$/);
      expect(Math.min(rule.forMs, rule.keepMs)).toBeGreaterThanOrEqual(0);
      expect(rule.restMs).toBeGreaterThanOrEqual(6 * HOUR);
      expect(rule.level === 'know' ? rule.repeatMs : rule.repeats).toBe(rule.level === 'know' ? null : 3);
    }
  });

  it('are known by name, and no other name is one', () => {
    expect(ruleNamed('foam').call).toBe('neck');
    expect(() => ruleNamed('toString')).toThrow(RangeError);
  });

  it('tell the withdrawal of "ready to bottle" at once', () => {
    expect(ruleNamed('bottle')).toMatchObject({ keepMs: 0, tellsEnd: true });
  });
});
