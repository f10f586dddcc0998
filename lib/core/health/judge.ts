import type { BatteryForecast } from './battery';
import type { Gaps } from './gaps';

/** When a cellar wants to be told. */
export interface HealthLimits {
  lowBatteryDays: number;
  weakSignalDbm: number;
  missedPercent: number;
  clockOffsetS: number;
}

export interface HealthFigures {
  silentForS: number | null;
  intervalS: number;
  gaps: Gaps | null;
  battery: BatteryForecast | null;
  /** Median of a day, dBm. */
  signalDbm: number | null;
  /** Its clock less ours, s. */
  clockOffsetS: number | null;
  refused24h: number;
  settings: { sentAgoS: number; confirmed: boolean } | null;
  waiting: number;
}

export interface Finding {
  of: 'silence' | 'gaps' | 'battery' | 'signal' | 'clock' | 'refused' | 'settings' | 'calibration';
  says: string;
  act: string;
}

/** Settings count as not taken after so many of its intervals without a word of them. */
const CONFIRM_WITHIN_INTERVALS = 3;
const LEAST_SILENCE_S = 6 * 3_600;

const spanWords = (seconds: number) => (seconds < 120 ? `${Math.round(seconds)} s` : seconds < 7_200 ? `${Math.round(seconds / 60)} min` : seconds < 172_800 ? `${Math.round(seconds / 3_600)} h` : days(Math.round(seconds / 86_400)));

const days = (count: number) => `${count} ${count === 1 ? 'day' : 'days'}`;

/** What is not as it should be with a sensor, most pressing first; each with what to do. */
export function judgeHealth(figures: HealthFigures, limits: HealthLimits): Finding[] {
  const findings: Finding[] = [];
  const { silentForS, intervalS, gaps, battery, signalDbm, clockOffsetS, refused24h, settings, waiting } = figures;
  if (silentForS !== null && silentForS > Math.max(LEAST_SILENCE_S, 6 * intervalS)) {
    findings.push({ of: 'silence', says: `Silent ${spanWords(silentForS)}; it speaks every ${spanWords(intervalS)}.`, act: 'Look at its cell and its network; read by hand meanwhile.' });
  }
  // The low end: a lithium cell drops at the end faster than any line.
  const daysLeft = battery?.lo ?? battery?.days ?? null;
  if (battery && daysLeft !== null && daysLeft <= limits.lowBatteryDays) {
    findings.push({ of: 'battery', says: daysLeft < 1 ? 'Cell is flat.' : `Cell may be flat in ${days(Math.floor(daysLeft))}.`, act: 'Charge it or change it at the next racking.' });
  }
  if (refused24h > 0) findings.push({ of: 'refused', says: `${refused24h} refused in 24 h.`, act: 'Their reasons stand below; set the sensor right by them.' });
  const all = gaps ? gaps.heard + gaps.missed : 0;
  if (gaps && gaps.missed > 0 && (100 * gaps.missed) / all >= limits.missedPercent) {
    findings.push({ of: 'gaps', says: `${gaps.missed} of ${all} never came.`, act: 'Bring the network nearer, or let it speak less often.' });
  }
  if (signalDbm !== null && signalDbm <= limits.weakSignalDbm) findings.push({ of: 'signal', says: `Signal weak: −${Math.abs(Math.round(signalDbm))} dBm.`, act: 'Bring the network nearer; glass and liquid hold it back.' });
  if (clockOffsetS !== null && Math.abs(clockOffsetS) >= limits.clockOffsetS) {
    findings.push({ of: 'clock', says: `Its clock is ${spanWords(Math.abs(clockOffsetS))} ${clockOffsetS > 0 ? 'fast' : 'slow'}.`, act: 'Let it take the time from the network, or leave the time out: then the arrival counts.' });
  }
  if (settings && !settings.confirmed && settings.sentAgoS > CONFIRM_WITHIN_INTERVALS * intervalS) {
    findings.push({ of: 'settings', says: `Settings sent ${spanWords(settings.sentAgoS)} ago, not confirmed.`, act: 'It may not listen: set its interval by hand.' });
  }
  if (waiting > 0) findings.push({ of: 'calibration', says: `${waiting} ${waiting === 1 ? 'reading waits' : 'readings wait'} for a calibration.`, act: 'Calibrate it: they turn into gravity then, back to the day you choose.' });
  return findings;
}
