import { describe, expect, it } from 'vitest';
import { CALL_NAMES } from '@/lib/core/types';
import { cursorLine } from '@/components/batch/cursor';
import { factsOf } from '@/components/batch/facts';
import { entryWords } from '@/components/batch/entry-words';
import { filtered, logRows, logTime } from '@/components/batch/log';
import { dayOf, placeWords } from '@/components/batch/words';
import { picture, straight } from '../charts/fixtures';
import { batch, entry, hours, judged, NOW } from './fixtures';

const fact = (over: Parameters<typeof batch>[0], name: string) => factsOf(batch(over), null, NOW, 'UTC').find((item) => item.name === name)!;

describe('the line of facts', () => {
  it('says how far the fall is on its way', () => {
    expect(fact({}, 'attenuation')).toMatchObject({ figure: '40 %', more: 'of 74' });
    expect(fact({}, 'strength so far')).toMatchObject({ figure: '3.5 %', more: 'of 6.6' });
    expect(fact({}, 'now')).toMatchObject({ figure: '1.041', more: '± 0.001' });
    expect(fact({}, 'pitched')).toMatchObject({ figure: 'Fri 9 Oct', more: 'day 6' });
  });

  it('says what is not known instead of leaving a guess', () => {
    const none = { assessment: null, original_gravity: null, sensor: null, pitched_at: null };
    expect(factsOf(batch(none), null, NOW, 'UTC').map((item) => item.figure)).toEqual(['not yet', 'not told', 'not read', 'not known', '–', '–', 'not known', 'none']);
  });

  it('says nothing yet of what is still on its way', () => {
    const none = { assessment: null };
    const arriving = (...given: Parameters<typeof factsOf>) => factsOf(...given).filter((item) => item.arriving).map(({ name, figure }) => `${name} ${figure}`);
    expect(arriving(batch({ assessment: judged({}, { gravity: null }) }), undefined, NOW, 'UTC')).toEqual(['now –']);
    expect(arriving(batch(none), null, NOW, 'UTC', [], true)).toEqual(['now –', 'bed –', 'likely end –']);
    expect(arriving(batch(none), null, NOW, 'UTC')).toEqual([]);
    expect(arriving(batch(), undefined, NOW, 'UTC')).toEqual([]);
  });

  it('gives the last reading its time where nothing is known of now', () => {
    const silent = batch({ assessment: judged({}, { gravity: null }) });
    expect(factsOf(silent, { at: NOW - 15 * 3600, gravity: 1.0312 }, NOW, 'UTC')[2]).toMatchObject({ name: 'last known', figure: '1.031', more: 'at Wed 23:32' });
    const known = batch({ assessment: judged({}, { gravity: null, last_gravity: { at: hours(-14), value: 1.0288 } }) });
    expect(factsOf(known, { at: NOW - 14 * 3600, gravity: 1.0312 }, NOW, 'UTC')[2]).toMatchObject({ name: 'last known', figure: '1.029', more: 'at 00:32' });
  });

  it('gives the likely end as days, until it is reached or has passed', () => {
    expect(fact({}, 'likely end').figure).toBe('20–22 Oct');
    expect(fact({ assessment: judged({}, { stage: 'terminal' }) }, 'likely end')).toMatchObject({ figure: 'reached', more: null });
    expect(fact({ assessment: judged({}, { stage: 'terminal', terminal_at: null }) }, 'likely end')).toMatchObject({ figure: 'reached', more: 'by its curve' });
    expect(fact({ assessment: judged({}, { terminal_at: { value: hours(-5), lo: hours(-9), hi: hours(-1) } }) }, 'likely end').figure).toBe('not known');
  });
});

describe('a batch in words', () => {
  it('counts days as the wall calendar does, and none before the pitch', () => {
    const now = Date.parse('2026-10-15T14:31Z') / 1000;
    expect([dayOf('2026-10-15T00:10Z', now, 'UTC'), dayOf('2026-10-14T23:50Z', now, 'UTC'), dayOf('2026-10-09T15:00Z', now, 'UTC'), dayOf('2026-10-16T00:10Z', now, 'UTC'), dayOf(null, now, 'UTC')]).toEqual([0, 1, 6, null, null]);
    // Over the change of clocks in late October a day has 25 hours.
    expect(dayOf('2026-10-20T12:00Z', Date.parse('2026-10-30T09:00Z') / 1000, 'Europe/Vienna')).toBe(10);
  });

  it('names the volume once where the vessel is full', () => {
    expect(placeWords(batch())).toBe('tag 5, 10 L carboy, back row');
    expect(placeWords(batch({ volume_l: 4.5, vessel_l: 5, tag: null, place: null }))).toBe('4.5 L in a 5 L carboy');
  });
});

