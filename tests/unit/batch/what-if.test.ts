import { describe, expect, it } from 'vitest';
import { curveLaid, curveWords } from '@/components/batch/other-curve';
import { isTouched, NOTHING_ELSE, play, type WhatIfDraft } from '@/components/batch/what-if';
import { assess } from '@/lib/core/assess';
import { layBeside, type Beside } from '@/lib/core/fit/other';
import { modelGravity } from '@/lib/core/fit/models';
import type { Footing, Reading } from '@/lib/core/types';
import { Random } from '../../evaluation/random';
import { batch } from './fixtures';

const PITCH = Date.UTC(2026, 9, 1, 18);
const DAY = 86_400_000;
const NOW = (PITCH + 5 * DAY) / 1000;
const random = new Random(2, 'play');
const readings: Reading[] = Array.from({ length: 5 * 48 + 1 }, (_, i) => ({ at: PITCH + (i / 48) * DAY, gravity: 1 + (modelGravity('kinetic', [55, -1, -1, 0.2, -1.2, -1], i / 48) + random.normal(0, 0.4)) / 1000, temperature: 19 }));
const footing: Footing = assess({ kind: 'cider', pitchedAt: PITCH, originalGravity: 1.055, volumeL: 4.5, vesselL: 6, attenuation: { min: 0.95, max: 1.05 }, alcoholToleranceAbv: 14, temperature: { minC: 15, maxC: 22 }, neck: 'airlock', events: [], timeZone: 'UTC' }, readings, PITCH + 5 * DAY).footing!;
const cider = batch({ kind: 'cider', volume_l: 4.5, vessel_l: 6, alcohol_tolerance_abv: 14, temperature_min_c: 15, temperature_max_c: 22, neck: 'airlock' });
const tried = (draft: Partial<WhatIfDraft>) => play({ ...NOTHING_ELSE, ...draft }, cider, footing, NOW, 'UTC');
const row = (draft: Partial<WhatIfDraft>, name: string) => tried(draft).rows.find((item) => item.name === name);

describe('what is played with under the chart', () => {
  it('says nothing until something is filled in', () => {
    expect(isTouched(NOTHING_ELSE)).toBe(false);
    expect(tried({})).toEqual({ errors: {}, rows: [], cautions: [], laid: null });
  });

  it('stands beside what is judged, and says where the two are the same', () => {
    expect(row({ temperature: '14' }, 'stops at')).toMatchObject({ same: true });
    expect(row({ temperature: '14' }, 'likely end')).toMatchObject({ same: false });
    expect(row({ gravity: '1.002' }, 'stops at')?.otherwise).toBe('1.002');
    expect(row({ sugar: '200' }, 'in the vessel')?.judged).toBe('4.5 L');
    expect(row({ temperature: '14' }, 'in the vessel')).toBeUndefined();
  });

  it('is drawn from now on and named as not real', () => {
    const { laid } = tried({ sugar: '200' });
    expect(laid).toMatchObject({ words: 'what if, not real' });
    expect(laid!.points[0]!.at).toBeCloseTo(NOW, 0);
    expect(laid!.end!.hi).toBeGreaterThan(laid!.end!.lo);
  });

  it('warns of a room out of the yeast’s range, of foam under an airlock, of a drink that gushes, of sugar that is left', () => {
    expect(tried({ temperature: '12' }).cautions[0]).toContain('it may stop before the end');
    expect(tried({ temperature: '26' }).cautions[0]).toContain('expect harsher');
    const fed = tried({ sugar: '1600', temperature: '22' }).cautions.join(' ');
    expect(fed).toContain('foams over');
    expect(fed).toContain('Not for bottles that hold pressure');
  });

  it('tells at its field what cannot be', () => {
    expect(tried({ gravity: '1.09' }).errors.gravity).toMatch(/^0\.980 to /);
    expect(tried({ temperature: '60' }).errors.temperature).toBe('4 to 34 °C');
    expect(tried({ volume: '3', liquidGravity: '1.05' }).errors.volume).toContain('room for 1.5 L');
    expect(tried({ volume: '1' }).errors.liquidGravity).toBe('tell its gravity');
    expect(tried({ sugar: '10', volume: '1', liquidGravity: '1.05' }).errors.sugar).toContain('one or the other');
    expect(tried({ sugar: 'much' }).errors.sugar).toMatch(/^0 to /);
    expect(tried({ gravity: '1.09' }).rows).toEqual([]);
  });
});

describe('why another curve is not in use', () => {
  const beside: Beside = { readings: 44, rms: { other: 0.91, own: 0.34 }, end: { other: 9, otherHalf: 2, own: 4, ownHalf: 1.5 }, aicMore: 31.4, gravity: () => 20 };

  it('is said with what each leaves unexplained, where each would end, and their support', () => {
    expect(curveWords('gompertz', beside)).toBe('Gompertz, modified: 0.9 points off on 44 readings, the curve in use 0.3 points. It would end at 1.009 ± 0.002; the curve in use at 1.004 ± 0.002. AIC 31 higher: hardly any support beside the curve in use.');
  });

  it('is honest where the other curve is as good, better, not determined, or cannot be had', () => {
    expect(curveWords('richards', { ...beside, aicMore: 6 })).toContain('considerably less support');
    expect(curveWords('richards', { ...beside, aicMore: -1 })).toContain('neither is the better');
    expect(curveWords('richards', { ...beside, aicMore: -12 })).toContain('AIC 12 lower: nearer to these readings');
    expect(curveWords('richards', { ...beside, end: { ...beside.end, otherHalf: null } })).toContain('which the readings do not determine');
    expect(curveWords('logistic', { model: 'logistic', reason: 'no fit', why: 'too few points' })).toBe('Logistic, 4 parameters cannot be fitted here: too few points.');
  });

  it('is drawn from the first reading to the end of the forecast', () => {
    const laid = curveLaid('logistic', layBeside(footing, 'logistic'), footing, NOW + 3 * 86_400)!;
    expect(laid.points[0]!.at).toBeLessThan(PITCH / 1000 + 86_400);
    expect(laid.points.at(-1)!.at).toBeCloseTo(NOW + 3 * 86_400, 0);
    const now = laid.points.find((point) => point.at >= NOW)!;
    expect(Math.abs(now.gravity - (1 + footing.level / 1000))).toBeLessThan(0.004);
  });
});
