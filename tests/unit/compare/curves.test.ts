import { describe, expect, it } from 'vitest';
import { closer, curveOf, tableDays, valueAt, type Compared } from '@/components/compare/curves';

function compared(over: Partial<Compared> = {}): Compared {
  return {
    batch: { id: '00000000-0000-4000-8000-000000000001', name: 'Trial', kind: 'cider', drink_colour: 'gold', vessel_kind: 'demijohn', tag: null, volume_l: 4.5, state: 'working', pitched_at: '2031-10-01T00:00:00.000Z', original_gravity: 1.05, yeast: null },
    zero_at: '2031-10-01T00:00:00.000Z',
    hours: [0, 24, 48],
    gravity: [1.05, 1.03, 1.01],
    temperature: [18, null, 20],
    curve: [],
    by_hand: [{ hour: 36, gravity: 1.021 }],
    posts: [{ hour: 36, kind: 'rack' }, { hour: 900, kind: 'addition' }],
    result: { gravity: 1.01, abv_percent: 5.3, how: null, attenuation_percent: 80, hours_to_terminal: null, score: null, lots: 0 },
    ...over,
  };
}

describe('a curve of the comparison', () => {
  it('counts days from the pitch, and tells the fall as a share of its own points', () => {
    expect(curveOf(compared(), 'gravity', '#000').points).toEqual([{ day: 0, value: 1.05 }, { day: 1, value: 1.03 }, { day: 2, value: 1.01 }]);
    const share = curveOf(compared(), 'share', '#000').points.map((point) => Math.round(point.value));
    expect(share).toEqual([0, 40, 80]);
  });

  it('is drawn as it was judged, where it was', () => {
    expect(curveOf(compared({ curve: [{ hour: 0, gravity: 1.051 }, { hour: 48, gravity: 1.011 }] }), 'gravity', '#000').points).toEqual([{ day: 0, value: 1.051 }, { day: 2, value: 1.011 }]);
  });

  it('draws no spike for a knock', () => {
    const hours = Array.from({ length: 30 }, (_, index) => index);
    const curve = curveOf(compared({ hours, gravity: hours.map((hour) => (hour === 12 ? 1.09 : 1.05 - hour / 1000)), temperature: hours.map(() => 18) }), 'gravity', '#000');
    expect(Math.max(...curve.points.map((point) => point.value))).toBeLessThanOrEqual(1.05);
    expect(curve.points[20]!.value).toBeCloseTo(1.03, 9);
  });

  it('joins the readings by hand where no sensor was in it', () => {
    const curve = curveOf(compared({ hours: [], gravity: [], temperature: [] }), 'gravity', '#000');
    expect(curve.points).toEqual([{ day: 0, value: 1.05 }, { day: 1.5, value: 1.021 }]);
  });

  it('has no share of the fall without an original gravity, and leaves out what was not measured', () => {
    const item = compared();
    expect(curveOf({ ...item, batch: { ...item.batch, original_gravity: null } }, 'share', '#000').points).toEqual([]);
    expect(curveOf(item, 'temperature', '#000').points).toEqual([{ day: 0, value: 18 }, { day: 2, value: 20 }]);
  });

  it('sets a post on the curve, and none where the curve has not come to', () => {
    expect(curveOf(compared(), 'gravity', '#000').posts).toEqual([{ day: 1.5, value: expect.closeTo(1.02, 9) as number, letter: 'R', kind: 'rack' }]);
  });

  it('has all the readings of a part that is looked at closely, and the others around it', () => {
    const near = compared({ hours: [20, 24, 28], gravity: [1.034, 1.03, 1.026], temperature: [18, 18, 18] });
    expect(closer(compared(), near)).toMatchObject({ hours: [0, 20, 24, 28, 48], gravity: [1.05, 1.034, 1.03, 1.026, 1.01] });
    expect(closer(compared(), compared({ hours: [], gravity: [], temperature: [] }))).toEqual(compared());
    expect(closer(compared(), undefined)).toEqual(compared());
    const last = compared({ hours: [40, 48, 60], gravity: [1.015, 1.01, 1.009], temperature: [20, 20, 20] });
    expect(closer(compared(), last).hours).toEqual([0, 24, 40, 48, 60]);
    const judged = (hours: number[]) => compared({ curve: hours.map((hour) => ({ hour, gravity: 1.05 - hour / 2000 })) });
    expect(closer(judged([0, 24, 48]), judged([20, 21, 22, 23, 24, 25])).curve.map(({ hour }) => hour)).toEqual([0, 20, 21, 22, 23, 24, 25, 48]);
  });

  it('says nothing before and after a curve', () => {
    const { points } = curveOf(compared(), 'gravity', '#000');
    expect(valueAt(points, -1)).toBeNull();
    expect(valueAt(points, 2)).toBe(1.01);
    expect(valueAt(points, 2.1)).toBeNull();
    expect(tableDays([curveOf(compared(), 'gravity', '#000')])).toEqual([0, 1, 2]);
  });
});
