import { describe, expect, it } from 'vitest';
import { alertsOf, dayWords, inOrder, laneFigures, laneView } from '@/components/shelf/lanes';
import { placeLanes, placesOf } from '@/components/shelf/placement';
import { anAlert, aLane, at, NOW } from './make';

const viewOf = (...given: Parameters<typeof aLane>) => laneView(aLane(...given), undefined, NOW, 'UTC');

describe('a lane', () => {
  it('drops the full stop of a verdict that stands alone, and keeps it where the reason runs in', () => {
    expect(viewOf({ calls: { stalled: { verdict: 'yes', headline: 'No fall for 31 h at 1.041: check.' } } }).headline).toBe('No fall for 31 h at 1.041: check');
    expect(viewOf({ calls: { rack: { headline: 'Leave it on the lees.' } } }).headline).toBe('Leave it on the lees.');
  });

  it.each([
    ['a trouble', { calls: { stalled: { verdict: 'yes', since: at('2026-10-13T07:30Z') } } }, 'since Tue 07:30'],
    ['something later today', { neck: 'blow_off', calls: { neck: { verdict: 'soon', expected_at: at('2026-10-15T19:30Z') } } }, 'today 19:30'],
    ['something tomorrow', { neck: 'blow_off', calls: { neck: { verdict: 'soon', expected_at: at('2026-10-16T14:00Z') } } }, 'Fri 14:00'],
    ['what may be done any day', { calls: { rack: { verdict: 'yes' } } }, 'any day'],
    ['what is left be for weeks', { calls: { rack: { expected_at: at('2026-11-02T10:00Z') } } }, 'until 2 Nov'],
    ['what has no time', {}, ''],
  ] as const)('says when of %s', (_, given, words) => {
    expect(viewOf(given).when).toBe(words);
  });

  it('names who has it once an alert is taken, and offers it to nobody else', () => {
    const alert = { call: 'stalled', state: 'acknowledged', taken_by: 'Bram Holt' } as const;
    const view = viewOf({ calls: { stalled: { verdict: 'yes' } }, alerts: [alert] });
    expect(view.when).toBe('Bram has it');
    expect(view.openAlert).toBeNull();
  });

  it('says that what an alert is about has gone, and until when it is kept', () => {
    const lane = aLane({ calls: { temperature: { verdict: 'no', headline: 'In its range: 18.4 °C.' } }, alerts: [{ call: 'temperature' }] });
    const gone = { since: at('2026-10-15T13:50Z'), kept_until: at('2026-10-15T15:50Z') };
    const view = laneView(lane, [anAlert(lane, { call: 'temperature', gone })], NOW, 'UTC');
    expect(view).toMatchObject({ attention: { state: 'Check' }, headline: 'In its range: 18.4 °C', when: 'kept until 15:50' });
    expect(view.reason).toBe('Back in its range since 13:50: the alert is kept until 15:50, in case it comes back.');
    const taken = laneView(lane, [anAlert(lane, { call: 'temperature', gone, state: 'acknowledged', acknowledged_by: { id: lane.id, name: 'Bram Holt' } })], NOW, 'UTC');
    expect(taken.when).toBe('Bram has it');
  });

  it('speaks before the first judgement', () => {
    expect(viewOf({ assessment: null, pitched_at: null }).headline).toBe('Not pitched yet.');
    expect(viewOf({ assessment: null, sensor: null }).reason).toContain('Read by hand');
    expect(viewOf({ assessment: null }).reason).toContain('first readings');
  });

  it('says of a batch that has ended what became of it, and no call any more', () => {
    const ended = { state: 'ended', ended_at: at('2026-10-14T18:00Z'), calls: { bottle: { verdict: 'yes', headline: 'May be bottled: since Mon.' } } } as const;
    expect(viewOf({ ...ended, entries: [] })).toMatchObject({ headline: 'Ended Wed 14 Oct.', reason: 'Last at 1.041.' });
    const bottling = { id: 'b', kind: 'bottling', at: at('2026-10-14T18:00Z'), gravity: null, neck: null, text: null } as const;
    expect(viewOf({ ...ended, entries: [bottling] })).toMatchObject({ headline: 'Bottled Wed 14 Oct.', reason: 'Last at 1.041. Its bottles are in the book.', attention: { state: 'Done' } });
  });

  it('takes an alert’s level from the list where it may be read, else by its call', () => {
    const lane = aLane({ alerts: [{ call: 'neck', state: 'open' }] });
    expect(alertsOf(lane, undefined)[0]?.level).toBe('check');
    expect(alertsOf(lane, [anAlert(lane, { call: 'neck', level: 'act' })])[0]?.level).toBe('act');
  });

  it('says the day, or that it is not pitched', () => {
    expect(dayWords(at('2026-10-14T23:50Z'), NOW, 'UTC')).toBe('day 1');
    expect(dayWords(null, NOW, 'UTC')).toBe('not pitched');
  });

  it('gives old figures their time', () => {
    const lane = aLane({});
    expect(laneFigures(lane, null, NOW, 'UTC')).toEqual({ gravity: '1.041', under: '3.5 % so far' });
    expect(laneFigures(lane, Date.parse('2026-10-15T14:10Z') / 1000, NOW, 'UTC').under).toBe('at 14:10');
  });

  it('without a judgement shows the newest reading by hand or sensor, then the original gravity, then a dash', () => {
    const bare = { assessment: null, entries: [] } as const;
    expect(laneFigures(aLane({ ...bare, original_gravity: 1.068 }), null, NOW, 'UTC')).toEqual({ gravity: '1.068', under: 'at pitch' });
    expect(laneFigures(aLane({ ...bare, original_gravity: null }), null, NOW, 'UTC').gravity).toBe('–');
    const read = [
      { kind: 'reading', at: at('2026-10-12T09:00Z'), gravity: 1.05 },
      { kind: 'reading', at: at('2026-10-14T09:00Z'), gravity: 1.044 },
    ] as const;
    expect(laneFigures(aLane({ assessment: null, entries: read }), null, NOW, 'UTC')).toEqual({ gravity: '1.044', under: 'by hand Wed 09:00' });
    const heard = { from: at('2026-10-01T00:00Z'), to: at('2026-10-20T00:00Z'), count: 2, at: [NOW - 7200, NOW - 3600], gravity: [1.043, null], temperature: [18, 18] };
    expect(laneFigures(aLane({ assessment: null, entries: read, series: heard }), null, NOW, 'UTC')).toEqual({ gravity: '1.043', under: 'at 12:32' });
  });

  it('while the float gives nothing shows where the judge last knew it to stand, or what was read by hand since', () => {
    const judged = { at: at('2026-10-15T12:32Z'), value: 1.039 };
    const heard = { from: at('2026-10-01T00:00Z'), to: at('2026-10-20T00:00Z'), count: 1, at: [NOW - 7200], gravity: [1.043], temperature: [18] };
    const lane = aLane({ series: heard });
    const silent = { ...lane, assessment: { ...lane.assessment!, gravity: null, last_gravity: judged } };
    expect(laneFigures(silent, null, NOW, 'UTC')).toEqual({ gravity: '1.039', under: 'at 12:32' });
    const read = aLane({ entries: [{ kind: 'reading', at: judged.at, gravity: 1.039 }] });
    expect(laneFigures({ ...silent, entries: read.entries }, null, NOW, 'UTC')).toEqual({ gravity: '1.039', under: 'by hand 12:32' });
  });
});

