import { describe, expect, it } from 'vitest';
import { assess } from '../../../lib/core/assess';
import { foamOf, foamSeen } from '../../../lib/core/calls/foam';
import { modelGravity } from '../../../lib/core/fit/models';
import type { BatchSetup, Foam, Reading } from '../../../lib/core/types';

const PITCH = Date.UTC(2026, 1, 20, 18);
const DAY = 86_400_000;
const HOUR = 3_600_000;

const setup: BatchSetup = { kind: 'cider', pitchedAt: PITCH, originalGravity: 1.055, volumeL: 4.5, vesselL: 5, attenuation: { min: 0.95, max: 1.05 }, alcoholToleranceAbv: 14, temperature: { minC: 15, maxC: 22 }, neck: 'blow_off', events: [], timeZone: 'UTC' };

const cider = (day: number): number => modelGravity('kinetic', [55, -1, -1, 0.2, -1.2, -1], day);
function record(days: number, celsius: number): Reading[] {
  const count = days * 48;
  return Array.from({ length: count }, (_, index) => ({ at: PITCH + index * 30 * 60_000, gravity: 1 + (cider(index / 48) + 0.3 * Math.sin(index)) / 1000, temperature: celsius }));
}
const callsAt = (day: number, extra: Partial<BatchSetup>, celsius = 19) => assess({ ...setup, ...extra }, record(day, celsius), PITCH + day * DAY).assessment.calls;
const seen = (foam: Foam, hoursAgo: number, day = 13) => ({ events: [{ at: PITCH + day * DAY - hoursAgo * HOUR, kind: 'note' as const, foam }] });

describe('foam', () => {
  it('keeps the tube on where it stands high, however low the gas', () => {
    expect(callsAt(13, {}).neck.verdict).toBe('yes');
    for (const foam of ['cover', 'at_neck'] as const) {
      const { neck } = callsAt(13, seen(foam, 2));
      expect(neck).toMatchObject({ verdict: 'hold', headline: 'Leave the tube on: foam stands high.' });
      expect(neck.reason).toContain('Thu 16:00');
    }
  });

  it('lets the tube go where there is none or a ring, and where nobody looked since yesterday', () => {
    for (const foam of ['none', 'ring'] as const) expect(callsAt(13, seen(foam, 2)).neck.verdict).toBe('yes');
    expect(callsAt(13, seen('cover', 25)).neck.verdict).toBe('yes');
  });

  it('is named as it was seen: what the krausen does is not told from the gas while somebody or a probe looks at it', () => {
    expect(callsAt(13, {}).neck.reason).toContain('Krausen falling; gas');
    expect(callsAt(13, seen('ring', 2)).neck.reason).toMatch(/^A ring of foam stood Thu 16:00; gas/);
    expect(callsAt(13, seen('none', 2)).neck.reason).toMatch(/^No foam was seen Thu 16:00; gas/);
    for (const day of [2, 3, 4, 5, 6, 7, 8]) {
      for (const foam of ['ring', 'cover'] as const) expect(callsAt(day, seen(foam, 2, day)).neck.reason).not.toContain('Krausen');
    }
  });

  it('asks for the tube back where it has reached an airlock', () => {
    expect(callsAt(13, { ...seen('at_neck', 1), neck: 'airlock' }).neck).toMatchObject({ verdict: 'hold', act: 'Put the blow-off tube back on.' });
    expect(callsAt(13, { ...seen('cover', 1), neck: 'airlock' }).neck.verdict).toBe('no');
  });

  it('counts as last seen, and not before it was known', () => {
    const events = [
      { at: 2 * HOUR, kind: 'note' as const, foam: 'none' as const },
      { at: HOUR, kind: 'note' as const, foam: 'cover' as const },
      { at: 3 * HOUR, kind: 'note' as const, foam: 'at_neck' as const, knownAt: 5 * HOUR },
    ];
    expect(foamSeen(events, 4 * HOUR)).toEqual({ foam: 'none', at: 2 * HOUR });
    expect(foamSeen(events, 5 * HOUR)).toEqual({ foam: 'at_neck', at: 3 * HOUR });
    expect(foamSeen(events, HOUR / 2)).toBeNull();
  });

  it('has a word for each height that a probe sees', () => {
    expect([0, 2.9, 3, 9.9, 10, 200].map(foamOf)).toEqual(['none', 'none', 'ring', 'ring', 'cover', 'cover']);
  });
});

describe('the room', () => {
  it('is named beside a temperature that is wrong, with what the drink warms itself by', () => {
    const { temperature } = callsAt(3, { roomC: 21 }, 25);
    expect(temperature).toMatchObject({ verdict: 'yes', kind: 'high', reason: 'Wanted: 15.0 °C to 22.0 °C. The room is 21.0 °C: it works itself warmer by 4.0 °C.' });
    expect(temperature.evidence).toContainEqual({ name: 'room', value: 21, threshold: null, unit: '°C' });
    expect(callsAt(3, { roomC: 24.5 }, 25).temperature.reason).toBe('Wanted: 15.0 °C to 22.0 °C. The room is 24.5 °C.');
  });

  it('changes no verdict and no word where nobody measured it', () => {
    expect(callsAt(3, { roomC: null })).toEqual(callsAt(3, {}));
    expect(callsAt(3, { roomC: 10 }).temperature.verdict).toBe('no');
  });
});

describe('a fining', () => {
  const fined = (hoursAgo: number, days: number, day = 30) => ({ events: [{ at: PITCH + day * DAY - hoursAgo * HOUR, kind: 'note' as const, settlesAt: PITCH + day * DAY + (days * 24 - hoursAgo) * HOUR }] });

  it('that still falls makes the bottles wait until it has settled, and no longer', () => {
    const { bottle } = callsAt(30, {});
    expect(bottle.verdict).toBe('yes');
    const waiting = callsAt(30, fined(24, 5)).bottle;
    expect(waiting).toMatchObject({ verdict: 'soon', expectedAt: PITCH + 34 * DAY, headline: 'Bottling: wait until it has settled, Thu 18:00.' });
    expect(waiting.evidence).toEqual(bottle.evidence);
    expect(callsAt(30, fined(121, 5)).bottle).toMatchObject({ verdict: 'yes' });
    expect(callsAt(30, fined(-1, 5)).bottle).toMatchObject({ verdict: 'yes' });
  });

  it('changes nothing of a batch that is not ready anyway', () => {
    expect(callsAt(6, fined(24, 5, 6)).bottle).toEqual(callsAt(6, {}).bottle);
  });
});
