import { describe, expect, it } from 'vitest';
import { drinkHex, drinkShare, isDark, luminance } from '@/components/charts/palette';
import { hazeTile } from '@/components/charts/haze';
import { keepClear, placePosts, rightmostRoom } from '@/components/charts/place';
import { temperatureWords } from '@/components/charts/over';
import { flatHours, pictureOf, postsOf } from '@/components/charts/from-wire';
import { spanWords } from '@/lib/core/calls/words';
import { twinOf } from '@/components/charts/twin';
import { afterKey, isWhole, moved, NARROWEST_S, within, zoomed } from '@/components/charts/zoom';
import { HOUR, NOW, picture, straight } from './fixtures';

describe('posts', () => {
  it('drop the word that would run into the next box, and keep the one that fits', () => {
    const placed = placePosts([{ x: 0, box: 17, word: 40 }, { x: 30, box: 17, word: 40 }], 200);
    expect(placed.map((post) => post.word)).toEqual([false, true]);
  });

  it('stand beside each other where two events fall together', () => {
    const [first, second] = placePosts([{ x: 10, box: 17, word: 0 }, { x: 12, box: 17, word: 0 }], 200);
    expect(second!.left).toBeGreaterThanOrEqual(first!.left + first!.width);
  });

  it('never move further than their own width', () => {
    const placed = placePosts(Array.from({ length: 20 }, () => ({ x: 5, box: 17, word: 0 })), 200);
    expect(Math.max(...placed.map((post) => post.left))).toBeLessThanOrEqual(5 + 17 + 2);
  });

  it('number additions of one sort and leave a lone one bare', () => {
    const event = (at: number, over: object) => ({ kind: 'addition' as const, at: new Date((NOW + at) * 1000).toISOString(), gravity: null, neck: null, text: 'yeast food', ...over });
    const posts = postsOf([event(20, {}), event(10, {}), event(30, { sugar_g: 120 })], new Date(NOW * 1000).toISOString());
    expect(posts.map((post) => post.letters)).toEqual(['P', 'N1', 'N2', 'S']);
  });
});

describe('labels', () => {
  it('give way to what was placed before them', () => {
    const label = (x: number) => ({ x, y: 0, width: 30, height: 12 });
    expect(keepClear([label(0), label(20), label(40)])).toEqual([0, 2]);
    expect(keepClear([label(0), label(40)], [label(10)])).toEqual([1]);
  });
});

describe('a caption', () => {
  const room = { from: 0, to: 100 };
  it('stands as far right as it covers nothing, and nowhere where there is no room', () => {
    expect(rightmostRoom(30, room, [])).toBe(100);
    expect(rightmostRoom(30, room, [{ from: 80, to: 90 }])).toBe(80);
    expect(rightmostRoom(8, room, [{ from: 80, to: 90 }])).toBe(100);
    expect(rightmostRoom(30, room, [{ from: 80, to: 120 }, { from: 60, to: 70 }])).toBe(60);
    expect(rightmostRoom(30, room, [{ from: 20, to: 95 }])).toBeNull();
  });

  it('is not moved by what lies under another', () => {
    expect(rightmostRoom(30, room, [{ from: 40, to: 98 }, { from: 60, to: 70 }])).toBe(40);
  });
});

describe('the drink’s colour', () => {
  it('falls back to a drink rather than to nothing', () => {
    expect(drinkHex('stout')).toBe('#3B2218');
    expect(drinkHex('#12ab9F')).toBe('#12ab9F');
    expect(drinkHex('url(x)')).toBe(drinkHex('gold'));
  });

  it('has the luminance that WCAG 2.2 defines: white 1, black 0, #777777 about 0.184', () => {
    expect(luminance('#ffffff')).toBeCloseTo(1, 6);
    expect(luminance('#000000')).toBe(0);
    expect(luminance('#777777')).toBeCloseTo(0.184, 3);
  });

  it('is let through less on the batch page by day where it is dark, and more at night', () => {
    const dark = isDark(drinkHex('stout'));
    expect(dark).toBe(true);
    expect(isDark(drinkHex('copper'))).toBe(false);
    expect(drinkShare({ night: false, dark }, true)).toBeLessThan(drinkShare({ night: false, dark: false }, true));
    expect(drinkShare({ night: true, dark }, true)).toBeGreaterThan(drinkShare({ night: true, dark: false }, true));
  });
});

describe('haze', () => {
  it('is whole device pixels with a gap between its lines at every density', () => {
    for (const ratio of [1, 1.25, 1.5, 2, 2.75, 3]) {
      const { period, line } = hazeTile(ratio);
      expect(Number.isInteger(period) && Number.isInteger(line)).toBe(true);
      expect(period).toBeGreaterThan(line);
    }
  });
});

describe('temperature now', () => {
  const at = (temperature: number | null, range: { min: number; max: number } | null = { min: 18, max: 21 }) => ({ readings: { at: [NOW], gravity: [null], temperature: [temperature] }, range });
  it('says low or high only outside the range, with how far on a page', () => {
    expect(temperatureWords(at(15.4), false)).toBe('15.4 °C low');
    expect(temperatureWords(at(15.4), true)).toBe('15.4 °C, 2.6 below range');
    expect(temperatureWords(at(22), true)).toBe('22.0 °C, 1.0 above range');
    expect(temperatureWords(at(18), true)).toBe('18.0 °C');
    expect(temperatureWords(at(-1, null), false)).toBe('−1.0 °C');
    expect(temperatureWords(at(null), false)).toBeNull();
  });
});

