import Link from 'next/link';
import { clock, dayName } from '@/components/charts/zone';
import { Button } from '@/components/ui/Button';
import { Sentence } from '@/components/ui/Sentence';
import type { MustBody } from '@/lib/contracts/musts';

/** All versions of a sheet with what changed, and the batches made from them. */
export function Versions({ must, timeZone, onVersion }: { must: MustBody; timeZone: string; onVersion: (version: number) => void }) {
  return (
    <section aria-labelledby="versions" className="mt-3 border-t-[1.5px] border-ink pt-3">
      <h2 id="versions" className="type-sub">
        Versions
      </h2>
      <ol>
        {must.versions.map((item) => {
          const at = Date.parse(item.at) / 1000;
          return (
            <li key={item.id} className="grid grid-cols-[2.5rem_minmax(0,1fr)_auto] items-baseline gap-x-3 border-b border-rule py-2">
              <span className="font-mono text-[0.9375rem] font-semibold">{item.version}</span>
              <div className="min-w-0">
                <p className="type-label text-ink2">
                  {dayName(at, timeZone)} {clock(at, timeZone)}
                  {item.by && `, ${item.by.name}`}
                </p>
                {item.change_note && <p className="type-body break-words">{item.change_note}</p>}
                {item.changes.map((change) => (
                  <p key={change} className="type-reason text-ink2">
                    <Sentence>{change}</Sentence>
                  </p>
                ))}
              </div>
              {item.version === must.version ? (
                <span className="type-label text-ink2">shown</span>
              ) : (
                <Button size="lane" look="quiet" onClick={() => onVersion(item.version)} aria-label={`Show version ${item.version}`}>
                  Show
                </Button>
              )}
            </li>
          );
        })}
      </ol>
      {must.batches.length > 0 && (
        <>
          <div className="mt-4 flex flex-wrap items-baseline justify-between gap-x-4">
            <h3 className="type-verdict">Made from it</h3>
            {must.batches.length > 1 && (
              <Link href={`/compare?batches=${must.batches.slice(0, 8).map((batch) => batch.id).join(',')}`} className="type-label">
                Compare them
              </Link>
            )}
          </div>
          <ul>
            {must.batches.map((batch) => (
              <li key={batch.id} className="border-b border-rule">
                <Link href={`/batches/${batch.id}`} className="flex min-h-11 items-baseline justify-between gap-3 py-2 no-underline hover:underline strip:min-h-8">
                  <span className="type-name-low">{batch.name}</span>
                  <span className="type-label text-ink2">
                    version {batch.version}, {batch.pitched_at ? `pitched ${dayName(Date.parse(batch.pitched_at) / 1000, timeZone)}` : 'not pitched'}
                  </span>
                </Link>
              </li>
            ))}
          </ul>
        </>
      )}
    </section>
  );
}
