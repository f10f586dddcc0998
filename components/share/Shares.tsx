'use client';

import { useState } from 'react';
import { typedNumber } from '@/components/batch/figures';
import { Box } from '@/components/ui/Box';
import { Button } from '@/components/ui/Button';
import { Field } from '@/components/ui/Field';
import { FormError } from '@/components/ui/Notice';
import { GroupBar } from '@/components/ui/Page';
import { ClientError } from '@/lib/client/fetcher';
import { createShare, revokeShare, useShares } from '@/lib/client/tastings';
import { lookedWords } from './words';

interface SharesProps {
  batchId: string;
  day: (at: string) => string;
  /** What a new link is asked for stands behind a button. */
  folded?: boolean;
}

/** The share links of a batch: made, copied, revoked. Whoever has the address can look. */
export function Shares({ batchId, day, folded = false }: SharesProps) {
  const { shares, error } = useShares(batchId);
  const [asking, setAsking] = useState(!folded);
  const [days, setDays] = useState('365');
  const [people, setPeople] = useState(false);
  const [tastings, setTastings] = useState(true);
  const [failed, setFailed] = useState<string | null>(null);
  const [wrongDays, setWrongDays] = useState<string | undefined>();
  const [copied, setCopied] = useState<string | null>(null);

  async function attempt(act: () => Promise<unknown>) {
    setFailed(null);
    setWrongDays(undefined);
    try {
      await act();
    } catch (problem) {
      const told = problem instanceof ClientError ? problem : null;
      const days = told?.fields.expires_in_days?.[0];
      if (days) setWrongDays(days);
      else setFailed(told?.message ?? 'It was not done. Try again.');
    }
  }
  return (
    <section aria-label="Share links" className="not-printed">
      <GroupBar word="Share links" note="one batch, to look at only" />
      {error && !shares && <p className="type-body px-(--margin) py-2 text-ink2">The links did not load. {error.message}</p>}
      <ul>
        {(shares ?? []).map((share) => (
          <li key={share.id} className="border-b border-rule px-(--margin) py-2">
            {share.url && share.open ? (
              <a href={share.url} className="type-label break-all underline underline-offset-4">
                {share.url}
              </a>
            ) : (
              <p className="type-label text-ink2">{share.revoked_at ? 'revoked' : 'expired'}</p>
            )}
            <div className="type-label flex flex-wrap items-center gap-x-4 text-ink2">
              <span className="w-full">
                until {day(share.expires_at)}, {lookedWords(share.looked_at)}
              </span>
              {share.open && share.url && (
                <>
                  <button type="button" className="min-h-8 underline underline-offset-4 max-strip:min-h-11" onClick={() => void attempt(async () => (await navigator.clipboard.writeText(share.url!), setCopied(share.id)))}>
                    {copied === share.id ? 'Copied' : 'Copy'}
                  </button>
                  <button type="button" className="min-h-8 text-madder underline underline-offset-4 max-strip:min-h-11" onClick={() => void attempt(() => revokeShare(share))}>
                    Revoke
                  </button>
                </>
              )}
            </div>
          </li>
        ))}
      </ul>
      {failed && <FormError>{failed}</FormError>}
      {asking ? (
        <div className="flex flex-col gap-2 border-b px-(--margin) py-3">
          <Field label="open for" unit="days" inputMode="numeric" value={days} onChange={(event) => setDays(event.target.value)} error={wrongDays} className="w-40" />
          <Box ticked={tastings} onTick={setTastings}>
            <span className="type-body">Guests may write tasting notes.</span>
          </Box>
          <Box ticked={people} onTick={setPeople}>
            <span className="type-body">Show my name, and those of tasters who chose it.</span>
          </Box>
          <Button className="self-start" onClick={() => void attempt(() => createShare(batchId, { expires_in_days: typedNumber(days) ?? Number.NaN, show_people: people, takes_tastings: tastings }))}>
            Make a link
          </Button>
        </div>
      ) : (
        <div className="border-b px-(--margin) py-3">
          <Button onClick={() => setAsking(true)}>Share it by a link</Button>
        </div>
      )}
    </section>
  );
}
