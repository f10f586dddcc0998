import type { Texts } from '../../texts/texts';
import { stateBlock, zoneName, type Wanting } from '../parts';
import type { DigestPayload, RenderContext, Rendered } from '../payload';
import { render, type Block } from '../render';
import { bare, day, figure, listed, said, time, vesselName, when } from '../words';

type Lane = DigestPayload['lanes'][number];

const isLeft = (state: Lane['state']): state is Exclude<Lane['state'], Wanting> => state === 'Leave be' || state === 'Done';

function jobRow(texts: Texts, job: DigestPayload['jobs'][number], zone: string): Extract<Block, { type: 'rows' }>['rows'][number] {
  const { t } = texts;
  return {
    lead: job.late ? t('digest.job.late', { when: when(texts, job.due, zone) }) : job.exact ? time(texts, job.due, zone) : t('digest.job.today'),
    late: job.late,
    text: listed(texts, [bare(job.title), job.place, job.taken_by === null ? null : t('digest.job.taken', { name: job.taken_by })]),
  };
}

function rounds(texts: Texts, { jobs, more_jobs, next_job, time_zone: zone }: DigestPayload): Block {
  const { t } = texts;
  const label = t('digest.rounds');
  if (jobs.length > 0) return { type: 'rows', label, rows: jobs.map((job) => jobRow(texts, job, zone)), after: more_jobs ? t('list.more', { count: more_jobs }) : null };
  return { type: 'part', label, text: next_job ? t('digest.nothing.next', { job: bare(next_job.title), when: when(texts, next_job.due, zone) }) : t('digest.nothing') };
}

function laneLine(texts: Texts, lane: Lane): string {
  const headline = lane.headline === null ? texts.t(lane.pitched ? 'digest.not-judged' : 'digest.not-pitched') : bare(said(texts, lane.headline));
  return texts.t('digest.vessel', { vessel: listed(texts, [vesselName(texts, lane), lane.gravity === null ? null : figure(texts, lane.gravity, 'SG')]), headline });
}

/** One cellar's morning, to stand by itself or below other messages. */
export function digestBlocks(payload: DigestPayload, { publicUrl, texts }: RenderContext): Block[] {
  const { lanes, time_zone: zone } = payload;
  const { t } = texts;
  const left = lanes.filter(({ state }) => isLeft(state));
  const more = payload.more_lanes ? [t('list.more', { count: payload.more_lanes })] : [];
  return [
    { type: 'title', text: t('digest.title', { cellar: payload.cellar.name, day: day(texts, payload.at, zone) }) },
    rounds(texts, payload),
    ...lanes.flatMap((lane): Block[] => (isLeft(lane.state) ? [] : [{ ...stateBlock(texts, lane.state), type: 'vessel', text: laneLine(texts, lane) }])),
    ...(left.length ? [{ type: 'part', label: t('digest.leave-be'), text: [...left.map((lane) => laneLine(texts, lane)), ...more].join('\n') } as const] : []),
    ...(lanes.length ? [] : [{ type: 'prose', text: t('digest.no-vessel') } as const]),
    ...payload.muted.map(({ name, until: end, by }): Block => {
      const until = when(texts, end, zone);
      return { type: 'line', text: by === null ? t('digest.muted', { vessel: name, until }) : t('digest.muted.by', { vessel: name, until, name: by }) };
    }),
    { type: 'link', label: t('digest.open-rounds'), url: `${publicUrl}/rounds` },
    { type: 'way', label: t('digest.shelf'), url: `${publicUrl}/shelf`, after: t('digest.shelf.after', { time: time(texts, payload.at, zone) }) },
  ];
}

/** `Low barn: 3 jobs today, 1 vessel wants you` */
export function digestSubject({ t }: Texts, { cellar, jobs, more_jobs, lanes }: DigestPayload): string {
  const vessels = lanes.filter((lane) => ['Stop', 'Now', 'Check', 'Silent'].includes(lane.state)).length;
  return t('digest.subject', { cellar: cellar.name, jobs: jobs.length + more_jobs, vessels });
}

export const digestMail = (payload: DigestPayload, context: RenderContext): Rendered =>
  render(digestSubject(context.texts, payload), [...digestBlocks(payload, context), { type: 'foot', text: context.texts.t('digest.foot', { zone: zoneName(payload.time_zone) }) }], context.texts);
