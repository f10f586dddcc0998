import type { Call } from '../types';
import { TEMPERATURE_MARGIN_C } from '../stages/watch';
import { sinceOf, type Scene } from './scene';
import { call, evidence, temperatureWords } from './words';

/** Degrees over the room from which a vessel is said to warm itself: more than two thermometers differ by (ours). */
const OWN_WARMTH_C = 1;

const roomWords = (drink: number, room: number): string => (drink - room >= OWN_WARMTH_C ? `The room is ${temperatureWords(room)}: it works itself warmer by ${temperatureWords(drink - room)}.` : `The room is ${temperatureWords(room)}.`);

/** Is the liquid outside the range that this yeast wants? */
export function temperatureCall(scene: Scene): Call {
  const { watch, temperature } = scene;
  const range = watch.setup.temperature;
  if (temperature === null) return call('unknown', 'Temperature not known.', 'No temperature in the last readings.', { act: 'Read a thermometer.' });
  if (!range) return call('unknown', `${temperatureWords(temperature)} now.`, 'No range was told for this yeast.', { evidence: [evidence('temperature', temperature, null, '°C')] });
  const room = watch.setup.roomC ?? null;
  const roomFigure = room === null ? [] : [evidence('room', room, null, '°C')];
  const low = temperature < range.minC - (watch.tooCold.on ? 0 : TEMPERATURE_MARGIN_C);
  const high = temperature > range.maxC + (watch.tooWarm.on ? 0 : TEMPERATURE_MARGIN_C);
  const span = `Wanted: ${temperatureWords(range.minC)} to ${temperatureWords(range.maxC)}.`;
  if (!low && !high) return call('no', `${temperatureWords(temperature)}, in its range.`, span, { evidence: [evidence('temperature', temperature, range.maxC, '°C'), ...roomFigure] });
  return call('yes', `Too ${low ? 'cold' : 'warm'}: ${temperatureWords(temperature)}.`, [span, room === null ? null : roomWords(temperature, room)].filter(Boolean).join(' '), {
    kind: low ? 'low' : 'high',
    since: sinceOf(scene, watch.outsideSince(low ? 'low' : 'high') ?? (low ? watch.tooCold : watch.tooWarm).since),
    evidence: [evidence('temperature', temperature, low ? range.minC : range.maxC, '°C'), ...roomFigure],
    act: low ? 'Move it somewhere warmer or wrap it.' : 'Move it somewhere cooler or stand it in water.',
    changesIt: `Changes it: ${low ? `${temperatureWords(range.minC)} or more` : `${temperatureWords(range.maxC)} or less`}.`,
  });
}
