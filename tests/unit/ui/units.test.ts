import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { splitFigures } from '@/lib/core/units/figures';
import { figureRead, gravityDoubt, gravityEnds, gravityText, gravityTyped, temperatureText, volumeEnds, volumeText } from '@/components/ui/units';
import { USUAL_UNITS, type ChosenUnits } from '@/lib/core/units/chosen';

const others: ChosenUnits = { gravity: 'plato', temperature: 'f', volume: 'us_gal' };
/** A sentence as somebody with other units reads it. */
const read = (sentence: string, units = others) =>
  splitFigures(sentence)
    .map((piece, index, pieces) => (piece.figure ? figureRead(piece.text, pieces[index - 1]?.text, units) : piece.text))
    .join('');

describe('figures in the units that a person reads', () => {
  it('turns SG into °P and °Bx by the published tables', () => {
    // Bates et al., NBS Circular C440 (1942), table 114: 10 % sucrose is 1.04003, 20 % is 1.08297 (20/20 °C, in air).
    expect(gravityText(1.04003, { ...others, gravity: 'plato' })).toBe('10.0 °P');
    expect(gravityText(1.08297, { ...others, gravity: 'brix' })).toBe('20.0 °Bx');
    expect(gravityText(1.04, USUAL_UNITS)).toBe('1.040');
    expect(gravityText(1, others)).toBe('0.0 °P');
    expect(gravityText(0.996, others)).toBe('−1.0 °P');
  });

  it('turns °C into °F and litres into gallons by their definitions', () => {
    expect(temperatureText(20, 1, others)).toBe('68.0 °F');
    expect(temperatureText(-40, 0, others)).toBe('−40 °F');
    expect(volumeText(3.785411784, undefined, others)).toBe('1 gal');
    expect(volumeText(4.54609, undefined, { ...others, volume: 'imp_gal' })).toBe('1 gal');
    expect(volumeText(4.5, undefined, USUAL_UNITS)).toBe('4.5 L');
    expect(volumeText(-0.42, 1, USUAL_UNITS)).toBe('−0.4 L');
    expect(volumeEnds({ lo: 3.785411784, hi: 7.570823568 }, others)).toBe('1 to 2 gal');
    expect(volumeEnds({ lo: 4.51, hi: 4.52 }, USUAL_UNITS)).toBeUndefined();
  });

  it('reads whole sentences, with spreads and spans, and leaves all else alone', () => {
    expect(read('Stopped at 1.041, as on Wed 14:00.')).toBe('Stopped at 10.2 °P, as on Wed 14:00.');
    expect(read('It should stop at 1.006 ± 0.004.')).toBe('It should stop at 1.5 °P ± 1.0 °P.');
    expect(read('15.4 °C, in its range.')).toBe('59.7 °F, in its range.');
    expect(read('Wanted is 15–22 °C.')).toBe('Wanted is 59–72 °F.');
    expect(read('4.5 L left.')).toBe('1.19 gal left.');
    for (const same of ['gas 0.61 L/h, under 0.45 by then', '6 points a day', '3.0 bar at 2.5 volumes', '120 g of sugar, 2 g/L', '8 in 10']) expect(read(same)).toBe(same);
  });

  it('takes a step of temperature for a step', () => {
    expect(read('Add must until the two are within 10 °C.')).toBe('Add must until the two are within 18 °F.');
    expect(read('A must under 40 °C.')).toBe('A must under 104 °F.');
  });

  it('changes nothing for who reads SG, °C and litres', () => {
    fc.assert(fc.property(fc.string({ unit: 'binary', maxLength: 80 }), (sentence) => read(sentence, USUAL_UNITS) === sentence));
  });

  it('is not turned a second time', () => {
    const once = read('1.048 at 18.5 °C, 4.5 L, ends 1.002–1.006.');
    expect(read(once)).toBe(once);
  });

  it('says half an interval in the same unit', () => {
    expect(gravityDoubt(1.01, 0.003, USUAL_UNITS)).toBe('± 0.003');
    expect(gravityDoubt(1.01, 0.004, others)).toBe('± 1.0 °P');
    expect(gravityEnds({ lo: 1.045, hi: 1.052 }, others)).toBe('11.2 to 12.9 °P');
    expect(gravityEnds({ lo: 1.0501, hi: 1.0502 }, USUAL_UNITS)).toBe('1.050');
  });

  it('takes °P typed by who reads °P only where it cannot be an SG', () => {
    expect(gravityTyped(12, others)).toBeCloseTo(1.0484, 3);
    expect(gravityTyped(1.048, others)).toBe(1.048);
    expect(gravityTyped(12, USUAL_UNITS)).toBe(12);
    expect(gravityTyped(60, others)).toBe(60);
  });
});
