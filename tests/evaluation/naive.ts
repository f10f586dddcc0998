import type { Case } from './catalogue';
import { nothingSaid, type Look } from './run';

/**
 * Rules of thumb on raw readings, as people use them: one reading 2 points lower is
 * a start, 24-hour slopes against fixed figures, three daily readings within a
 * point are done and may be bottled, the final gravity is the middle of the yeast's
 * range, and the end lies on a straight line to it.
 */
export function naiveLooks(batch: Case, truePitch: number): Look[] {
  const HOUR = 3_600_000;
  const { setup } = batch;
  const readings = batch.readings.map((reading) => ({ hour: (reading.at - truePitch) / HOUR, received: ((reading.receivedAt ?? reading.at) - truePitch) / HOUR, points: (reading.gravity - 1) * 1000, celsius: reading.temperature }));
  const og = setup.originalGravity === null ? (readings[0]?.points ?? 50) : (setup.originalGravity - 1) * 1000;
  const mid = setup.attenuation ? (setup.attenuation.min + setup.attenuation.max) / 2 : { beer: 0.75, cider: 1.02, mead: 1.05, wine: 1.04 }[setup.kind];
  const final = og * (1 - mid);
  const looks: Look[] = [];
  let most = 0;
  let started = false;
  const toldShift = (setup.pitchedAt! - truePitch) / HOUR;
  const ordered = [...readings].sort((a, b) => a.received - b.received);
  const known: typeof readings = [];
  let taken = 0;
  for (let hour = toldShift + 3; hour <= batch.endH; hour += 3) {
    while (taken < ordered.length && ordered[taken]!.received <= hour) {
      const one = ordered[taken]!;
      let i = known.length;
      while (i > 0 && known[i - 1]!.hour > one.hour) i -= 1;
      known.splice(i, 0, one);
      taken += 1;
    }
    const at = (h: number) => {
      let i = known.length - 1;
      while (i >= 0 && known[i]!.hour > h) i -= 1;
      return i >= 0 && h - known[i]!.hour < 12 ? known[i]! : null;
    };
    const now = at(hour);
    const look: Look = { hour, said: nothingSaid(), rate: null, finalGravity: { value: final, lo: final, hi: final, lo95: final, hi95: final }, terminalHour: null, rackHour: null };
    looks.push(look);
    if (!now) continue;
    if (og - now.points >= 2) started = true;
    const age = hour - toldShift;
    const limit = setup.kind === 'beer' ? 48 : 72;
    look.said.started = started;
    look.said['overdue start'] = !started && age >= limit;
    const day = at(hour - 24);
    const rate = day ? day.points - now.points : null;
    if (rate !== null) {
      look.rate = rate;
      most = Math.max(most, rate);
      look.said['past peak'] = started && rate < 0.85 * most;
      look.said['airlock ok'] = started && look.said['past peak'] && (0.55 * setup.volumeL * rate) / 24 < Math.min(2, (0.5 * (setup.vesselL - setup.volumeL)) / (setup.kind === 'beer' ? 1 : 0.3));
      look.said.sluggish = started && rate < 2 && now.points > final + 9;
      look.said.stuck = started && rate < 0.5 && now.points > final + 4;
      if (rate > 0.2 && now.points > final + 1) {
        const end = hour + ((now.points - final - 1) / rate) * 24;
        look.terminalHour = { value: end, lo: end, hi: end };
        look.rackHour = hour + Math.max(0, ((now.points - final - 2) / rate) * 24);
      } else look.terminalHour = { value: hour, lo: hour, hi: hour };
    }
    const before = at(hour - 48);
    const equal = day && before && Math.max(now.points, day.points, before.points) - Math.min(now.points, day.points, before.points) <= 1;
    look.said.terminal = started && Boolean(equal);
    look.said['ready to bottle'] = started && Boolean(equal);
    look.said['ready to rack'] = started && (Boolean(equal) || (rate !== null && rate < 1.5 && now.points < final + 4));
    const range = setup.temperature;
    look.said.temperature = range !== null && now.celsius !== null && (now.celsius < range.minC || now.celsius > range.maxC);
  }
  return looks;
}
