import { describe, expect, it } from 'vitest';
import { ALERT_RULES, ruleAsSet, ruleNamed, ruleWords, type RuleSetting } from '@/lib/core/alerts/rules';
import { holdOf, isWanted, nextDigest, quietUntil, turnsOf } from '@/lib/core/alerts/telling';

const at = (iso: string) => Date.parse(iso);
const iso = (instant: number | null) => (instant === null ? null : new Date(instant).toISOString().replace('.000', ''));
const NIGHT = { fromMin: 22 * 60, toMin: 7 * 60 };
const MINUTE = 60_000;

describe('quiet hours', () => {
  const CASES: Array<[string, string, { fromMin: number; toMin: number }, string, string | null]> = [
    ['do not hold by day', 'Europe/Berlin', NIGHT, '2026-01-10T12:00:00Z', null],
    ['hold from their first minute', 'UTC', NIGHT, '2026-01-10T22:00:00Z', '2026-01-11T07:00:00Z'],
    ['do not hold a minute before', 'UTC', NIGHT, '2026-01-10T21:59:59Z', null],
    ['hold after midnight to the same morning', 'UTC', NIGHT, '2026-01-11T03:00:00Z', '2026-01-11T07:00:00Z'],
    ['end with their last minute', 'UTC', NIGHT, '2026-01-11T07:00:00Z', null],
    ['are those of the person’s own clock', 'Pacific/Auckland', NIGHT, '2026-01-10T10:00:00Z', '2026-01-10T18:00:00Z'],
    ['can lie within one day', 'UTC', { fromMin: 13 * 60, toMin: 15 * 60 }, '2026-01-10T14:00:00Z', '2026-01-10T15:00:00Z'],
    ['are an hour shorter when the clock goes forward', 'Europe/Berlin', NIGHT, '2026-03-28T21:30:00Z', '2026-03-29T05:00:00Z'],
    ['are an hour longer when the clock goes back', 'Europe/Berlin', NIGHT, '2026-10-24T20:30:00Z', '2026-10-25T06:00:00Z'],
    ['that end in the hour left out end after it', 'Europe/Berlin', { fromMin: 22 * 60, toMin: 150 }, '2026-03-29T00:10:00Z', '2026-03-29T01:30:00Z'],
    ['that end in the hour that comes twice hold in its second run too', 'Europe/Berlin', { fromMin: 22 * 60, toMin: 150 }, '2026-10-25T01:10:00Z', '2026-10-25T01:30:00Z'],
    ['go over the end of a month', 'UTC', NIGHT, '2026-02-28T23:00:00Z', '2026-03-01T07:00:00Z'],
    ['go over the end of a year', 'UTC', NIGHT, '2026-12-31T23:00:00Z', '2027-01-01T07:00:00Z'],
  ];
  it.each(CASES)('%s (%s)', (_name, zone, quiet, now, until) => {
    expect(iso(quietUntil(quiet, zone, at(now)))).toBe(until);
  });

  it('never end in the past, at any minute of the days on which clocks change', () => {
    for (const zone of ['Europe/Berlin', 'America/New_York', 'Australia/Lord_Howe', 'Asia/Kathmandu'])
      for (const day of ['2026-03-08', '2026-03-29', '2026-04-05', '2026-10-04', '2026-10-25', '2026-11-01'])
        for (let minute = 0; minute < 48 * 60; minute += 7) {
          const now = at(`${day}T00:00:00Z`) - 12 * 60 * MINUTE + minute * MINUTE;
          for (const quiet of [NIGHT, { fromMin: 60, toMin: 150 }, { fromMin: 120, toMin: 121 }]) {
            const until = quietUntil(quiet, zone, now);
            if (until !== null) {
              expect(until).toBeGreaterThan(now);
              expect(until - now).toBeLessThanOrEqual(11 * 60 * MINUTE);
            }
          }
        }
  });
});

describe('whether a message goes now', () => {
  const night = at('2026-01-10T23:00:00Z');
  const usual = { level: 'check', asked: false, quiet: NIGHT, timeZone: 'UTC', mutedUntil: null } as const;
  it('waits for the end of the quiet hours', () => {
    expect(holdOf(usual, night)).toEqual({ until: at('2026-01-11T07:00:00Z'), by: 'quiet' });
  });
  it('goes at once where someone could be hurt, whatever is quiet or muted', () => {
    expect(holdOf({ ...usual, level: 'act', mutedUntil: night + 5 * 60 * MINUTE }, night)).toBeNull();
  });
  it('goes where the person named the hour themselves', () => {
    expect(holdOf({ ...usual, asked: true }, night)).toBeNull();
  });
  it('waits for the end of a mute', () => {
    expect(holdOf({ ...usual, quiet: null, mutedUntil: night + MINUTE }, night)).toEqual({ until: night + MINUTE, by: 'mute' });
    expect(holdOf({ ...usual, quiet: null, mutedUntil: night }, night)).toBeNull();
  });
  it('goes over from a mute into the quiet hours', () => {
    expect(holdOf({ ...usual, mutedUntil: night }, at('2026-01-10T18:00:00Z'))).toEqual({ until: at('2026-01-11T07:00:00Z'), by: 'mute' });
  });
});

