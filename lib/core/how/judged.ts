/** Where the figures of a judgement come from: the batch page, the shelf and the rounds ask here. */
import { WORKS_PER_DAY } from '../calls/neck';
import { GAS_L_PER_L_PER_POINT, VOLUMES_PER_POINT } from '../gas/gas';
import { ABOVE_END_POINTS, AT_REST_POINTS, RACK_PACE, RACK_POINTS, RACK_TAIL_POINTS } from '../stages/ending';
import { LATE_IN_BOTTLE } from '../stages/late-fall';
import { TEMPERATURE_MARGIN_C } from '../stages/watch';
import type { CallName } from '../types';
import { how, type How, type InputTuple } from './how';
import { ours, published, SOURCES } from './sources';

interface Interval {
  value: number;
  lo: number;
  hi: number;
}

/** What a judgement stood on, as far as it is known outside of it. */
export interface JudgedFrom {
  originalGravity: number | null;
  volumeL: number;
  yeast: string | null;
  /** Name of the float; null: read by hand. */
  sensor: string | null;
  gravity: Interval | null;
  finalGravity: Interval | null;
  ratePointsPerDay: Interval | null;
  abvPercent: number | null;
}

export const JUDGED_FIGURES = ['original gravity', 'gravity now', 'bed', 'attenuation', 'strength so far', 'strength expected', 'likely end', 'gas', 'volume', 'room', 'foam'] as const;
export type JudgedFigure = (typeof JUDGED_FIGURES)[number];

const ROBUST = ours('our own; the line after Sen, J. Am. Stat. Assoc. 63 (1968) 1379, its weights after Huber 1964');
const CURVE = ours('our own curve and interval; the widening after Lei et al. 2018 (split conformal)');
const GAS = published(`Balling’s split, ${GAS_L_PER_L_PER_POINT} L of gas at 20 °C from a litre that falls 1 point; it follows the fall closely (Pandiella et al. 1995)`);

/** `1.041 (1.040 to 1.042)` */
const within = (range: Interval | null): string | null => range && `${range.value.toFixed(3)} (${range.lo.toFixed(3)} to ${range.hi.toFixed(3)})`;

/** Of a gravity that somebody read and wrote down. */
export const howReadByHand = (gravity: number): How => how('last reading by hydrometer, corrected to 20 °C where the sample’s temperature was logged', SOURCES.told, [['read', gravity, 'SG']]);

/** Formula, inputs and source of a figure of the judgement. */
export function howOfJudged(figure: JudgedFigure, from: JudgedFrom): How {
  const og: InputTuple = ['original gravity, as told', from.originalGravity, 'SG'];
  const now: InputTuple = ['gravity now, 8 times in 10', within(from.gravity), 'SG'];
  const bed: InputTuple = ['bed, 8 times in 10', within(from.finalGravity), 'SG'];
  const read: InputTuple = ['read by', from.sensor ?? 'hand', ''];
  switch (figure) {
    case 'original gravity':
      return how('as told in the set-up, or the reading at the pitch; corrected to 20 °C where the sample’s temperature was logged', SOURCES.told, [og]);
    case 'gravity now':
      return from.sensor === null
        ? how('the last reading by hand, corrected to 20 °C where the sample’s temperature was logged; ± what such a reading is good to', SOURCES.told, [read, now])
        : how('level now of the float’s robust line through the medians of its hours, a version of its calibration applied; ± its noise and its calibration, 8 times in 10', ROBUST, [read, now]);
    case 'bed':
      return how('where the sugar is expected to end: the yeast’s range and tolerance and the make-up of the must at first, the course of the fall the more the further it is; ± 8 times in 10', CURVE, [og, ['yeast', from.yeast, ''], now, bed]);
    case 'attenuation':
      return how('(original gravity − gravity now) ÷ (original gravity − 1), all the sugar that went in counted as there from the start; after “of”: the same for the bed', SOURCES.practice, [og, now, bed]);
    case 'strength so far':
      return how('Balling from the original gravity, with all the sugar that went in since, to the gravity now', SOURCES.balling, [og, now]);
    case 'strength expected':
      return how('Balling from the original gravity, with all the sugar that went in since, to the bed', SOURCES.balling, [og, bed]);
    case 'likely end':
      return how('when the curve through this batch’s readings comes within 1 point of the bed, at the warmth of the last day; the days hold it 8 times in 10', CURVE, [now, bed, ['fall', from.ratePointsPerDay && Number(from.ratePointsPerDay.value.toFixed(1)), 'points a day']]);
    case 'gas':
      return how(`${GAS_L_PER_L_PER_POINT} × litres × points a day ÷ 24`, GAS, [
        ['volume', from.volumeL, 'L'],
        ['fall', from.ratePointsPerDay && Number(from.ratePointsPerDay.value.toFixed(1)), 'points a day'],
      ]);
    case 'volume':
      return how('as told in the set-up, less what was taken out and lost, plus what went in, as the log has it', SOURCES.told, [['volume', from.volumeL, 'L']]);
    case 'room':
      return how('last reading of the room probe that hangs in the batch’s place or at its vessel', SOURCES.told);
    case 'foam':
      return how('last reading of the probe that looks into the neck', SOURCES.told);
  }
}

