import { duration, when } from '@/components/charts/zone';
import { gravityText, temperatureText } from '@/components/ui/units';
import type { SensorBody, SensorKindName } from '@/lib/contracts/sensors';
import type { StateWord } from '@/lib/core/calls/attention';

const HOUR = 3_600;

/** No word for this long is silence: six of its intervals, and six hours at least, as the sensor call has it. */
const silentAfter = (sensor: SensorBody) => Math.max(6 * HOUR, 6 * sensor.interval_s);

export interface SensorState {
  state: StateWord;
  word: string;
}

/** How a sensor stands. `now` in seconds since 1970. */
export function sensorState(sensor: SensorBody, now: number): SensorState {
  if (sensor.disabled) return { state: 'Leave be', word: 'Switched off' };
  if (!sensor.last) return { state: 'Leave be', word: 'Not heard yet' };
  if (now - Date.parse(sensor.last.received_at) / 1000 > silentAfter(sensor)) return { state: 'Silent', word: 'Silent' };
  if (sensor.refused_24h > 0) return { state: 'Check', word: 'Some refused' };
  return { state: 'Done', word: 'Heard' };
}

/** `14:31`, or `never` */
export const heardWords = (sensor: SensorBody, now: number, timeZone: string) => (sensor.last ? when(Date.parse(sensor.last.received_at) / 1000, now, timeZone) : 'never');

export const cellWords = (volts: number | null | undefined) => (typeof volts === 'number' ? `${volts.toFixed(1)} V` : '–');

/** Bounds of received power that Wi-Fi practice calls good and weak, dBm (common practice). */
const LINK = { good: -67, weak: -80 } as const;

export function linkWords(dBm: number | null | undefined): string {
  if (typeof dBm !== 'number') return '–';
  const word = dBm >= LINK.good ? 'good' : dBm >= LINK.weak ? 'fair' : 'weak';
  return `${word}, −${Math.abs(Math.round(dBm))} dBm`;
}

export const gravityWords = (gravity: number | null | undefined) => (typeof gravity === 'number' ? gravityText(gravity) : '–');
export const temperatureWords = (celsius: number | null | undefined) => (typeof celsius === 'number' ? temperatureText(celsius) : '–');

export const everyWords = (seconds: number) => (seconds < 60 ? `${seconds} s` : duration(seconds));

export const KIND_WORDS: Record<SensorKindName, { name: string; says: string }> = {
  float: { name: 'Float', says: 'Floats in the drink; tells gravity, or the angle it leans at, and temperature.' },
  room: { name: 'Room', says: 'Hangs in the room; tells its temperature.' },
  foam: { name: 'Foam', says: 'Looks at the foam in the neck; tells its height and temperature.' },
};

/** A change of gravity in points, with a sign and one decimal: `+0.3`, `−0.9`. */
export const signedPoints = (gravity: number) => {
  const points = Math.round(gravity * 1e4) / 10;
  return `${points < 0 ? '−' : '+'}${Math.abs(points).toFixed(1)}`;
};
