import Link from 'next/link';
import type { ReactNode } from 'react';
import { BackIcon, OnwardIcon } from '@/components/ui/icons';
import { AskHow } from '@/components/how/AskHow';
import { answersOfFacts } from '@/components/how/judged';
import { Button, LinkButton } from '@/components/ui/Button';
import { Vessel } from '@/components/vessel/Vessel';
import type { VesselState } from '@/components/vessel/describe';
import { Haze } from '@/components/ui/Haze';
import type { BatchBody } from '@/lib/contracts/batches';
import type { Fact } from './facts';
import { placeWords } from './words';

export interface HeadActions {
  onRead: (() => void) | null;
  onAdd: (() => void) | null;
  onSetup: (() => void) | null;
  /** Where additions, racking, fining and the family stand; null for those who only look. */
  work: string | null;
}

const compareHref = (batchId: string): string => `/compare?batches=${batchId}`;

function Facts({ batch, facts, phone }: { batch: BatchBody; facts: readonly Fact[]; phone: boolean }) {
  const shown = phone ? facts.filter((fact) => fact.phone) : facts;
  const names: Record<string, string> = phone ? { 'original gravity': 'pitched at', attenuation: 'fallen', 'strength so far': 'strength' } : {};
  const order = phone ? ['now', 'last known', 'attenuation', 'strength so far', 'original gravity', 'room', 'foam'] : shown.map((fact) => fact.name);
  const ordered = order.flatMap((name) => shown.find((fact) => fact.name === name) ?? []);
  return (
    <div className={phone ? 'border-b' : 'mt-[14px] border-t wide:flex'}>
      <dl className={phone ? 'grid grid-cols-4' : 'grid min-w-0 flex-1 grid-cols-4 wide:flex'}>
      {ordered.map((fact, index) => (
        <div key={fact.name} className={phone ? `border-rule py-2 ${index > 3 ? 'border-t' : ''} ${index % 4 === 0 ? 'pl-(--margin)' : 'border-l pl-2'}` : `flex-auto py-2 pr-3 ${index === 0 ? '' : index % 4 === 0 ? 'wide:border-l wide:pl-3' : 'border-l pl-3'}`}>
          <dt className="type-label truncate text-[0.71875rem] text-ink2">{names[fact.name] ?? fact.name}</dt>
          {/* Words are longer than figures and would touch their neighbour. */}
          <dd className={`font-mono font-semibold leading-5 ${phone && !/\d/.test(fact.figure) ? 'text-[0.8125rem]' : 'flex flex-wrap items-baseline gap-x-1.5 whitespace-nowrap text-[0.96875rem]'}`}>
            {fact.arriving ? (
              <Haze height={20} label={`Loading: ${names[fact.name] ?? fact.name}`} className="w-14" />
            ) : (
              // A sensor's name may be sixty letters long.
              <span className={phone ? '' : 'inline-block max-w-[16ch] truncate align-bottom'} title={phone ? undefined : fact.figure}>
                {fact.figure}
              </span>
            )}
            {fact.more && !phone && <span className="type-label text-ink2">{fact.more}</span>}
          </dd>
        </div>
      ))}
      </dl>
      <AskHow of={`figures of ${batch.name}`} answers={() => answersOfFacts(batch, facts)} className={phone ? 'w-full border-t border-rule px-(--margin)' : 'py-2 wide:border-l wide:pl-3'} />
    </div>
  );
}

/** What stands around the vessel, in one line below the drink's own figures. */
const AROUND: ReadonlySet<string> = new Set(['room', 'foam']);

function Around({ facts }: { facts: readonly Fact[] }) {
  return (
    <dl className="flex flex-wrap gap-x-8 gap-y-1 border-t border-rule pt-2">
      {facts.map((fact) => (
        <div key={fact.name} className="type-label flex items-baseline gap-[1ch]">
          <dt className="text-ink2">{fact.name}</dt>
          <dd>
            <span className="font-mono text-[0.875rem] font-semibold">{fact.figure}</span>
            {fact.more && <span className="pl-1.5 text-ink2">{fact.more}</span>}
          </dd>
        </div>
      ))}
    </dl>
  );
}

/** The batch's name, its vessel, what can be done, and one ruled line of facts. */
export function BatchHead({ batch, vessel, facts, actions }: { batch: BatchBody; vessel: VesselState; facts: readonly Fact[]; actions: HeadActions }) {
  const around = facts.filter((fact) => AROUND.has(fact.name));
  return (
    <header className="hidden border-b pl-3 pr-(--margin) strip:flex">
      <div className="w-[142px] shrink-0 py-3">
        <Vessel vessel={vessel} height={132} />
      </div>
      <div className="min-w-0 flex-1 pb-4 pt-3">
        <div className="flex flex-wrap items-center gap-x-4 gap-y-2">
          <h1 className="type-title min-w-0 break-words">{batch.name}</h1>
          <p className="type-label text-ink2">
            {placeWords(batch)}
            {batch.state === 'ended' && ', ended'}
          </p>
          <div className="ml-auto flex flex-wrap gap-2">
            {actions.onRead && <Button onClick={actions.onRead}>Read by hand</Button>}
            {actions.onAdd && <Button onClick={actions.onAdd}>Add</Button>}
            {actions.work && <LinkButton href={actions.work}>Cellar work</LinkButton>}
            <LinkButton look="quiet" href={compareHref(batch.id)}>
              Compare
            </LinkButton>
            {actions.onSetup && (
              <Button look="quiet" onClick={actions.onSetup}>
                Set-up
              </Button>
            )}
          </div>
        </div>
        <Facts batch={batch} facts={facts.filter((fact) => !AROUND.has(fact.name))} phone={false} />
        {around.length > 0 && <Around facts={around} />}
      </div>
    </header>
  );
}

/** On a phone: the way back and the name, before the decision. */
export function PhoneHead({ batch, meta, onSetup }: { batch: BatchBody; meta: readonly string[]; onSetup: (() => void) | null }) {
  return (
    <header className="flex min-h-[46px] items-center gap-2 border-b-[1.5px] border-ink px-(--margin) py-1 strip:hidden">
      <Link href="/shelf" className="type-label -ml-2 inline-flex min-h-11 items-center gap-1 px-2 text-ink2 no-underline">
        <BackIcon size={11} /> Shelf
      </Link>
      <p className="type-sub two-lines mb-0! min-w-0 flex-1 break-words pb-0! leading-6!" role="heading" aria-level={1}>
        {batch.name}
      </p>
      <div className="type-label shrink-0 text-right text-ink2 max-[359px]:hidden" style={{ lineHeight: '1rem' }}>
        {meta.map((line) => (
          <div key={line}>{line}</div>
        ))}
      </div>
      {onSetup && (
        <button type="button" className="type-label min-h-11 text-ink underline decoration-rule2 underline-offset-4" onClick={onSetup}>
          Set-up
        </button>
      )}
    </header>
  );
}

export function PhoneFacts({ batch, facts, work }: { batch: BatchBody; facts: readonly Fact[]; work: string | null }) {
  return (
    <div className="strip:hidden">
      <Facts batch={batch} facts={facts} phone />
      {work && <Onward href={work}>Cellar work: add, rack, fine, family</Onward>}
      <Onward href={compareHref(batch.id)}>Compare with another batch</Onward>
    </div>
  );
}

function Onward({ href, children }: { href: string; children: ReactNode }) {
  return (
    <Link href={href} className="type-label flex min-h-11 items-center justify-between border-b px-(--margin) text-ink no-underline">
      {children} <OnwardIcon size={11} />
    </Link>
  );
}
