'use client';

import Link from 'next/link';
import type { Span } from '@/components/charts/picture';
import { LaneMuted } from '@/components/messages/BatchMute';
import type { PageLayout } from '@/components/ui/layout';
import { Sentence } from '@/components/ui/Sentence';
import { State } from '@/components/ui/StateMark';
import { vesselOf } from '@/components/vessel/describe';
import { Vessel } from '@/components/vessel/Vessel';
import { HowLane, LaneButton, LaneCall } from './LaneCall';
import { dayWords, laneFigures, litres, type LaneView } from './lanes';
import { LanePicture } from './LanePicture';

export interface LaneProps {
  view: LaneView;
  span: Span;
  now: number;
  timeZone: string;
  /** When the page was last in touch with the server, if it is not now; s. */
  staleAt: number | null;
  mayTake: boolean;
}

/** Height is attention. */
const HEIGHT = { now: 97, next: 84, leave: 50 } as const;
const VESSEL = { now: 82, next: 71, leave: 43 } as const;

const rackedWhenFinished = (view: LaneView) => view.lane.assessment?.stage === 'terminal' && view.lane.entries.some((entry) => entry.kind === 'rack');

/** The name opens the batch; its link covers the whole lane. The state is read before the name. */
function Name({ view, className }: { view: LaneView; className: string }) {
  const { lane, attention } = view;
  return (
    <h3 className={className}>
      <Link
        href={`/batches/${lane.id}`}
        data-lane={lane.id}
        className="no-underline outline-none after:absolute after:inset-0 after:content-[''] focus-visible:after:outline-3 focus-visible:after:-outline-offset-3 focus-visible:after:outline-mercury"
      >
        <span className="heard-only">{attention.state}: </span>
        <span className="two-lines break-words">{lane.name}</span>
      </Link>
    </h3>
  );
}

const paper = (view: LaneView) => (view.attention.group === 'now' ? 'bg-lit' : 'bg-sheet');

function Meta({ view, now, timeZone, low }: Pick<LaneProps, 'view' | 'now' | 'timeZone'> & { low: boolean }) {
  const { lane } = view;
  const day = dayWords(lane.pitched_at, now, timeZone);
  if (low) return <span className="type-label text-ink2">{lane.tag === null ? `${day}, ${litres(lane.volume_l)}` : `${day}, tag ${lane.tag}`}</span>;
  return (
    <span className="type-label text-ink2">
      {day}
      <br />
      {litres(lane.volume_l)}
    </span>
  );
}

/** Vessel, facts, calendar and call side by side; below 1100 px the call moves under the calendar. */
export function Lane({ view, span, now, timeZone, staleAt, mayTake, layout }: LaneProps & { layout: PageLayout }) {
  const { lane, attention } = view;
  const { group } = attention;
  const low = group === 'leave';
  const figures = laneFigures(lane, staleAt, now, timeZone);
  const middle = layout === 'middle';
  return (
    <li
      className={`relative grid border-b hover:bg-lit ${paper(view)} ${middle ? 'grid-cols-[var(--vessel)_minmax(0,1fr)]' : 'grid-cols-[var(--vessel)_minmax(0,1fr)_var(--call)]'}`}
      style={{ minHeight: HEIGHT[group] }}
    >
      <div className={`grid grid-cols-[94px_minmax(0,1fr)] gap-x-[18px] pr-[14px] ${middle ? 'row-span-2' : ''}`}>
        <div className={`pl-[17px] ${middle ? 'self-start pt-2' : 'self-end'}`} style={{ paddingBottom: low ? 3 : 5 }}>
          <Vessel vessel={vesselOf(lane, rackedWhenFinished(view))} height={VESSEL[group]} />
        </div>
        <div className={`flex min-w-0 flex-col ${middle ? 'gap-2' : 'justify-between'} ${low ? 'pb-1 pt-[3px]' : group === 'now' ? 'pb-[19px] pt-[6px]' : 'pb-[14px] pt-[6px]'}`}>
          <Name view={view} className={low ? 'type-name-low' : 'type-name'} />
          <div className="flex flex-wrap items-end justify-between gap-x-2">
            <Meta view={view} now={now} timeZone={timeZone} low={low} />
            <span className="ml-auto flex flex-col items-end">
              <span className={low ? 'font-mono text-[0.9375rem] leading-[1.125rem] font-semibold' : 'type-fig-lg'}>{figures.gravity}</span>
              {!low && <span className="type-label whitespace-nowrap text-ink2">{figures.under || ' '}</span>}
            </span>
          </div>
        </div>
      </div>
      <LanePicture lane={lane} span={span} now={now} timeZone={timeZone} height={HEIGHT[group]} />
      <div className={middle ? 'border-t border-rule pl-2 pr-(--margin)' : 'pl-[18px] pr-(--margin)'}>
        <LaneCall view={view} mayTake={mayTake} />
      </div>
    </li>
  );
}

/** Decision above evidence: words first, then the strip from edge to edge on the shared axis. */
export function PhoneLane({ view, span, now, timeZone, staleAt, mayTake }: LaneProps) {
  const { lane, attention, headline, reason } = view;
  const { group } = attention;
  const low = group === 'leave';
  const figures = laneFigures(lane, staleAt, now, timeZone);
  const height = low ? 62 : 78;
  return (
    <li className={`relative border-b ${paper(view)}`}>
      <div className="grid grid-cols-[68px_minmax(0,1fr)] pt-3">
        <div className="pl-3">
          <Vessel vessel={vesselOf(lane, rackedWhenFinished(view))} height={height} />
        </div>
        <div className="min-w-0 pb-1.5 pr-(--margin)">
          <div className="ml-4">
            <div className="flex items-baseline justify-between gap-3">
              <Name view={view} className="type-name min-w-0" />
              <span className="type-fig-lg">{figures.gravity}</span>
            </div>
            <div className="flex items-center justify-between gap-3">
              <span className="type-label flex flex-wrap items-center gap-x-2 text-ink2">
                <span aria-hidden className="leading-none">
                  <State state={attention.state} />
                </span>
                {view.when}
                <LaneMuted batchId={lane.id} />
              </span>
              <span className="type-label flex items-baseline gap-3 whitespace-nowrap text-ink2">
                <HowLane view={view} />
                {staleAt === null ? dayWords(lane.pitched_at, now, timeZone) : figures.under}
              </span>
            </div>
            <p className={`mt-1 text-balance ${group === 'now' ? 'text-[1.125rem]/[1.4375rem] font-[670]' : low ? 'text-[0.9375rem]/[1.25rem] font-[640]' : 'text-[1.0625rem]/[1.375rem] font-[660]'}`}>
              <Sentence strong>{headline.replace(/\.$/, '')}</Sentence>
            </p>
            <div className="flex flex-wrap items-end justify-end gap-x-3">
              <p className="min-w-[9rem] flex-1 pb-1 text-[0.84375rem]/[1.125rem] text-ink2">
                <Sentence>{reason}</Sentence>
              </p>
              <LaneButton view={view} mayTake={mayTake} />
            </div>
          </div>
        </div>
      </div>
      <LanePicture lane={lane} span={span} now={now} timeZone={timeZone} height={62} phone />
    </li>
  );
}

