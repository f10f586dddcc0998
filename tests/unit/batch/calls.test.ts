import { describe, expect, it } from 'vitest';
import { callRows, isLoud } from '@/components/batch/calls';
import { figureWords, rulerOf, thresholdsOf } from '@/components/batch/evidence';
import { batch, call, hours, judged, NOW } from './fixtures';

/** A batch that works, unless told otherwise. */
const rows = (calls: Parameters<typeof judged>[0], over: Parameters<typeof batch>[0] = {}) => callRows(batch(over), judged({ started: { verdict: 'yes' }, ...calls }), NOW, 'UTC');
const row = (all: ReturnType<typeof rows>, name: string) => all.find((item) => item.name === name)!;

describe('the calls of a batch page', () => {
  it('put what wants a person first, then the bottle that nobody may fill, then the rest', () => {
    const all = rows({ stalled: { verdict: 'yes', kind: 'stuck' }, bottle: { verdict: 'hold' }, rack: { verdict: 'no' } });
    expect(all.slice(0, 2).map((item) => [item.name, item.state])).toEqual([
      ['stalled', 'Check'],
      ['bottle', 'Stop'],
    ]);
    expect(all).toHaveLength(7);
  });

  it('put a bottle that works again before all else, even where the verdict is only no', () => {
    const all = rows({ bottle: { verdict: 'no', kind: 'refermentation' }, stalled: { verdict: 'yes', kind: 'stuck' } });
    expect(all[0]).toMatchObject({ name: 'bottle', state: 'Stop' });
  });

  it('say not yet for what is a matter of time, and not known where the data say nothing', () => {
    const all = rows({ rack: { verdict: 'no' }, stalled: { verdict: 'unknown' }, sensor: { verdict: 'yes', kind: 'silent' } });
    expect(row(all, 'rack')).toMatchObject({ state: 'Leave be', word: 'Not yet' });
    expect(row(all, 'stalled').word).toBe('Not known');
    expect(row(all, 'sensor')).toMatchObject({ state: 'Silent', word: 'Silent' });
  });

  it('begin with the start while it has not been seen, and not afterwards', () => {
    expect(rows({ started: { verdict: 'unknown' }, stalled: { verdict: 'unknown' } })[0]!.name).toBe('started');
    expect(rows({ started: { verdict: 'yes' } })[0]!.name).not.toBe('started');
  });

  it('offer the alert that nobody has, and name the one who has it', () => {
    const alert = { id: '00000000-0000-4000-8000-0000000000cc', call: 'stalled', state: 'open', opened_at: hours(-2), taken_by: null };
    const stuck = { stalled: { verdict: 'yes' as const, kind: 'stuck' } };
    expect(row(rows(stuck, { alerts: [alert] }), 'stalled').alert).toBe(alert.id);
    expect(row(rows(stuck, { alerts: [{ ...alert, state: 'acknowledged', taken_by: 'Ines' }] }), 'stalled')).toMatchObject({ alert: null, takenBy: 'Ines', state: 'In hand' });
  });

  it('never let a Stop be quietened by somebody having it', () => {
    const alert = { id: '00000000-0000-4000-8000-0000000000cc', call: 'bottle', state: 'acknowledged', opened_at: hours(-2), taken_by: 'Ines' };
    expect(row(rows({ bottle: { verdict: 'hold' } }, { alerts: [alert] }), 'bottle').state).toBe('Stop');
  });

  it('tell what to do, since when and what would change it, without saying the label twice', () => {
    const { lines } = row(rows({ stalled: { verdict: 'yes', kind: 'stuck', act: 'Warm it.', since: hours(-31), changes_it: 'Changes it: a fall of 1 point.' } }), 'stalled');
    expect(lines).toEqual([
      { label: 'do', text: 'Warm it.' },
      { label: 'since', text: 'Wed 07:32.' },
      { label: 'changes it', text: 'A fall of 1 point.' },
    ]);
  });

  it('keep open what is loud and fold what is quiet', () => {
    const loud = rows({ stalled: { verdict: 'yes', kind: 'stuck' }, rack: { verdict: 'yes' }, temperature: { verdict: 'unknown' }, sensor: { verdict: 'yes', kind: 'silent' } }).filter(isLoud);
    expect(loud.map((item) => item.name)).toEqual(['stalled', 'sensor', 'rack']);
  });
});

describe('the ruler of a call', () => {
  const stalled = call({
    evidence: [
      { name: 'gravity', value: 1.041, threshold: 1.021, unit: 'SG' },
      { name: 'fall', value: 0.1, threshold: 0.5, unit: 'points/d' },
    ],
  });

  it('weighs the pace against its limit, good above it for a stall and below it for racking', () => {
    expect(rulerOf('stalled', stalled, 1.068)).toMatchObject({ value: 0.1, limit: 0.5, good: 'above', says: '0.1 points', limitSays: '0.5 points needed', from: 0 });
    expect(rulerOf('rack', stalled, 1.068)).toMatchObject({ good: 'below', limitSays: '0.5 points at most' });
  });

  it('leaves the other figure to words', () => {
    expect(thresholdsOf(stalled, 1)).toBe('Gravity 1.041, limit 1.021.');
    expect(thresholdsOf(call(), null)).toBeNull();
  });

  it('holds a chance between nothing and certainty', () => {
    expect(rulerOf('bottle', call({ evidence: [{ name: 'chance of a late fall', value: 83, threshold: 10, unit: '%' }] }), 1.068)).toMatchObject({ says: '83 %', limitSays: '10 % at most', good: 'below', from: 0, to: 100 });
  });

  it('holds a gravity between its own ends, never from zero', () => {
    const ruler = rulerOf('rack', call({ evidence: [{ name: 'gravity', value: 1.041, threshold: 1.021, unit: 'SG' }] }), 1.068)!;
    expect(ruler.from).toBeGreaterThan(0.95);
    expect(ruler.from).toBeLessThan(1.021);
    expect(ruler.to).toBeGreaterThan(1.068);
  });

  it('is good above the limit for what is too cold and below it for what is too warm', () => {
    const warmth = (kind: string) => call({ kind, evidence: [{ name: 'temperature', value: 15, threshold: 18, unit: '°C' }] });
    expect(rulerOf('temperature', warmth('low'), null)!.good).toBe('above');
    expect(rulerOf('temperature', warmth('high'), null)!.good).toBe('below');
  });

  it('is not drawn where no figure has a limit', () => {
    expect(rulerOf('sensor', call({ evidence: [{ name: 'x', value: 1, threshold: null, unit: '' }] }), null)).toBeNull();
  });

  it('writes each unit as the log does', () => {
    expect([figureWords(1.0412, 'SG'), figureWords(0.611, 'L/h'), figureWords(4.166667, 'h'), figureWords(-0.5, '°C'), figureWords(2, 'points/d'), figureWords(1.26, 'volumes')]).toEqual(['1.041', '0.61 L/h', '4 h 10 min', '−0.5 °C', '2 points a day', '1.3 volumes']);
  });
});
