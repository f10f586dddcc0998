/** The original gravity as measured, and what a gap to the expected one may mean. */
import { figure, how, type RangeFigure } from '../how/how';
import { SOURCES } from '../how/sources';
import { correctHydrometer } from '../gravity/hydrometer';
import { correctBrix, sgOfBrix } from '../gravity/refractometer';
import { within, type Range } from '../units/range';
import { pointsOf } from '../units/convert';

/** Half a division of a common hydrometer and of a hand refractometer (0.2 °Bx). Our own rule. */
const HYDROMETER_DOUBT = 0.0005;
const REFRACTOMETER_DOUBT = 0.001;
/** Above this a sample is let cool: glass may crack, and the correction is past its table. */
export const SAMPLE_MAX_C = 40;

export type Measurement =
  | { with: 'hydrometer'; reading: number; sampleC: number; calibrationC: number }
  | { with: 'refractometer'; brix: number; /** Null: the instrument corrects itself. */ sampleC: number | null };

export type Measured = { ok: true; gravity: RangeFigure } | { ok: false; sentence: string };

/** Original gravity at 20 °C from a reading, with half a division of doubt. Only for a must without alcohol. */
export function measuredOriginal(measurement: Measurement): Measured {
  if (measurement.with === 'hydrometer') {
    const { reading, sampleC, calibrationC } = measurement;
    if (!(sampleC >= 0 && sampleC <= SAMPLE_MAX_C)) return { ok: false, sentence: `Let the sample come under ${SAMPLE_MAX_C} °C. Hot liquid cracks glass.` };
    const gravity = correctHydrometer(reading, sampleC, calibrationC);
    const origin = how('density shown, glass expansion allowed for; the sugar solution of that density, taken to 20 °C', SOURCES.iso1768, [
      ['reading', reading, 'SG'],
      ['sample', sampleC, '°C'],
      ['hydrometer made for', calibrationC, '°C'],
    ]);
    return { ok: true, gravity: figure(within(gravity, HYDROMETER_DOUBT), 'SG', origin) };
  }
  const { brix, sampleC } = measurement;
  const at20 = sampleC === null ? brix : correctBrix(brix, sampleC);
  if (at20 === null) return { ok: false, sentence: 'The published correction is known here from 10 to 20 °C. Let the sample come to 20 °C.' };
  const origin = how('°Bx taken to 20 °C, then the cubic through NBS Circular C440 backwards', SOURCES.oivRefractometer, [
    ['reading', brix, '°Bx'],
    ['sample', sampleC ?? 'corrected by the instrument', sampleC === null ? '' : '°C'],
    ['at 20 °C', Number(at20.toFixed(2)), '°Bx'],
  ]);
  return { ok: true, gravity: figure(within(sgOfBrix(at20), REFRACTOMETER_DOUBT), 'SG', origin) };
}

export interface Gap {
  /** Measured less expected, points, at the middle values. */
  points: number;
  verdict: 'as_expected' | 'lower' | 'higher';
  causes: readonly string[];
}

const LOWER = [
  'Sugar or honey still lies at the bottom: stir hard and read again.',
  'Fruit and candied pieces have not given up their sugar yet.',
  'More water or juice than on the sheet, or a juice thinner than its label.',
  'The mash won less than reckoned.',
  'The sample was warmer than told, or the hydrometer is made for 15.56 °C.',
] as const;
const HIGHER = [
  'Bubbles or pulp hold the hydrometer up: spin it and read again.',
  'Less water than on the sheet, or more boiled away.',
  'A sample from the bottom, where the sugar lies: stir and read again.',
  'The sample was colder than told.',
] as const;

/** Whether a measured original gravity is what the sheet promised, and what a gap may mean, likely causes first. */
export function gapOf(expected: Range, measured: Range): Gap {
  const points = pointsOf(measured.value) - pointsOf(expected.value);
  if (measured.hi < expected.lo) return { points, verdict: 'lower', causes: LOWER };
  if (measured.lo > expected.hi) return { points, verdict: 'higher', causes: HIGHER };
  return { points, verdict: 'as_expected', causes: [] };
}
