import { describe, expect, test } from 'vitest';
import { gapOf, measuredOriginal } from '@/lib/core/must/original-gravity';
import { pitchChecklist } from '@/lib/core/must/pitch';
import { exactly, within } from '@/lib/core/units/range';
import { yeastNamed } from '../../support/must';

const gravity = (of: ReturnType<typeof measuredOriginal>) => {
  if (!of.ok) throw new Error(of.sentence);
  return of.gravity.value;
};

describe('original gravity as measured', () => {
  test('a warm sample is corrected upwards, and the doubt is half a division', () => {
    const { lo, value, hi } = gravity(measuredOriginal({ with: 'hydrometer', reading: 1.06, sampleC: 28, calibrationC: 20 }));
    expect(value).toBeGreaterThan(1.0615);
    expect(value).toBeLessThan(1.0628);
    expect(hi - lo).toBeCloseTo(0.001, 9);
  });

  test('a hydrometer made for 15.56 °C reads the same must differently from one made for 20 °C', () => {
    const old = gravity(measuredOriginal({ with: 'hydrometer', reading: 1.05, sampleC: 20, calibrationC: 15.56 })).value;
    const other = gravity(measuredOriginal({ with: 'hydrometer', reading: 1.05, sampleC: 20, calibrationC: 20 })).value;
    expect(old - other).toBeGreaterThan(0.0006);
    expect(old - other).toBeLessThan(0.0012);
  });

  test('a hot sample is refused with the reason', () => {
    expect(measuredOriginal({ with: 'hydrometer', reading: 1.05, sampleC: 60, calibrationC: 20 })).toMatchObject({ ok: false, sentence: expect.stringContaining('cracks glass') });
  });

  test('a refractometer at the start: 12 °Bx is 1.0484', () => {
    expect(gravity(measuredOriginal({ with: 'refractometer', brix: 12, sampleC: null })).value).toBeCloseTo(1.0484, 4);
    expect(measuredOriginal({ with: 'refractometer', brix: 12, sampleC: 30 }).ok).toBe(false);
  });

  test('a gap says what it may mean; within both doubts there is none', () => {
    const expected = { lo: 1.058, value: 1.06, hi: 1.062 };
    expect(gapOf(expected, within(1.0615, 0.0005))).toMatchObject({ verdict: 'as_expected', causes: [] });
    expect(gapOf(expected, within(1.05, 0.0005)).causes[0]).toContain('bottom');
    expect(gapOf(expected, within(1.07, 0.0005)).causes[0]).toContain('Bubbles');
    expect(gapOf(expected, exactly(1.05)).points).toBeCloseTo(-10, 6);
  });
});

describe('the pitch', () => {
  const yeast = yeastNamed('mead yeast');
  const base = { yeast, dryYeastG: 5, mustC: 20, glass: true, sulphited: false };

  test('at the right temperature nothing stands in the way, and dry yeast gets ten times its weight of warm water', () => {
    const { steps, stops } = pitchChecklist(base);
    expect(stops).toEqual([]);
    expect(steps.find((s) => s.key === 'water')?.sentence).toContain('50 ml');
    expect(steps.find((s) => s.key === 'cool')?.caution).toContain('hot liquid into cold glass');
  });

  test.each([
    [{ mustC: 60 }, 'glass'],
    [{ mustC: 45, glass: false }, 'dies'],
    [{ mustC: 26 }, 'over the yeast'],
    [{ mustC: 10 }, 'under the yeast'],
  ])('%o stops it', (over, word) => {
    expect(pitchChecklist({ ...base, ...over }).stops.join(' ')).toContain(word);
  });

  test('a day passes after sulphite, before anything else, and no step speaks of it where none went in', () => {
    expect(pitchChecklist({ ...base, sulphited: true }).steps[0]).toMatchObject({ key: 'sulphite', sentence: expect.stringContaining('24 h') });
    expect(pitchChecklist(base).steps.map((s) => s.key)).not.toContain('sulphite');
  });

  test('liquid yeast needs no rehydration', () => {
    expect(pitchChecklist({ ...base, dryYeastG: null }).steps.map((s) => s.key)).not.toContain('rehydrate');
  });
});
