import type { Call } from '../types';
import { abvBalling } from '../strength/strength';
import { sinceOf, type Scene } from './scene';
import { call, evidence, gravityWords, pointsWords, rateWords, spanWords, strengthWords, temperatureWords } from './words';

/** Has it stopped, or all but stopped, with sugar left that the yeast should be able to take? */
export function stalledCall(scene: Scene): Call {
  const { watch, hour, level, rate } = scene;
  const top = watch.zoneTop();
  if (!watch.started.on) return call(scene.silentH === null ? 'unknown' : 'no', scene.silentH === null ? 'Not seen working, so not stalled.' : 'Not started, so not stalled.', 'The start comes first.');
  if (watch.frozen || scene.silent || level === null) {
    const since = scene.silentH === null ? '' : `Sensor ${watch.frozen ? 'stuck' : `silent ${spanWords(scene.silentH)}`}.`;
    return call('unknown', 'Not known whether it still falls.', since || 'No reading yet.', {
      act: 'Read by hand.',
      changesIt: `Changes it: a hydrometer reading, and another two days later; ${gravityWords(top)} or less is done.`,
    });
  }
  const figures = [
    evidence('gravity', 1 + level / 1000, 1 + top / 1000, 'SG'),
    ...(rate ? [evidence('fall', Math.max(0, rate.value), watch.stuck.on ? 0.5 : 2, 'points/d')] : []),
  ];
  const above = pointsWords(level - watch.fgPrior().mean);
  if (watch.stuck.on) {
    const since = sinceOf(scene, watch.stuck.since);
    const flatSince = watch.flatSince();
    const flat = spanWords(flatSince === null ? 48 : hour - flatSince);
    const cold = watch.stuckCold;
    return call('yes', `Stopped at ${gravityWords(level)}: flat for ${flat}.`, `${above} above the expected end, ${rate ? rateWords(rate.value) : 'no fall'}.${hint(scene, cold)}`, {
      kind: cold ? 'cold' : 'stuck',
      since,
      evidence: figures,
      act: cold ? 'Warm it into its range, then rouse the yeast gently.' : 'Check with a hydrometer; then warm and rouse it before you feed or pitch again.',
      changesIt: 'Changes it: a fall of 1 point in a day, or a hydrometer reading at the expected end.',
    });
  }
  if (watch.sluggish.on) {
    // Below what the yeast's range expects, the curve is what says that more will come.
    const over = level - watch.fgPrior().mean;
    const byCurve = watch.leftOnCurve()?.value ?? 0;
    const toGo = over > 1 || byCurve < over ? `${above} above the expected end` : `${pointsWords(byCurve)} to go by its curve`;
    return call('yes', `Slow: ${rate ? rateWords(rate.value) : 'little fall'}.`, `${toGo}; at this pace more than 5 days to go.${hint(scene, watch.coldNow())}`, {
      kind: 'sluggish',
      since: sinceOf(scene, watch.sluggish.since),
      evidence: figures,
      act: 'Check the temperature and keep it in range.',
      changesIt: 'Changes it: a fall of 2.6 points a day, or less than 5 points to go.',
    });
  }
  if (watch.terminal.on && level > top) {
    return call('no', 'Finished, a little above its range.', `${gravityWords(level)} and level for days; ${gravityWords(top)} or less was expected.`, { evidence: figures });
  }
  if (watch.stuck.run > 0 || (level > top && level <= top + 3 && rate !== null && rate.value < 0.3 && hour > 120)) {
    return call('unknown', `Unclear: ${gravityWords(level)} and hardly falling.`, `The expected end is ${gravityWords(top)} or less.`, {
      evidence: figures,
      act: 'Check with a hydrometer; a warm sample with fresh yeast tells where it would end.',
      changesIt: 'Changes it: a hydrometer reading.',
    });
  }
  const headline = watch.terminal.on ? 'Finished, not stalled.' : rate !== null && rate.value < 0.05 ? 'Near its end, not stalled.' : 'Falling as it should.';
  return call('no', headline, rate ? `${rateWords(rate.value)}, ${gravityWords(level)} now.` : `${gravityWords(level)} now.`, { evidence: figures });
}

/** The likeliest cause, as a sentence with a space before it; empty when nothing points anywhere. */
function hint(scene: Scene, cold: boolean): string {
  const { watch, level, temperature } = scene;
  if (cold && temperature !== null) return ` It is cold: ${temperatureWords(temperature)}.`;
  const tolerance = watch.setup.alcoholToleranceAbv;
  if (tolerance !== null && level !== null && watch.segment.effectiveOg > 0) {
    const abv = abvBalling(1 + watch.segment.effectiveOg / 1000, 1 + level / 1000);
    if (abv > 0.8 * tolerance) return ` The alcohol, ${strengthWords(abv)}, is near what this yeast bears.`;
  }
  if (watch.maxRate > 0 && watch.maxRate < 5 && watch.segment.effectiveOg > 60) return ' It never ran fast: short of nutrient or of healthy yeast.';
  return '';
}
