import type { Call, CallName } from '../types';
import { gasLPerH, VOLUMES_PER_POINT } from '../gas/gas';
import { HAND_MOST, handRecord, type HandRecord } from '../stages/byhand';
import { OVERDUE_H } from '../stages/watch';
import { foamSeen, standsHigh } from './foam';
import { closedCall, leaveOn, MAY_WORK } from './neck';
import { racked } from './rack';
import { later, sinceOf, when, type Scene } from './scene';
import { call, evidence, gasWords, gravityWords, pointsWords, rateWords, spanWords } from './words';

export { handRecord };

/** The calls that single readings can carry; the others stay as they are. */
export function callsByHand(scene: Scene, record: HandRecord): Pick<Record<CallName, Call>, 'started' | 'neck' | 'stalled' | 'rack' | 'bottle'> {
  return {
    started: started(scene, record),
    neck: neck(scene, record),
    stalled: stalled(scene, record),
    rack: rack(scene, record),
    bottle: bottle(scene, record),
  };
}

/** A reading older than this is repeated before anything goes in on its word, h. */
const FRESH_H = 24;

const readWords = (scene: Scene, record: HandRecord): string => `${gravityWords(record.last.points)} read ${when(scene, scene.watch.track.instantOf(record.last.hour))}`;

function started(scene: Scene, record: HandRecord): Call {
  const { watch } = scene;
  const og = watch.segment.level ?? watch.segment.effectiveOg;
  const drop = og - record.last.points;
  const figures = [evidence('fall since pitch', drop, 3, 'points')];
  if (og <= 5) {
    return call('unknown', 'Start not known.', `${readWords(scene, record)}; the original gravity was not told.`, { act: 'Log the original gravity if you have it.', changesIt: 'Changes it: a second reading 3 points lower.' });
  }
  if (record.started === 'yes') {
    const first = record.readings.find((one) => og - one.points >= 3);
    return call('yes', 'Working.', `${readWords(scene, record)}, ${pointsWords(drop)} down.`, { since: sinceOf(scene, first?.hour ?? null), evidence: figures });
  }
  const limit = OVERDUE_H[watch.setup.kind];
  if (record.started === 'overdue') {
    return call('hold', `No start ${spanWords(record.last.hour)} after the pitch.`, `${readWords(scene, record)}; a start shows within ${limit} h as a rule.`, {
      kind: 'overdue',
      since: sinceOf(scene, limit),
      evidence: figures,
      act: scene.hour - record.last.hour > FRESH_H ? 'Read it again first. Where it has not fallen and is warm enough, pitch again.' : 'Check the temperature, then pitch again if it is right.',
      changesIt: 'Changes it: a reading 3 points lower.',
    });
  }
  return call(record.started, 'No start seen yet.', `${readWords(scene, record)}.`, {
    evidence: figures,
    act: 'Read again in a day.',
    changesIt: `Changes it: ${gravityWords(og - 3)} or less.`,
  });
}

/** Share of the fall after which the strong foam is over (ours). */
const PAST_FOAM = 0.4;

/** The pace between two readings holds so long after the last, h (ours). */
const PACE_HOLDS_H = 72;

