import { describe, expect, it } from 'vitest';
import { alertFate, alertMeta, alertState, byNeed, goneSentence, lookAgainTimes, toldLines } from '@/components/alerts/rows';
import type { AlertBody } from '@/lib/contracts/alerts';
import { call, hours, NOW } from './fixtures';

const ID = '00000000-0000-4000-8000-000000000001';
const alert = (over: Partial<AlertBody> = {}): AlertBody => ({
  id: ID,
  batch: { id: ID, name: 'Oat stout', tag: 5, vessel_kind: 'carboy', drink_colour: 'stout', neck: 'airlock', volume_l: 10, vessel_l: 12 },
  call: 'stalled',
  kind: 'stuck',
  level: 'check',
  state: 'open',
  since: hours(-31),
  opened_at: hours(-5),
  acknowledged_at: null,
  acknowledged_by: null,
  note: null,
  look_again_at: null,
  resolved_at: null,
  resolved_by: null,
  gone: null,
  evidence: call(),
  told: [],
  muted_until: null,
  ...over,
});

describe('an alert in the list', () => {
  it('has a shape and a word of its own for each way it can stand', () => {
    expect(alertState(alert())).toEqual({ state: 'Check', word: 'Check' });
    expect(alertState(alert({ level: 'act' })).state).toBe('Now');
    expect(alertState(alert({ call: 'sensor', kind: 'silent' })).state).toBe('Silent');
    expect(alertState(alert({ call: 'neck', kind: null, level: 'know' })).state).toBe('Due');
    expect(alertState(alert({ call: 'rack', kind: null, level: 'know' })).state).toBe('Ready');
    expect(alertState(alert({ state: 'acknowledged', level: 'act' })).state).toBe('In hand');
    expect(alertState(alert({ state: 'resolved' }))).toEqual({ state: 'Done', word: 'Cleared' });
  });

  it('says what somebody said they do in place of since when', () => {
    expect(alertMeta(alert(), NOW, 'UTC')).toBe('Oat stout, tag 5, since Wed 07:32');
    expect(alertMeta(alert({ note: 'Moved off the sill.' }), NOW, 'UTC')).toBe('Oat stout, tag 5, “Moved off the sill.”');
  });

  it('says that it is so no longer, and until when it is kept', () => {
    const gone = { since: hours(-1), kept_until: hours(1) };
    expect(alertMeta(alert({ call: 'temperature', gone, note: 'Moved.' }), NOW, 'UTC')).toBe('Oat stout, tag 5, back in its range since 13:32, kept until 15:32');
    expect(goneSentence(alert({ call: 'sensor', kind: 'silent', gone }), NOW, 'UTC')).toBe('Heard again since 13:32: the alert is kept until 15:32, in case it comes back.');
    expect(goneSentence(alert({ call: 'sensor', kind: 'frozen', gone }), NOW, 'UTC')).toMatch(/^No longer so since 13:32/);
    expect(goneSentence(alert({ gone: { ...gone, kept_until: hours(-0.5) } }), NOW, 'UTC')).toBe('Not stalled any more since 13:32: the alert is kept until the next reading, in case it comes back.');
    expect(goneSentence(alert(), NOW, 'UTC')).toBeNull();
    expect(alertMeta(alert({ state: 'resolved', gone: null, note: 'Moved.' }), NOW, 'UTC')).toBe('Oat stout, tag 5, “Moved.”');
  });

  it('says who was told, who has it, and that the time to look again has passed', () => {
    const told = [
      { person: 'Bram', means: 'mail' as const, at: null, state: 'waiting' as const, held_by: null, due: null, error: null },
      { person: 'Oriel', means: 'mail' as const, at: hours(-2.5), state: 'sent' as const, held_by: null, due: null, error: null },
    ];
    expect(toldLines({ told }, NOW, 'UTC').map((line) => line.text)).toEqual(['told Oriel 12:02', 'telling Bram']);
    const held = { person: 'Ines', means: 'push' as const, at: null, state: 'held' as const, held_by: 'quiet' as const, due: hours(3), error: null };
    const dropped = { person: 'Tove', means: 'mail' as const, at: null, state: 'dropped' as const, held_by: null, due: null, error: 'somebody had it before its time came' };
    expect(toldLines({ told: [dropped, held, ...told] }, NOW, 'UTC').map((line) => line.text)).toEqual([
      'told Oriel 12:02',
      'telling Bram',
      'Ines on the device from 17:32: quiet hours',
      'Tove not told: somebody had it before its time came',
    ]);
    const taken = alert({ state: 'acknowledged', acknowledged_by: { id: ID, name: 'Ines' }, look_again_at: hours(-1) });
    expect(alertFate(taken, NOW, 'UTC').map((line) => line.text)).toEqual(['Ines has it', 'was to look again 13:32']);
    expect(alertFate(alert({ state: 'resolved', resolved_at: hours(-1) }), NOW, 'UTC')[0]!.text).toBe('passed by itself, 13:32');
  });
});

