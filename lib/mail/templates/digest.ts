import type { DigestPayload, RenderContext, Rendered } from '../payload';
import { render, type Block } from '../render';
import { bare, figure, headlineDay, vesselName, when } from '../words';

type Lane = DigestPayload['lanes'][number];

const COLOURS: Record<string, Extract<Block, { type: 'state' }>['colour']> = { Stop: 'madder', Now: 'madder', Check: 'ochre', Ready: 'green', Done: 'green' };

function jobRow(job: DigestPayload['jobs'][number], zone: string): Extract<Block, { type: 'rows' }>['rows'][number] {
  return {
    lead: job.late ? `late, ${when(job.due, zone)}` : job.exact ? when(job.due, zone).slice(-5) : 'today',
    late: job.late,
    text: [bare(job.title), job.place, job.taken_by === null ? null : `${job.taken_by} has it`].filter((part) => part !== null).join(', '),
  };
}

const rounds = ({ jobs, more_jobs, next_job, time_zone: zone }: DigestPayload): Block =>
  jobs.length > 0
    ? { type: 'rows', label: 'the rounds', rows: jobs.map((job) => jobRow(job, zone)), after: more_jobs ? `and ${more_jobs} more` : null }
    : { type: 'part', label: 'the rounds', text: `Nothing due today.${next_job ? ` Next: ${bare(next_job.title)}, ${when(next_job.due, zone)}.` : ''}` };

const laneLine = (lane: Lane) => `${vesselName(lane)}${lane.gravity === null ? '' : `, ${figure(lane.gravity, 'SG')}`}. ${bare(lane.headline)}.`;

/** One cellar's morning, to stand by itself or below other messages. */
export function digestBlocks(payload: DigestPayload, { publicUrl }: RenderContext): Block[] {
  const { lanes, time_zone: zone } = payload;
  const wanting = lanes.filter((lane) => lane.state !== 'Leave be' && lane.state !== 'Done');
  const left = lanes.filter((lane) => !wanting.includes(lane));
  return [
    { type: 'title', text: `${payload.cellar.name}, ${headlineDay(payload.at, zone)}` },
    rounds(payload),
    ...wanting.map((lane): Block => ({ type: 'vessel', word: lane.state, colour: COLOURS[lane.state] ?? 'ink2', text: laneLine(lane) })),
    ...(left.length ? [{ type: 'part', label: 'leave be', text: left.map(laneLine).join('\n') + (payload.more_lanes ? `\nand ${payload.more_lanes} more` : '') } as const] : []),
    ...(lanes.length ? [] : [{ type: 'prose', text: 'No vessel is at work.' } as const]),
    ...payload.muted.map((mute): Block => ({ type: 'line', text: `${mute.name} is muted until ${when(mute.until, zone)}${mute.by === null ? '' : ` by ${mute.by}`}.` })),
    { type: 'link', label: 'Open the rounds', url: `${publicUrl}/rounds` },
    { type: 'way', label: 'The shelf', url: `${publicUrl}/shelf`, after: `as it stands now; this was written at ${when(payload.at, zone).slice(-5)}.` },
  ];
}

const counted = (count: number, one: string, many: string) => `${count} ${count === 1 ? one : many}`;

/** `Low barn: 3 jobs today, 1 vessel wants you` */
export function digestSubject({ cellar, jobs, more_jobs, lanes }: DigestPayload): string {
  const wanting = lanes.filter((lane) => ['Stop', 'Now', 'Check', 'Silent'].includes(lane.state)).length;
  const due = jobs.length + more_jobs;
  return `${cellar.name}: ${due ? counted(due, 'job today', 'jobs today') : 'nothing due today'}${wanting ? `, ${counted(wanting, 'vessel wants', 'vessels want')} you` : ''}`;
}

export const digestMail = (payload: DigestPayload, context: RenderContext): Rendered =>
  render(digestSubject(payload), [...digestBlocks(payload, context), { type: 'foot', text: `The morning digest. Times are those of ${payload.time_zone.replaceAll('_', ' ')}. Another hour, or none: in the settings, under messages.` }]);
