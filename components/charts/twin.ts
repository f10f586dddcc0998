import { gravityNow, hasStopped, knownUntil, valueAt, type Picture } from './picture';
import { temperatureWords } from './over';
import { clock, dayName } from './zone';

/** What a chart shows, in words: one sentence and a table of at most `rows` lines. */
export interface Twin {
  sentence: string;
  head: string[];
  rows: string[][];
}

const figure = (value: number | null | undefined, digits: number) => (typeof value === 'number' ? value.toFixed(digits).replace('-', '−') : '–');

function sentenceOf(picture: Picture, name: string, timeZone: string): string {
  const gravity = gravityNow(picture);
  if (gravity === null) return `${name}: no readings yet.`;
  const known = knownUntil(picture);
  const parts = [`${name}: gravity ${gravity.toFixed(3)}`];
  if (picture.silentAt !== null) parts[0] += ` when last heard, ${dayName(known, timeZone)} ${clock(known, timeZone)}`;
  if (picture.originalGravity !== null) parts.push(`fallen ${Math.round((picture.originalGravity - gravity) * 1000)} points from ${picture.originalGravity.toFixed(3)}`);
  if (picture.bed) parts.push(`should stop at ${picture.bed.value.toFixed(3)}, 8 in 10 between ${picture.bed.lo.toFixed(3)} and ${picture.bed.hi.toFixed(3)}`);
  if (picture.likelyEnd && !hasStopped(picture)) parts.push(`likely ${picture.likelyEnd.words}`);
  if (picture.bracket) parts.push(picture.bracket.words);
  const warmth = temperatureWords(picture, true);
  if (warmth) parts.push(warmth);
  return `${parts.join('; ')}.`;
}

/** Evenly spaced rows over what was read, then the forecast, a day apart or wider. */
export function twinOf(picture: Picture, name: string, timeZone: string, rows = 40): Twin {
  const { at, gravity, temperature } = picture.readings;
  const label = (time: number) => `${dayName(time, timeZone)} ${clock(time, timeZone)}`;
  const every = Math.max(1, Math.ceil(at.length / rows));
  const read = at.flatMap((time, index) => {
    if (index % every !== 0 && index !== at.length - 1) return [];
    const fitted = valueAt(picture.curve, time);
    const gas = picture.gas.findLast((bin) => bin.at <= time);
    return [[label(time), figure(gravity[index], 3), fitted ? `${fitted.lo.toFixed(3)} to ${fitted.hi.toFixed(3)}` : '–', figure(temperature[index], 1), figure(gas?.value, 2)]];
  });
  const coming = picture.curve.filter((point) => point.at > picture.now);
  const step = Math.max(1, Math.ceil(coming.length / 12));
  const foreseen = coming
    .filter((_, index) => index % step === step - 1)
    .map((point) => [`${dayName(point.at, timeZone)}, forecast`, point.gravity.toFixed(3), `${point.lo.toFixed(3)} to ${point.hi.toFixed(3)}`, '–', '–']);
  return { sentence: sentenceOf(picture, name, timeZone), head: ['time', 'gravity', '8 in 10', '°C', 'gas, L/h'], rows: [...read, ...foreseen] };
}
