import type { Call } from '../types';
import { later, sinceOf, when, type Scene } from './scene';
import { call, evidence, gravityWords, pointsWords, spanWords } from './words';

/** Can the sensor be believed? */
export function sensorCall(scene: Scene): Call {
  const { watch, silentH } = scene;
  if (silentH === null) {
    if (scene.hour < 6) return call('unknown', 'No word from a sensor yet.', 'Nothing has been received since the pitch.');
    return call('unknown', 'No sensor.', 'Nothing has been received; readings by hand work alone.');
  }
  if (scene.silent) {
    const limit = Math.max(6, 6 * watch.track.spacing);
    return call('yes', `Sensor silent ${spanWords(silentH)}.`, `Last word ${when(scene, later(scene, -silentH))}; it speaks every ${spanWords(watch.track.spacing)}.`, {
      kind: 'silent',
      since: later(scene, -silentH),
      evidence: [evidence('time since the last reading', silentH, limit, 'h')],
      act: 'Look at its battery and its network; read by hand meanwhile.',
      changesIt: 'Changes it: a new reading.',
    });
  }
  if (watch.frozen) {
    return call('yes', 'Float is stuck.', `Its readings move ${pointsWords(watch.frozen.index)} where ${pointsWords(watch.frozen.usual)} is usual.`, {
      kind: 'frozen',
      since: sinceOf(scene, watch.frozen.since),
      evidence: [evidence('noise of the float', watch.frozen.index, 0.3 * watch.frozen.usual, 'points')],
      act: 'Turn the vessel gently to free it; read by hand meanwhile.',
      changesIt: 'Changes it: readings that flicker as before.',
    });
  }
  if (watch.drifting.on) {
    const hand = watch.lastHand;
    const off = hand && Math.abs(hand.miss) > 4 ? `It was ${pointsWords(Math.abs(hand.miss))} off the hydrometer's ${gravityWords(hand.points)}.` : 'It shows a slow rise, which a ferment does not make.';
    return call('yes', 'Float drifts.', off, {
      kind: 'drifting',
      since: sinceOf(scene, watch.drifting.since),
      evidence: hand ? [evidence('float against hydrometer', hand.miss, 4, 'points')] : [],
      act: 'Read by hand and log it; clean the float when you can.',
      changesIt: 'Changes it: a hydrometer reading that agrees.',
    });
  }
  return call('no', 'Sensor speaks.', `Last word ${spanWords(silentH)} ago.`, { evidence: [evidence('time since the last reading', silentH, Math.max(6, 6 * watch.track.spacing), 'h')] });
}