describe('open alerts', () => {
  it('stand in the order of need, the longest waiting first among equals', () => {
    const list = byNeed([alert({ call: 'rack', kind: null, level: 'know' }), alert({ kind: 'new' }), alert({ kind: 'old', since: hours(-90) }), alert({ level: 'act', call: 'neck' })]);
    expect(list.map((item) => item.kind ?? item.call)).toEqual(['stuck', 'old', 'new', 'rack']);
  });
});

describe('when to look again', () => {
  it('offers times ahead, in order, the first in about two hours', () => {
    for (let hour = 0; hour < 24; hour++) {
      const now = NOW + hour * 3600;
      const times = lookAgainTimes(now, 'Europe/Prague', null);
      expect(times.length).toBeGreaterThanOrEqual(2);
      times.forEach((time, index) => {
        expect(time.at).toBeGreaterThan(now + 3600);
        if (index > 0) expect(time.at).toBeGreaterThan(times[index - 1]!.at);
      });
    }
  });

  it('wakes nobody in their quiet hours: what falls into them is offered at their end, by their own clock', () => {
    const words = (at: string, timeZone: string) => lookAgainTimes(Date.parse(at) / 1000, 'UTC', { quiet: { fromMin: 22 * 60, toMin: 390 }, timeZone }).map((time) => time.words);
    expect(words('2026-12-03T21:40:00Z', 'UTC')).toEqual(['tomorrow 06:30', 'tomorrow 09:00', 'tomorrow 18:00']);
    expect(words('2026-12-03T00:23:00Z', 'UTC')).toEqual(['06:30', '09:00', '18:00', '21:00']);
    expect(words('2026-12-03T17:20:00Z', 'Europe/Prague')).toEqual(['19:30', 'tomorrow 09:00', 'tomorrow 18:00']);
    expect(words('2026-12-03T18:50:00Z', 'Europe/Prague')[0]).toBe('tomorrow 05:30');
  });

  it('keeps the time that was chosen on offer until it has passed, though the others move on', () => {
    const chosen = lookAgainTimes(NOW, 'UTC', null)[0]!;
    expect(chosen.words).toBe('17:00');
    const later = (minutes: number) => lookAgainTimes(NOW + minutes * 60, 'UTC', null, chosen.at).map((time) => time.words);
    expect(later(40)).toEqual(['17:00', '17:30', '21:00', 'tomorrow 09:00', 'tomorrow 18:00']);
    expect(later(150)).not.toContain('17:00');
    expect(lookAgainTimes(NOW, 'UTC', null, chosen.at)).toHaveLength(4);
  });

  it('names tomorrow as such', () => {
    expect(lookAgainTimes(NOW, 'UTC', null).map((time) => time.words)).toEqual(['17:00', '18:00', '21:00', 'tomorrow 09:00']);
  });
});
