import type { Call, Evidence, Foam } from '../types';
import { gasLPerH } from '../gas/gas';
import { GAS_BAND } from '../stages/peak';
import { foamSeen, standsHigh, type SeenFoam } from './foam';
import { later, sinceOf, when, type Scene } from './scene';
import { call, evidence, gasWords, rateWords } from './words';

/** A fall beyond doubt that is more than this makes gas that a closed vessel must not keep, points a day (ours). */
export const WORKS_PER_DAY = 0.2;
const Z80 = 1.2816;

/** A bung on a vessel that works, which can break it; null where it has none, or has not been seen to work. */
export function closedCall(scene: Scene, started: boolean, rate: { value: number; sd: number } | null): Call | null {
  const { watch, gas } = scene;
  const atRest = (watch.terminal.on || watch.ended.on) && !watch.refermenting.on;
  if (watch.neck !== 'bung' || !started || atRest || rate === null || rate.value - Z80 * rate.sd <= WORKS_PER_DAY) return null;
  const limit = watch.swapGas();
  const foamy = (gas !== null && gas.lo > GAS_BAND * limit) || standsHigh(foamSeen(watch.setup.events, scene.at));
  return call('hold', 'Take the bung out: it still works.', `It falls ${rateWords(rate.value)}; the gas has no way out, and its pressure can break the glass.`, {
    kind: 'closed',
    since: sinceOf(scene, watch.neckSince),
    evidence: [evidence('fall', rate.value, WORKS_PER_DAY, 'points/d')],
    act: `Ease it out now, turned away from faces. ${foamy ? 'Put the blow-off tube on.' : 'Fit an airlock with water in it.'}`,
    changesIt: 'Changes it: an airlock or a tube on it, or a fall that has ended.',
  });
}

/** `yes`: swap the blow-off tube for an airlock. `hold`: foam may reach the neck, leave the tube; or a bung keeps the gas in. */
export function neckCall(scene: Scene): Call {
  const { watch, gas } = scene;
  const limit = watch.swapGas();
  const figures = gas ? [evidence('gas', gas.value, limit, 'L/h')] : [];
  const changesIt = `Changes it: gas ${gasWords(limit)} for nine hours.`;
  const foam = foamSeen(watch.setup.events, scene.at);
  if (watch.neck === 'airlock' || watch.neck === 'bung') {
    const closed = closedCall(scene, watch.started.on, scene.rate);
    if (closed) return closed;
    const busy = gas !== null && gas.lo > GAS_BAND * limit;
    if (foam?.foam === 'at_neck') {
      return call('hold', `Foam is at the ${watch.neck}.`, `${foamWords(scene, foam)}${gas ? ` Gas ${gasWords(gas.value)}.` : ''}`, { since: foam.at, evidence: figures, act: 'Put the blow-off tube back on.', changesIt: 'Changes it: foam down to a ring.' });
    }
    if (busy) {
      return call('hold', 'Foam may reach the airlock.', `Gas ${gasWords(gas.value)}; an airlock here is safe under ${gasWords(limit)}.`, {
        evidence: figures,
        act: 'Put the blow-off tube back on.',
        changesIt,
      });
    }
    return call('no', watch.neck === 'airlock' ? 'Airlock is on already.' : 'Bung is in already.', gas ? `Gas ${gasWords(gas.value)}, limit ${gasWords(limit)}.` : 'No gas figure now.', {
      since: sinceOf(scene, watch.neckSince),
      evidence: figures,
      act: watch.neck === 'bung' && !watch.bottle.on && (gas === null || gas.hi > 0.02) ? MAY_WORK : null,
    });
  }
  if (watch.airlock.on) {
    if (standsHigh(foam)) return leaveOn(scene, foam, gas ? `Gas is low, ${gasWords(gas.value)}.` : null, figures);
    const since = sinceOf(scene, watch.airlock.since);
    return call('yes', `Swap tube for airlock: from ${since === null ? 'now' : when(scene, since)}.`, gas ? `${krausenWords(scene, foam)}; gas ${gasWords(gas.value)}, under ${gasWords(limit)}.` : blindly(scene, foam), {
      since,
      evidence: figures,
      act: gas ? 'Swap the tube for an airlock with water in it.' : 'Look at the foam, then swap the tube for an airlock with water in it.',
      changesIt: `Changes it: gas over ${gasWords(GAS_BAND * limit)}.`,
    });
  }
  if (!watch.started.on) {
    return call(scene.silentH === null ? 'unknown' : 'no', 'Leave the tube on.', scene.silentH === null ? 'Not seen working; the strong gas may still come.' : 'Not working yet; the strong gas is still to come.', { evidence: figures, changesIt });
  }
  if (!gas || scene.silent || watch.frozen) {
    return call('unknown', 'Leave the tube on.', 'The gas is not known while the sensor gives nothing to go by.', { act: 'Look at the foam before you swap.', changesIt });
  }
  if (watch.waitsForWarmth) {
    return call('hold', 'Leave the tube on: it is only cold.', `Gas ${gasWords(gas.value)}; warm again it may give ${gasWords(watch.gasIfWarmed())}, and an airlock is safe under ${gasWords(limit)}.`, {
      evidence: figures,
      changesIt: `Changes it: three warm days with gas ${gasWords(limit)} or less.`,
    });
  }
  const expected = watch.peaked.on ? hoursToSwap(scene, limit) : null;
  if (expected !== null && expected < 72) {
    const at = later(scene, expected);
    return call('soon', `Swap tube for airlock: from ${when(scene, at)}.`, `${krausenWords(scene, foam)}; gas ${gasWords(gas.value)}, under ${gasWords(limit)} by then.`, { expectedAt: at, evidence: figures, changesIt });
  }
  return call('hold', 'Leave the tube on.', watch.peaked.on ? `Gas ${gasWords(gas.value)}; an airlock is safe under ${gasWords(limit)}.` : `${foam ? seenWords(scene, foam) : 'Krausen still building'}; gas ${gasWords(gas.value)}.`, {
    since: sinceOf(scene, watch.started.since),
    evidence: figures,
    changesIt,
  });
}