function neck(scene: Scene, record: HandRecord): Call {
  const { watch } = scene;
  const limit = watch.swapGas();
  if (watch.neck === 'airlock' || watch.neck === 'bung') {
    const fresh = scene.hour - record.last.hour <= PACE_HOLDS_H;
    const since = sinceOf(scene, watch.neckSince);
    if (watch.neck === 'airlock') return call('no', 'Airlock is on already.', 'Look at it now and then.', { since });
    const done = record.most !== null && record.most.points < HAND_MOST;
    return closedCall(scene, record.started === 'yes' && !done && fresh, record.rate) ?? call('no', 'Bung is in already.', 'Look at it now and then.', { since, act: done ? null : MAY_WORK });
  }
  if (record.started !== 'yes') return call(record.started === 'unknown' ? 'unknown' : 'no', 'Leave the tube on.', 'Not seen working yet; the strong gas is still to come.');
  const { rate } = record;
  const gas = rate ? gasLPerH(rate.value + 1.28 * rate.sd, watch.setup.volumeL) : null;
  const og = watch.segment.effectiveOg;
  const calm = og - PAST_FOAM * (og - watch.fgPrior().mean);
  const past = rate !== null && record.readings.length >= 3 && record.last.points < calm;
  if (gas !== null && past && gas < limit) {
    const foam = foamSeen(watch.setup.events, scene.at);
    if (standsHigh(foam)) return leaveOn(scene, foam, `Gas at most ${gasWords(gas)} by the last two readings.`, [evidence('gas at most', gas, limit, 'L/h')]);
    return call('yes', 'Swap tube for airlock.', `Gas at most ${gasWords(gas)} by the last two readings, under ${gasWords(limit)}.`, {
      since: sinceOf(scene, record.last.hour),
      evidence: [evidence('gas at most', gas, limit, 'L/h')],
      act: 'Look at the foam, then swap.',
      changesIt: `Changes it: gas over ${gasWords(1.3 * limit)}.`,
    });
  }
  if (gas !== null && gas < limit) {
    const few = record.last.points < calm;
    return call('hold', 'Leave the tube on.', few ? `Gas at most ${gasWords(gas)}, but by two readings alone.` : `${pointsWords(og - record.last.points)} down; the strong foam may still come.`, {
      evidence: [evidence('gas at most', gas, limit, 'L/h')],
      act: 'Read again in a day or two.',
      changesIt: few ? 'Changes it: a third reading.' : `Changes it: ${gravityWords(calm)} or less, at a gas under ${gasWords(limit)}.`,
    });
  }
  return call(gas === null ? 'unknown' : 'hold', 'Leave the tube on.', gas === null ? 'One reading does not tell the pace.' : `Gas may still be ${gasWords(gas)}; an airlock is safe under ${gasWords(limit)}.`, {
    evidence: gas === null ? [] : [evidence('gas at most', gas, limit, 'L/h')],
    act: 'Read again in a day or two.',
    changesIt: `Changes it: gas under ${gasWords(limit)} between two readings.`,
  });
}

function stalled(scene: Scene, record: HandRecord): Call {
  const { watch } = scene;
  const floor = watch.stuckFloor();
  const figures = [evidence('gravity', 1 + record.last.points / 1000, 1 + watch.zoneTop() / 1000, 'SG'), ...(record.rate ? [evidence('fall', record.rate.value, 0.5, 'points/d')] : [])];
  if (record.started !== 'yes') return call(record.started === 'unknown' ? 'unknown' : 'no', 'Not seen working, so not stalled.', 'The start comes first.');
  if (record.stuck && record.rate) {
    return call('yes', `Stopped at ${gravityWords(record.last.points)}: flat for ${spanWords(record.rate.hours)}.`, `${pointsWords(record.last.points - watch.fgPrior().mean)} above the expected end by two readings.`, {
      kind: 'stuck',
      since: sinceOf(scene, record.last.hour),
      evidence: figures,
      act: 'Check the temperature; then warm and rouse it before you feed or pitch again.',
      changesIt: 'Changes it: a reading 2 points lower.',
    });
  }
  if (record.last.points <= floor) {
    return call('no', record.inside ? 'Within its expected end, not stalled.' : `Unclear: ${gravityWords(record.last.points)}.`, `${readWords(scene, record)}; the expected end is ${gravityWords(watch.zoneTop())} or less.`, { evidence: figures });
  }
  const again = later(scene, Math.max(0, record.last.hour + 72 - scene.hour));
  const moving = record.rate !== null && record.rate.value - 1.28 * record.rate.sd > 0.5 && scene.hour - record.last.hour < 72;
  if (moving && record.rate) return call('no', 'Falling as it should.', `${rateWords(record.rate.value)} between the last two readings.`, { evidence: figures });
  return call('unknown', 'Not known whether it still falls.', `${readWords(scene, record)}.`, {
    expectedAt: again,
    evidence: figures,
    act: `Read again ${when(scene, again)} or after.`,
    changesIt: `Changes it: ${gravityWords(record.last.points - 2)} or less is working; an equal reading is a stall.`,
  });
}

