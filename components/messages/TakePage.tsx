'use client';

import { useState } from 'react';
import { Button, LinkButton } from '@/components/ui/Button';
import { Haze } from '@/components/ui/Haze';
import { Wordmark } from '@/components/ui/Mark';
import { ErrorState, FormError } from '@/components/ui/Notice';
import { Sentence } from '@/components/ui/Sentence';
import { State } from '@/components/ui/StateMark';
import { alertState, goneWord } from '@/components/alerts/rows';
import { takeByLink, useTakeLink } from '@/lib/client/messages';
import type { TakePage as Body } from '@/lib/contracts/messages';
import { useSaving } from './use-saving';

/** Behind a mailed link: what it is about, and one button. Opening the page takes nothing. */
export function TakePage({ token }: { token: string }) {
  const { page, error, retry } = useTakeLink(token);
  const gone = error && (error.status === 404 || error.status === 422);
  return (
    <div className="mx-auto min-h-dvh max-w-[560px] pb-16 strip:border-x">
      <header className="flex min-h-(--header) items-center border-b-[1.5px] border-ink px-(--margin)">
        <Wordmark />
      </header>
      <main>
        {gone ? (
          <ErrorState title="This link no longer opens anything">
            <p>Its time is over, or you no longer tend that cellar.</p>
            <LinkButton href="/alerts" className="mt-2">
              To the alerts
            </LinkButton>
          </ErrorState>
        ) : error && !page ? (
          <ErrorState title="The page did not load" onRetry={retry}>
            {error.message}
          </ErrorState>
        ) : !page ? (
          <Haze height={240} label="Loading the alert" className="m-(--margin)" />
        ) : (
          <Alert page={page} token={token} retry={retry} />
        )}
      </main>
    </div>
  );
}

function Alert({ page, token, retry }: { page: Body; token: string; retry: () => void }) {
  const { busy, failed, run } = useSaving('It was not taken. Try again.');
  const [done, setDone] = useState<Body | null>(null);
  const shown = done ?? page;
  const { state, word } = alertState(shown);
  const vessel = shown.batch.tag === null ? shown.batch.name : `${shown.batch.name}, tag ${shown.batch.tag}`;
  const take = async () => {
    const taken = await run(async () => setDone(await takeByLink(token)));
    // Somebody may have been quicker: the page then says who.
    if (!taken) retry();
  };
  return (
    <article className="flex flex-col gap-4 px-(--margin) py-5">
      <header>
        <State state={state} size={18} word={`${word}, ${vessel}`} className="text-[0.84375rem]" />
        <h1 className="type-head mt-2">
          <Sentence strong>{shown.headline}</Sentence>
        </h1>
        <p className="type-body mt-1">
          <Sentence>{shown.reason}</Sentence>
        </p>
        {shown.gone && shown.state !== 'resolved' && <p className="type-body mt-3 border-l-[3px] border-ink pl-3">Meanwhile it is {goneWord(shown)}. It is over by itself if that lasts.</p>}
      </header>
      {shown.act && (
        <section>
          <h2 className="type-label border-b pb-1.5 text-ink2">what to do</h2>
          <p className="type-body pt-2">
            <Sentence>{shown.act}</Sentence>
          </p>
        </section>
      )}
      {failed && <FormError>{failed}</FormError>}
      {shown.state === 'open' && !shown.used ? (
        <>
          <Button look="first" size="tall" disabled={busy} onClick={() => void take()}>
            I have it
          </Button>
          <p className="type-reason text-ink2">As {shown.person}. Then nobody else is told. The link works once.</p>
        </>
      ) : (
        <div role="status" className="border-l-[3px] border-ink pl-3">
          <p className="type-body">
            {shown.state === 'resolved' ? 'It has passed: there is nothing to do.' : shown.state === 'acknowledged' ? `${shown.taken_by ?? 'Somebody'} has it. Nobody else is told.` : 'This link has been used. Sign in to take it again.'}
          </p>
        </div>
      )}
      <LinkButton href={`/batches/${shown.batch.id}`}>To {shown.batch.name}</LinkButton>
    </article>
  );
}
