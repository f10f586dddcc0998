import { describe, expect, it } from 'vitest';
import { limitWords, linkWords, sensorState } from '@/components/sensors/words';
import type { SensorBody } from '@/lib/contracts/sensors';

const NOW = Date.UTC(2027, 4, 1) / 1000;
const sensor = (more: Partial<SensorBody> = {}): SensorBody => ({
  id: 'fs-1',
  name: 'Float 1',
  kind: 'float',
  interval_s: 900,
  disabled: false,
  place: null,
  created_at: '2027-01-01T00:00:00Z',
  batch: null,
  last: { measured_at: '2027-04-30T23:50:00Z', received_at: '2027-04-30T23:50:00Z', gravity: 1.02, temperature: 18, battery: 3.7, signal: -70 },
  refused_24h: 0,
  settings: null,
  calibration: null,
  ...more,
});
const found = (of: 'battery' | 'signal' | 'silence') => ({ of, says: '', act: '' });

describe('how a sensor stands in the list', () => {
  it('is heard where its health says nothing', () => expect(sensorState(sensor(), NOW)).toEqual({ state: 'Done', word: 'Heard' }));
  it('says what its health says first', () => {
    expect(sensorState(sensor(), NOW, [found('battery'), found('signal')])).toEqual({ state: 'Check', word: 'Cell low' });
    expect(sensorState(sensor(), NOW, [found('signal')])).toEqual({ state: 'Check', word: 'Link weak' });
  });
  it('is silent before anything else, and what is switched off is left be', () => {
    const silent = sensor({ last: { ...sensor().last!, received_at: '2027-04-30T10:00:00Z' } });
    expect(sensorState(silent, NOW, [found('battery')])).toEqual({ state: 'Silent', word: 'Silent' });
    expect(sensorState(sensor({ disabled: true }), NOW, [found('battery')]).state).toBe('Leave be');
  });
});

describe('the words of a link', () => {
  it('call weak what the cellar calls weak', () => {
    expect([linkWords(-75, -80), linkWords(-75, -75), linkWords(-60, -80), linkWords(-60, -50), linkWords(null)]).toEqual(['fair, −75 dBm', 'weak, −75 dBm', 'good, −60 dBm', 'weak, −60 dBm', '–']);
  });
});

it('the limits of a cellar make one sentence', () => {
  expect(limitWords({ low_battery_days: 14, empty_battery_v: 3.3, weak_signal_dbm: -80, missed_percent: 10, clock_offset_s: 300 })).toBe(
    'a cell may be flat within 14 days, at 3.3 V; a link is −80 dBm or weaker; 10 % of a day’s messages are missing; a clock is off by 5 min.',
  );
});
