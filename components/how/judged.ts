import { gravityText, percent } from '@/components/batch/figures';
import { volumeText } from '@/components/ui/units';
import type { BatchBody } from '@/lib/contracts/batches';
import { howOfCall, howOfJudged, type JudgedFigure, type JudgedFrom } from '@/lib/core/how/judged';
import type { CallName } from '@/lib/core/types';
import type { Answer } from './AskHow';

type Judged = Pick<BatchBody, 'original_gravity' | 'volume_l' | 'yeast' | 'sensor' | 'assessment'>;

export const judgedFrom = ({ original_gravity, volume_l, yeast, sensor, assessment }: Judged): JudgedFrom => ({
  originalGravity: original_gravity,
  volumeL: volume_l,
  yeast,
  sensor: sensor?.name ?? null,
  gravity: assessment?.gravity ?? null,
  finalGravity: assessment?.final_gravity ?? null,
  ratePointsPerDay: assessment?.rate_points_per_day ?? null,
  abvPercent: assessment?.abv_percent?.value ?? null,
});

/** What a fact of the head is called where it is asked for. */
const FIGURES: Record<string, JudgedFigure> = {
  'original gravity': 'original gravity',
  now: 'gravity now',
  'last known': 'gravity now',
  bed: 'bed',
  attenuation: 'attenuation',
  'strength so far': 'strength so far',
  'likely end': 'likely end',
  room: 'room',
  foam: 'foam',
};

/** Answers for the facts in a batch's head, in their order, and for its volume, which stands beside its name. */
export function answersOfFacts(batch: Judged, facts: readonly { name: string; figure: string }[]): Answer[] {
  const from = judgedFrom(batch);
  const told = facts.flatMap(({ name, figure }): Answer[] => {
    const asked = FIGURES[name];
    return asked && figure !== '–' ? [{ name, says: figure, how: howOfJudged(asked, from) }] : [];
  });
  return [...told, { name: 'volume', says: volumeText(batch.volume_l), how: howOfJudged('volume', from) }];
}

/** Answers for what a lane of the shelf says of its batch, and for the call that speaks there. */
export function answersOfLane(batch: Judged, name: CallName): Answer[] {
  const { assessment: judged, original_gravity: og } = batch;
  const call = judged?.calls[name];
  const said = [
    ...(og === null ? [] : [{ name: 'original gravity', figure: gravityText(og) }]),
    ...(judged?.gravity ? [{ name: 'now', figure: gravityText(judged.gravity.value) }] : []),
    ...(judged?.final_gravity ? [{ name: 'bed', figure: gravityText(judged.final_gravity.value) }] : []),
    ...(judged?.abv_percent ? [{ name: 'strength so far', figure: percent(Math.max(0, judged.abv_percent.value)) }] : []),
  ];
  return [...(call ? [{ name: 'its call', says: call.headline, how: howOfCall(name, call.evidence) }] : []), ...answersOfFacts(batch, said)];
}