function rack(scene: Scene, record: HandRecord): Call {
  const { watch } = scene;
  const top = watch.zoneTop();
  const figures = [evidence('gravity', 1 + record.last.points / 1000, 1 + top / 1000, 'SG'), ...(record.rate ? [evidence('fall', record.rate.value, 1.2, 'points/d')] : [])];
  if (record.started !== 'yes') return call(record.started === 'unknown' ? 'unknown' : 'no', 'Not yet: not seen working.', 'Racking comes at the end of the fall.');
  // Came off the lees since it was all but there.
  const near = record.readings.find((one) => one.points <= top);
  const off = near ? racked(scene, watch.track.instantOf(near.hour)) : null;
  if (off) return { ...off, evidence: figures };
  if (!record.inside) return call('no', 'Leave it on the lees.', `${readWords(scene, record)}; the expected end is ${gravityWords(top)} or less.`, { evidence: figures, changesIt: `Changes it: ${gravityWords(top)} or less.` });
  if (record.rate && record.rate.value < 1.2 && record.rate.value + 0.8 * record.rate.sd < 2) {
    return call('yes', 'May be racked.', `${readWords(scene, record)}, ${rateWords(record.rate.value)} since the one before.`, { since: sinceOf(scene, record.last.hour), evidence: figures, act: 'Rack off the lees when it suits.' });
  }
  return call('unknown', 'Nearly there.', `${readWords(scene, record)}; one reading does not tell the pace.`, { evidence: figures, act: 'Read again in two days.', changesIt: 'Changes it: less than 2 points lower two days on.' });
}

function bottle(scene: Scene, record: HandRecord): Call {
  const { watch } = scene;
  const top = watch.zoneTop();
  const figures = [evidence('gravity', 1 + record.last.points / 1000, 1 + top / 1000, 'SG'), ...(record.most === null ? [] : [evidence('may still fall', record.most.points, HAND_MOST, 'points')])];
  if (record.started !== 'yes') return call(record.started === 'unknown' ? 'unknown' : 'no', 'Not yet: not seen working.', 'All its sugar may be still to come.', { evidence: figures });
  if (!record.inside) {
    return call(record.stuck ? 'hold' : 'no', record.stuck ? 'Do not bottle: sugar is left.' : 'Not yet: it still has sugar.', `${readWords(scene, record)}; the expected end is ${gravityWords(top)} or less.`, { evidence: figures, changesIt: `Changes it: ${gravityWords(top)} or less, and equal ${spanWords(record.settlesAfterH)} on.` });
  }
  if (record.most !== null && record.most.points < HAND_MOST) {
    return call('yes', 'May be bottled.', `Equal over ${spanWords(record.most.hours)}; at worst ${(record.most.points * VOLUMES_PER_POINT).toFixed(1)} volumes more in the bottle.`, {
      since: sinceOf(scene, record.last.hour),
      evidence: figures,
      act: 'Prime for the bottles you have, not for more.',
      changesIt: 'Changes it: a reading 1 point lower.',
    });
  }
  const again = later(scene, Math.max(0, record.settlesAtHour - scene.hour));
  return call('unknown', 'Not known whether it has stopped.', `${readWords(scene, record)}; one more reading tells.`, {
    expectedAt: again,
    evidence: figures,
    act: `Read again ${when(scene, again)} or after.`,
    changesIt: 'Changes it: an equal reading then.',
  });
}
