'use client';

import { useState } from 'react';
import { Row } from '@/components/settings/Row';
import { Button } from '@/components/ui/Button';
import { Field } from '@/components/ui/Field';
import { FormError } from '@/components/ui/Notice';
import { GroupBar } from '@/components/ui/Page';
import { Sentence } from '@/components/ui/Sentence';
import { saveMessages } from '@/lib/client/messages';
import type { MessagesBody } from '@/lib/contracts/messages';
import { useSaving } from './use-saving';
import { clockOf, minutesOf } from './words';

const USUAL = { from: '22:00', to: '07:00', digest: '07:30' };

function Quiet({ messages }: { messages: MessagesBody }) {
  const { quiet } = messages;
  const [draft, setDraft] = useState<{ from: string; to: string } | null>(null);
  const { busy, failed, run } = useSaving();
  const from = draft && minutesOf(draft.from);
  const to = draft && minutesOf(draft.to);
  const same = draft !== null && from !== null && from === to;
  const begin = () => setDraft(quiet ? { from: clockOf(quiet.from), to: clockOf(quiet.to) } : { from: USUAL.from, to: USUAL.to });
  return (
    <Row name="quiet hours">
      {failed && <FormError>{failed}</FormError>}
      {draft === null ? (
        <div className="flex flex-wrap items-center gap-x-4 gap-y-2">
          <span className="min-w-0 flex-1 basis-64">
            <Sentence>{quiet ? `From ${clockOf(quiet.from)} to ${clockOf(quiet.to)} messages wait and come as one after. What can hurt someone comes all the same.` : 'None: messages come at any hour.'}</Sentence>
          </span>
          <span className="flex gap-2">
            <Button disabled={busy} onClick={begin}>
              {quiet ? 'Change' : 'Keep some'}
            </Button>
            {quiet && (
              <Button look="quiet" disabled={busy} onClick={() => void run(() => saveMessages({ quiet: null }))}>
                None
              </Button>
            )}
          </span>
        </div>
      ) : (
        <div className="flex flex-wrap items-start gap-3">
          <Field label="From" type="time" required value={draft.from} onChange={(event) => setDraft({ ...draft, from: event.target.value })} className="w-32" />
          <Field label="To" type="time" required value={draft.to} onChange={(event) => setDraft({ ...draft, to: event.target.value })} className="w-32" error={same ? 'must be another time' : undefined} />
          <div className="flex gap-2 self-end">
            <Button
              look="first"
              disabled={busy || from === null || to === null || same}
              onClick={() => void run(() => saveMessages({ quiet: { from: from!, to: to! } })).then((done) => done && setDraft(null))}
            >
              Keep these
            </Button>
            <Button look="quiet" onClick={() => setDraft(null)}>
              Leave it
            </Button>
          </div>
        </div>
      )}
    </Row>
  );
}

function Digest({ messages }: { messages: MessagesBody }) {
  const { digest_at: at } = messages;
  const [draft, setDraft] = useState<string | null>(null);
  const { busy, failed, run } = useSaving();
  const minutes = draft === null ? null : minutesOf(draft);
  return (
    <Row name="morning mail">
      {failed && <FormError>{failed}</FormError>}
      {draft === null ? (
        <div className="flex flex-wrap items-center gap-x-4 gap-y-2">
          <span className="min-w-0 flex-1 basis-64">
            <Sentence>{at === null ? 'None. It would hold the day’s rounds and how every vessel stands.' : `At ${clockOf(at)}: the day’s rounds and how every vessel stands, of every cellar you tend.`}</Sentence>
          </span>
          <span className="flex gap-2">
            <Button disabled={busy} onClick={() => setDraft(at === null ? USUAL.digest : clockOf(at))}>
              {at === null ? 'Send me one' : 'Change'}
            </Button>
            {at !== null && (
              <Button look="quiet" disabled={busy} onClick={() => void run(() => saveMessages({ digest_at: null }))}>
                None
              </Button>
            )}
          </span>
        </div>
      ) : (
        <div className="flex flex-wrap items-start gap-3">
          <Field label="At" type="time" required value={draft} onChange={(event) => setDraft(event.target.value)} className="w-32" />
          <div className="flex gap-2 self-end">
            <Button look="first" disabled={busy || minutes === null} onClick={() => void run(() => saveMessages({ digest_at: minutes })).then((done) => done && setDraft(null))}>
              Every morning
            </Button>
            <Button look="quiet" onClick={() => setDraft(null)}>
              Leave it
            </Button>
          </div>
        </div>
      )}
    </Row>
  );
}

/** When the reader may be told, by their own clock. */
export function Times({ messages }: { messages: MessagesBody }) {
  return (
    <section aria-label="When">
      <GroupBar word="When" note={`by your clock, ${messages.time_zone.replaceAll('_', ' ')}`} />
      <Quiet messages={messages} />
      <Digest messages={messages} />
    </section>
  );
}