describe('the shelf', () => {
  const now = viewOf({ name: 'Oat stout', tag: 5, calls: { stalled: { verdict: 'yes', since: at('2026-10-13T07:30Z') } } });
  const ready = viewOf({ name: 'Crab cider', tag: 2, calls: { rack: { verdict: 'yes' } } });
  const quiet = viewOf({ name: 'Bramble wine', tag: 4 });
  const alsoQuiet = viewOf({ name: 'Quince wine', tag: 3 });

  it('puts what wants a person first, and what is alike by its tag', () => {
    expect(inOrder([quiet, ready, alsoQuiet, now]).map((view) => view.lane.name)).toEqual(['Oat stout', 'Crab cider', 'Quince wine', 'Bramble wine']);
  });

  it('groups lanes by how much they want a person', () => {
    expect(placeLanes([quiet, ready, now], null).map(({ group, views }) => [group, views.length])).toEqual([
      ['now', 1],
      ['next', 1],
      ['leave', 1],
    ]);
  });

  it('keeps a lane where it is while somebody points at it, and moves it afterwards', () => {
    const before = placesOf(placeLanes([quiet, ready, now], null));
    const passed = { ...now, attention: { ...now.attention, state: 'Leave be' as const, group: 'leave' as const } };
    const groupOf = (held: typeof before | null) => placeLanes([quiet, ready, passed], held).find(({ views }) => views.includes(passed))?.group;
    expect(groupOf(before)).toBe('now');
    expect(groupOf(null)).toBe('leave');
  });
});

describe('a call that somebody overruled', () => {
  it('asks nothing on the shelf any more, and what else is wrong speaks', () => {
    const calls = { stalled: { verdict: 'yes', kind: 'stuck' }, temperature: { verdict: 'yes', kind: 'low' } } as const;
    const set = [{ id: '00000000-0000-4000-8000-0000000000ff', call: 'stalled' as const, instead: 'no' as const, at: at('2026-10-15T12:00Z'), by: 'Una', reason: 'Read by hand.' }];
    expect(viewOf({ calls }).attention.call).toBe('stalled');
    expect(viewOf({ calls, overruled: set }).attention.call).toBe('temperature');
    expect(viewOf({ calls: { stalled: calls.stalled }, overruled: set }).attention.group).toBe('leave');
  });
});
