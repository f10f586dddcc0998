import { duration, when } from '@/components/charts/zone';
import { gravityText, temperatureText } from '@/components/ui/units';
import type { SensorBody, SensorHealthList, SensorKindName, SensorLimits } from '@/lib/contracts/sensors';
import type { Degree } from '@/lib/core/calibration/calibrate';
import type { StateWord } from '@/lib/core/calls/attention';

/** A calibration's curve by its degree. */
export const CURVE_WORDS: Record<Degree, string> = { 1: 'a straight line', 2: 'a line bent once', 3: 'a line bent twice' };

const HOUR = 3_600;

/** No word for this long is silence: six of its intervals, and six hours at least, as the sensor call has it. */
const silentAfter = (sensor: SensorBody) => Math.max(6 * HOUR, 6 * sensor.interval_s);

export interface SensorState {
  state: StateWord;
  word: string;
}

type Finding = SensorHealthList['items'][number]['findings'][number];

/** What is not as it should be, in a word. */
const FOUND: Record<Finding['of'], string> = { silence: 'Silent', battery: 'Cell low', refused: 'Some refused', gaps: 'Gaps', signal: 'Link weak', clock: 'Clock off', settings: 'Not confirmed', calibration: 'Not calibrated', call: 'Not believed' };

/** How a sensor stands, with what its health says where that is known. `now` in seconds since 1970. */
export function sensorState(sensor: SensorBody, now: number, findings: readonly Finding[] = []): SensorState {
  if (sensor.disabled) return { state: 'Leave be', word: 'Switched off' };
  if (!sensor.last) return { state: 'Leave be', word: 'Not heard yet' };
  if (now - Date.parse(sensor.last.received_at) / 1000 > silentAfter(sensor)) return { state: 'Silent', word: 'Silent' };
  if (sensor.refused_24h > 0) return { state: 'Check', word: FOUND.refused };
  const first = findings.find((finding) => finding.of !== 'silence');
  if (first) return { state: 'Check', word: FOUND[first.of] };
  return { state: 'Done', word: 'Heard' };
}

/** `14:31`, or `never` */
export const heardWords = (sensor: SensorBody, now: number, timeZone: string) => (sensor.last ? when(Date.parse(sensor.last.received_at) / 1000, now, timeZone) : 'never');

export const cellWords = (volts: number | null | undefined) => (typeof volts === 'number' ? `${volts.toFixed(1)} V` : '–');

/** Received power that Wi-Fi practice calls good, dBm (common practice); weak is what the cellar says. */
const GOOD_LINK_DBM = -67;
const USUAL_WEAK_DBM = -80;

export function linkWords(dBm: number | null | undefined, weakDbm = USUAL_WEAK_DBM): string {
  if (typeof dBm !== 'number') return '–';
  const word = dBm <= weakDbm ? 'weak' : dBm >= GOOD_LINK_DBM ? 'good' : 'fair';
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

/** The cellar's limits as one sentence. */
export const limitWords = (limits: SensorLimits) =>
  `a cell may be flat within ${limits.low_battery_days} ${limits.low_battery_days === 1 ? 'day' : 'days'}, at ${limits.empty_battery_v.toFixed(1)} V; a link is −${Math.abs(limits.weak_signal_dbm)} dBm or weaker; ${limits.missed_percent} % of a day’s messages are missing; a clock is off by ${everyWords(limits.clock_offset_s)}.`;