/** For a bung where it is not known that nothing comes any more. */
export const MAY_WORK = 'Never stop a vessel that works: while it may, fit an airlock.';

const SEEN: Record<Foam, string> = { none: 'No foam was seen', ring: 'A ring of foam stood', cover: 'Foam covered the drink', at_neck: 'Foam stood at the neck' };

const seenWords = (scene: Scene, foam: SeenFoam): string => `${SEEN[foam.foam]} ${when(scene, foam.at)}`;

/** The gas tells what the krausen does only where nobody and no probe has looked at it. */
const krausenWords = (scene: Scene, foam: SeenFoam | null): string => (foam ? seenWords(scene, foam) : 'Krausen falling');

const foamWords = (scene: Scene, foam: SeenFoam): string => `${seenWords(scene, foam)}.`;

/** What would be time to swap, were there not foam that could reach an airlock. */
export const leaveOn = (scene: Scene, foam: SeenFoam, gas: string | null, figures: readonly Evidence[]): Call =>
  call('hold', 'Leave the tube on: foam stands high.', [foamWords(scene, foam), gas].filter(Boolean).join(' '), { since: foam.at, evidence: figures, act: 'Look at the foam again tomorrow.', changesIt: 'Changes it: foam down to a ring.' });

/** The float gives no gas figure now: what it gave before says that the gas is low. */
const blindly = (scene: Scene, foam: SeenFoam | null): string => {
  const before = `by what the sensor gave before it ${scene.watch.frozen ? 'stuck' : 'fell silent'}`;
  return foam ? `${seenWords(scene, foam)}; gas is low ${before}.` : `Krausen falling, ${before}.`;
};

/** Hours until the curve's gas is under the limit, with the nine hours it must stay there; null without a curve. */
function hoursToSwap(scene: Scene, limit: number): number | null {
  const { watch, hour } = scene;
  const fit = watch.fit();
  if (!fit) return null;
  const warmth = watch.track.warmthAt(hour);
  const tau = watch.track.tauAt(hour) - watch.track.tauAt(watch.segment.from);
  for (let ahead = 0; ahead <= 240; ahead += 3) {
    const rate = fit.curve.rate(tau + (ahead / 24) * warmth) * warmth;
    if (gasLPerH(rate, watch.setup.volumeL) < limit) return ahead + 9;
  }
  return null;
}
