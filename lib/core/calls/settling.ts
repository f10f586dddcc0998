import type { Call, Instant } from '../types';
import { when, type Scene } from './scene';
import { call } from './words';

/** When the last fining that was known at a time will have sunk; null where nothing sinks any more. */
export function settlesAt({ watch, at }: Pick<Scene, 'watch' | 'at'>): Instant | null {
  let last: Instant | null = null;
  for (const event of watch.setup.events) {
    const until = event.settlesAt ?? null;
    if (until === null || until <= at || event.at > at || (event.knownAt ?? event.at) > at) continue;
    last = Math.max(last ?? until, until);
  }
  return last;
}

/** What may come off its lees by its gravity stands still while a fining falls in it. */
export function rackOnceSettled(scene: Scene, rack: Call): Call {
  const clear = rack.verdict === 'yes' ? settlesAt(scene) : null;
  if (clear === null) return rack;
  return call('soon', `Racking: wait until it has settled, ${when(scene, clear)}.`, 'A fining still falls in it.', { expectedAt: clear, evidence: rack.evidence, act: 'Let it stand still.', changesIt: `Changes it: ${when(scene, clear)}.` });
}

/** A drink that may be bottled by its gravity waits until its fining has sunk: what still floats goes into the bottle. */
export function onceSettled(scene: Scene, bottle: Call): Call {
  const clear = bottle.verdict === 'yes' ? settlesAt(scene) : null;
  if (clear === null) return bottle;
  return call('soon', `Bottling: wait until it has settled, ${when(scene, clear)}.`, `A fining still falls in it. ${bottle.reason}`, {
    expectedAt: clear,
    evidence: bottle.evidence,
    act: 'Let it stand still; rack it off the finings once it is bright.',
    changesIt: `Changes it: ${when(scene, clear)}.`,
  });
}
