import { gravityName, gravityNumber, gravityText, temperatureName, temperatureNumber, unitsRead } from '@/components/ui/units';
import { gravityNow, hasStopped, knownUntil, valueAt, type Picture } from './picture';
import { temperatureWords } from './over';
import { clock, dayName } from './zone';

/** What a chart shows, in words: one sentence and a table of at most `rows` lines. */
export interface Twin {
  sentence: string;
  head: string[];
  rows: string[][];
}

const written = (value: number | null | undefined, as: (value: number) => string) => (typeof value === 'number' ? as(value) : '–');
const figure = (value: number | null | undefined, digits: number) => (typeof value === 'number' ? value.toFixed(digits).replace('-', '−') : '–');

function sentenceOf(picture: Picture, name: string, timeZone: string): string {
  const gravity = gravityNow(picture);
  if (gravity === null) return `${name}: no readings yet.`;
  const known = knownUntil(picture);
  const parts = [`${name}: gravity ${gravityText(gravity)}`];
  if (picture.silentAt !== null) parts[0] += ` when last heard, ${dayName(known, timeZone)} ${clock(known, timeZone)}`;
  if (picture.originalGravity !== null) parts.push(`fallen ${Math.round((picture.originalGravity - gravity) * 1000)} points from ${gravityText(picture.originalGravity)}`);
  if (picture.bed) parts.push(`should stop at ${gravityText(picture.bed.value)}, 8 in 10 between ${gravityText(picture.bed.lo)} and ${gravityText(picture.bed.hi)}`);
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
    return [[label(time), written(gravity[index], gravityNumber), fitted ? `${gravityNumber(fitted.lo)} to ${gravityNumber(fitted.hi)}` : '–', written(temperature[index], temperatureNumber), figure(gas?.value, 2)]];
  });
  const coming = picture.curve.filter((point) => point.at > picture.now);
  const step = Math.max(1, Math.ceil(coming.length / 12));
  const foreseen = coming
    .filter((_, index) => index % step === step - 1)
    .map((point) => [`${dayName(point.at, timeZone)}, forecast`, gravityNumber(point.gravity), `${gravityNumber(point.lo)} to ${gravityNumber(point.hi)}`, '–', '–']);
  return { sentence: sentenceOf(picture, name, timeZone), head: ['time', unitsRead().gravity === 'sg' ? 'gravity' : `gravity,${gravityName()}`, '8 in 10', temperatureName(), 'gas, L/h'], rows: [...read, ...foreseen] };
}
