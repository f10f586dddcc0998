'use client';

import Link from 'next/link';
import { Component, type ReactNode } from 'react';
import { Button, LinkButton } from '@/components/ui/Button';
import { Haze } from '@/components/ui/Haze';
import { OnwardIcon } from '@/components/ui/icons';
import { State } from '@/components/ui/StateMark';
import { EmptyVessel } from '@/components/vessel/Vessel';
import type { Action } from '@/lib/core/actions';

function Row({ vessel, name, picture, call }: { vessel: ReactNode; name: ReactNode; picture: ReactNode; call: ReactNode }) {
  return (
    <li className="relative grid min-h-[84px] grid-cols-[94px_minmax(0,1fr)] gap-x-[18px] border-b wide:grid-cols-[var(--vessel)_minmax(0,1fr)_var(--call)] wide:gap-x-0">
      <div className="grid grid-cols-[94px_minmax(0,1fr)] gap-x-[18px] pr-[14px] max-wide:contents">
        <div className="self-end pb-[5px] pl-[17px]">{vessel}</div>
        <div className="flex min-w-0 flex-col justify-center py-2 max-wide:justify-start max-wide:pr-(--margin)">
          {name}
          <div className="pt-2 wide:hidden">{call}</div>
        </div>
      </div>
      <div className="relative max-wide:col-span-full">{picture}</div>
      <div className="hidden pl-[18px] pr-(--margin) wide:block">{call}</div>
    </li>
  );
}

/** A lane on its way: a broken vessel and haze that grows denser downwards. */
export function LoadingLane({ first }: { first: boolean }) {
  return (
    <Row
      vessel={<EmptyVessel height={71} bung={false} />}
      name={<Haze height={16} label="" className="w-40" />}
      picture={
        <div className="px-1 py-2.5">
          <Haze height={62} label="" />
        </div>
      }
      call={
        first && (
          <div className="pt-[7px]">
            <State state="Leave be" word="Loading" />
            <p className="type-reason pt-1 text-ink2">The haze clears when the lane is in. Nothing moves.</p>
          </div>
        )
      }
    />
  );
}

/** What one may begin with in a cellar that has nothing yet. */
const BEGINNINGS: readonly { needs: Action; href: string; word: string; note: string }[] = [
  { needs: 'musts.write', href: '/musts/new', word: 'Weigh it up first', note: 'A must sheet tells the original gravity, the strength and the foam before anything is poured.' },
  { needs: 'sensors.manage', href: '/sensors/new', word: 'Add a sensor', note: 'A float tells gravity and temperature by itself. A hydrometer alone works too.' },
  { needs: 'data.import', href: '/settings/data', word: 'Bring in what there is', note: 'Readings and old batches, as CSV or as an archive.' },
  { needs: 'members.manage', href: '/settings/people', word: 'Invite those who share the work', note: 'Each with a role.' },
];

/** A place with nothing in it: a dotted bed, the way to fill it, and what else one may begin with. */
export function EmptyLane({ may }: { may: (action: Action) => boolean }) {
  const mayStart = may('batches.create');
  const ways = BEGINNINGS.filter(({ needs }) => may(needs));
  return (
    <>
      <Row
        vessel={<EmptyVessel height={71} />}
        name={<h3 className="type-name text-ink3">An empty place</h3>}
        picture={<span className="absolute inset-x-0 bottom-6 border-b border-dotted border-rule2 max-wide:hidden" />}
        call={
          <div className="flex flex-col pb-2 pt-[7px]">
            <State state="Leave be" word="Empty" />
            <p className="type-verdict">Nothing in it yet</p>
            <div className="flex flex-wrap items-end justify-between gap-x-4 gap-y-2">
              <p className="type-reason self-start text-ink2">{mayStart ? 'Give it a name and a pitch time.' : 'Whoever brews here starts a batch.'}</p>
              {mayStart && (
                <LinkButton href="/batches/new" size="lane" look="first">
                  Start a batch
                </LinkButton>
              )}
            </div>
          </div>
        }
      />
      {ways.map(({ href, word, note }) => (
        <li key={href} className="border-b">
          <Link href={href} className="flex min-h-11 items-center gap-x-6 px-(--margin) py-2 no-underline -outline-offset-2 hover:bg-lit strip:pl-[112px] wide:pl-(--vessel)">
            <span className="min-w-0 flex-1 wide:flex wide:items-baseline wide:gap-x-6">
              <span className="type-verdict block text-[0.9375rem] wide:w-[280px]">{word}</span>
              <span className="type-reason block text-ink2">{note}</span>
            </span>
            <OnwardIcon size={14} className="shrink-0 text-ink2" />
          </Link>
        </li>
      ))}
    </>
  );
}

/** One lane that cannot be drawn does not take the others with it. */
export class LaneGuard extends Component<{ name: string; gravity: string; children: ReactNode }, { failed: boolean }> {
  override state = { failed: false };

  static getDerivedStateFromError() {
    return { failed: true };
  }

  override render() {
    if (!this.state.failed) return this.props.children;
    return (
      <Row
        vessel={<EmptyVessel height={71} />}
        name={
          <div className="flex items-baseline justify-between gap-3">
            <h3 className="type-name">{this.props.name}</h3>
            <span className="type-fig-lg">{this.props.gravity}</span>
          </div>
        }
        picture={<p className="type-label p-3 text-ink">This vessel could not be drawn.</p>}
        call={
          <div className="flex flex-col pb-2 pt-[7px]">
            <State state="Check" word="Not shown" />
            <p className="type-verdict">This lane could not be drawn</p>
            <div className="flex items-end justify-between gap-4">
              <p className="type-reason self-start text-ink2">The rest of the shelf is right; nothing logged is lost.</p>
              <Button size="lane" onClick={() => this.setState({ failed: false })}>
                Try again
              </Button>
            </div>
          </div>
        }
      />
    );
  }
}