describe('turns', () => {
  const escalation = { afterMin: 30, order: ['piet', 'inga'] };
  const minutes = (turns: Map<string, number>) => Object.fromEntries([...turns].map(([person, ms]) => [person, ms / MINUTE]));
  it('tell those who are not in the order at once, the others one after another', () => {
    expect(minutes(turnsOf(['una', 'piet', 'inga'], 'check', escalation))).toEqual({ una: 0, piet: 30, inga: 60 });
  });
  it('tell the first of the order at once where everybody is in it', () => {
    expect(minutes(turnsOf(['inga', 'piet'], 'act', escalation))).toEqual({ piet: 0, inga: 30 });
  });
  it('leave out who does not want to hear of it', () => {
    expect(minutes(turnsOf(['una', 'inga'], 'check', escalation))).toEqual({ una: 0, inga: 30 });
  });
  it('are not waited for where nothing is wrong', () => {
    expect(minutes(turnsOf(['una', 'piet'], 'know', escalation))).toEqual({ una: 0, piet: 0 });
  });
  it('are no matter without an order', () => {
    expect(minutes(turnsOf(['una', 'piet'], 'act', null))).toEqual({ una: 0, piet: 0 });
  });
});

describe('what a person chose', () => {
  it('is everything by mail and what is wrong on the device, where they chose nothing', () => {
    expect(ALERT_RULES.filter((rule) => !isWanted(rule, 'mail', []))).toEqual([]);
    expect(ALERT_RULES.filter((rule) => !isWanted(rule, 'push', [])).map((rule) => rule.level)).toEqual(['know', 'know', 'know']);
  });
  it('goes before the usual, by rule and means', () => {
    const choices = [{ rule: 'stalled', means: 'mail', wanted: false }, { rule: 'rack', means: 'push', wanted: true }] as const;
    expect(isWanted(ruleNamed('stalled'), 'mail', choices)).toBe(false);
    expect(isWanted(ruleNamed('stalled'), 'push', choices)).toBe(true);
    expect(isWanted(ruleNamed('rack'), 'push', choices)).toBe(true);
  });
});

describe('a rule as a cellar sets it', () => {
  const setting = (overrides: Partial<RuleSetting>): RuleSetting => ({ rule: 'stalled', ofBatch: false, enabled: true, forMin: null, keepMin: null, ...overrides });
  it('is the usual where nothing is set', () => {
    expect(ruleAsSet(ruleNamed('stalled'), [])).toEqual({ rule: ruleNamed('stalled'), enabled: true });
  });
  it('takes the spans that were set, and the batch’s setting before the cellar’s', () => {
    const set = ruleAsSet(ruleNamed('stalled'), [setting({ forMin: 120 }), setting({ ofBatch: true, keepMin: 30 })]);
    expect([set.rule.forMs / MINUTE, set.rule.keepMs / MINUTE]).toEqual([60, 30]);
    expect(ruleAsSet(ruleNamed('stalled'), [setting({ enabled: false }), setting({ ofBatch: true })]).enabled).toBe(true);
  });
  it('never tells later than usual of what can hurt someone', () => {
    const foam = ruleNamed('foam');
    expect(ruleAsSet(foam, [setting({ rule: 'foam', forMin: 600 })]).rule.forMs).toBe(foam.forMs);
    expect(ruleAsSet(foam, [setting({ rule: 'foam', forMin: 0 })]).rule.forMs).toBe(0);
  });
  it('says its spans in words', () => {
    expect(ruleWords(ruleNamed('rack'))).toEqual({ begins: 'Told when it can be racked for 3 h.', ends: 'Over when it has not been so for 1 h, or once a racking is logged or it can be bottled.' });
    expect(ruleWords(ruleNamed('bottle')).ends).toBe('Over as soon as that is no longer so.');
    expect(ruleWords(ruleNamed('refermentation')).begins).toBe('Told at once when a batch thought finished falls again.');
  });
});

describe('the morning digest', () => {
  const EIGHT = 8 * 60;
  it.each([
    ['comes today where its hour lies ahead', 'UTC', '2026-05-01T07:59:00Z', '2026-05-01T08:00:00Z'],
    ['comes tomorrow where it has passed', 'UTC', '2026-05-01T08:00:00Z', '2026-05-02T08:00:00Z'],
    ['comes by the person’s clock', 'America/New_York', '2026-05-01T07:59:00Z', '2026-05-01T12:00:00Z'],
    ['comes at its hour when the clock has gone forward', 'Europe/Berlin', '2026-03-28T10:00:00Z', '2026-03-29T06:00:00Z'],
    ['comes at its hour when the clock has gone back', 'Europe/Berlin', '2026-10-24T10:00:00Z', '2026-10-25T07:00:00Z'],
  ])('%s', (_name, zone, after, next) => {
    expect(iso(nextDigest(EIGHT, zone, at(after)))).toBe(next);
  });
  it('comes every day, once, in every zone', () => {
    for (const zone of ['Europe/Berlin', 'America/St_Johns', 'Pacific/Chatham']) {
      let now = at('2026-01-01T00:00:00Z');
      const gaps: number[] = [];
      for (let day = 0; day < 365; day += 1) {
        const next = nextDigest(EIGHT, zone, now);
        gaps.push((next - now) / 3_600_000);
        now = next;
      }
      expect(Math.min(...gaps.slice(1))).toBe(23);
      expect(Math.max(...gaps.slice(1))).toBe(25);
    }
  });
});
