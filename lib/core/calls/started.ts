import type { Call } from '../types';
import { OVERDUE_H } from '../stages/watch';
import { sinceOf, when, type Scene } from './scene';
import { call, evidence, gravityWords, pointsWords, spanWords } from './words';

/** Has the yeast begun? `hold` means that a start is overdue. */
export function startedCall(scene: Scene): Call {
  const { watch, hour } = scene;
  const drop = watch.dropSoFar();
  const figures = drop === null ? [] : [evidence('fall since pitch', drop, 1.4, 'points')];
  if (watch.started.on) {
    const since = sinceOf(scene, watch.started.since);
    return call('yes', `Working since ${since === null ? 'before the first reading' : when(scene, since)}.`, drop === null ? 'The gravity is falling.' : `${pointsWords(Math.max(0, drop))} down so far.`, {
      since,
      evidence: figures,
      changesIt: 'Nothing: once begun it has begun.',
    });
  }
  if (scene.silentH === null || drop === null) {
    const og = watch.og === null ? '' : ` a gravity below ${gravityWords(watch.og - 3)}`;
    return call('unknown', 'Start not seen yet.', scene.silentH === null ? 'No reading yet.' : 'Too few readings to know.', {
      act: 'Take a reading by hand.',
      changesIt: `Changes it:${og || ' a second reading 3 points lower'}.`,
    });
  }
  const limit = OVERDUE_H[watch.setup.kind];
  if (watch.overdue.on) {
    return call('hold', `No start ${spanWords(hour)} after the pitch.`, `Gravity ${pointsWords(Math.max(0, drop))} down; a start shows within ${limit} h as a rule.`, {
      kind: 'overdue',
      since: sinceOf(scene, watch.overdue.since),
      evidence: [...figures, evidence('time since pitch', hour, limit, 'h')],
      act: 'Check the temperature, then pitch again if it is right.',
      changesIt: 'Changes it: a fall of 1.4 points.',
    });
  }
  return call('no', 'Not started yet.', `${spanWords(hour)} after the pitch, ${pointsWords(Math.max(0, drop))} down.`, {
    evidence: [...figures, evidence('time since pitch', hour, limit, 'h')],
    changesIt: 'Changes it: a fall of 1.4 points that goes on.',
  });
}
