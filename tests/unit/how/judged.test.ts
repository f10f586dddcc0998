import { describe, expect, it } from 'vitest';
import { HOW_STATUSES } from '@/lib/core/how/how';
import { howOfCall, howOfJudged, JUDGED_FIGURES, type JudgedFrom } from '@/lib/core/how/judged';
import { howOfReading } from '@/lib/core/how/readings';
import { CALL_NAMES } from '@/lib/core/types';

const FROM: JudgedFrom = {
  originalGravity: 1.052,
  volumeL: 4.5,
  yeast: 'dry cider yeast',
  sensor: 'Float 01',
  gravity: { value: 1.02, lo: 1.019, hi: 1.021 },
  finalGravity: { value: 1, lo: 0.998, hi: 1.002 },
  ratePointsPerDay: { value: 4.2, lo: 4, hi: 4.4 },
  abvPercent: 4.3,
};

describe('how a judged figure came about', () => {
  it.each(JUDGED_FIGURES)('%s: a formula, its inputs, a source', (figure) => {
    const told = howOfJudged(figure, FROM);
    expect(told.formula.length).toBeGreaterThan(20);
    expect(told.source.length).toBeGreaterThan(5);
    expect(HOW_STATUSES).toContain(told.status);
  });

  it('tells a float from a reading by hand', () => {
    expect(howOfJudged('gravity now', FROM)).toMatchObject({ status: 'our own rule', inputs: [{ name: 'read by', value: 'Float 01' }, { value: '1.020 (1.019 to 1.021)', unit: 'SG' }] });
    expect(howOfJudged('gravity now', { ...FROM, sensor: null }).status).toBe('told');
  });

  it.each(CALL_NAMES)('the call %s tells its rule and the figures that it was held to', (name) => {
    const told = howOfCall(name, [{ name: 'fall', value: 1.23456, threshold: 3, unit: 'points/d' }]);
    expect(told.formula.length).toBeGreaterThan(20);
    expect(told.inputs).toEqual([{ name: 'fall', value: 1.2346, unit: 'points/d' }, { name: 'fall, limit', value: 3, unit: 'points/d' }]);
  });
});

describe('how a logged gravity came about', () => {
  const plain = { gravity: 1.012, read: 1.011, sampleC: 24, calibratedC: 20, brix: null, must: false };

  it('says nothing of a reading that stands as it was read', () => {
    expect(howOfReading({ ...plain, read: 1.012 })).toBeNull();
    expect(howOfReading({ ...plain, sampleC: null })).toBeNull();
  });

  it('names the published correction of a hydrometer', () => {
    expect(howOfReading(plain)).toMatchObject({ status: 'published', inputs: [{ value: 1.011 }, { value: 24 }, { value: 20 }] });
  });

  it('marks what a refractometer says of a drink with alcohol as recalled, with its spread, and of a must as published', () => {
    const recalled = howOfReading({ ...plain, brix: 6.4 });
    expect(recalled?.status).toBe('from memory');
    expect(recalled?.formula).toContain('± 0.004');
    expect(howOfReading({ ...plain, brix: 12, must: true })?.status).toBe('published');
  });
});
