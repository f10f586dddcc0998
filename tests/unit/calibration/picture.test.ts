import { describe, expect, it } from 'vitest';
import { degreesScale, placed, scaleOf, withRoom } from '@/components/sensors/calibration-picture';
import { fromLocalInput, readNumber, toLocalInput } from '@/components/sensors/numbers';
import { daysWords } from '@/components/sensors/Health';
import { signedPoints } from '@/components/sensors/words';

describe('the picture of a calibration', () => {
  it('has even ticks that hold every value', () => {
    const scale = scaleOf([0.9987, 1.0812], 6);
    expect(scale.from).toBeLessThanOrEqual(0.9987);
    expect(scale.to).toBeGreaterThanOrEqual(1.0812);
    expect(scale.ticks).toEqual([0.98, 1, 1.02, 1.04, 1.06, 1.08, 1.1]);
    expect(placed(scale, 100, 0)(scale.from)).toBe(100);
  });
  it('never leans beyond what can be', () => {
    expect(degreesScale([10, 88], 9)).toMatchObject({ from: 0, to: 90 });
  });
  it('leaves out labels that would lie on each other', () => {
    expect(withRoom([10, 30, 60, 61, 120], 40)).toEqual([true, false, true, false, true]);
    expect(withRoom([], 40)).toEqual([]);
  });
});

describe('what a sensor’s page says', () => {
  it('reads numbers with a point or a comma, and nothing else', () => {
    expect([readNumber('1,5'), readNumber('−3'), readNumber(' 20 '), readNumber('1.2.3'), readNumber('')]).toEqual([1.5, -3, 20, null, null]);
  });
  it('puts times on the cellar’s clock and back, across the change to summer time', () => {
    const at = Date.parse('2026-03-29T10:30:00Z');
    expect(toLocalInput(at, 'Europe/Berlin')).toBe('2026-03-29T12:30');
    expect(fromLocalInput('2026-03-29T12:30', 'Europe/Berlin')).toBe('2026-03-29T10:30:00.000Z');
    expect(fromLocalInput('soon', 'Europe/Berlin')).toBeNull();
  });
  it('gives the days of a cell with how sure they are', () => {
    expect(daysWords({ value: 90.2, lo: 70.9, hi: 119.1 })).toBe('about 90 days, 70–120');
    expect(daysWords({ value: 90, lo: 70, hi: null })).toBe('about 90 days, 70 at least');
    expect(daysWords({ value: 0, lo: 0, hi: 0 })).toBe('flat');
    expect(daysWords(null)).toBeNull();
  });
  it('writes points with a real sign', () => {
    expect([signedPoints(0.0003), signedPoints(-0.0009), signedPoints(0)]).toEqual(['+0.3', '−0.9', '+0.0']);
  });
});
