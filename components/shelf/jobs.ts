import { clock, duration, when } from '@/components/charts/zone';
import type { AlertBody } from '@/lib/contracts/alerts';
import type { LaneView } from './lanes';

/** One of today's jobs. Times are seconds since 1970. */
export interface Job {
  key: string;
  /** Set where a tick takes the alert in hand. */
  alertId: string | null;
  batchId: string;
  late: boolean;
  /** `late`, `14:54`, `any hour` */
  time: string;
  /** `since 12:00`, `in 22 min` */
  note: string;
  text: string;
  tag: number | null;
  /** First name of whoever has it. */
  who: string | null;
  /** For the order; null: any time. */
  at: number | null;
}

/** Nobody took it for this long: it is late. To act is a matter of the hour, to look one of the half day. */
const LATE_AFTER_S = { act: 3_600, check: 4 * 3_600 } as const;

/** The job in a person's words. */
function jobText(alert: AlertBody): string {
  const name = alert.batch.name;
  switch (alert.call) {
    case 'sensor':
      return alert.kind === 'silent' ? `See to the sensor in ${name}` : `Read ${name} by hand`;
    case 'neck':
      return alert.evidence.verdict === 'hold' ? `Put the tube on ${name}` : `Swap the tube on ${name}`;
    case 'temperature':
      return alert.kind === 'low' ? `Warm ${name}` : alert.kind === 'high' ? `Cool ${name}` : `Look at ${name}`;
    case 'started':
    case 'stalled':
    case 'bottle':
    case 'rack':
      return `Look at ${name}`;
  }
}

const firstName = (name: string | undefined) => name?.trim().split(/\s+/)[0] ?? null;

function jobOfAlert(alert: AlertBody, now: number, timeZone: string): Job {
  const opened = Date.parse(alert.opened_at) / 1000;
  const taken = alert.state === 'acknowledged';
  const again = alert.look_again_at === null ? null : Date.parse(alert.look_again_at) / 1000;
  const base = { key: alert.id, alertId: alert.id, batchId: alert.batch.id, text: jobText(alert), tag: alert.batch.tag, who: taken ? firstName(alert.acknowledged_by?.name) : null };
  if (taken && again !== null) {
    return again < now
      ? { ...base, late: true, time: 'late', note: `since ${when(again, now, timeZone)}`, at: again }
      : { ...base, late: false, time: when(again, now, timeZone), note: `in ${duration(again - now)}`, at: again };
  }
  const late = !taken && alert.level !== 'know' && now - opened > LATE_AFTER_S[alert.level];
  return { ...base, late, time: late ? 'late' : 'now', note: `since ${when(opened, now, timeZone)}`, at: opened };
}

/** Something that falls due today and has no alert yet. */
function jobOfLane(view: LaneView, now: number, timeZone: string): Job[] {
  const at = view.attention.at === null ? null : view.attention.at / 1000;
  if (view.attention.state !== 'Due' || view.openAlert || at === null) return [];
  const today = when(at, now, timeZone) === clock(at, timeZone);
  if (!today && at > now) return [];
  const base = { key: `${view.lane.id}-${view.attention.call}`, alertId: null, batchId: view.lane.id, late: false, text: `Swap the tube on ${view.lane.name}`, tag: view.lane.tag, who: null, at };
  return [at > now ? { ...base, time: clock(at, timeZone), note: `in ${duration(at - now)}` } : { ...base, time: 'now', note: `since ${when(at, now, timeZone)}` }];
}

/** What may be done any day is no job of today's. */
const isJob = (alert: AlertBody) => alert.state !== 'resolved' && !(alert.level === 'know' && (alert.call === 'rack' || alert.call === 'bottle'));

/** Today's jobs: late ones first, then by time. `now` in seconds since 1970. */
export function jobsOf(views: readonly LaneView[], alerts: readonly AlertBody[] | undefined, now: number, timeZone: string): Job[] {
  const jobs = [...(alerts ?? []).filter(isJob).map((alert) => jobOfAlert(alert, now, timeZone)), ...views.flatMap((view) => jobOfLane(view, now, timeZone))];
  return jobs.sort((a, b) => Number(b.late) - Number(a.late) || Number(a.who !== null) - Number(b.who !== null) || (a.at ?? Infinity) - (b.at ?? Infinity));
}

/** The first time at which anything falls due after now, as a sentence for an empty day. */
export function nothingDue(views: readonly LaneView[], now: number, timeZone: string): string {
  const times = views.flatMap(({ attention }) => (attention.at !== null && attention.at / 1000 > now && (attention.state === 'Due' || attention.state === 'Leave be') ? [attention.at / 1000] : []));
  return times.length > 0 ? `Nothing due today. Next: ${when(Math.min(...times), now, timeZone)}.` : 'Nothing due today.';
}
