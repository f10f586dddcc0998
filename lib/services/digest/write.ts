import { findBatches, type BatchRow } from '@/db/queries/batches';
import { findJobs } from '@/db/queries/jobs';
import { mutesOf } from '@/db/queries/mutes';
import { Cellar } from '@/db/models';
import type { AssessmentBody } from '@/lib/contracts/assessment';
import { attentionOf, compareAttention, type OpenAlert } from '@/lib/core/calls/attention';
import { ALERT_RULES } from '@/lib/core/alerts/rules';
import { CALL_NAMES, type CallName } from '@/lib/core/types';
import { instantOf, wallTime } from '@/lib/core/units/zone';
import type { DigestPayload } from '@/lib/mail/payload';

/** A mail that is read over breakfast. */
const MOST_JOBS = 12;
const MOST_LANES = 30;

const ms = (iso: string | null) => (iso === null ? null : Date.parse(iso));

/** The end of the reader's day, ms. */
function endOfDay(now: number, timeZone: string): number {
  const wall = wallTime(Math.floor(now / 1000), timeZone);
  const next = new Date(Date.UTC(wall.year, wall.month - 1, wall.day + 1));
  return instantOf({ year: next.getUTCFullYear(), month: next.getUTCMonth() + 1, day: next.getUTCDate() }, timeZone) * 1000;
}

/** How the shelf would show it. The list of batches knows an alert's call; its level is that of the call's first rule. */
function laneOf(row: BatchRow) {
  const assessment = row.assessment as AssessmentBody | null;
  const name = { id: row.id, name: row.name, tag: row.tag };
  if (!assessment) return { attention: null, lane: { ...name, state: 'Leave be' as const, headline: null, pitched: row.pitchedAt !== null, gravity: row.originalGravity } };
  const attention = attentionOf({
    calls: Object.fromEntries(CALL_NAMES.map((call) => [call, { ...assessment.calls[call], since: ms(assessment.calls[call].since), expectedAt: ms(assessment.calls[call].expected_at) }])) as unknown as Parameters<typeof attentionOf>[0]['calls'],
    alerts: row.alerts.flatMap((alert): OpenAlert[] => {
      const rule = ALERT_RULES.find((item) => item.call === alert.call);
      return rule ? [{ call: alert.call as CallName, level: rule.level, taken: alert.state === 'acknowledged', since: Date.parse(alert.openedAt) }] : [];
    }),
    stage: assessment.stage,
    neck: row.neck,
    ended: false,
  });
  return { attention, lane: { ...name, state: attention.state, headline: assessment.calls[attention.call].headline, gravity: assessment.gravity?.value ?? row.originalGravity } };
}

/** One cellar's morning for a reader in `timeZone`: the jobs of the day, the vessels by need, the mutes. */
export async function writeDigest(cellarId: string, timeZone: string, now: number): Promise<DigestPayload> {
  const [cellar, jobs, rows, mutes] = await Promise.all([
    Cellar.findByPk(cellarId, { rejectOnEmpty: true }),
    findJobs({ cellarId, state: 'open', limit: 200 }),
    findBatches({ cellarId, state: 'working', limit: 500 }),
    mutesOf(cellarId, new Date(now)),
  ]);
  const tonight = endOfDay(now, timeZone);
  const today = jobs.filter((job) => job.dueAt.getTime() < tonight);
  const next = jobs.find((job) => job.dueAt.getTime() >= tonight);
  const lanes = rows
    .map(laneOf)
    .sort((a, b) => (a.attention && b.attention ? compareAttention(a.attention, b.attention) : Number(a.attention === null) - Number(b.attention === null)) || a.lane.name.localeCompare(b.lane.name))
    .map(({ lane }) => lane);
  return {
    template: 'digest',
    at: new Date(now).toISOString(),
    cellar: { name: cellar.name, time_zone: cellar.timeZone },
    time_zone: timeZone,
    jobs: today.slice(0, MOST_JOBS).map((job) => ({
      title: job.title,
      due: job.dueAt.toISOString(),
      late: job.dueAt.getTime() < now - (job.exact ? 0 : 24 * 3_600_000),
      exact: job.exact,
      place: job.batch?.place ?? job.lot?.place ?? null,
      taken_by: job.takenBy?.name ?? null,
    })),
    more_jobs: Math.max(0, today.length - MOST_JOBS),
    next_job: next ? { title: next.title, due: next.dueAt.toISOString() } : null,
    lanes: lanes.slice(0, MOST_LANES),
    more_lanes: Math.max(0, lanes.length - MOST_LANES),
    muted: mutes.map((mute) => ({ name: mute.batch.name, until: mute.untilAt.toISOString(), by: mute.by?.name ?? null })),
  };
}