/** The rule of each call, with what its limits are from. */
const RULES: Record<CallName, { formula: string; source: Parameters<typeof how>[1] }> = {
  started: { formula: 'under way once the median of 6 hours lies 1.4 points (by hand 3) below its level at the pitch and goes on down; overdue after 48 h for beer, 72 h for the rest', source: SOURCES.ownRule },
  neck: { formula: `gas: ${GAS_L_PER_L_PER_POINT} × litres × points a day ÷ 24. Limit: half the headspace ÷ the time that foam lives (beer 1 h, else 0.3 h), at most 2 L/h; it must stay under it for nine hours past the peak. Under a bung: a fall of more than ${WORKS_PER_DAY} points a day, 9 times in 10`, source: SOURCES.foam },
  stalled: { formula: 'stopped: under 0.5 points a day for 48 hours, or under 0.35 for 72, well above where the yeast’s range and tolerance let it end. Slow: under 2 points a day with more than 5 days to go', source: SOURCES.ownRule },
  temperature: { formula: `median of 3 hours: more than ${TEMPERATURE_MARGIN_C} °C outside the yeast’s range as told, until it is back inside`, source: SOURCES.told },
  rack: { formula: `at its expected end or near it, falling less than ${RACK_PACE} points a day, and at most ${RACK_POINTS} points that may still come, 9 times in 10 (${RACK_TAIL_POINTS} by the end of the record alone), at two looks in a row; where the sensor gives nothing, by its curve at half the pace`, source: SOURCES.ownRule },
  bottle: { formula: `inside the expected end (or up to ${ABOVE_END_POINTS} points above it where less than ${AT_REST_POINTS} may still come, 9 times in 10), three days that fall less than a point in all, nothing that climbs or waits for warmth, no sugar added for 5 days, less than a volume of gas that may still come, 9 times in 10, and a chance of at most ${Math.round(100 * LATE_IN_BOTTLE.chance)} % that more than ${LATE_IN_BOTTLE.points} point is still to come, as the mean of about a day. The chance is weighed from what may still come by the last 4 to 12 days and by the last 4 to 14, how well it is known where the yeast ends, how far below the top of the expected end it rests, and how long ago it stood 2 and 8 points higher; each point makes ${VOLUMES_PER_POINT} volumes in a closed bottle`, source: ours('our own, its weights learnt on simulated batches of two families; 1 point gives 1.01 g/L of CO2 by Balling’s split. Two or three equal readings days apart are common practice') },
  sensor: { formula: 'silent after 6 hours, or six of its own intervals where that is longer; stuck where its noise falls under 0.22 of what is usual for it (0.18 where it speaks seldom); adrift where a hydrometer says 4 points else', source: SOURCES.ownRule },
};

/** A figure that a call was held to. */
export interface Evidence {
  name: string;
  value: number;
  threshold: number | null;
  unit: string;
}

/** How a call comes about: its rule, and the figures that it was held to. */
export function howOfCall(name: CallName, evidence: readonly Evidence[]): How {
  const rule = RULES[name];
  return how(
    rule.formula,
    rule.source,
    evidence.flatMap((item): InputTuple[] => [[item.name, Number(item.value.toFixed(4)), item.unit], ...(item.threshold === null ? [] : [[`${item.name}, limit`, Number(item.threshold.toFixed(4)), item.unit] as const])]),
  );
}