describe('zooming', () => {
  const whole = { from: 0, to: 100 * HOUR };
  it('keeps the instant under the finger where it is', () => {
    const about = 60 * HOUR;
    const next = zoomed(whole, whole, 2, about);
    expect((about - next.from) / (next.to - next.from)).toBeCloseTo(0.6, 9);
    expect(next.to - next.from).toBe(50 * HOUR);
  });

  it('never leaves the whole and never goes narrower than two hours', () => {
    expect(moved({ from: 90 * HOUR, to: 100 * HOUR }, whole, 5)).toEqual({ from: 90 * HOUR, to: 100 * HOUR });
    expect(within({ from: -50 * HOUR, to: 300 * HOUR }, whole)).toEqual(whole);
    const far = zoomed(whole, whole, 1000, 0);
    expect(far.to - far.from).toBe(NARROWEST_S);
  });

  it('answers its keys and no others; 0 shows all again', () => {
    const span = { from: 10 * HOUR, to: 20 * HOUR };
    expect(afterKey('ArrowRight', span, whole)).toEqual({ from: 12 * HOUR, to: 22 * HOUR });
    expect(isWhole(afterKey('0', span, whole)!, whole)).toBe(true);
    expect(afterKey('a', span, whole)).toBeNull();
  });
});

describe('the text twin', () => {
  it('says in one sentence what the chart shows', () => {
    const { sentence } = twinOf(picture({ curve: straight(), likelyEnd: { lo: NOW, hi: NOW, words: '20–22 Oct' } }), 'Perry', 'UTC');
    expect(sentence).toBe('Perry: gravity 1.030; fallen 30 points from 1.060; should stop at 1.010, 8 in 10 between 1.007 and 1.013; likely 20–22 Oct.');
  });

  it('says so where there is nothing yet', () => {
    expect(twinOf(picture(), 'Perry', 'UTC')).toMatchObject({ sentence: 'Perry: no readings yet.', rows: [] });
  });

  it('holds the last reading and no more rows than asked, with a forecast after them', () => {
    const at = Array.from({ length: 500 }, (_, index) => NOW - (500 - index) * 600);
    const twin = twinOf(picture({ curve: straight(), readings: { at, gravity: at.map(() => 1.03), temperature: at.map(() => 17) } }), 'Perry', 'UTC', 40);
    const read = twin.rows.filter((row) => !row[0]!.includes('forecast'));
    expect(read.length).toBeLessThanOrEqual(41);
    expect(read.at(-1)![0]).toBe('Thu 15 Oct 14:22');
    expect(twin.rows.length).toBeGreaterThan(read.length);
  });
});

describe('a picture from what the server tells', () => {
  const iso = (at: number) => new Date(at * 1000).toISOString();
  const batch = {
    original_gravity: 1.06,
    pitched_at: iso(NOW - 100 * HOUR),
    drink_colour: 'amber',
    assessment: null,
    attenuation_min_percent: 70,
    attenuation_max_percent: 80,
    temperature_min_c: 18,
    temperature_max_c: null,
  };
  it('has a bed from the yeast’s range before anything was judged, and no range with one end', () => {
    const made = pictureOf({ batch, series: undefined, drawn: undefined, entries: [] }, NOW, 'UTC');
    expect(made.bed!.value).toBeCloseTo(1.015, 9);
    expect(made.bed!.lo).toBeCloseTo(1.012, 9);
    expect(made.bed!.hi).toBeCloseTo(1.018, 9);
    expect(made.range).toBeNull();
    expect(made.posts.map((post) => post.letters)).toEqual(['P']);
  });

  it('has a bracket as long as the sentence beside it says', () => {
    const stalled = { verdict: 'yes', kind: 'cold', since: iso(NOW - 82 * HOUR), headline: 'Stopped at 1.025: flat for 5 days.' };
    const judged = { ...batch, assessment: { gravity: { value: 1.025 }, calls: { stalled, sensor: { verdict: 'no' }, neck: { evidence: [] } } } } as unknown as typeof batch;
    const made = pictureOf({ batch: judged, series: undefined, drawn: undefined, entries: [] }, NOW, 'UTC');
    expect(made.bracket).toMatchObject({ from: NOW - 5 * 24 * HOUR, to: NOW, words: 'flat 5 days' });
    for (const hours of [31, 4 + 1 / 6, 72]) expect(flatHours(`Stopped at 1.041: flat for ${spanWords(hours)}.`)).toBeCloseTo(hours, 9);
    expect(flatHours('Slow: 0.4 points a day.')).toBeNull();
  });

  it('never draws gas below nothing', () => {
    const made = pictureOf({ batch, series: undefined, drawn: { curve: [], expected: [], gas: [{ at: iso(NOW), value: -0.02 }] }, entries: [] }, NOW, 'UTC');
    expect(made.gas).toEqual([{ at: NOW, value: 0 }]);
  });
});
