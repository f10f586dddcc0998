import Link from 'next/link';
import { dayName } from '@/components/charts/zone';
import { litres } from '@/components/batch/figures';
import { Haze } from '@/components/ui/Haze';
import { Vessel } from '@/components/vessel/Vessel';
import { useFamily } from '@/lib/client/cellarwork';
import type { FamilyBody } from '@/lib/contracts/family';

type Member = FamilyBody['batches'][number];

const FLOW_WORDS: Record<FamilyBody['links'][number]['kind'], string> = { split: 'split off', blend: 'blended in', top_up: 'topped up' };

function Node({ member, note, here }: { member: Member; note: string | null; here: boolean }) {
  return (
    <Link href={`/batches/${member.id}`} aria-current={here ? 'page' : undefined} className={`flex min-h-14 items-center gap-3 py-1.5 pr-3 no-underline hover:underline ${here ? 'bg-lit' : ''}`}>
      <Vessel silentPicture height={48} vessel={{ kind: member.vessel_kind, neck: member.neck, level: Math.min(1, member.volume_l / member.vessel_l), drink: member.drink_colour, clearness: 'clearing', krausen: false, lees: 'none', tag: null, silent: false }} />
      <span className="min-w-0">
        <span className="type-name-low block break-words">{member.name}</span>
        <span className="type-label text-ink2">
          {member.tag !== null && `tag ${member.tag}, `}
          {litres(member.volume_l)}
          {member.state === 'ended' && ', ended'}
          {note && `, ${note}`}
        </span>
      </span>
    </Link>
  );
}

/** Those that flowed into it above, those that it flowed into below, each with its litres. */
export function Family({ batchId, timeZone }: { batchId: string; timeZone: string }) {
  const { family, error } = useFamily(batchId);
  if (error && !family) return <p className="type-body text-ink2">The family did not load. {error.message}</p>;
  if (!family) return <Haze height={120} label="Loading the family" />;
  const members = new Map(family.batches.map((member) => [member.id, member]));
  const branch = (id: string, way: 'from' | 'to', seen: readonly string[]): React.ReactNode => {
    const links = family.links.filter((link) => (way === 'from' ? link.to : link.from) === id);
    if (links.length === 0) return null;
    return (
      <ul className="ml-5 border-l-[1.5px] border-ink2 pl-4">
        {links.map((link) => {
          const other = way === 'from' ? link.from : link.to;
          const member = members.get(other);
          if (!member || seen.includes(other)) return null;
          return (
            <li key={`${link.from} ${link.to} ${link.at}`}>
              <Node member={member} here={false} note={`${litres(link.litres)} ${FLOW_WORDS[link.kind]} ${dayName(Date.parse(link.at) / 1000, timeZone)}`} />
              {branch(other, way, [...seen, other])}
            </li>
          );
        })}
      </ul>
    );
  };
  const self = members.get(batchId);
  const from = branch(batchId, 'from', [batchId]);
  const to = branch(batchId, 'to', [batchId]);
  const shares = family.ancestry.filter((part) => part.batch !== batchId || family.ancestry.length > 1);
  return (
    <div className="flex max-w-[700px] flex-col gap-3">
      {self && <Node member={self} note={null} here />}
      {!from && !to && <p className="type-body text-ink2">It was never split, blended or topped up from another batch.</p>}
      {from && (
        <section aria-label="Where it comes from">
          <h3 className="type-verdict">Comes from</h3>
          {from}
        </section>
      )}
      {to && (
        <section aria-label="Where it went">
          <h3 className="type-verdict">Went into</h3>
          {to}
        </section>
      )}
      {shares.length > 0 && (
        <p className="type-label text-ink2">
          made of {shares.map((part) => `${Math.round(100 * part.share)} % ${members.get(part.batch)?.name ?? 'another batch'}`).join(', ')}
        </p>
      )}
    </div>
  );
}
