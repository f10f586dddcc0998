import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { splitFigures } from '@/lib/core/units/figures';

const figures = (sentence: string) => splitFigures(sentence).filter((piece) => piece.figure).map((piece) => piece.text);

describe('figures in a sentence', () => {
  it.each([
    ['No fall for 31 h at 1.041: check.', ['31 h', '1.041']],
    ['Swap tube for airlock: from Thu 14:00.', ['Thu 14:00']],
    ['Krausen falling; gas 0.61 L/h, under 0.45 by then.', ['0.61 L/h', '0.45']],
    ['Sensor silent 4 h 10 min.', ['4 h 10 min']],
    ['Cooled from 19.1 to 15.4 °C first. Warm to 19, rouse.', ['19.1', '15.4 °C', '19']],
    ['Bed 1.018 ± 0.003, likely 20–22 Oct.', ['1.018 ± 0.003', '20–22 Oct']],
    ['8 in 10 between 1.002 and 1.011.', ['8 in 10', '1.002', '1.011']],
    ['A fall of 1 point. 23 points of sugar left.', ['1 point', '23 points']],
    ['Falling 6.1 points a day.', ['6.1 points a day']],
    ['Two equal readings, 3 days apart: ready to rack.', ['3 days']],
    ['12.1 % so far, −61 dBm, 2.9 V.', ['12.1 %', '−61 dBm', '2.9 V']],
    ['Taste and decide on Wed 15 Oct, or 30 Oct–2 Nov.', ['Wed 15 Oct', '30 Oct–2 Nov']],
    ['Stay signed in on this device for 30 days', ['30 days']],
  ])('of “%s”', (sentence, expected) => {
    expect(figures(sentence)).toEqual(expected);
  });

  it('are not the digits of a name', () => {
    expect(figures('N3 goes in; see mead2b and v1.')).toEqual([]);
  });

  it('do not swallow the word that follows', () => {
    expect(splitFigures('at 1.041 halved')).toEqual([
      { text: 'at ', figure: false },
      { text: '1.041', figure: true },
      { text: ' halved', figure: false },
    ]);
  });

  it('lose nothing: the pieces joined are the sentence', () => {
    fc.assert(fc.property(fc.string({ unit: 'binary', maxLength: 80 }), (sentence) => splitFigures(sentence).map((piece) => piece.text).join('') === sentence));
  });
});