describe('the log', () => {
  it('says what a reading was corrected from only where that changed the figure', () => {
    const reading = { kind: 'reading' as const, gravity: 1.041, temperature_c: 25 };
    expect(entryWords(entry({ ...reading, gravity_read: 1.04 }))).toBe('Hydrometer, sample at 25.0 °C, corrected from 1.040.');
    expect(entryWords(entry({ ...reading, gravity_read: 1.041 }))).toBe('Hydrometer, sample at 25.0 °C.');
  });

  it('lists what went in as one sentence', () => {
    expect(entryWords(entry({ kind: 'addition', sugar_g: 120, fruit_g: 500, volume_l: 0.3, gravity: 1.031 }))).toBe('Added 120 g of sugar, 500 g of fruit and 0.3 L of liquid at 1.031.');
  });

  it('leaves the person’s own words alone where ours would add no figure', () => {
    const [pitch, rack] = logRows([entry({ id: 'a', kind: 'pitch', at: hours(-1), text: 'Pitched a packet.' }), entry({ id: 'b', kind: 'rack', at: hours(-2), volume_l: 4.2, text: 'Off the lees.' })], []);
    expect(pitch).toMatchObject({ text: '', own: 'Pitched a packet.' });
    expect(rack).toMatchObject({ text: 'Racked, 4.2 L came over.', own: 'Off the lees.' });
  });

  it('stands newest first, with the program’s own lines among the people’s', () => {
    const changes = [{ at: hours(-6), changed: ['stalled' as const], assessment: judged({ stalled: { verdict: 'yes', headline: 'Stopped at 1.041.' } }) }];
    const rows = logRows([entry({ id: 'a', at: hours(-7) }), entry({ id: 'b', at: hours(-5), person: null })], changes);
    expect(rows.map((row) => [row.kind, row.who])).toEqual([
      ['note', 'Fallbright'],
      ['call', 'Fallbright'],
      ['note', 'Bram'],
    ]);
  });

  it('tells of the first judgement only what is so', () => {
    const first = { at: hours(-6), changed: [...CALL_NAMES], assessment: judged({ started: { verdict: 'yes', headline: 'Working.' }, sensor: { verdict: 'no', headline: 'Sensor speaks.' } }) };
    expect(logRows([], [first])[0]!.text).toBe('Working.');
    expect(logRows([], [{ ...first, changed: ['sensor'] }])[0]!.text).toBe('Sensor speaks.');
  });

  it('keeps no line for a call that only lost its data', () => {
    expect(logRows([], [{ at: hours(-6), changed: ['stalled'], assessment: judged({ stalled: { verdict: 'unknown' } }) }])).toEqual([]);
  });

  it('puts every kind under exactly one filter', () => {
    const kinds = ['pitch', 'reading', 'observation', 'neck', 'rack', 'addition', 'top_up', 'stabilise', 'note'] as const;
    const rows = logRows(kinds.map((kind, index) => entry({ id: String(index), kind })), []);
    const parts = (['readings', 'additions', 'notes', 'calls'] as const).map((filter) => filtered(rows, filter).length);
    expect(parts.reduce((sum, count) => sum + count, 0)).toBe(kinds.length);
    expect(filtered(rows, 'all')).toHaveLength(kinds.length);
  });

  it('names the weekday this month, the month before that, the year where it is another', () => {
    const at = (iso: string) => logTime(Date.parse(iso) / 1000, NOW, 'UTC');
    expect([at('2026-10-14T09:04:00Z'), at('2026-09-14T09:04:00Z'), at('2025-10-14T09:04:00Z')]).toEqual(['Wed 14, 09:04', '14 Sep, 09:04', '14 Oct 2025']);
  });
});

describe('the line under the cursor', () => {
  const shown = picture({ curve: straight(), readings: { at: [NOW - 7200], gravity: [1.031], temperature: [17.4] }, gas: [{ at: NOW - 7200, value: 0.417 }] });
  it('gives the nearest reading, not one of another day', () => {
    expect(cursorLine(shown, NOW - 7000, 'UTC')).toEqual({ time: 'Thu 15 Oct 12:35', figures: '1.031, 17.4 °C, 0.42 L/h' });
    expect(cursorLine(shown, NOW - 40 * 3600, 'UTC').figures).toBe('1.040');
  });

  it('gives the forecast with its interval past now', () => {
    expect(cursorLine(shown, NOW + 24 * 3600, 'UTC').figures).toBe('1.024, 8 in 10 1.022–1.026');
  });

  it('calls what lies after a silent sensor’s last word a forecast, now included', () => {
    expect(cursorLine({ ...shown, silentAt: NOW - 20 * 3600 }, null, 'UTC').figures).toBe('1.030, 8 in 10 1.028–1.032');
  });

  it('stands at now while nobody points', () => {
    expect(cursorLine(shown, null, 'UTC').time).toBe('14:32');
  });
});
