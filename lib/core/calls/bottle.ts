import type { Call } from '../types';
import { VOLUMES_PER_POINT } from '../gas/gas';
import { LATE_IN_BOTTLE } from '../stages/late-fall';
import type { Remaining } from '../stages/remaining';
import { later, sinceOf, when, type Scene } from './scene';
import { call, evidence, fallingWords, gravityWords, pointsWords, rateWords } from './words';

/** No chance is told as less, %: what was learnt from simulations is not surer than that. */
const SUREST_PERCENT = 1;

/** What may still fall; null without a level. */
function leftToCome(scene: Scene): Remaining | null {
  return scene.level === null ? null : scene.watch.remainingNow();
}

/** Volumes of CO2 that could still come in the bottle, nine times in ten. */
export function worstExtraVolumes(scene: Scene): number | null {
  const left = leftToCome(scene);
  return left && Math.max(0, left.most) * VOLUMES_PER_POINT;
}

/** Has it stopped for good? The one call that is wrong only on the safe side. */
export function bottleCall(scene: Scene): Call {
  const { watch, level, rate } = scene;
  const top = watch.zoneTop();
  const left = leftToCome(scene);
  const chance = watch.chanceOfLateFall();
  const worst = worstExtraVolumes(scene);
  const figures = [
    ...(level === null ? [] : [evidence('gravity', 1 + level / 1000, 1 + top / 1000, 'SG')]),
    ...(chance === null ? [] : [evidence('chance of a late fall', Math.max(SUREST_PERCENT, Math.ceil(100 * chance)), 100 * LATE_IN_BOTTLE.chance, '%')]),
    ...(left === null ? [] : [evidence('may still fall, 7 times in 10', Math.max(0, left.likely), null, 'points')]),
    ...(rate ? [evidence('fall', Math.max(0, rate.value), 0.5, 'points/d')] : []),
    ...(worst === null ? [] : [evidence('worst extra carbonation', worst, 1, 'volumes')]),
  ];
  const changesIt = `Changes it: ${gravityWords(top)} or less for days, and a chance of ${Math.round(100 * LATE_IN_BOTTLE.chance)} % at most that more than ${pointsWords(LATE_IN_BOTTLE.points)} is to come.`;
  if (watch.refermenting.on) {
    const fallen = level !== null && watch.plateau !== null ? pointsWords(watch.plateau - level) : 'More than 1.5 points';
    return call('hold', 'Do not bottle: it works again.', `${fallen} below where it had come to rest.`, {
      kind: 'refermentation',
      since: sinceOf(scene, watch.refermenting.since),
      evidence: figures,
      act: 'Leave it under an airlock; if it is in bottles already, keep them cold and open them with care.',
      changesIt: 'Changes it: a new level that holds.',
    });
  }
  if (!watch.started.on) {
    // Unread is not unstarted: what was split off may have all but finished.
    return scene.silentH === null ? call('unknown', 'Not yet: not seen working.', 'No reading yet.', { evidence: figures }) : call('no', 'Not yet: it has not started.', 'All its sugar is still to come.', { evidence: figures });
  }
  if (watch.frozen || scene.silent || level === null) {
    return call('unknown', 'Not known whether it has stopped.', 'The sensor gives nothing to go by.', {
      evidence: figures,
      act: 'Take two hydrometer readings three days apart.',
      changesIt: `Changes it: two equal readings at ${gravityWords(top)} or less.`,
    });
  }
  if (watch.bottle.on) {
    const since = sinceOf(scene, watch.bottle.since);
    return call('yes', `May be bottled: since ${since === null ? 'now' : when(scene, since)}.`, `${gravityWords(level)} and level; ${worst === null ? '' : `at worst ${worst.toFixed(1)} volumes more in the bottle.`}`, {
      since,
      evidence: figures,
      act: watch.sweetHeld()
        ? 'Do not prime it: its sugar waits for any yeast that lives. Keep the bottles cool, and open one after two weeks.'
        : level > top || (worst !== null && worst >= 1)
          ? 'Check the gravity with a hydrometer before you prime.'
          : 'Prime for the bottles you have, not for more.',
      changesIt: 'Changes it: a fall of 0.5 points a day.',
    });
  }
  if (watch.sweetStill(level)) {
    return call('hold', 'Do not bottle: the sugar that went in is still there.', `${gravityWords(level)}, and nothing keeps the yeast from it.`, {
      since: sinceOf(scene, watch.lastAddition),
      evidence: figures,
      act: 'Stabilise it and log that, or wait until it has worked out.',
      changesIt,
    });
  }
  if (watch.stuck.on) {
    return call('hold', 'Do not bottle: sugar is left.', `Stopped at ${gravityWords(level)}, ${pointsWords(level - watch.fgPrior().mean)} above the expected end.`, {
      since: sinceOf(scene, watch.stuck.since),
      evidence: figures,
      act: 'See to the stall first.',
      changesIt,
    });
  }
  if (watch.mayOnlyBeCold() && rate !== null && rate.value < 0.3 && level <= top) {
    return call('no', 'Not yet: it may only be the cold.', `${gravityWords(level)} and level since it turned cold.`, {
      evidence: figures,
      act: 'Let it warm into its range for three days, then look again.',
      changesIt: 'Changes it: the same gravity once it is warm.',
    });
  }
  if (watch.terminal.on && level > top) {
    return call('unknown', 'Not known whether it has stopped for good.', `${gravityWords(level)} and level for days, but ${gravityWords(top)} or less was expected.`, {
      since: sinceOf(scene, watch.terminal.since),
      evidence: figures,
      act: 'Check with a hydrometer; a warm sample with fresh yeast tells where it would end.',
      changesIt: 'Changes it: a hydrometer reading.',
    });
  }
  const hours = hoursToBottle(scene);
  const expectedAt = hours === null ? null : later(scene, hours);
  if (expectedAt !== null && hours !== null && hours <= 96 && watch.terminal.on) {
    return call('soon', `Bottling: from about ${when(scene, expectedAt)}.`, `${gravityWords(level)}, ${rate ? rateWords(rate.value) : 'hardly falling'}; it must hold that long.`, { expectedAt, evidence: figures, changesIt });
  }
  return call('no', rate !== null && rate.value < 0.05 ? 'Not yet: it must hold longer.' : 'Not yet: it still works.', `${gravityWords(level)} now${rate ? `, ${fallingWords(rate.value)}` : ''}.`, { expectedAt: watch.progress() > 0.65 && !watch.sluggish.on ? expectedAt : null, evidence: figures, changesIt });
}

/** Hours until the curve has half a point left, and then the days it must hold; null without a curve that ends in the zone. */
function hoursToBottle(scene: Scene): number | null {
  const { watch, hour } = scene;
  const fit = watch.fit();
  if (!fit || fit.curve.fg > watch.zoneTop()) return null;
  const { curve } = fit;
  const drop = Math.max(0.6, curve.og - curve.fg);
  const warmth = watch.track.warmthAt(hour);
  const tau0 = watch.track.tauAt(hour) - watch.track.tauAt(watch.segment.from);
  const tau = Math.max(tau0, curve.tauOfShare(0.5 / drop));
  return ((tau - tau0) / warmth) * 24 + 76;
}
