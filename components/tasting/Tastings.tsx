'use client';

import { useState } from 'react';
import { Sheet } from '@/components/ui/Sheet';
import { dayWords } from '@/components/book/words';
import { Photos } from '@/components/photos/Photos';
import { Button } from '@/components/ui/Button';
import { Haze } from '@/components/ui/Haze';
import { How } from '@/components/ui/How';
import { GroupBar } from '@/components/ui/Page';
import { useMe } from '@/lib/client/me';
import { createTasting, removeTasting, useTastings } from '@/lib/client/tastings';
import { HOW_TASTED } from '@/lib/core/how/lots';
import { TastingSheet } from './TastingSheet';
import { ASPECTS, FOUND_WORDS, spreadWords, type Found } from './words';

/** What people found in a lot: the average with its spread, and each note. */
export function Tastings({ lotId, timeZone, now, mayTaste }: { lotId: string; timeZone: string; now: number; mayTaste: boolean }) {
  const { me } = useMe();
  const { tastings, summary, error, retry } = useTastings(lotId);
  const [open, setOpen] = useState(false);
  const found = (Object.entries(summary?.sparkle ?? {}) as [Found, number][]).filter(([, count]) => count > 0);
  return (
    <section aria-label="Tasting notes">
      <GroupBar word="Tasting notes" note={tastings && `${tastings.length}`} />
      {error && !tastings ? (
        <div className="type-body px-(--margin) py-3">
          The notes did not load. {error.message} <Button onClick={retry}>Try again</Button>
        </div>
      ) : !tastings || !summary ? (
        <Haze height={80} label="Loading the notes" className="m-(--margin)" />
      ) : (
        <>
          <div className="flex flex-wrap items-center gap-x-6 gap-y-1 border-b px-(--margin) py-2">
            {summary.count > 0 ? <p className="type-fig-lg">{spreadWords(summary.score, 10)}</p> : <p className="type-body text-ink2">Nobody has tasted it yet.</p>}
            {summary.count > 0 && <How how={HOW_TASTED} of="averages of the notes" className="open:order-last open:w-full" />}
            {mayTaste && (
              <Button className="ml-auto" onClick={() => setOpen(true)}>
                Taste it
              </Button>
            )}
            {summary.count > 0 && <dl className="type-label flex w-full flex-wrap gap-x-5 text-ink2">
              {ASPECTS.map((aspect) => (
                <div key={aspect}>
                  <dt className="inline">{aspect} </dt>
                  <dd className="inline text-ink">{spreadWords(summary[aspect], 5)}</dd>
                </div>
              ))}
              {found.length > 0 && (
                <div>
                  <dt className="inline">sparkle </dt>
                  <dd className="inline text-ink">{found.map(([word, count]) => `${FOUND_WORDS[word]} ${count}`).join(', ')}</dd>
                </div>
              )}
            </dl>}
          </div>
          <ul>
            {tastings.map((tasting) => (
              <li key={tasting.id} className="flex items-end gap-4 border-b border-rule px-(--margin) py-2">
                <div className="min-w-0 flex-1">
                  <p className="type-label flex flex-wrap gap-x-4 text-ink2">
                    <span className="min-w-0 font-semibold text-ink">
                      {tasting.by.name ?? 'somebody'}
                      {tasting.by.guest && ', guest'}
                    </span>
                    <span>{dayWords(tasting.at, timeZone, now)}</span>
                    {tasting.score !== null && <span className="text-ink">{tasting.score.toFixed(1)} of 10</span>}
                    {ASPECTS.filter((aspect) => tasting[aspect] !== null).map((aspect) => (
                      <span key={aspect}>
                        {aspect} {tasting[aspect]}
                      </span>
                    ))}
                    {tasting.sparkle && <span>{FOUND_WORDS[tasting.sparkle]}</span>}
                  </p>
                  {tasting.words && <p className="type-body break-words">{tasting.words}</p>}
                  {tasting.next_time && <p className="type-reason break-words text-ink2">Next time: {tasting.next_time}</p>}
                  <Photos place={{ lot: lotId }} on={{ tasting: tasting.id }} own={tasting.by.id !== null && tasting.by.id === me?.person.id} />
                </div>
                {tasting.mine && (
                  <button type="button" onClick={() => void removeTasting(tasting.id)} className="type-label min-h-8 shrink-0 text-ink2 underline underline-offset-4 max-strip:min-h-11">
                    Take back
                  </button>
                )}
              </li>
            ))}
          </ul>
        </>
      )}
      {open && (
        <Sheet title="Tasting sheet" onClose={() => setOpen(false)}>
          <TastingSheet
            guest={false}
            onSend={async ({ name: _name, ...tasted }) => {
              await createTasting(lotId, { ...tasted, at: new Date().toISOString() });
              setOpen(false);
            }}
          />
        </Sheet>
      )}
    </section>
  );
}
