import { valueAt, type Picture } from '@/components/charts/picture';
import { clock, dayName } from '@/components/charts/zone';
import { degrees, gravityText } from './figures';

/** What the chart says of one instant: a time, and the figures that were known or are foreseen then. */
export interface CursorLine {
  time: string;
  figures: string;
}

/** A reading further off than this says nothing of the instant. */
const NEAR_S = 3 * 3600;

function nearest(at: number, times: readonly number[], values: readonly (number | null)[]): number | null {
  let best: number | null = null;
  let distance = NEAR_S;
  times.forEach((time, index) => {
    const value = values[index];
    if (value === null || value === undefined || Math.abs(time - at) > distance) return;
    distance = Math.abs(time - at);
    best = value;
  });
  return best;
}

export function cursorLine(picture: Picture, at: number | null, timeZone: string): CursorLine {
  const time = at ?? picture.now;
  const said = !picture.ended && (at === null || Math.abs(at - picture.now) < 60) ? clock(time, timeZone) : `${dayName(time, timeZone)} ${clock(time, timeZone)}`;
  if (time > picture.now || (picture.silentAt !== null && time > picture.silentAt + NEAR_S)) {
    const foreseen = valueAt(picture.curve, time);
    return { time: said, figures: foreseen ? `${gravityText(foreseen.gravity)}, 8 in 10 ${gravityText(foreseen.lo)}–${gravityText(foreseen.hi)}` : 'not foreseen' };
  }
  const gravity = nearest(time, picture.readings.at, picture.readings.gravity) ?? valueAt(picture.curve, time)?.gravity ?? null;
  const temperature = nearest(time, picture.readings.at, picture.readings.temperature);
  const gas = nearest(time, picture.gas.map((bin) => bin.at), picture.gas.map((bin) => bin.value));
  const parts = [gravity === null ? null : gravityText(gravity), temperature === null ? null : degrees(temperature), gas === null ? null : `${gas.toFixed(2)} L/h`].filter((part) => part !== null);
  return { time: said, figures: parts.length > 0 ? parts.join(', ') : 'no reading' };
}
