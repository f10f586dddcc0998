'use client';

import { useState, type CSSProperties } from 'react';
import { dayWords, SPARKLE_WORDS, strengthWords } from '@/components/book/words';
import { drinkHex } from '@/components/charts/palette';
import { TastingSheet } from '@/components/tasting/TastingSheet';
import { FOUND_WORDS, spreadWords } from '@/components/tasting/words';
import { Button } from '@/components/ui/Button';
import { Facts, type Fact } from '@/components/ui/Facts';
import { Select } from '@/components/ui/Field';
import { Haze } from '@/components/ui/Haze';
import { How } from '@/components/ui/How';
import { Wordmark } from '@/components/ui/Mark';
import { ErrorState } from '@/components/ui/Notice';
import { useNow } from '@/components/ui/now';
import { GroupBar } from '@/components/ui/Page';
import { State } from '@/components/ui/StateMark';
import { tasteShared, useShared } from '@/lib/client/tastings';
import type { SharedBatch } from '@/lib/contracts/shares';
import { how } from '@/lib/core/how/how';
import { SOURCES } from '@/lib/core/how/sources';
import { HOW_TASTED } from '@/lib/core/how/lots';
import { FallPicture } from './FallPicture';

const ORIGINAL = how('as the brewer told it, or the reading at the pitch, at 20 °C; the top of the picture', SOURCES.told);
const LAST = how('the latest word of the float or the hydrometer, at 20 °C; the picture follows the curve through all readings', SOURCES.told);

/** Days on a public page are those of the calendar everywhere: nobody's own zone is told. */
const ZONE = 'UTC';

/** One batch for those who have its address: to look at, and to say how it tasted. */
export function SharedPage({ token }: { token: string }) {
  const { shared, error, retry } = useShared(token);
  const now = useNow();
  const gone = error && (error.status === 404 || error.status === 410 || error.status === 422);
  return (
    <div className="mx-auto min-h-dvh max-w-[760px] pb-16 strip:border-x">
      <header className="flex min-h-(--header) items-center border-b-[1.5px] border-ink px-(--margin)">
        <Wordmark />
      </header>
      <main>
        {gone ? (
          <ErrorState title="This link no longer opens anything">It was revoked, its time is over, or a piece of its address is missing. Ask whoever gave it to you for another.</ErrorState>
        ) : error && !shared ? (
          <ErrorState title="The page did not load" onRetry={retry}>
            {error.message}
          </ErrorState>
        ) : !shared || now === null ? (
          <Haze height={420} label="Loading the batch" className="m-(--margin)" />
        ) : (
          <Shared shared={shared} token={token} now={now} />
        )}
      </main>
    </div>
  );
}

function Shared({ shared, token, now }: { shared: SharedBatch; token: string; now: number }) {
  const day = (at: string) => dayWords(at, ZONE, now);
  const facts: Fact[] = [
    { name: 'original gravity', says: shared.original_gravity?.toFixed(3) ?? 'not known', how: shared.original_gravity === null ? null : ORIGINAL },
    { name: 'gravity', says: shared.gravity?.toFixed(3) ?? 'not known', how: shared.gravity === null ? null : LAST },
    { name: 'strength', says: strengthWords(shared.abv_percent), how: shared.how },
    { name: 'pitched', says: shared.pitched_at ? day(shared.pitched_at) : 'not yet' },
  ];
  return (
    <div className="drink" style={{ '--drink': drinkHex(shared.drink_colour) } as CSSProperties}>
      <div className="px-(--margin) pb-2 pt-4">
        <h1 className="type-title break-words">{shared.name}</h1>
        <p className="type-label mt-1 text-ink2">
          {shared.called}
          {shared.by && `, by ${shared.by}`}
        </p>
      </div>
      <div className="px-(--margin)">
        <FallPicture shared={shared} now={now} />
      </div>
      <Facts facts={facts} columns="grid-cols-2 strip:grid-cols-4" className="border-t" />
      {shared.lots.map((lot) => (
        <section key={lot.id} aria-label={`Lot ${lot.code}`}>
          <GroupBar word={`${lot.name}, lot ${lot.code}`} note={`bottled ${day(lot.bottled_at)}`} />
          <div className="border-b px-(--margin) py-3">
            {lot.caution ? (
              <>
                <State state="Stop" word="Caution" />
                <p className="type-body">These bottles may hold more pressure than they should. Keep them cold; gloves and eye protection; open outdoors, away from faces.</p>
              </>
            ) : (
              <State state={lot.ready ? 'Ready' : 'Leave be'} word={lot.ready ? 'Ready to open' : `Ready from ${day(lot.ready_from)}`} />
            )}
            <p className="type-label pt-1 text-ink2">
              {SPARKLE_WORDS[lot.sparkle]}, {strengthWords(lot.abv_percent)}
              {lot.allergens && `. ${lot.allergens}`}
            </p>
            <How how={lot.how} of={`strength of lot ${lot.code}`} />
            <p className="type-label pt-1">tasted: {spreadWords(lot.tastings.score, 10)}</p>
            {lot.tastings.score && <How how={HOW_TASTED} of={`score of lot ${lot.code}`} />}
          </div>
          <ul>
            {lot.words.map((said, index) => (
              <li key={index} className="border-b border-rule px-(--margin) py-2">
                <p className="type-body break-words">{said.words}</p>
                <p className="type-label text-ink2">
                  {said.by ?? 'a taster'}, {day(said.at)}
                  {said.score !== null && `, ${said.score.toFixed(1)} of 10`}
                  {said.sparkle && `, ${FOUND_WORDS[said.sparkle]}`}
                </p>
              </li>
            ))}
          </ul>
        </section>
      ))}
      {shared.takes_tastings && shared.lots.length > 0 && <Taste shared={shared} token={token} />}
      {shared.cautions.length > 0 && (
        <ul className="type-reason list-disc py-3 pl-10 pr-(--margin) text-ink2" aria-label="Cautions">
          {shared.cautions.map((caution) => (
            <li key={caution}>{caution}</li>
          ))}
        </ul>
      )}
      <p className="type-label px-(--margin) py-3 text-ink2">This page is open until {day(shared.expires_at)}.</p>
    </div>
  );
}

/** A guest's tasting note. */
function Taste({ shared, token }: { shared: SharedBatch; token: string }) {
  const [lotId, setLotId] = useState(shared.lots[0]!.id);
  const [done, setDone] = useState(false);
  return (
    <section aria-label="Tasting sheet" className="border-b bg-desk px-(--margin) py-4">
      <h2 className="type-sub pb-2">How is it?</h2>
      {done ? (
        <div role="status" className="flex flex-col items-start gap-2">
          <State state="Done" word="Kept" />
          <p className="type-body">Your note stands with the others.</p>
          <Button onClick={() => setDone(false)}>Write another</Button>
        </div>
      ) : (
        <>
          {shared.lots.length > 1 && (
            <Select label="which" value={lotId} onChange={(event) => setLotId(event.target.value)} className="pb-3">
              {shared.lots.map((lot) => (
                <option key={lot.id} value={lot.id}>
                  {lot.name}, {lot.code}
                </option>
              ))}
            </Select>
          )}
          <TastingSheet
            guest
            onSend={async ({ name, show_name: _shown, ...tasted }) => {
              await tasteShared(token, { ...tasted, lot_id: lotId, guest_name: name });
              setDone(true);
            }}
          />
        </>
      )}
    </section>
  );
}
