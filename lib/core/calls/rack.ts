import type { Call, Instant } from '../types';
import { RACK_PACE } from '../stages/ending';
import { later, sinceOf, when, type Scene } from './scene';
import { call, evidence, fallingWords, gravityWords, pointsWords, rateWords } from './words';

/** Racked so shortly before it was ready, it has no lees to come off again (ours). */
const RACKED_LATELY_MS = 96 * 3_600_000;

/** May it come off the lees? */
export function rackCall(scene: Scene): Call {
  const { watch, level, rate } = scene;
  const top = watch.zoneTop();
  const figures = level === null ? [] : [evidence('gravity', 1 + level / 1000, 1 + top / 1000, 'SG'), ...(rate ? [evidence('fall', Math.max(0, rate.value), RACK_PACE, 'points/d')] : [])];
  const changesIt = `Changes it: ${gravityWords(top)} or less and about 2 points still to come.`;
  if (!watch.started.on) return call(scene.silentH === null ? 'unknown' : 'no', scene.silentH === null ? 'Not yet: not seen working.' : 'Not yet: it has not started.', 'Racking comes at the end of the fall.', { changesIt });
  const blind = watch.frozen !== null || scene.silent || level === null;
  if (watch.rack.on) {
    const since = sinceOf(scene, watch.rack.since);
    const words = level === null ? '' : `${gravityWords(level)}, ${rate ? rateWords(rate.value) : 'hardly falling'}.`;
    const off = since === null ? null : racked(scene, since, words);
    if (off) return { ...off, evidence: figures };
    const headline = `May be racked: since ${since === null ? 'now' : when(scene, since)}.`;
    if (blind) {
      return call('yes', headline, `By what the sensor gave before it ${watch.frozen ? 'stuck' : 'fell silent'}.`, {
        since,
        evidence: figures,
        act: `Read by hand first: rack it at ${gravityWords(top)} or less.`,
        changesIt: `Changes it: a reading above ${gravityWords(top)}.`,
      });
    }
    return call('yes', headline, words, {
      since,
      evidence: figures,
      act: 'Rack off the lees when it suits; full to the neck, airlock on.',
      changesIt: `Changes it: a fall of more than ${pointsWords(RACK_PACE)} a day.`,
    });
  }
  if (watch.stuck.on && level !== null) return call('no', 'Not yet: it has stopped early.', `${gravityWords(level)}; racking takes yeast away that is still needed.`, { evidence: figures, changesIt });
  if (blind) return call('unknown', 'Not known.', 'The sensor gives nothing to go by.', { act: 'Read by hand.', changesIt });
  const hours = hoursToRack(scene);
  const expectedAt = hours === null ? null : later(scene, hours);
  const left = (watch.remainingNow()?.value ?? null);
  if (hours !== null && expectedAt !== null && hours <= 72 && watch.peaked.on && watch.progress() > 0.65) {
    return call('soon', `Racking: from about ${when(scene, expectedAt)}.`, `${gravityWords(level)} now${left === null ? '' : `, ${pointsWords(Math.max(0, left))} to go`}.`, { expectedAt, evidence: figures, changesIt });
  }
  return call('no', 'Leave it on the lees.', `${gravityWords(level)} now${rate ? `, ${fallingWords(rate.value)}` : ''}.`, {
    expectedAt: watch.progress() > 0.4 && !watch.sluggish.on ? expectedAt : null,
    evidence: figures,
    changesIt,
  });
}

/** That it came off the lees, at the earliest shortly before it was ready; null where it did not. */
export function racked(scene: Scene, ready: Instant, words = ''): Call | null {
  const at = scene.watch.setup.events.findLast((event) => event.kind === 'rack' && event.at <= scene.at)?.at ?? null;
  if (at === null || at < ready - RACKED_LATELY_MS) return null;
  return call('no', `Racked ${when(scene, at)}.`, `${words} It clears on its own now.`.trimStart(), { since: at });
}

/** Hours until the curve has 2 points left, and the looks it takes to be sure; null without a curve. */
function hoursToRack(scene: Scene): number | null {
  const { watch } = scene;
  const fit = watch.fit();
  if (!fit || fit.curve.fg > watch.zoneTop()) return null;
  const hours = watch.hoursUntilLeft(2);
  return hours === null || !Number.isFinite(hours) || hours === 0 ? hours : hours + 9;
}
