import { Op } from 'sequelize';
import { Sensor } from '@/db/models';
import { batchState } from '@/db/queries/batch-states';
import { refusalGroups, sensorHealth } from '@/db/queries/sensor-health';
import { findSensors } from '@/db/queries/sensors';
import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import { systemClock, type Clock } from '@/lib/clock';
import type { AssessmentBody } from '@/lib/contracts/assessment';
import type { SensorBody, SensorHealthBody, SensorHealthList, SensorLimits } from '@/lib/contracts/sensors';
import { batteryForecast } from '@/lib/core/health/battery';
import { countGaps } from '@/lib/core/health/gaps';
import { judgeHealth } from '@/lib/core/health/judge';
import { median } from '@/lib/core/series/order';
import { iso } from '../iso';
import { getSensor } from './get';
import { limitsOf } from './limits';
import { loadSensor } from './place';
import { presentSensor } from './present';

const DAY_MS = 86_400_000;
/** As many as the page of sensors shows. */
const MOST_LISTED = 200;

function byDay(cell: readonly { at: number; volts: number }[]): { at: string; volts: number }[] {
  const days = new Map<number, number[]>();
  for (const { at, volts } of cell) {
    const day = Math.floor(at / DAY_MS);
    days.set(day, [...(days.get(day) ?? []), volts]);
  }
  return [...days].map(([day, volts]) => ({ at: iso(day * DAY_MS), volts: median(volts) }));
}

/** How a sensor does, and what of it is not as the cellar wants it. */
export async function getSensorHealth(actor: Actor, identifier: string, clock: Clock = systemClock): Promise<SensorHealthBody> {
  authorize(actor, 'sensors.read');
  const now = clock.now();
  const { id } = await loadSensor(actor.cellarId, identifier);
  return healthOf(id, await getSensor(actor, identifier), await limitsOf(actor.cellarId), now);
}

/** The same of every sensor, in short. */
export async function listSensorHealth(actor: Actor, clock: Clock = systemClock): Promise<SensorHealthList> {
  authorize(actor, 'sensors.read');
  const now = clock.now();
  const limits = await limitsOf(actor.cellarId);
  const rows = await Sensor.findAll({ attributes: ['id', 'identifier'], where: { cellarId: actor.cellarId, removedAt: null, kind: { [Op.ne]: 'file' } }, raw: true });
  const ids = new Map(rows.map((row) => [row.identifier, row.id]));
  const items: SensorHealthList['items'] = [];
  for (const row of await findSensors({ cellarId: actor.cellarId, limit: MOST_LISTED })) {
    const sensor = presentSensor(row);
    const id = ids.get(sensor.id);
    if (id === undefined || sensor.disabled) continue;
    const { battery, findings } = await healthOf(id, sensor, limits, now);
    items.push({ sensor: sensor.id, battery_days: battery?.days ?? null, findings });
  }
  return { items, limits };
}

async function healthOf(id: number, sensor: SensorBody, limits: SensorLimits, now: number): Promise<SensorHealthBody> {
  const [figures, refused] = [await sensorHealth(id, now), await refusalGroups(id, now)];
  const state = sensor.batch && sensor.kind === 'float' ? await batchState<AssessmentBody>(sensor.batch.id) : null;
  const call = state?.assessment.calls.sensor ?? null;

  const silentForS = sensor.last ? Math.max(0, (now - Date.parse(sensor.last.received_at)) / 1000) : null;
  const gaps = figures.sequences ? countGaps(figures.sequences) : null;
  const cell = figures.cell ?? [];
  const battery = batteryForecast(cell, limits.empty_battery_v, now);
  const volts = sensor.last?.battery ?? cell.at(-1)?.volts ?? null;
  const clockOffsetS = figures.timed && figures.delayS !== null ? -figures.delayS : null;
  const findings = judgeHealth(
    {
      silentForS,
      intervalS: sensor.interval_s,
      gaps,
      battery,
      signalDbm: figures.signal,
      clockOffsetS,
      refused24h: refused.reduce((sum, group) => sum + group.within24h, 0),
      settings: sensor.settings && { sentAgoS: (now - Date.parse(sensor.settings.sent_at)) / 1000, confirmed: sensor.settings.confirmed_at !== null },
      waiting: sensor.kind === 'float' ? figures.waiting : 0,
    },
    { lowBatteryDays: limits.low_battery_days, weakSignalDbm: limits.weak_signal_dbm, missedPercent: limits.missed_percent, clockOffsetS: limits.clock_offset_s },
  );
  return {
    silent_for_s: silentForS,
    heard_24h: figures.heard24h,
    gaps,
    battery: volts === null ? null : { volts, per_day: battery?.perDay ?? null, days: battery && battery.days !== null ? { value: battery.days, lo: battery.lo, hi: battery.hi } : null, by_day: byDay(cell) },
    signal: figures.signal === null ? null : { dbm: figures.signal, weakest: figures.weakest ?? figures.signal },
    clock_offset_s: clockOffsetS,
    refused: refused.map(({ reason, count, last }) => ({ reason, count, last: iso(last) })),
    call: call && { verdict: call.verdict, kind: call.kind ?? null, headline: call.headline, reason: call.reason },
    findings: [...(call?.verdict === 'yes' && call.kind !== 'silent' ? [{ of: 'call' as const, says: call.headline, act: call.act ?? call.reason }] : []), ...findings],
    limits,
  };
}
