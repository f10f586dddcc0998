'use client';

import { useState } from 'react';
import { degrees } from '@/components/batch/figures';
import { Button } from '@/components/ui/Button';
import { Haze } from '@/components/ui/Haze';
import { FormError } from '@/components/ui/Notice';
import { State } from '@/components/ui/StateMark';
import { ClientError } from '@/lib/client/fetcher';
import { createPlace, removePlace, updatePlace, usePlaces } from '@/lib/client/lots';
import type { PlaceBody } from '@/lib/contracts/lots';
import { PlaceForm } from './PlaceForm';

const LINK = 'type-label min-h-8 text-ink2 underline underline-offset-4 max-strip:min-h-11';

/** Places with their room; full is said, not only drawn. */
export function Places({ mayManage }: { mayManage: boolean }) {
  const { places, error, retry } = usePlaces();
  const [changed, setChanged] = useState<string | null>(null);
  const [failed, setFailed] = useState<string | null>(null);

  async function remove(place: PlaceBody) {
    setFailed(null);
    try {
      await removePlace(place.id);
    } catch (problem) {
      setFailed(problem instanceof ClientError ? problem.message : 'It was not taken away. Try again.');
    }
  }

  if (error && !places) {
    return (
      <div className="type-body flex flex-wrap items-center gap-3 px-(--margin) py-3 text-ink2">
        <p>The places did not load. {error.message}</p>
        <Button onClick={retry}>Try again</Button>
      </div>
    );
  }
  if (!places) return <Haze height={60} label="Loading the places" className="m-(--margin)" />;
  return (
    <>
      {places.length === 0 && <p className="type-body border-b px-(--margin) py-3 text-ink2">No place is named yet.</p>}
      <ul>
        {places.map((place) => (
          <li key={place.id} className="border-b border-rule">
            {changed === place.id ? (
              <PlaceForm
                place={place}
                onLeave={() => setChanged(null)}
                onSend={async (input) => {
                  await updatePlace(place.id, input);
                  setChanged(null);
                }}
              />
            ) : (
              <div className="flex flex-wrap items-center gap-x-5 gap-y-1 px-(--margin) py-2">
                <span className="type-name-low min-w-40 break-words">{place.name}</span>
                <Standing place={place} />
                {mayManage && (
                  <span className="not-printed ml-auto flex gap-4">
                    <button type="button" aria-label={`Change ${place.name}`} onClick={() => setChanged(place.id)} className={LINK}>
                      Change
                    </button>
                    {place.bottles === 0 && (
                      <button type="button" aria-label={`Take ${place.name} away`} onClick={() => void remove(place)} className={LINK}>
                        Take away
                      </button>
                    )}
                  </span>
                )}
              </div>
            )}
          </li>
        ))}
      </ul>
      {failed && <FormError>{failed}</FormError>}
      {mayManage && (
        <div className="not-printed border-b">
          <PlaceForm place={null} onSend={createPlace} />
        </div>
      )}
    </>
  );
}

/** How many stand there, of how many that fit. */
function Standing({ place: { bottles, capacity, temperature_c } }: { place: PlaceBody }) {
  const full = capacity !== null && bottles >= capacity;
  return (
    <>
      <span className="type-label text-ink2">
        {capacity === null ? `${bottles} bottles` : `${bottles} of ${capacity} bottles`}
        {temperature_c !== null && `, up to ${degrees(temperature_c)}`}
      </span>
      {full && <State state="Check" word="Full" size={13} />}
    </>
  );
}
