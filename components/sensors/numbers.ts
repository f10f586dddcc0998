import { instantOf, wallTime } from '@/components/charts/zone';
import { typedNumber } from '@/components/units/typed';

/** A number as people write it, with a point or a comma; null where it is none, so that the form says what is missing. */
export function readNumber(text: string): number | null {
  const value = typedNumber(text);
  return value === null || Number.isNaN(value) ? null : value;
}

const two = (value: number) => String(value).padStart(2, '0');

/** A time, ms since 1970, as an input of type datetime-local shows it on the clock of that zone. */
export function toLocalInput(at: number, timeZone: string): string {
  const wall = wallTime(at / 1000, timeZone);
  return `${wall.year}-${two(wall.month)}-${two(wall.day)}T${two(wall.hour)}:${two(wall.minute)}`;
}

/** The reverse, as RFC 3339; null where nothing sensible stands there. */
export function fromLocalInput(text: string, timeZone: string): string | null {
  const match = /^(\d{4})-(\d{2})-(\d{2})T(\d{2}):(\d{2})/.exec(text);
  if (!match) return null;
  const [year, month, day, hour, minute] = match.slice(1).map(Number) as [number, number, number, number, number];
  return new Date(instantOf({ year, month, day, hour, minute }, timeZone) * 1000).toISOString();
}
