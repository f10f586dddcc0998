import { describe, expect, it } from 'vitest';
import { complaintIn, keptText, shownText, typedNumber, unitOf } from '@/components/units/typed';
import { USUAL_UNITS, type ChosenUnits } from '@/lib/core/units/chosen';

const american: ChosenUnits = { gravity: 'brix', temperature: 'f', volume: 'us_gal' };
const imperial: ChosenUnits = { gravity: 'plato', temperature: 'f', volume: 'imp_gal' };

describe('a figure typed in the unit that a person reads', () => {
  it('is kept as SG, °C and litres', () => {
    // Bates et al., NBS Circular C440 (1942), table 114: 10 % sucrose is 1.04003 (20/20 °C, in air).
    expect(Number(keptText('10', 'gravity', imperial))).toBeCloseTo(1.04003, 4);
    expect(keptText('68', 'temperature', american)).toBe('20');
    expect(keptText('60', 'temperature', american)).toBe('15.56');
    expect(keptText('5', 'volume', american)).toBe('18.927');
    expect(keptText('1', 'volume', imperial)).toBe('4.546');
  });

  it('stays letter for letter where it is typed in what is kept', () => {
    for (const text of ['1,048', ' 12.50 ', '', '20', '4.5', '−3']) {
      for (const measure of ['temperature', 'volume'] as const) expect(keptText(text, measure, USUAL_UNITS)).toBe(text);
    }
    expect(keptText('1,048', 'gravity', USUAL_UNITS)).toBe('1,048');
  });

  it('comes back as it was typed, for every tenth of a degree and hundredth of a gallon', () => {
    const same = (typed: string, measure: 'gravity' | 'temperature' | 'volume', units: ChosenUnits) => expect(shownText(keptText(typed, measure, units), measure, units), `${typed} ${measure}`).toBe(typed);
    for (let tenths = -40; tenths <= 350; tenths += 1) {
      // A tenth under nought apparent extract is written with its sign.
      same((tenths / 10).toFixed(1), 'gravity', imperial);
      same(String(tenths / 10), 'temperature', american);
    }
    for (let hundredths = 1; hundredths <= 2000; hundredths += 7) {
      same(String(hundredths / 100), 'volume', american);
      same(String(hundredths / 100), 'volume', imperial);
    }
  });

  it('is understood in another unit where that is written beside it', () => {
    expect(keptText('60 F', 'temperature', USUAL_UNITS)).toBe('15.56');
    expect(keptText('20°C', 'temperature', american)).toBe('20');
    expect(Number(keptText('12.5 °P', 'gravity', USUAL_UNITS))).toBeCloseTo(1.0505, 4);
    expect(keptText('750 ml', 'volume', american)).toBe('0.75');
    expect(unitOf('60 f', 'temperature', USUAL_UNITS)).toBe('°F');
    expect(unitOf('1.25 gal', 'volume', american)).toBe('gal');
  });

  it('takes a hydrometer’s figure from who reads °P, and one read aloud without its point', () => {
    expect(keptText('1.048', 'gravity', imperial)).toBe('1.048');
    expect(unitOf('1.048', 'gravity', imperial)).toBe('SG');
    expect(keptText('1048', 'gravity', imperial)).toBe('1.048');
    expect(keptText('998', 'gravity', USUAL_UNITS)).toBe('0.998');
    // A dry drink's 1.2 °P is no must of 1.200.
    expect(Number(keptText('1.2', 'gravity', imperial))).toBeCloseTo(1.0046, 3);
  });

  it('is left as it was typed where it is no figure, so that the form can say so', () => {
    for (const text of ['abc', '12 L gone', '1.0.4', '60 K', '3 gal']) {
      for (const measure of ['gravity', 'temperature', 'volume'] as const) expect(keptText(text, measure, USUAL_UNITS)).toBe(text);
    }
    expect(shownText('abc', 'temperature', american)).toBe('abc');
    expect(unitOf('abc', 'temperature', american)).toBe('°F');
  });
});

describe('a complaint about a figure', () => {
  it('names its limits in the unit that the figure was typed in', () => {
    expect(complaintIn('must be between -10 and 60 °C', 'temperature', american)).toBe('must be between 14 and 140 °F');
    expect(complaintIn('must be at most 2000 L', 'volume', american)).toBe('must be at most 528.34 gal');
    expect(complaintIn('must be between 0.970 and 1.200', 'gravity', imperial)).toBe('must be between −8 and 43.9');
    expect(complaintIn('must be between -10 and 60 °C', 'temperature', USUAL_UNITS)).toBe('must be between -10 and 60 °C');
  });
});

describe('a number as a person types it', () => {
  it('takes a comma or a point, spaces around it and a real minus', () => {
    expect([typedNumber(' 1,048 '), typedNumber('12.5'), typedNumber('−3'), typedNumber('.5')]).toEqual([1.048, 12.5, -3, 0.5]);
  });

  it('is null where nothing was typed and NaN where it is no number', () => {
    expect(typedNumber('  ')).toBeNull();
    for (const text of ['1.0.4', 'abc', '1e3', '12 L', '1,0,4']) expect(typedNumber(text), text).toBeNaN();
  });
});
